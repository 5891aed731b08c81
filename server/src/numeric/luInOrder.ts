/**
 * LU factors without exchanging rows, in place: A = L U, L with a unit diagonal.
 *
 * For matrices whose leading parts are all well conditioned, such as Galerkin matrices: the factors of every leading part
 * are then the leading parts of the factors, so that one factorisation answers for a system and for those with fewer
 * unknowns. Row-major. False when a pivot is lost to cancellation (below 1e-11 of what it was formed from), or is NaN.
 *
 * Method    Doolittle, row by row                      Source    textbook; Golub & Van Loan
 * Accuracy  1e-16 times the growth of the entries, which the test on pivots bounds
 */
export function luInOrder(matrix: Float64Array, order: number): boolean {
  for (let i = 0; i < order; i += 1) {
    const row = i * order;
    const before = Math.abs(matrix[row + i]);
    let k = 0;
    // Two rows at a time: the row that is worked on is read and written half as often.
    for (; k + 1 < i; k += 2) {
      const top = k * order;
      const next = top + order;
      const factor = matrix[row + k] / matrix[top + k];
      const second = (matrix[row + k + 1] - factor * matrix[top + k + 1]) / matrix[next + k + 1];
      matrix[row + k] = factor;
      matrix[row + k + 1] = second;
      for (let j = k + 2; j < order; j += 1) matrix[row + j] -= factor * matrix[top + j] + second * matrix[next + j];
    }
    if (k < i) {
      const top = k * order;
      const factor = matrix[row + k] / matrix[top + k];
      matrix[row + k] = factor;
      for (let j = k + 1; j < order; j += 1) matrix[row + j] -= factor * matrix[top + j];
    }
    if (!(1e-11 * before < Math.abs(matrix[row + i]))) return false;
  }
  return true;
}

/** Solves L y = b in place for `count` right sides, each `order` long, one after the other. Leading zeros are skipped. */
export function solveUnitLower(factors: Float64Array, order: number, rightSides: Float64Array, count = 1): void {
  for (let side = 0; side < count; side += 1) {
    const base = side * order;
    let start = 0;
    while (start < order && rightSides[base + start] === 0) start += 1;
    for (let i = start + 1; i < order; i += 1) {
      let sum = rightSides[base + i];
      for (let k = start; k < i; k += 1) sum -= factors[i * order + k] * rightSides[base + k];
      rightSides[base + i] = sum;
    }
  }
}

/** Solves U^T z = b in place for `count` right sides, each `order` long, one after the other. */
export function solveUpperTransposed(factors: Float64Array, order: number, rightSides: Float64Array, count = 1): void {
  for (let side = 0; side < count; side += 1) {
    const base = side * order;
    // Column by column of U^T, which are rows of U.
    for (let k = 0; k < order; k += 1) {
      const row = k * order;
      const value = rightSides[base + k] / factors[row + k];
      rightSides[base + k] = value;
      if (value === 0) continue;
      for (let j = k + 1; j < order; j += 1) rightSides[base + j] -= factors[row + j] * value;
    }
  }
}
