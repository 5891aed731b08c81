/**
 * Quadrature on [0, 1] for r^power f(r) and, at the same nodes, for r^power (-ln r) f(r).
 *
 * The logarithm of a distance, once the distance is scaled out of a corner, is -ln r plus something smooth: both
 * parts then cost one set of values of f.
 *
 * Method    Gauss-Jacobi nodes; the second set of weights integrates the interpolating polynomial exactly
 * Formula   integral of r^c (-ln r) P_m(0,c)(2r - 1) = (-1)^m (m-1)! / [(c+1)(c+2)…(c+m+1)],  m = 0: 1/(c+1)²
 *           (Rodrigues' formula, then the derivative of r^d at d = 0)
 * Symbols   c power, P_m(0,c) Jacobi polynomial
 * Accuracy  first weights exact to degree 2 count - 1, second to degree count - 1
 */
import { gaussJacobi } from '../../../numeric/gaussJacobi';
import { orthonormalJacobi, writePolynomials } from './orthonormalJacobi';

export interface LogRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
  readonly logWeights: Float64Array;
}

export function logRule(count: number, power: number): LogRule {
  const { nodes, weights } = gaussJacobi(count, 0, power);
  const recurrence = orthonormalJacobi(count, power, 0);
  const moments = logMoments(count, power);
  const scale = 2 ** -(power + 1);
  const logWeights = new Float64Array(count);
  const values = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    writePolynomials(recurrence, nodes[i], 1, values, 0, count);
    let sum = 0;
    for (let m = 0; m < count; m += 1) sum += values[m] * moments[m];
    // The weight of the orthonormal family integrates to 1, ours to 1/(power + 1).
    logWeights[i] = weights[i] * scale * (power + 1) * sum;
  }
  return { nodes: nodes.map((x) => (1 + x) / 2), weights: weights.map((w) => w * scale), logWeights };
}

/** Integrals of r^power (-ln r) p_m, p_m orthonormal under (power + 1) r^power. */
function logMoments(count: number, power: number): Float64Array {
  const moments = new Float64Array(count);
  moments[0] = 1 / (power + 1) ** 2;
  let term = 1 / (power + 1);
  for (let m = 1; m < count; m += 1) {
    // term = (m-1)! / [(c+1) … (c+m+1)]
    term *= m === 1 ? 1 / (power + 2) : (m - 1) / (power + m + 1);
    moments[m] = (m % 2 === 0 ? 1 : -1) * term * Math.sqrt((2 * m + power + 1) / (power + 1));
  }
  return moments;
}
