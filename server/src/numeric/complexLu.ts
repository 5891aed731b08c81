/**
 * LU factors of a complex matrix with partial pivoting, in place; real and imaginary parts in arrays of their own.
 *
 * Row-major. Answers the row that was exchanged at every step, or null where a column has no pivot other than zero (or NaN).
 *
 * Method    outer-product elimination along rows, pivots by |re| + |im|       Source    textbook; Golub & Van Loan
 * Accuracy  backward stable in practice, as `lu.ts`
 */
export interface ComplexNumbers {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

export function complexLuFactor({ real, imaginary }: ComplexNumbers, order: number): Int32Array | null {
  const exchanged = new Int32Array(order);
  for (let column = 0; column < order; column += 1) {
    let pivotRow = column;
    let largest = -1;
    for (let i = column; i < order; i += 1) {
      const size = Math.abs(real[i * order + column]) + Math.abs(imaginary[i * order + column]);
      if (largest < size) {
        largest = size;
        pivotRow = i;
      }
    }
    if (!(0 < largest && largest < Infinity)) return null;
    exchanged[column] = pivotRow;
    if (pivotRow !== column) {
      exchangeRows(real, order, pivotRow, column);
      exchangeRows(imaginary, order, pivotRow, column);
    }
    const top = column * order;
    const a = real[top + column];
    const b = imaginary[top + column];
    const size = a * a + b * b;
    for (let i = column + 1; i < order; i += 1) {
      const row = i * order;
      const x = real[row + column];
      const y = imaginary[row + column];
      if (x === 0 && y === 0) continue;
      const re = (x * a + y * b) / size;
      const im = (y * a - x * b) / size;
      real[row + column] = re;
      imaginary[row + column] = im;
      for (let k = column + 1; k < order; k += 1) {
        real[row + k] -= re * real[top + k] - im * imaginary[top + k];
        imaginary[row + k] -= re * imaginary[top + k] + im * real[top + k];
      }
    }
  }
  return exchanged;
}

/** Solves A x = b in place from the factors, for `count` right sides, each `order` long, one after the other. */
export function complexLuSolve(factors: ComplexNumbers, exchanged: Int32Array, { real, imaginary }: ComplexNumbers, count = 1): void {
  const order = exchanged.length;
  for (let side = 0; side < count; side += 1) {
    const base = side * order;
    for (let i = 0; i < order; i += 1) {
      const from = base + exchanged[i];
      [real[base + i], real[from]] = [real[from], real[base + i]];
      [imaginary[base + i], imaginary[from]] = [imaginary[from], imaginary[base + i]];
    }
    for (let i = 0; i < order; i += 1) subtractProducts(factors, { real, imaginary }, { row: i * order, at: base + i, base, from: 0, to: i });
    for (let i = order - 1; 0 <= i; i -= 1) {
      subtractProducts(factors, { real, imaginary }, { row: i * order, at: base + i, base, from: i + 1, to: order });
      const a = factors.real[i * order + i];
      const b = factors.imaginary[i * order + i];
      const size = a * a + b * b;
      const x = real[base + i];
      const y = imaginary[base + i];
      real[base + i] = (x * a + y * b) / size;
      imaginary[base + i] = (y * a - x * b) / size;
    }
  }
}

interface Products {
  readonly row: number;
  readonly at: number;
  readonly base: number;
  readonly from: number;
  readonly to: number;
}

function subtractProducts(factors: ComplexNumbers, { real, imaginary }: ComplexNumbers, { row, at, base, from, to }: Products): void {
  let re = real[at];
  let im = imaginary[at];
  for (let k = from; k < to; k += 1) {
    const a = factors.real[row + k];
    const b = factors.imaginary[row + k];
    re -= a * real[base + k] - b * imaginary[base + k];
    im -= a * imaginary[base + k] + b * real[base + k];
  }
  real[at] = re;
  imaginary[at] = im;
}

function exchangeRows(matrix: Float64Array, order: number, first: number, second: number): void {
  for (let k = 0; k < order; k += 1) {
    const held = matrix[first * order + k];
    matrix[first * order + k] = matrix[second * order + k];
    matrix[second * order + k] = held;
  }
}
