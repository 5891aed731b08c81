import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { gaussJacobi } from '../../server/src/numeric/gaussJacobi';
import { gradedRule } from '../../server/src/numeric/gradedRule';
import { logGamma } from '../../server/src/numeric/logGamma';
import { near } from '../support/near';

/** Integral of (1-x)^a (1+x)^b over [-1, 1]: Euler's beta function. */
const betaIntegral = (a: number, b: number) => Math.exp((a + b + 1) * Math.LN2 + logGamma(a + 1) + logGamma(b + 1) - logGamma(a + b + 2));

const exponents = [[0, 0], [-0.5, -0.5], [0.5, 0.5], [-1 / 3, -0.4384], [-0.5, 0], [0.3, -0.9], [2, -0.75]] as const;

describe('gaussJacobi', () => {
  it('has the closed forms of Legendre, two and three nodes', () => {
    const two = gaussJacobi(2, 0, 0);
    near(two.nodes[1], 1 / Math.sqrt(3), 1e-15);
    near(two.weights[0], 1, 1e-14);
    const three = gaussJacobi(3, 0, 0);
    near(three.nodes[0], -Math.sqrt(0.6), 1e-15);
    assert.ok(Math.abs(three.nodes[1]) < 1e-15);
    near(three.weights[1], 8 / 9, 1e-14);
    near(three.weights[2], 5 / 9, 1e-14);
  });

  it('has the closed forms of Chebyshev', () => {
    for (const count of [1, 2, 5, 24, 40]) {
      const { nodes, weights } = gaussJacobi(count, -0.5, -0.5);
      for (let i = 0; i < count; i += 1) {
        assert.ok(Math.abs(nodes[i] + Math.cos((Math.PI * (i + 0.5)) / count)) < 2e-15);
        near(weights[i], Math.PI / count, 2e-13);
      }
    }
  });

  it('integrates (1+x)^m exactly up to degree 2 count - 1 and not beyond', () => {
    for (const [a, b] of exponents) {
      for (const count of [1, 2, 3, 4, 6, 10, 16]) {
        const { nodes, weights } = gaussJacobi(count, a, b);
        for (let m = 0; m <= 2 * count; m += 1) {
          const sum = weights.reduce((total, weight, i) => total + weight * (1 + nodes[i]) ** m, 0);
          const exact = betaIntegral(a, b + m);
          if (m < 2 * count) near(sum, exact, 2e-13, `a=${a} b=${b} count=${count} m=${m}`);
          // The first degree it misses must be seen to be missed (while above rounding).
          else if (count <= 6) assert.ok(1e-11 < Math.abs(sum / exact - 1), `a=${a} b=${b} count=${count} is exact beyond its degree`);
        }
      }
    }
  });

  it('mirrors when the exponents are exchanged', () => {
    const one = gaussJacobi(7, -0.3, 0.4);
    const other = gaussJacobi(7, 0.4, -0.3);
    for (let i = 0; i < 7; i += 1) {
      assert.ok(Math.abs(one.nodes[i] + other.nodes[6 - i]) < 1e-15);
      near(one.weights[i], other.weights[6 - i], 2e-14);
    }
  });

  it('refuses what has no rule', () => {
    for (const [count, a, b] of [[0, 0, 0], [3, -1, 0], [3, 0, NaN]]) assert.throws(() => gaussJacobi(count, a, b));
  });
});

describe('gradedRule', () => {
  it('integrates its weight and powers at both ends', () => {
    for (const [alpha, beta] of exponents) {
      for (const [points, tolerance] of [[12, 2e-10], [18, 1e-13]]) {
        const { fromStart, fromEnd, weights } = gradedRule({ alpha, beta, ratio: 0.2, levels: 5, points });
        assert.equal(weights.length, 2 * 6 * points);
        for (const [p, q] of [[0, 0], [1, 0], [0, 1], [2, 3]]) {
          const sum = weights.reduce((total, weight, i) => total + weight * fromEnd[i] ** p * fromStart[i] ** q, 0);
          near(sum, betaIntegral(alpha + p, beta + q), tolerance, `alpha=${alpha} beta=${beta} p=${p} q=${q} points=${points}`);
        }
      }
    }
  });

  it('takes a logarithm at each end, and converges exponentially with the points', () => {
    // Integral of ln(1+x) over [-1,1] is 2 ln 2 - 2.
    const errors = [2, 4, 8, 14].map((points) => {
      const { fromStart, weights } = gradedRule({ alpha: 0, beta: 0, ratio: 0.2, levels: 12, points });
      const sum = weights.reduce((total, weight, i) => total + weight * Math.log(fromStart[i]), 0);
      return Math.abs(sum - (2 * Math.LN2 - 2));
    });
    for (let i = 1; i < errors.length; i += 1) assert.ok(errors[i] < errors[i - 1] / 10 || errors[i] < 1e-10, errors.join(' '));
    assert.ok(errors[3] < 1e-9);
  });

  it('keeps the distance from an end that x itself would have lost', () => {
    const { fromStart, fromEnd } = gradedRule({ alpha: 0, beta: 0, ratio: 0.1, levels: 30, points: 4 });
    assert.ok(0 < fromStart[0] && fromStart[0] < 1e-30);
    assert.ok(0 < fromEnd[fromEnd.length - 1] && fromEnd[fromEnd.length - 1] < 1e-30);
    for (let i = 1; i < fromStart.length; i += 1) assert.ok(fromStart[i - 1] <= fromStart[i] && fromEnd[i] <= fromEnd[i - 1]);
    for (let i = 0; i < fromStart.length; i += 1) near(fromStart[i] + fromEnd[i], 2, 4e-16);
  });
});
