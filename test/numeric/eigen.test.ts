import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { simultaneousDiagonal } from '../../server/src/numeric/simultaneousDiagonal';
import { symmetricEigen } from '../../server/src/numeric/symmetricEigen';
import { near } from '../support/near';
import { seeded } from '../support/seeded';

describe('symmetricEigen', () => {
  it('has the closed form of the second-difference matrix: 4 sin²(k pi / (2 (n + 1)))', () => {
    for (const order of [1, 2, 7, 16, 40]) {
      const a = new Float64Array(order * order);
      for (let i = 0; i < order; i += 1) {
        a[i * order + i] = 2;
        if (0 < i) a[i * order + i - 1] = a[(i - 1) * order + i] = -1;
      }
      const { values } = symmetricEigen(a, order);
      values.forEach((value, k) => near(value, 4 * Math.sin(((k + 1) * Math.PI) / (2 * (order + 1))) ** 2, 2e-13));
    }
  });

  it('gives orthogonal vectors that rebuild the matrix, also with equal values', () => {
    const order = 6;
    const next = seeded(5);
    const a = new Float64Array(order * order);
    for (let i = 0; i < order; i += 1) for (let j = 0; j <= i; j += 1) a[i * order + j] = a[j * order + i] = i < 3 && j < 3 ? (i === j ? 2 : 0) : next() - 0.5;
    const { values, vectors } = symmetricEigen(a, order);
    for (let i = 0; i < order; i += 1) {
      if (0 < i) assert.ok(values[i - 1] <= values[i]);
      for (let j = 0; j < order; j += 1) {
        let product = 0;
        let rebuilt = 0;
        for (let k = 0; k < order; k += 1) {
          product += vectors[k * order + i] * vectors[k * order + j];
          rebuilt += vectors[i * order + k] * values[k] * vectors[j * order + k];
        }
        assert.ok(Math.abs(product - (i === j ? 1 : 0)) < 1e-14);
        assert.ok(Math.abs(rebuilt - a[i * order + j]) < 1e-14);
      }
    }
  });

  it('keeps the digits of a small value of a graded positive definite matrix', () => {
    const { values } = symmetricEigen(Float64Array.of(1e12, 1, 1, 1), 2);
    near(values[0], 1 - 1e-12, 1e-14);
    near(values[1], 1e12, 1e-15);
  });

  it('takes zero matrices', () => {
    assert.deepEqual([...symmetricEigen(new Float64Array(9), 3).values], [0, 0, 0]);
  });
});

describe('simultaneousDiagonal', () => {
  it('finds the even and odd mode of two equal lines', () => {
    const [l, m, c, d] = [3.8e-7, 8.5e-8, 8.6e-11, 1.0e-11];
    const { values, left, right } = simultaneousDiagonal(Float64Array.of(l, m, m, l), Float64Array.of(c, -d, -d, c), 2)!;
    near(values[0], (l - m) * (c + d), 1e-14);
    near(values[1], (l + m) * (c - d), 1e-14);
    near(left[0] / left[2], -1, 1e-13);
    near(right[1] / right[3], 1, 1e-13);
  });

  it('obeys its three identities for random pairs, in SI sizes', () => {
    const next = seeded(17);
    for (const order of [1, 3, 8, 16]) {
      const a = randomSymmetric(order, next, 1e-7);
      const b = randomSymmetric(order, next, 1e-11);
      const { values, left, right } = simultaneousDiagonal(a, b, order)!;
      const close = (matrix: Float64Array, diagonal: (k: number) => number, size: number) => {
        for (let i = 0; i < order; i += 1) for (let j = 0; j < order; j += 1) assert.ok(Math.abs(matrix[i * order + j] - (i === j ? diagonal(i) : 0)) < 1e-12 * size);
      };
      close(product(left, product(b, left, order, false), order, true), () => 1, 1);
      close(product(right, product(a, right, order, false), order, true), (k) => values[k], values[order - 1]);
      close(product(left, right, order, true), () => 1, 1);
    }
  });

  it('answers null when the second matrix is not positive definite', () => {
    assert.equal(simultaneousDiagonal(Float64Array.of(1, 0, 0, 1), Float64Array.of(1, 2, 2, 1), 2), null);
    assert.equal(simultaneousDiagonal(Float64Array.of(1), Float64Array.of(-1), 1), null);
  });
});

/** Positive definite: a dominant diagonal over random couplings. */
function randomSymmetric(order: number, next: () => number, size: number): Float64Array {
  const a = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) {
    a[i * order + i] = size * (1 + next());
    for (let j = 0; j < i; j += 1) a[i * order + j] = a[j * order + i] = (size * (next() - 0.5)) / order;
  }
  return a;
}

function product(a: Float64Array, b: Float64Array, order: number, transposeFirst: boolean): Float64Array {
  const c = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) for (let j = 0; j < order; j += 1) for (let k = 0; k < order; k += 1) c[i * order + j] += (transposeFirst ? a[k * order + i] : a[i * order + k]) * b[k * order + j];
  return c;
}
