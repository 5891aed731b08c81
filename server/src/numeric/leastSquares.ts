/**
 * x that makes |A x - b| least, for A with at least as many rows as columns.
 *
 * Row-major. Overwrites both arguments with the factors and the transformed right side. A column that depends
 * on the ones before it to working precision gets the coefficient 0; add small rows (Tikhonov) where that matters.
 *
 * Method    QR by Householder reflections              Source    Golub 1965; Golub & Van Loan, from memory
 * Accuracy  backward stable; residual within rounding of the least one
 */
export function leastSquares(matrix: Float64Array, rows: number, columns: number, rightSide: Float64Array): Float64Array {
  if (rows < columns) throw new Error(`least squares with ${rows} rows for ${columns} columns`);
  const diagonal = new Float64Array(columns);
  const product = new Float64Array(columns);
  for (let column = 0; column < columns; column += 1) {
    diagonal[column] = reflect(matrix, rows, columns, column, rightSide, product);
  }
  return solveUpper(matrix, columns, diagonal, rightSide);
}

/** Zeroes one column below its diagonal, applies the same reflection to the rest, and answers the new diagonal entry. */
function reflect(matrix: Float64Array, rows: number, columns: number, column: number, rightSide: Float64Array, product: Float64Array): number {
  let largest = 0;
  for (let i = column; i < rows; i += 1) largest = Math.max(largest, Math.abs(matrix[i * columns + column]));
  if (!(0 < largest)) return 0;
  let sum = 0;
  for (let i = column; i < rows; i += 1) sum += (matrix[i * columns + column] / largest) ** 2;
  const length = largest * Math.sqrt(sum);
  const head = matrix[column * columns + column];
  // The sign that adds magnitudes: the other one cancels.
  const diagonal = 0 < head ? -length : length;
  matrix[column * columns + column] = head - diagonal;
  const scale = 1 / (length * (length + Math.abs(head)));
  product.fill(0, column + 1);
  let rightProduct = 0;
  // By rows, so that memory is walked in order.
  for (let i = column; i < rows; i += 1) {
    const v = matrix[i * columns + column];
    for (let k = column + 1; k < columns; k += 1) product[k] += v * matrix[i * columns + k];
    rightProduct += v * rightSide[i];
  }
  for (let i = column; i < rows; i += 1) {
    const v = matrix[i * columns + column] * scale;
    for (let k = column + 1; k < columns; k += 1) matrix[i * columns + k] -= v * product[k];
    rightSide[i] -= v * rightProduct;
  }
  return diagonal;
}

function solveUpper(matrix: Float64Array, columns: number, diagonal: Float64Array, rightSide: Float64Array): Float64Array {
  const negligible = diagonal.reduce((most, value) => Math.max(most, Math.abs(value)), 0) * columns * Number.EPSILON;
  const answer = new Float64Array(columns);
  for (let i = columns - 1; 0 <= i; i -= 1) {
    let sum = rightSide[i];
    for (let k = i + 1; k < columns; k += 1) sum -= matrix[i * columns + k] * answer[k];
    answer[i] = negligible < Math.abs(diagonal[i]) ? sum / diagonal[i] : 0;
  }
  return answer;
}
