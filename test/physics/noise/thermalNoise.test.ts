import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { thermalNoise } from '../../../server/src/physics/noise/thermalNoise';
import { farads, hertz, kelvins, ohms } from '../../../server/src/units/quantity';

const room = kelvins(300);
const band = (from: number, to: number) => ({ from: hertz(from), to: hertz(to) });

describe('thermal noise of a node', () => {
  it('is 4.07 nV/√Hz for 1 kΩ at 300 K (Nyquist 1928, textbook value)', () => {
    const value = thermalNoise({ resistance: ohms(1000), capacitance: farads(0), temperature: room, band: band(0, 1) });
    assert.ok(Math.abs(value! / 4.07e-9 - 1) < 1e-3);
  });

  it('is 1.3 µV rms for 10 kΩ in 10 kHz at room temperature (Horowitz & Hill, The Art of Electronics, from memory)', () => {
    const value = thermalNoise({ resistance: ohms(1e4), capacitance: farads(0), temperature: kelvins(293), band: band(0, 1e4) });
    assert.ok(Math.abs(value! / 1.3e-6 - 1) < 0.03);
  });

  it('is 64 µV rms for 1 pF at 300 K, whatever the resistance (kT/C, textbook value)', () => {
    for (const resistance of [1, 1e3, 1e9]) {
      const value = thermalNoise({ resistance: ohms(resistance), capacitance: farads(1e-12), temperature: room, band: null });
      assert.ok(Math.abs(value! / 64.36e-6 - 1) < 1e-3);
    }
  });

  it('over a band that covers everything is kT/C, and over a narrow one the density at its middle', () => {
    const node = { resistance: ohms(2e3), capacitance: farads(3e-12), temperature: room };
    const all = thermalNoise({ ...node, band: band(0, 1e18) })!;
    assert.ok(Math.abs(all / thermalNoise({ ...node, band: null })! - 1) < 1e-5);
    const corner = 1 / (2 * Math.PI * 2e3 * 3e-12);
    const narrow = thermalNoise({ ...node, band: band(corner - 500, corner + 500) })!;
    const density = Math.sqrt((4 * 1.380649e-23 * 300 * 2e3 * 1000) / 2);
    assert.ok(Math.abs(narrow / density - 1) < 1e-4);
    // Far above the corner the difference of two arctangents near pi/2 would lose its digits.
    const high = thermalNoise({ ...node, band: band(1e16, 1.0001e16) })!;
    const roll = 1 / (1 + (2 * Math.PI * 1.00005e16 * 2e3 * 3e-12) ** 2);
    assert.ok(Math.abs(high / Math.sqrt(4 * 1.380649e-23 * 300 * 2e3 * 1e12 * roll) - 1) < 1e-4);
  });

  it('agrees with the integral of 4 k T Re Z, summed over a fine grid', () => {
    const [from, to, resistance, capacitance] = [1e5, 5e7, 1e4, 1e-12];
    let sum = 0;
    const steps = 200_000;
    for (let index = 0; index < steps; index += 1) {
      const f = from + ((to - from) * (index + 0.5)) / steps;
      sum += (resistance / (1 + (2 * Math.PI * f * resistance * capacitance) ** 2)) * ((to - from) / steps);
    }
    const value = thermalNoise({ resistance: ohms(resistance), capacitance: farads(capacitance), temperature: room, band: band(from, to) })!;
    assert.ok(Math.abs(value / Math.sqrt(4 * 1.380649e-23 * 300 * sum) - 1) < 1e-8);
  });

  it('is nothing where nothing dissipates, and has no value where nothing limits it', () => {
    const node = { capacitance: farads(1e-12), temperature: room, band: null };
    assert.equal(thermalNoise({ ...node, resistance: ohms(Infinity) }), 0);
    assert.equal(thermalNoise({ ...node, resistance: ohms(0) }), 0);
    assert.equal(thermalNoise({ ...node, resistance: ohms(50), capacitance: farads(0) }), null);
  });
});
