/** Polynomials, rules and tables of a side, against quadrature that knows nothing of them and against closed forms. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { gradedRule } from '../../../../server/src/numeric/gradedRule';
import { gaussJacobi } from '../../../../server/src/numeric/gaussJacobi';
import { logRule } from '../../../../server/src/physics/section/basis/logRule';
import { orthonormalJacobi, polynomialLimit, writePolynomials } from '../../../../server/src/physics/section/basis/orthonormalJacobi';
import { sideBasis } from '../../../../server/src/physics/section/basis/sideBasis';
import { near } from '../../../support/near';

const exponents = [[-0.5, -0.5], [-1 / 3, -1 / 3], [-0.4384, -1 / 3], [0, -0.45], [0, 0], [-0.1, -0.62]] as const;

describe('polynomials of a side', () => {
  it('are orthonormal under their weight, and Chebyshev’s where both exponents are -1/2', () => {
    const values = new Float64Array(polynomialLimit);
    for (const [start, end] of exponents) {
      const { nodes, weights } = gaussJacobi(polynomialLimit + 1, end, start);
      const total = weights.reduce((sum, weight) => sum + weight);
      const products = new Float64Array(polynomialLimit ** 2);
      const recurrence = orthonormalJacobi(polynomialLimit, start, end);
      nodes.forEach((u, i) => {
        writePolynomials(recurrence, u, 1, values, 0, polynomialLimit);
        for (let m = 0; m < polynomialLimit; m += 1) for (let n = 0; n < polynomialLimit; n += 1) products[m * polynomialLimit + n] += (weights[i] / total) * values[m] * values[n];
      });
      products.forEach((value, at) => assert.ok(Math.abs(value - (Math.floor(at / polynomialLimit) === at % polynomialLimit ? 1 : 0)) < 1e-11, `${start} ${end}: ${at} is ${value}`));
    }
    writePolynomials(orthonormalJacobi(polynomialLimit, -0.5, -0.5), Math.cos(0.7), 1, values, 0, polynomialLimit);
    for (let m = 1; m < polynomialLimit; m += 1) assert.ok(Math.abs(values[m] - Math.SQRT2 * Math.cos(0.7 * m)) < 1e-13);
  });
});

describe('rule with a logarithm', () => {
  it('has the closed forms of r^(c + m) and r^(c + m) (-ln r)', () => {
    for (const power of [-0.6, -1 / 3, 0, 0.2, 1, 2.3]) {
      const { nodes, weights, logWeights } = logRule(14, power);
      for (let m = 0; m < 14; m += 1) {
        const sum = (w: Float64Array) => nodes.reduce((total, r, i) => total + w[i] * r ** m, 0);
        near(sum(weights), 1 / (power + m + 1), 1e-12);
        near(sum(logWeights), 1 / (power + m + 1) ** 2, 1e-10, `power ${power}, degree ${m}`);
      }
    }
  });
});

describe('parts of a side', () => {
  it('add up to the whole, for every polynomial times an exponential', () => {
    for (const [start, end] of exponents) {
      const basis = sideBasis(start, end);
      const whole = basis.whole(24);
      for (const level of [1, 2, 4]) {
        for (let m = 0; m < 12; m += 1) {
          const integral = (rule: typeof whole) => rule.t.reduce((sum, t, f) => sum + rule.weighted[f * polynomialLimit + m] * Math.exp(-t), 0);
          let sum = 0;
          for (let index = 0; index < 2 ** level; index += 1) sum += integral(basis.part(level, index));
          assert.ok(Math.abs(sum - integral(whole)) < 1e-8, `${start} ${end}, level ${level}, p${m}: ${sum} instead of ${integral(whole)}`);
        }
      }
    }
  });
});

describe('a side on itself', () => {
  it('has the closed forms of Chebyshev’s weight: ln 2 for p0, 1/m for the others', () => {
    const { entries, stride } = sideBasis(-0.5, -0.5).self(polynomialLimit);
    for (let m = 0; m < polynomialLimit; m += 1) {
      for (let n = 0; n < polynomialLimit; n += 1) {
        const exact = m !== n ? 0 : m === 0 ? Math.LN2 : 1 / m;
        // The highest pairs are at the limit of the rules' degree.
        assert.ok(Math.abs(entries[m * stride + n] - exact) < (m + n < 24 ? 1e-11 : 1e-7), `${m} ${n}: ${entries[m * stride + n]}`);
      }
    }
  });

  it('has those of a uniform charge: 3/2 - ln 2, and polynomials by their potential in closed form', () => {
    const { entries, stride } = sideBasis(0, 0).self(8);
    near(entries[0], 1.5 - Math.LN2, 1e-13);
    // u u': the potential of u is u + (u² - 1)/2 ln|(u - 1)/(u + 1)|, and p1 = sqrt(3) u with the weight 1/2.
    const { nodes, weights } = gaussJacobi(60, 0, 0);
    const sum = nodes.reduce((total, u, i) => total + weights[i] * u * (u + ((u * u - 1) / 2) * Math.log((1 - u) / (1 + u))), 0);
    near(entries[stride + 1], (3 / 4) * sum, 1e-6);
  });

  it('agrees with graded panels for every pair of exponents, at both sizes', () => {
    for (const [start, end] of exponents) {
      const basis = sideBasis(start, end);
      for (const size of [8, polynomialLimit]) {
        const { entries, stride } = basis.self(size);
        for (const [m, n] of [[0, 0], [1, 0], [3, 2], [5, 5], [7, 0]]) {
          const slow = selfByPanels(start, end, m, n);
          assert.ok(Math.abs(entries[m * stride + n] - slow) < 1e-8, `${start} ${end}, ${m} ${n}: ${entries[m * stride + n]} instead of ${slow}`);
        }
      }
    }
  });
});

/** The inner integral cut at v = u, both halves graded towards their ends. */
function selfByPanels(start: number, end: number, m: number, n: number): number {
  const recurrence = orthonormalJacobi(polynomialLimit, start, end);
  const total = gaussJacobi(1, end, start).weights[0];
  const values = new Float64Array(polynomialLimit);
  const at = (u: number, degree: number) => {
    writePolynomials(recurrence, u, 1, values, 0, polynomialLimit);
    return values[degree];
  };
  const outer = gradedRule({ alpha: end, beta: start, ratio: 0.2, levels: 10, points: 12 });
  const left = gradedRule({ alpha: 0, beta: start, ratio: 0.2, levels: 18, points: 12 });
  const right = gradedRule({ alpha: end, beta: 0, ratio: 0.2, levels: 18, points: 12 });
  let sum = 0;
  outer.weights.forEach((outerWeight, i) => {
    const [below, above] = [outer.fromStart[i], outer.fromEnd[i]];
    const u = below < 1 ? below - 1 : 1 - above;
    let inner = 0;
    left.weights.forEach((weight, k) => {
      const fromU = (below * left.fromEnd[k]) / 2;
      inner -= weight * (below / 2) ** (start + 1) * (above + fromU) ** end * Math.log(fromU) * at(u - fromU, n);
    });
    right.weights.forEach((weight, k) => {
      const fromU = (above * right.fromStart[k]) / 2;
      inner -= weight * (above / 2) ** (end + 1) * (below + fromU) ** start * Math.log(fromU) * at(u + fromU, n);
    });
    sum += outerWeight * at(u, m) * inner;
  });
  return sum / total ** 2;
}
