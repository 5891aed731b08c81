import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { search } from '../../server/src/fixes/search';

/** Noise that falls as a power of the factor: the crossing is known exactly. */
const powerLaw = (start: number, power: number) => (factor: number) => Math.log(start) - power * Math.log(factor);

describe('search', () => {
  it('finds where a power law meets what is wanted', () => {
    fc.assert(fc.property(fc.double({ min: 0.05, max: 20, noNaN: true }), fc.double({ min: 0.5, max: 4, noNaN: true }), (start, power) => {
      const found = search({ excess: powerLaw(start, power), better: 'more', smallest: 1e-4, largest: 1e4, tolerance: 1e-4, slope: 1.5 });
      assert.ok(found?.enough);
      assert.ok(Math.abs(Math.log(found.factor) - Math.log(start) / power) < 1e-3);
      assert.ok(found.evaluations <= 12, `${found.evaluations} evaluations`);
    }), { seed: 7, numRuns: 200 });
  });

  it('goes down for what has to become less', () => {
    const found = search({ excess: (factor) => Math.log(4 * factor), better: 'less', smallest: 0.01, largest: 10, tolerance: 1e-5, slope: 1.5 });
    assert.ok(found?.enough);
    assert.ok(Math.abs(found.factor - 0.25) < 1e-4);
  });

  it('says so where nothing in reach is enough', () => {
    assert.deepEqual(search({ excess: () => 1, better: 'more', smallest: 0.1, largest: 8, tolerance: 1e-3, slope: 1.5 })?.enough, false);
  });

  it('ends at the smallest that is allowed where even that is enough', () => {
    const found = search({ excess: () => -1, better: 'more', smallest: 0.1, largest: 8, tolerance: 1e-3, slope: 1.5 });
    assert.ok(found?.enough);
    assert.ok(Math.abs(found.factor - 0.1) < 1e-12);
  });

  it('has no answer where the noise has none', () => {
    assert.equal(search({ excess: () => NaN, better: 'more', smallest: 0.1, largest: 8, tolerance: 1e-3, slope: 1.5 }), null);
  });
});
