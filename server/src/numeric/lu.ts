/**
 * LU factors with partial pivoting, in place: P A = L U, L with a unit diagonal.
 *
 * Row-major. Answers the row that was exchanged at every step, or null when a column has no pivot other
 * than zero (or NaN): the matrix is singular to working precision and its content is then spoilt.
 *
 * Method    outer-product elimination along rows       Source    textbook; Golub & Van Loan
 * Accuracy  backward stable in practice; residual of a few order × 1e-16 times the largest entry
 */
export function luFactor(matrix: Float64Array, order: number): Int32Array | null {
  const exchanged = new Int32Array(order);
  for (let column = 0; column < order; column += 1) {
    let pivotRow = column;
    for (let i = column + 1; i < order; i += 1) {
      if (Math.abs(matrix[pivotRow * order + column]) < Math.abs(matrix[i * order + column])) pivotRow = i;
    }
    exchanged[column] = pivotRow;
    const pivot = matrix[pivotRow * order + column];
    if (!(0 < Math.abs(pivot))) return null;
    if (pivotRow !== column) exchangeRows(matrix, order, pivotRow, column);
    const top = column * order;
    for (let i = column + 1; i < order; i += 1) {
      const row = i * order;
      const factor = matrix[row + column] / pivot;
      matrix[row + column] = factor;
      if (factor === 0) continue;
      for (let k = column + 1; k < order; k += 1) matrix[row + k] -= factor * matrix[top + k];
    }
  }
  return exchanged;
}

/** Solves A x = b in place from the factors, for `count` right sides, each `order` long, one after the other. */
export function luSolve(factors: Float64Array, exchanged: Int32Array, rightSides: Float64Array, count = 1): void {
  const order = exchanged.length;
  for (let side = 0; side < count; side += 1) {
    const base = side * order;
    for (let i = 0; i < order; i += 1) {
      const from = exchanged[i];
      const held = rightSides[base + from];
      rightSides[base + from] = rightSides[base + i];
      rightSides[base + i] = held;
    }
    for (let i = 0; i < order; i += 1) {
      let sum = rightSides[base + i];
      for (let k = 0; k < i; k += 1) sum -= factors[i * order + k] * rightSides[base + k];
      rightSides[base + i] = sum;
    }
    for (let i = order - 1; 0 <= i; i -= 1) {
      let sum = rightSides[base + i];
      for (let k = i + 1; k < order; k += 1) sum -= factors[i * order + k] * rightSides[base + k];
      rightSides[base + i] = sum / factors[i * order + i];
    }
  }
}

function exchangeRows(matrix: Float64Array, order: number, first: number, second: number): void {
  for (let k = 0; k < order; k += 1) {
    const held = matrix[first * order + k];
    matrix[first * order + k] = matrix[second * order + k];
    matrix[second * order + k] = held;
  }
}
