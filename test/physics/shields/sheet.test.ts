/** Sheets and slots: independent cases, a textbook value, limits. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { materialOf } from '../../../server/src/physics/shields/materials';
import { throughSheet, throughSlot } from '../../../server/src/physics/shields/sheet';
import { hertz, metres } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import reference from '../../reference/fields-and-noise.json';

const decibelsOf = (through: number) => -20 * Math.log10(through);
const copper = (thickness: number) => ({ conductivity: 5.8e7, permeability: 1, thickness: metres(thickness) });

describe('a sheet', () => {
  for (const { id, inputs_SI: given, outputs } of reference.cases.filter((each) => each.id.startsWith('D-SE-')) as unknown as { id: string; inputs_SI: { f: number; t: number; sigma: number; r: number | null; mu_r: number }; outputs: { SE_dB: number } }[]) {
    it(`${id}: Schelkunoff’s theory by transmission lines`, () => {
      const source = given.r === null ? { kind: 'plane' as const } : { kind: 'magnetic' as const, distance: metres(given.r) };
      near(decibelsOf(throughSheet({ conductivity: given.sigma, permeability: given.mu_r, thickness: metres(given.t) }, source, hertz(given.f))), outputs.SE_dB, 1e-6);
    });
  }

  it('of copper, 0.5 mm, at 1 MHz reflects 108 dB of a plane wave and absorbs 66 dB (Ott, from memory: R = 168 - 10 lg f, A = 131 t sqrt f)', () => {
    const absorbed = 131 * 0.5e-3 * Math.sqrt(1e6);
    near(decibelsOf(throughSheet(copper(0.5e-3), { kind: 'plane' }, hertz(1e6))), 168 - 60 + absorbed, 5e-3);
  });

  it('of no thickness, or against a field that stands still, lets all through', () => {
    assert.equal(throughSheet(copper(0), { kind: 'plane' }, hertz(1e6)), 1);
    assert.equal(throughSheet(copper(1e-3), { kind: 'magnetic', distance: metres(0.1) }, hertz(0)), 1);
    // What is left out is its own thickness: 35 µm of twice the distance.
    near(throughSheet(copper(35e-6), { kind: 'magnetic', distance: metres(1e-3) }, hertz(0.01)), 1 / (1 + 35e-6 / 2e-3), 1e-4);
  });

  it('keeps out an electric source better than a plane wave, and that better than a magnetic one', () => {
    const through = (kind: 'electric' | 'magnetic') => throughSheet(copper(35e-6), { kind, distance: metres(0.05) }, hertz(1e6));
    const plane = throughSheet(copper(35e-6), { kind: 'plane' }, hertz(1e6));
    assert.ok(through('electric') < plane && plane < through('magnetic'));
  });

  it('knows its materials, and no others', () => {
    assert.deepEqual(['copper', 'aluminium', 'brass', 'tin', 'steel', 'nickel-silver'].map((name) => materialOf(name) !== null), Array(6).fill(true));
    assert.equal(materialOf('__proto__'), null);
  });
});

describe('a slot', () => {
  it('lets half a wave through whole, and 20 dB a decade less below (Ott)', () => {
    near(throughSlot(metres(0.15), hertz(299792458)), 0.3, 1e-12);
    assert.equal(throughSlot(metres(0.5), hertz(1e9)), 1);
    near(throughSlot(metres(6e-3), hertz(1e8)) / throughSlot(metres(6e-3), hertz(1e7)), 10, 1e-12);
  });
});
