/**
 * The closed forms that the section solver is measured with, measured themselves: against each other and in the
 * limits that they must have. They are written from memory, so nothing else vouches for them.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { coupledMicrostrip } from '../../support/closedForms/coupledMicrostrip';
import { microstrip, microstripEffectivePermittivity, microstripImpedanceInAir } from '../../support/closedForms/microstrip';
import { stripOverPlaneCapacitance } from '../../support/closedForms/stripOverPlane';
import { coupledStripCapacitance, stripCapacitance, thickStripCapacitance } from '../../support/closedForms/stripline';
import { mutualOverPlane, twoWireCapacitance, twoWireInductance, wireOverPlaneCapacitance } from '../../support/closedForms/wires';
import { near, relativeDifference } from '../../support/near';
import { epsilon0, mu0, speedOfLight } from '../../../server/src/units/constants';

describe('closed forms of striplines', () => {
  it('have the table value of the reference case (Cohn 1955, w = s = 0.2 mm, b = 0.6 mm, er = 4.2)', () => {
    const { even, odd } = coupledStripCapacitance(0.2e-3, 0.2e-3, 0.6e-3);
    near((4.2 * (even + odd)) / 2, 1.166068171e-10, 5e-10);
    near((4.2 * (even - odd)) / 2, -1.630145563e-11, 5e-10);
  });

  it('join: far pair and single strip, touching pair in even mode and half a double strip', () => {
    for (const w of [0.01, 0.2, 1, 3]) {
      const far = coupledStripCapacitance(w, 20, 1);
      near(far.even, stripCapacitance(w, 1), 1e-13);
      near(far.odd, stripCapacitance(w, 1), 1e-13);
      near(2 * coupledStripCapacitance(w, 1e-13, 1).even, stripCapacitance(2 * w, 1), 1e-11);
    }
  });

  it('go over into parallel plates with thick edges when wide, and into a wire when narrow', () => {
    near(thickStripCapacitance(3, 1e-14, 1), stripCapacitance(3, 1), 1e-8);
    // Flat strip of width w = wire of radius w/4; a wire midway between planes: 2 pi eps0 / ln(4 b / (pi 2 a)).
    near(stripCapacitance(1e-4, 1), (2 * Math.PI * epsilon0) / Math.log(8 / (Math.PI * 1e-4)), 1e-8);
  });
});

describe('closed form of a strip over a plane', () => {
  it('is that of a wire of a quarter of its width when narrow', () => {
    near(stripOverPlaneCapacitance(1e-3, 1), (2 * Math.PI * epsilon0) / Math.log(8e3), 1e-8);
  });

  it('agrees with Hammerstad & Jensen over 0.01 <= w/h <= 30 within their 0.03 %', () => {
    for (let u = 0.01; u <= 30; u *= 1.3) near(1 / (speedOfLight * microstripImpedanceInAir(u)), stripOverPlaneCapacitance(u, 1), 3e-4, `w/h = ${u}`);
  });

  it('gains one parallel plate per width when wide', () => {
    const slope = (stripOverPlaneCapacitance(30, 1) - stripOverPlaneCapacitance(28, 1)) / 2;
    // d/dw of w/h + (1/pi)(1 + ln(2 pi (w/2h + 0.92))): the fringe grows with the logarithm.
    near(slope, epsilon0 * (1 + 2 / (2 * Math.PI * (14.5 + 0.92))), 1e-3);
  });
});

describe('closed forms of wires', () => {
  it('have the reference value of two wires, and half a distance to the mirror plane', () => {
    near(twoWireCapacitance(0.1e-3, 0.4e-3), 2.112159504e-11, 1e-9);
    near(twoWireInductance(0.1e-3, 0.4e-3), 5.267831591e-7, 1e-9);
    near(wireOverPlaneCapacitance(0.1, 0.7), 2 * twoWireCapacitance(0.1, 1.4), 1e-15);
  });

  it('give a mutual that falls as 1/s² and meets the self inductance at the surface', () => {
    near(mutualOverPlane(1, 0.01, 0.01) / mutualOverPlane(2, 0.01, 0.01), 4, 1e-3);
    near(mutualOverPlane(1e-3, 1, 1), (mu0 / (2 * Math.PI)) * Math.acosh(1e3), 1e-6);
  });
});

describe('closed forms of microstrips', () => {
  it('are the speed of light in air, and monotone in thickness and permittivity', () => {
    const air = microstrip(1, 0, 1, 1);
    near(air.capacitance * air.inductance * speedOfLight ** 2, 1, 1e-12);
    for (const u of [0.1, 1, 10]) {
      assert.ok(microstrip(u, 0, 1, 4).capacitance < microstrip(u, 0.05, 1, 4).capacitance);
      assert.ok(microstrip(u, 0.05, 1, 4).inductance < microstrip(u, 0, 1, 4).inductance);
      near(microstrip(u, 1e-9, 1, 4).capacitance, microstrip(u, 0, 1, 4).capacitance, 1e-6);
      assert.ok((1 + 4) / 2 < microstripEffectivePermittivity(u, 4) && microstripEffectivePermittivity(u, 4) < 4);
    }
  });

  it('of a distant pair become those of the single strip, even above and odd below', () => {
    for (const u of [0.1, 1, 10]) {
      const effective = microstripEffectivePermittivity(u, 4.2);
      const single = microstripImpedanceInAir(u) / Math.sqrt(effective);
      const { even, odd } = coupledMicrostrip(u, 10, 4.2);
      assert.ok(single < even.impedance && odd.impedance < single);
      assert.ok(relativeDifference(even.impedance, single) < 0.006 && relativeDifference(odd.impedance, single) < 0.012);
      assert.ok(odd.effectivePermittivity < effective * 1.005 && effective < even.effectivePermittivity * 1.005);
    }
  });

  it('of a close pair have the even impedance of half a double strip, within their 0.6 %', () => {
    for (const u of [0.3, 1, 3]) {
      const double = microstripImpedanceInAir(2 * u + 0.1);
      near(coupledMicrostrip(u, 0.1, 1).even.impedance, 2 * double, 0.012, `u = ${u}`);
    }
  });
});
