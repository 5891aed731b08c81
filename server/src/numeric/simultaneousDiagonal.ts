/**
 * One change of variables that makes two symmetric matrices diagonal at once, the second positive definite.
 *
 *   left^T B left = 1      right^T A right = diag(values)      left^T right = 1
 *   so A B = left diag(values) left^-1 and B A = right diag(values) right^-1, values ascending.
 *
 * For coupled lines A = inductance and B = capacitance per length: `values` are the squared modal slownesses,
 * `left` maps modal to line voltages and `right` modal to line currents.
 *
 * Method    B = U U^T (Cholesky); U^T A U = S diag S^T (Jacobi); left = U^-T S, right = U S. Both matrices are first
 *           scaled by B's diagonal, so that units and unequal lines cost no digits
 * Source    textbook; Golub & Van Loan; Paul, Analysis of Multiconductor Transmission Lines, from memory
 * Accuracy  1e-14 times the condition number of B so scaled. Null when B is not positive definite.
 */
import { backSubstitute, cholesky } from './cholesky';
import { symmetricEigen } from './symmetricEigen';

export interface SimultaneousDiagonal {
  readonly values: Float64Array;
  /** Row-major; column k belongs to value k. */
  readonly left: Float64Array;
  readonly right: Float64Array;
}

export function simultaneousDiagonal(first: Float64Array, second: Float64Array, order: number): SimultaneousDiagonal | null {
  const scale = Float64Array.from({ length: order }, (_, i) => Math.sqrt(second[i * order + i]));
  const lower = Float64Array.from(second, (value, at) => value / (scale[Math.floor(at / order)] * scale[at % order]));
  if (!cholesky(lower, order)) return null;
  const scaledFirst = Float64Array.from(first, (value, at) => value * scale[Math.floor(at / order)] * scale[at % order]);
  const { values, vectors } = symmetricEigen(congruent(scaledFirst, lower, order), order);
  const left = new Float64Array(order * order);
  const right = new Float64Array(order * order);
  const column = new Float64Array(order);
  for (let k = 0; k < order; k += 1) {
    for (let i = 0; i < order; i += 1) {
      column[i] = vectors[i * order + k];
      let sum = 0;
      for (let j = 0; j <= i; j += 1) sum += lower[i * order + j] * vectors[j * order + k];
      right[i * order + k] = sum * scale[i];
    }
    backSubstitute(lower, order, column);
    for (let i = 0; i < order; i += 1) left[i * order + k] = column[i] / scale[i];
  }
  return { values, left, right };
}

/** U^T A U for a lower triangular U. */
function congruent(a: Float64Array, lower: Float64Array, order: number): Float64Array {
  const half = new Float64Array(order * order);
  const whole = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) {
    for (let j = 0; j < order; j += 1) {
      let sum = 0;
      for (let k = j; k < order; k += 1) sum += a[i * order + k] * lower[k * order + j];
      half[i * order + j] = sum;
    }
  }
  for (let i = 0; i < order; i += 1) {
    for (let j = 0; j <= i; j += 1) {
      let sum = 0;
      for (let k = i; k < order; k += 1) sum += lower[k * order + i] * half[k * order + j];
      whole[i * order + j] = whole[j * order + i] = sum;
    }
  }
  return whole;
}
