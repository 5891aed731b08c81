/** Skin effect in a flat trace: the reference case, limits, convergence. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { copperAt, skinDepth } from '../../../server/src/physics/resistance/copper';
import { traceResistance, type TraceConductor } from '../../../server/src/physics/resistance/traceResistance';
import { hertz, kelvins, metres } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import reference from '../../reference/fields-and-noise.json';

const caseOf = (id: string) => reference.cases.find((each) => each.id === id) as unknown as { inputs_SI: Readonly<Record<string, number>>; outputs: Readonly<Record<string, number>> };
const trace = (more: Partial<TraceConductor> = {}): TraceConductor => ({ width: metres(0.2e-3), thickness: metres(35e-6), overPlane: null, temperature: kelvins(293.15), ...more });
const at = (frequency: number, more: Partial<TraceConductor> = {}, refinement = 1) => traceResistance(trace(more), hertz(frequency), refinement).perLength;

describe('the resistance of a trace', () => {
  it('D-skin-1: skin depth of copper', () => {
    const { inputs_SI: { f, rho }, outputs } = caseOf('D-skin-1');
    // The case takes mu0 as 4 pi 1e-7.
    near(skinDepth(rho, hertz(f)), outputs.delta_m, 1e-9);
  });

  it('D-Rdc-1, and 0.393 % more for each kelvin (IEC 60028)', () => {
    const { inputs_SI: { l, w, t }, outputs } = caseOf('D-Rdc-1');
    const dc = (kelvin: number) => l * at(0, { width: metres(w), thickness: metres(t), temperature: kelvins(kelvin) });
    near(dc(293.15), outputs.R, 1e-9);
    near(dc(353.15) / dc(293.15), 1 + 60 * 0.00393, 1e-12);
    near(copperAt(kelvins(293.15)), 1.724e-8, 1e-12);
  });

  it('D-Rac-10MHz: against volume filaments and finite elements', () => {
    const { inputs_SI: { w, t, f }, outputs } = caseOf('D-Rac-10MHz');
    near(at(f, { width: metres(w), thickness: metres(t) }), outputs.R_per_m, 0.01);
  });

  it('goes from dc upwards without a step', () => {
    let before = at(0);
    for (let exponent = 3; exponent <= 9; exponent += 0.05) {
      const now = at(10 ** exponent);
      assert.ok(before * (1 - 2e-3) <= now && now < 1.15 * before, `${10 ** exponent} Hz: ${before} to ${now}`);
      before = now;
    }
  });

  it('agrees with cells twice as fine, from 100 kHz to 1 GHz, alone and over a plane', () => {
    for (const frequency of [1e5, 1e6, 1e7, 1e8, 1e9]) {
      for (const overPlane of [null, metres(0.1e-3), metres(1e-3)]) near(at(frequency, { overPlane }), at(frequency, { overPlane }, 2), 0.01, `${frequency} Hz`);
    }
  });

  it('does not jump with the last digit of a frequency, over a plane', () => {
    // Where the edges of the cells, added up, end a rounding error off the middle.
    const cases = [[1.991244018812192e-3, 7.294102371607572e-6, 0.7225116141685404e-3, 156037978.30922082], [4.705759017809413e-3, 88.7855284576532e-6, 86.06950296841044e-6, 154196819.58646512], [2.435239019042122e-3, 88.32372593707415e-6, 98.50544635504167e-6, 238191008.68000522]];
    for (const [width, thickness, overPlane, frequency] of cases) {
      const more = { width: metres(width), thickness: metres(thickness), overPlane: metres(overPlane) };
      near(at(1.0001 * frequency, more), at(frequency, more), 2e-3, `${frequency} Hz`);
    }
  });

  it('rises with the root of frequency where the depth is small', () => {
    near(at(1e9) / at(2.5e8), 2, 0.05);
  });

  it('of a strip high over its plane is that alone; close over it, the current crowds to the face', () => {
    near(at(1e8, { overPlane: metres(50e-3) }), at(1e8), 5e-3);
    // Very close, nearly all of it runs in one depth of the lower face: its edges and the upper one carry what is left.
    const width = 2e-3;
    const one = 1.724e-8 / (width * skinDepth(1.724e-8, hertz(1e9)));
    const close = at(1e9, { width: metres(width), overPlane: metres(20e-6) });
    assert.ok(0.85 * one < close && close < 1.1 * one, `${close} of ${one}`);
  });

  it('of a square bar lies above that of the round wire of its perimeter (skin-depth estimate), by its corners', () => {
    const [side, frequency] = [0.5e-3, 1e7];
    const perimeter = 1.724e-8 / (4 * side * skinDepth(1.724e-8, hertz(frequency)));
    const square = at(frequency, { width: metres(side), thickness: metres(side) });
    assert.ok(1.05 * perimeter < square && square < 1.3 * perimeter, `${square / perimeter}`);
  });
});
