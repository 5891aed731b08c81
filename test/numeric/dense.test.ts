import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { backSubstitute, cholesky, forwardSubstitute } from '../../server/src/numeric/cholesky';
import { inverseSpd } from '../../server/src/numeric/inverseSpd';
import { leastSquares } from '../../server/src/numeric/leastSquares';
import { luFactor, luSolve } from '../../server/src/numeric/lu';
import { near } from '../support/near';
import { seeded } from '../support/seeded';

/** Hilbert's matrix 1/(i+j+1): positive definite, with a known inverse of whole numbers. */
const hilbert = (order: number) => Float64Array.from({ length: order * order }, (_, at) => 1 / (Math.floor(at / order) + (at % order) + 1));
const identity = (order: number) => Float64Array.from({ length: order * order }, (_, at) => (Math.floor(at / order) === at % order ? 1 : 0));
const times = (a: Float64Array, x: Float64Array, order: number) =>
  Float64Array.from({ length: order }, (_, i) => x.reduce((sum, value, k) => sum + a[i * order + k] * value, 0));
const randomSpd = (order: number, next: () => number) => {
  const g = Float64Array.from({ length: order * order }, () => next() - 0.5);
  const a = identity(order);
  for (let i = 0; i < order; i += 1) for (let j = 0; j < order; j += 1) for (let k = 0; k < order; k += 1) a[i * order + j] += g[i * order + k] * g[j * order + k];
  return a;
};

describe('cholesky', () => {
  it('factors the min(i, j) matrix into ones', () => {
    const order = 9;
    const a = Float64Array.from({ length: order * order }, (_, at) => Math.min(Math.floor(at / order), at % order) + 1);
    assert.ok(cholesky(a, order));
    for (let i = 0; i < order; i += 1) for (let j = 0; j <= i; j += 1) assert.equal(a[i * order + j], 1);
  });

  it('solves for several right sides, with and without leading zeros', () => {
    const order = 24;
    const a = randomSpd(order, seeded(7));
    const lower = Float64Array.from(a);
    assert.ok(cholesky(lower, order));
    const wanted = Float64Array.from({ length: 2 * order }, (_, i) => Math.sin(i + 1));
    const sides = new Float64Array(3 * order);
    sides.set(times(a, wanted.slice(0, order), order), 0);
    sides.set(times(a, wanted.slice(order), order), order);
    sides[3 * order - 1] = 1;
    forwardSubstitute(lower, order, sides, 3);
    backSubstitute(lower, order, sides, 3);
    for (let i = 0; i < 2 * order; i += 1) near(sides[i], wanted[i], 1e-12);
    const last = times(a, sides.slice(2 * order), order);
    for (let i = 0; i < order; i += 1) assert.ok(Math.abs(last[i] - (i === order - 1 ? 1 : 0)) < 1e-13);
  });

  it('says no to matrices that are not positive definite', () => {
    assert.equal(cholesky(Float64Array.of(1, 2, 2, 1), 2), false);
    assert.equal(cholesky(Float64Array.of(0), 1), false);
    assert.equal(cholesky(Float64Array.of(NaN), 1), false);
    assert.equal(cholesky(Float64Array.of(4, 2, 2, 1), 2), false);
  });
});

describe('inverseSpd', () => {
  it('inverts Hilbert’s matrix of order 4 (entries are whole numbers, from memory of its closed form)', () => {
    const inverse = inverseSpd(hilbert(4), 4)!;
    const exact = [16, -120, 240, -140, -120, 1200, -2700, 1680, 240, -2700, 6480, -4200, -140, 1680, -4200, 2800];
    exact.forEach((value, at) => near(inverse[at], value, 1e-11));
  });

  it('is symmetric and keeps its digits under any scaling of the rows', () => {
    const a = randomSpd(5, seeded(11));
    const scale = [1e-12, 1, 1e9, 1e-3, 1e5];
    const scaled = Float64Array.from(a, (value, at) => value * scale[Math.floor(at / 5)] * scale[at % 5]);
    const plain = inverseSpd(a, 5)!;
    const back = inverseSpd(scaled, 5)!;
    for (let at = 0; at < 25; at += 1) {
      assert.equal(back[at], back[(at % 5) * 5 + Math.floor(at / 5)]);
      near(back[at] * scale[Math.floor(at / 5)] * scale[at % 5], plain[at], 1e-12);
    }
  });

  it('answers null where there is none', () => {
    assert.equal(inverseSpd(Float64Array.of(1, 1, 1, 1), 2), null);
    assert.equal(inverseSpd(Float64Array.of(-1), 1), null);
  });
});

describe('lu', () => {
  it('solves where the first pivot is zero', () => {
    const a = Float64Array.of(0, 2, 1, 1, 0, 3, 4, 5, 0);
    const wanted = Float64Array.of(1, -2, 3);
    const side = times(a, wanted, 3);
    const exchanged = luFactor(a, 3)!;
    luSolve(a, exchanged, side);
    wanted.forEach((value, i) => near(side[i], value, 1e-15));
  });

  it('solves random systems for several right sides', () => {
    const next = seeded(3);
    for (const order of [1, 2, 8, 40]) {
      const a = Float64Array.from({ length: order * order }, () => next() - 0.5);
      const wanted = Float64Array.from({ length: order }, (_, i) => 1 + i);
      const sides = new Float64Array(2 * order);
      sides.set(times(a, wanted, order), 0);
      sides.set(times(a, wanted.map((v) => -2 * v), order), order);
      const exchanged = luFactor(a, order)!;
      luSolve(a, exchanged, sides, 2);
      for (let i = 0; i < order; i += 1) {
        near(sides[i], wanted[i], 1e-9);
        near(sides[order + i], -2 * wanted[i], 1e-9);
      }
    }
  });

  it('answers null for a singular matrix', () => {
    assert.equal(luFactor(Float64Array.of(1, 2, 2, 4), 2), null);
    assert.equal(luFactor(Float64Array.of(NaN, 2, 2, 4), 2), null);
  });
});

describe('leastSquares', () => {
  it('finds the regression line of four points', () => {
    // y = 3.5 + 1.4 x through (1,6) (2,5) (3,7) (4,10): normal equations by hand.
    const answer = leastSquares(Float64Array.of(1, 1, 1, 2, 1, 3, 1, 4), 4, 2, Float64Array.of(6, 5, 7, 10));
    near(answer[0], 3.5, 1e-14);
    near(answer[1], 1.4, 1e-14);
  });

  it('leaves a residual orthogonal to every column, also where the normal equations would fail', () => {
    const rows = 30;
    const columns = 6;
    // Läuchli's matrix: one row of ones over a tiny diagonal; its Gram matrix is singular in double precision.
    const a = new Float64Array(rows * columns);
    for (let k = 0; k < columns; k += 1) {
      a[k] = 1;
      a[(k + 1) * columns + k] = 1e-9;
    }
    const wanted = Float64Array.from({ length: columns }, (_, k) => k - 2.5);
    const side = new Float64Array(rows);
    for (let i = 0; i < rows; i += 1) for (let k = 0; k < columns; k += 1) side[i] += a[i * columns + k] * wanted[k];
    const answer = leastSquares(Float64Array.from(a), rows, columns, Float64Array.from(side));
    wanted.forEach((value, k) => near(answer[k], value, 1e-6));
  });

  it('gives a dependent column nothing', () => {
    const answer = leastSquares(Float64Array.of(1, 2, 1, 2, 1, 2), 3, 2, Float64Array.of(3, 3, 3));
    near(answer[0], 3, 1e-15);
    assert.equal(answer[1], 0);
  });

  it('refuses more columns than rows', () => {
    assert.throws(() => leastSquares(new Float64Array(2), 1, 2, new Float64Array(1)));
  });
});
