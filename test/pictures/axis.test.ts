/** Ticks are numbers that a person would choose, and stand where their numbers are. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { linearAxis, logAxis, niceStep } from '../../server/src/pictures/axis';

describe('axes', () => {
  it('step by 1, 2 or 5', () => {
    for (const [least, step] of [[0.9, 1], [1.1, 2], [2.1, 5], [5.1, 10], [3e-13, 5e-13], [0, 1], [NaN, 1]] as const) assert.equal(niceStep(least), step);
  });

  it('label a linear axis in one unit’s short numbers', () => {
    const { ticks, at } = linearAxis({ from: 0, to: 2.4e-3, pixels: [0, 240], dimension: 'voltage' }, 60);
    assert.deepEqual(ticks.map(({ label }) => label), ['0 V', '1 mV', '2 mV']);
    assert.equal(at(1.2e-3), 120);
  });

  it('label a logarithmic axis at powers of ten, with 2 and 5 between where there is room', () => {
    const { ticks, at } = logAxis({ from: 1e-4, to: 1e-2, pixels: [0, 400], dimension: 'length' }, 40);
    assert.deepEqual(ticks.map(({ label }) => label), ['0.1 mm', '0.2 mm', '0.5 mm', '1 mm', '2 mm', '5 mm', '10 mm']);
    assert.ok(Math.abs(at(1e-3) - 200) < 1e-9);
    assert.deepEqual(logAxis({ from: 1e-9, to: 1, pixels: [100, 0], dimension: 'voltage' }, 30).ticks.map(({ label }) => label).length <= 4, true);
  });
});
