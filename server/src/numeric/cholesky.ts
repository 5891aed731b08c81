/**
 * Cholesky factor of a symmetric positive definite matrix, in place: A = L L^T.
 *
 * Row-major; only the lower triangle is read and written, so that all products run along rows. False when a
 * pivot is not above zero (or is NaN): the matrix is not positive definite and its content is then spoilt.
 *
 * Method    Cholesky-Banachiewicz, two rows at a time (triangularRows.ts)      Source    textbook; Golub & Van Loan
 * Accuracy  backward stable: residual of a few order × 1e-16 times the largest entry
 */
import { solveTriangularRows } from './triangularRows';

export function cholesky(matrix: Float64Array, order: number): boolean {
  for (let i = 0; i < order; i += 2) {
    const rows = Math.min(2, order - i);
    solveTriangularRows({ target: matrix, stride: order, start: i * order, rows, from: 0, to: i, triangle: matrix, order, unit: false });
    if (!finishDiagonal(matrix, order, i, rows)) return false;
  }
  return true;
}

function finishDiagonal(matrix: Float64Array, order: number, i: number, rows: number): boolean {
  for (let r = i; r < i + rows; r += 1) {
    for (let c = i; c <= r; c += 1) {
      let sum = matrix[r * order + c];
      for (let k = 0; k < c; k += 1) sum -= matrix[r * order + k] * matrix[c * order + k];
      if (c < r) {
        matrix[r * order + c] = sum / matrix[c * order + c];
      } else {
        if (!(0 < sum)) return false;
        matrix[r * order + r] = Math.sqrt(sum);
      }
    }
  }
  return true;
}

/** Solves L y = b in place for `count` right sides, each `order` long, one after the other. Leading zeros are skipped. */
export function forwardSubstitute(lower: Float64Array, order: number, rightSides: Float64Array, count = 1): void {
  solveRightSides({ triangle: lower, order, unit: false }, rightSides, count);
}

/** Two at a time, from the first that is not zero in either. */
export function solveRightSides(factor: { readonly triangle: Float64Array; readonly order: number; readonly unit: boolean }, rightSides: Float64Array, count: number): void {
  const { order } = factor;
  for (let side = 0; side < count; side += 2) {
    const rows = Math.min(2, count - side);
    let from = 0;
    while (from < order && rightSides[side * order + from] === 0 && (rows === 1 || rightSides[(side + 1) * order + from] === 0)) from += 1;
    solveTriangularRows({ target: rightSides, stride: order, start: side * order, rows, from, to: order, ...factor });
  }
}

/** Solves L^T x = y in place for `count` right sides, each `order` long, one after the other. */
export function backSubstitute(lower: Float64Array, order: number, rightSides: Float64Array, count = 1): void {
  for (let side = 0; side < count; side += 1) {
    const base = side * order;
    // Column by column of L^T, which are rows of L.
    for (let i = order - 1; 0 <= i; i -= 1) {
      const row = i * order;
      const value = rightSides[base + i] / lower[row + i];
      rightSides[base + i] = value;
      for (let k = 0; k < i; k += 1) rightSides[base + k] -= lower[row + k] * value;
    }
  }
}
