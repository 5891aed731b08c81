import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { ellipticK, ellipticRatio } from '../../server/src/numeric/ellipticK';
import { logGamma } from '../../server/src/numeric/logGamma';
import { near } from '../support/near';

describe('logGamma', () => {
  it('equals the logarithm of factorials', () => {
    let factorial = 1;
    for (let n = 1; n <= 150; n += 1) {
      factorial *= n;
      assert.ok(Math.abs(logGamma(n + 1) - Math.log(factorial)) <= 2e-14 + 1e-15 * Math.log(factorial), `${n}!`);
    }
  });

  it('keeps Gamma(1/2) = sqrt(pi) and Gamma(1/4) = 3.6256099082219083119… (Abramowitz & Stegun, table 6.1)', () => {
    near(logGamma(0.5), 0.5 * Math.log(Math.PI), 4e-14);
    near(Math.exp(logGamma(0.25)), 3.6256099082219083119, 3e-14);
  });

  it('obeys the duplication and reflection formulas over many decades', () => {
    for (const x of [1e-9, 1e-3, 0.07, 0.31, 0.5, 0.99, 2.2, 7.7, 14.999, 33, 1e4]) {
      const doubled = logGamma(x) + logGamma(x + 0.5) + (2 * x - 1) * Math.LN2 - 0.5 * Math.log(Math.PI);
      assert.ok(Math.abs(doubled - logGamma(2 * x)) <= 4e-14 + 1e-15 * Math.abs(logGamma(2 * x)), `duplication at ${x}: ${doubled}`);
      if (x < 1) assert.ok(Math.abs(logGamma(x) + logGamma(1 - x) - Math.log(Math.PI / Math.sin(Math.PI * x))) < 4e-14, `reflection at ${x}`);
    }
  });

  it('answers NaN outside its range', () => {
    for (const x of [0, -0.5, -3, NaN]) assert.ok(Number.isNaN(logGamma(x)));
  });
});

describe('ellipticK', () => {
  it('has its closed forms: pi/2 at 0, Gamma(1/4)^2 / (4 sqrt(pi)) at k² = 1/2', () => {
    assert.equal(ellipticK(0), Math.PI / 2);
    near(ellipticK(Math.SQRT1_2), Math.exp(2 * logGamma(0.25)) / (4 * Math.sqrt(Math.PI)), 5e-14);
  });

  it('agrees with its power series for small and moderate moduli', () => {
    for (const k of [1e-8, 0.01, 0.2, 0.5]) {
      let term = 1;
      let sum = 1;
      for (let n = 1; n < 60; n += 1) {
        term *= (((2 * n - 1) / (2 * n)) * k) ** 2;
        sum += term;
      }
      near(ellipticK(k), (Math.PI / 2) * sum, 4e-16 * 4);
    }
  });

  it('is logarithmic at the far end, where only the complement is known', () => {
    for (const complement of [1e-6, 1e-12, 1e-100, 1e-300]) {
      near(ellipticK(1, complement), Math.log(4 / complement), complement < 1e-7 ? 1e-15 : 1e-11);
    }
    assert.equal(ellipticK(1), Infinity);
  });

  it('obeys Landen’s transformation', () => {
    for (const k of [0.1, 0.6, 0.95, 0.9999]) {
      const complement = Math.sqrt((1 - k) * (1 + k));
      const lower = (1 - complement) / (1 + complement);
      near(ellipticK(k), (1 + lower) * ellipticK(lower), 1e-13);
    }
  });
});

describe('ellipticRatio', () => {
  it('is 1 at k² = 1/2, reciprocal under exchange of the moduli, and 2 at k = (sqrt 2 - 1)²', () => {
    near(ellipticRatio(Math.SQRT1_2), 1, 4e-16);
    near(ellipticRatio((Math.SQRT2 - 1) ** 2), 2, 1e-15);
    for (const k of [1e-200, 1e-10, 0.3, 0.8]) {
      const complement = Math.sqrt((1 - k) * (1 + k));
      near(ellipticRatio(k) * ellipticRatio(complement, k), 1, 4e-16);
    }
  });

  it('keeps its digits for vanishing moduli: (2/pi) ln(4/k)', () => {
    for (const k of [1e-9, 1e-60, 1e-300]) near(ellipticRatio(k), (2 / Math.PI) * Math.log(4 / k), 1e-15);
  });
});
