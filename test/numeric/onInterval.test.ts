import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { chebyshevSeries, chebyshevValue } from '../../server/src/numeric/chebyshev';
import { root } from '../../server/src/numeric/root';
import { near } from '../support/near';

const found = (f: (x: number) => number, low: number, high: number, tolerance = 1e-15) => {
  const result = root(f, { low, high, tolerance });
  assert.ok('found' in result, JSON.stringify(result));
  return result;
};

describe('root', () => {
  it('finds closed forms', () => {
    near(found((x) => x * x - 2, 0, 2).found, Math.SQRT2, 1e-15);
    near(found(Math.cos, 0, 3).found, Math.PI / 2, 1e-15);
    near(found((x) => Math.exp(x) - 10, -5, 5).found, Math.LN10, 1e-15);
  });

  it('takes a bracket either way round, and a zero at its ends', () => {
    near(found((x) => x - 0.3, 1, 0).found, 0.3, 1e-15);
    assert.equal(found((x) => x, 0, 1).found, 0);
    assert.equal(found((x) => x - 1, 0, 1).found, 1);
  });

  it('is quick on smooth functions and never hangs on hard ones', () => {
    assert.ok(found((x) => Math.log(x) + 1, 1e-3, 10).evaluations < 20);
    assert.ok(found((x) => (x - 0.7) ** 9, 0, 1, 1e-6).evaluations < 100);
    // A step: nothing to interpolate.
    near(found((x) => (x < 1 / 3 ? -1 : 1), 0, 1, 1e-12).found, 1 / 3, 1e-11);
  });

  it('says why it has none', () => {
    assert.deepEqual(root((x) => x * x + 1, { low: -1, high: 1, tolerance: 1e-9 }), { missing: 'no-sign-change', evaluations: 2 });
    assert.deepEqual(root(() => NaN, { low: -1, high: 1, tolerance: 1e-9 }), { missing: 'not-a-number', evaluations: 2 });
    const inside = root((x) => (x === -1 || x === 1 ? x : NaN), { low: -1, high: 1, tolerance: 1e-9 });
    assert.ok('missing' in inside && inside.missing === 'not-a-number');
    const short = root((x) => (x < 1 / 3 ? -1 : 1), { low: 0, high: 1, tolerance: 0, limit: 5 });
    assert.ok('missing' in short && short.missing === 'limit');
  });
});

describe('chebyshev', () => {
  it('has the closed coefficients of x³ = (3 T1 + T3) / 4', () => {
    const series = chebyshevSeries((x) => x ** 3, -1, 1, 6);
    [0, 0.75, 0, 0.25, 0, 0].forEach((value, n) => assert.ok(Math.abs(series[n] - value) < 1e-15));
  });

  it('converges geometrically for an analytic function', () => {
    const errors = [4, 8, 16, 32].map((count) => {
      const series = chebyshevSeries(Math.log, 0.5, 8, count);
      let worst = 0;
      for (let x = 0.5; x <= 8; x += 0.01) worst = Math.max(worst, Math.abs(chebyshevValue(series, 0.5, 8, x) - Math.log(x)));
      return worst;
    });
    // Nearest singularity at 0: the rate is rho = 1.667, so doubling the count squares the error, roughly.
    assert.ok(errors[1] < errors[0] / 5 && errors[2] < errors[1] / 40 && errors[3] < errors[2] / 1000, errors.join(' '));
  });
});
