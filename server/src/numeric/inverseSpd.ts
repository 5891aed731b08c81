/**
 * Inverse of a symmetric positive definite matrix, exactly symmetric; null when it is not positive definite.
 *
 * Row-major; the argument is left as it is. Rows and columns are first scaled to a unit diagonal, so that
 * entries of very different size, or of 1e-12, cost no digits.
 *
 * Method    Cholesky; columns of the identity           Source    textbook; Golub & Van Loan
 * Accuracy  1e-15 times the condition number of the scaled matrix. Meant for small orders.
 */
import { backSubstitute, cholesky, forwardSubstitute } from './cholesky';

export function inverseSpd(matrix: Float64Array, order: number): Float64Array | null {
  const scale = Float64Array.from({ length: order }, (_, i) => 1 / Math.sqrt(matrix[i * order + i]));
  const lower = Float64Array.from(matrix, (value, at) => value * scale[Math.floor(at / order)] * scale[at % order]);
  if (!cholesky(lower, order)) return null;
  const inverse = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) inverse[i * order + i] = 1;
  forwardSubstitute(lower, order, inverse, order);
  backSubstitute(lower, order, inverse, order);
  for (let i = 0; i < order; i += 1) {
    for (let j = 0; j <= i; j += 1) {
      const mean = ((inverse[i * order + j] + inverse[j * order + i]) / 2) * scale[i] * scale[j];
      inverse[i * order + j] = inverse[j * order + i] = mean;
    }
  }
  return inverse;
}
