import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { pivotedBasis } from '../../../../server/src/physics/section/galerkin/pivotedBasis';
import { seeded } from '../../../support/seeded';

describe('a basis of the first few directions', () => {
  const [count, length, rank] = [12, 9, 4];
  const next = seeded(11);
  const random = () => Float64Array.from({ length: rank * (count + length) }, () => next() - 0.5);
  /** Combinations of four vectors. */
  const setOf = (numbers: Float64Array) => {
    const vectors = new Float64Array(count * length);
    for (let v = 0; v < count; v += 1) for (let i = 0; i < length; i += 1) for (let r = 0; r < rank; r += 1) vectors[v * length + i] += numbers[v * rank + r] * numbers[count * rank + r * length + i];
    return vectors;
  };

  it('ends at the rank, is orthonormal, and gives every vector back', () => {
    const given = setOf(random());
    const set = { vectors: Float64Array.from(given), count, length };
    const { count: found, pivots, parts: [parts] } = pivotedBasis([set], 1e-10, count);
    assert.equal(found, rank);
    for (let a = 0; a < found; a += 1) {
      for (let b = 0; b <= a; b += 1) {
        let sum = 0;
        for (let i = 0; i < length; i += 1) sum += set.vectors[pivots[a] * length + i] * set.vectors[pivots[b] * length + i];
        assert.ok(Math.abs(sum - (a === b ? 1 : 0)) < 1e-14);
      }
    }
    for (let v = 0; v < count; v += 1) {
      for (let i = 0; i < length; i += 1) {
        let sum = 0;
        for (let f = 0; f < found; f += 1) sum += parts[f * count + v] * set.vectors[pivots[f] * length + i];
        assert.ok(Math.abs(sum - given[v * length + i]) < 1e-13);
      }
    }
  });

  it('takes the same vectors of two sets, enough for both', () => {
    const sets = [setOf(random()), setOf(random())].map((vectors) => ({ vectors, count, length }));
    const { count: found, pivots } = pivotedBasis(sets, 1e-10, count);
    assert.equal(new Set(pivots).size, found);
    for (const { vectors } of sets) {
      for (let v = 0; v < count; v += 1) {
        if (pivots.includes(v)) continue;
        for (let i = 0; i < length; i += 1) assert.ok(Math.abs(vectors[v * length + i]) < 1e-9);
      }
    }
  });

  it('takes no more than asked for, and none of nothing', () => {
    assert.equal(pivotedBasis([{ vectors: setOf(random()), count, length }], 1e-10, 2).count, 2);
    assert.equal(pivotedBasis([{ vectors: new Float64Array(count * length), count, length }], 1e-10, count).count, 0);
  });
});
