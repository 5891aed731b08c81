/**
 * Cholesky factor of a symmetric positive definite matrix, in place: A = L L^T.
 *
 * Row-major; only the lower triangle is read and written, so both dot products run along rows. False when a
 * pivot is not above zero (or is NaN): the matrix is not positive definite and its content is then spoilt.
 *
 * Method    Cholesky-Banachiewicz, row by row        Source    textbook; Golub & Van Loan
 * Accuracy  backward stable: residual of a few order × 1e-16 times the largest entry
 */
export function cholesky(matrix: Float64Array, order: number): boolean {
  for (let i = 0; i < order; i += 1) {
    const row = i * order;
    for (let j = 0; j < i; j += 1) {
      const other = j * order;
      let sum = matrix[row + j];
      for (let k = 0; k < j; k += 1) sum -= matrix[row + k] * matrix[other + k];
      matrix[row + j] = sum / matrix[other + j];
    }
    let pivot = matrix[row + i];
    for (let k = 0; k < i; k += 1) pivot -= matrix[row + k] * matrix[row + k];
    if (!(0 < pivot)) return false;
    matrix[row + i] = Math.sqrt(pivot);
  }
  return true;
}

/** Solves L y = b in place for `count` right sides, each `order` long, one after the other. Leading zeros are skipped. */
export function forwardSubstitute(lower: Float64Array, order: number, rightSides: Float64Array, count = 1): void {
  for (let side = 0; side < count; side += 1) {
    const base = side * order;
    let start = 0;
    while (start < order && rightSides[base + start] === 0) start += 1;
    for (let i = start; i < order; i += 1) {
      const row = i * order;
      let sum = rightSides[base + i];
      for (let k = start; k < i; k += 1) sum -= lower[row + k] * rightSides[base + k];
      rightSides[base + i] = sum / lower[row + i];
    }
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
