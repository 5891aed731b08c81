import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { densityOverBand } from '../../../server/src/physics/noise/densityOverBand';
import { hertz } from '../../../server/src/units/quantity';
import { near } from '../../support/near';

const band = (from: number, to: number) => ({ from: hertz(from), to: hertz(to) });

describe('a density summed over a band', () => {
  it('is the closed integral of one pole, wherever the band lies about it, and its error bar covers what is off', () => {
    for (const pole of [1e-3, 50, 1e6, 3e11]) {
      for (const [from, to] of [[0, 1e3], [0, 1e9], [10, 20], [20, 2e7], [1e6, 1.0001e6], [1e-6, 1e12]] as const) {
        const found = densityOverBand(band(from, to), (f) => 1 / (1 + (f / pole) ** 2));
        const [x1, x2] = [from / pole, to / pole];
        const exact = pole * Math.atan2((to - from) / pole, 1 + x1 * x2);
        near(found.value, exact, 1e-10, `${pole}: ${from} to ${to}`);
        assert.ok(Math.abs(found.value - exact) <= found.error, `${pole}: ${from} to ${to}: ${found.error}`);
        assert.ok(found.error <= 1e-7 * exact);
      }
    }
  });

  it('is the logarithm of the band for 1/f, and its width for what is white', () => {
    near(densityOverBand(band(0.1, 1e7), (f) => 1 / f).value, 8 * Math.LN10, 1e-12);
    near(densityOverBand(band(0, 1e7), () => 3).value, 3e7, 1e-9);
  });

  it('is nothing over no band', () => assert.deepEqual(densityOverBand(band(5, 5), () => 1), { value: 0, error: 0 }));
});
