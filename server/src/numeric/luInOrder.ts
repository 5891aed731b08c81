/**
 * LU factors without exchanging rows, in place: A = L U, L with a unit diagonal.
 *
 * For matrices whose leading parts are all well conditioned, such as Galerkin matrices: the factors of every leading part
 * are then the leading parts of the factors, so that one factorisation answers for a system and for those with fewer
 * unknowns. Row-major. False when a pivot is lost to cancellation (below 1e-11 of what it was formed from), or is NaN.
 *
 * Method    rows of L and columns of U in turn, two at a time (triangularRows.ts); the columns lie in a second matrix as
 *           rows until the end, so that all products run along rows
 * Source    textbook; Golub & Van Loan
 * Accuracy  1e-16 times the growth of the entries, which the test on pivots bounds
 */
import { solveRightSides } from './cholesky';
import { solveTriangularRows } from './triangularRows';

export function luInOrder(matrix: Float64Array, order: number): boolean {
  if (columns.length < order * order) columns = new Float64Array(order * order);
  transposeUpper(matrix, columns, order);
  for (let i = 0; i < order; i += 2) {
    const rows = Math.min(2, order - i);
    const block = { stride: order, start: i * order, rows, from: 0, to: i, order };
    solveTriangularRows({ ...block, target: matrix, triangle: columns, unit: false });
    solveTriangularRows({ ...block, target: columns, triangle: matrix, unit: true });
    if (!finishDiagonal(matrix, order, i, rows)) return false;
  }
  transposeUpper(columns, matrix, order, true);
  return true;
}

/** Columns of U, each as a row. */
let columns = new Float64Array(0);

/** The upper triangle with its diagonal into the lower one of another matrix, or back. */
function transposeUpper(from: Float64Array, to: Float64Array, order: number, back = false): void {
  for (let i = 0; i < order; i += 1) {
    for (let j = i; j < order; j += 1) {
      if (back) to[i * order + j] = from[j * order + i];
      else to[j * order + i] = from[i * order + j];
    }
  }
}

/** The corner that the two rows and the two columns share. */
function finishDiagonal(matrix: Float64Array, order: number, i: number, rows: number): boolean {
  for (let r = i; r < i + rows; r += 1) {
    const before = Math.abs(columns[r * order + r]);
    if (i < r) matrix[r * order + i] = (matrix[r * order + i] - product(matrix, r, columns, i, i, order)) / columns[i * order + i];
    if (i < r) columns[r * order + i] -= product(columns, r, matrix, i, i, order);
    const pivot = columns[r * order + r] - product(matrix, r, columns, r, r, order);
    columns[r * order + r] = pivot;
    if (!(1e-11 * before < Math.abs(pivot))) return false;
  }
  return true;
}

function product(a: Float64Array, row: number, b: Float64Array, other: number, to: number, order: number): number {
  let sum = 0;
  for (let k = 0; k < to; k += 1) sum += a[row * order + k] * b[other * order + k];
  return sum;
}

/** Solves L y = b in place for `count` right sides, each `order` long, one after the other. Leading zeros are skipped. */
export function solveUnitLower(factors: Float64Array, order: number, rightSides: Float64Array, count = 1): void {
  solveRightSides({ triangle: factors, order, unit: true }, rightSides, count);
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
