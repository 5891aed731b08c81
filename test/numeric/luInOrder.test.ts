import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { luInOrder, solveUnitLower, solveUpperTransposed } from '../../server/src/numeric/luInOrder';
import { luFactor, luSolve } from '../../server/src/numeric/lu';
import { near } from '../support/near';
import { seeded } from '../support/seeded';

/** Dominant diagonal: every leading part is well conditioned. */
function dominant(order: number, next: () => number): Float64Array {
  return Float64Array.from({ length: order * order }, (_, at) => (next() - 0.5) / order + (at % (order + 1) === 0 ? 1 : 0));
}

describe('luInOrder', () => {
  it('has the factors of a two by two matrix', () => {
    const a = Float64Array.of(2, 4, 6, 17);
    assert.ok(luInOrder(a, 2));
    assert.deepEqual([...a], [2, 4, 3, 5]);
  });

  it('answers bilinear forms y^T A^-1 b of the matrix and, cut short, of each leading part', () => {
    const order = 20;
    const a = dominant(order, seeded(9));
    const factors = Float64Array.from(a);
    assert.ok(luInOrder(factors, order));
    const b = Float64Array.from({ length: order }, (_, i) => (i % 3 === 0 ? 1 : 0));
    const y = Float64Array.from({ length: order }, (_, i) => (i % 4 === 1 ? 1 : 0));
    const [right, left] = [Float64Array.from(b), Float64Array.from(y)];
    solveUnitLower(factors, order, right);
    solveUpperTransposed(factors, order, left);
    for (const part of [2, 7, 20]) {
      const leading = Float64Array.from({ length: part * part }, (_, at) => a[Math.floor(at / part) * order + (at % part)]);
      const exchanged = luFactor(leading, part)!;
      const x = b.slice(0, part);
      luSolve(leading, exchanged, x);
      const direct = x.reduce((sum, value, i) => sum + value * y[i], 0);
      const cut = right.subarray(0, part).reduce((sum, value, i) => sum + value * left[i], 0);
      near(cut, direct, 1e-12, `leading part of ${part}`);
    }
  });

  it('takes several right sides, each by itself', () => {
    const order = 6;
    const factors = dominant(order, seeded(4));
    assert.ok(luInOrder(factors, order));
    const sides = Float64Array.from({ length: 2 * order }, (_, i) => i);
    const [first, second] = [sides.slice(0, order), sides.slice(order)];
    solveUnitLower(factors, order, sides, 2);
    solveUnitLower(factors, order, first);
    solveUnitLower(factors, order, second);
    assert.deepEqual([...sides], [...first, ...second]);
    solveUpperTransposed(factors, order, sides, 2);
    solveUpperTransposed(factors, order, first);
    solveUpperTransposed(factors, order, second);
    assert.deepEqual([...sides], [...first, ...second]);
  });

  it('says no when a leading part is singular, or anything is not a number', () => {
    assert.equal(luInOrder(Float64Array.of(0, 1, 1, 0), 2), false);
    assert.equal(luInOrder(Float64Array.of(1, 2, 2, 4), 2), false);
    assert.equal(luInOrder(Float64Array.of(1, NaN, 2, 5), 2), false);
  });
});
