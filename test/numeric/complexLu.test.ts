import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { complexLuFactor, complexLuSolve } from '../../server/src/numeric/complexLu';

/** Seeded, between -1 and 1. */
function noise(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
}

describe('complex LU', () => {
  for (const order of [1, 2, 5, 12, 34]) {
    it(`leaves no residual at order ${order}`, () => {
      const next = noise(order);
      const real = Float64Array.from({ length: order * order }, next);
      const imaginary = Float64Array.from({ length: order * order }, next);
      const b = { real: Float64Array.from({ length: 2 * order }, next), imaginary: Float64Array.from({ length: 2 * order }, next) };
      const factors = { real: real.slice(), imaginary: imaginary.slice() };
      const x = { real: b.real.slice(), imaginary: b.imaginary.slice() };
      complexLuSolve(factors, complexLuFactor(factors, order)!, x, 2);
      for (let side = 0; side < 2; side += 1) {
        for (let i = 0; i < order; i += 1) {
          let re = -b.real[side * order + i];
          let im = -b.imaginary[side * order + i];
          for (let k = 0; k < order; k += 1) {
            const at = i * order + k;
            re += real[at] * x.real[side * order + k] - imaginary[at] * x.imaginary[side * order + k];
            im += real[at] * x.imaginary[side * order + k] + imaginary[at] * x.real[side * order + k];
          }
          assert.ok(Math.hypot(re, im) < 1e-12 * order, `row ${i}: ${re} ${im}`);
        }
      }
    });
  }

  it('divides as complex numbers do: (1 + 2i) x = 5i', () => {
    const factors = { real: Float64Array.of(1), imaginary: Float64Array.of(2) };
    const x = { real: Float64Array.of(0), imaginary: Float64Array.of(5) };
    complexLuSolve(factors, complexLuFactor(factors, 1)!, x);
    assert.deepEqual([x.real[0], x.imaginary[0]], [2, 1]);
  });

  it('says that a matrix is singular', () => {
    assert.equal(complexLuFactor({ real: Float64Array.of(1, 2, 2, 4), imaginary: new Float64Array(4) }, 2), null);
    assert.equal(complexLuFactor({ real: Float64Array.of(NaN), imaginary: Float64Array.of(0) }, 1), null);
  });
});
