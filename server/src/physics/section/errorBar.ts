/**
 * Relative error bars of a matrix from the same with the highest polynomials of every side left out.
 *
 * Formula   |fine - coarse| + 1e-5 |fine| + 3e-9 sqrt(fine_ii fine_jj), over |fine|
 * Model     the series converges geometrically, so the last step is larger than all that follow; the two floors
 *           are the integrals' and the kernel's own error, which no degree changes
 * Accuracy  holds the truth in all of the seeded random sections of the test; above 1e-5 it is 5 to 50 times too large
 */
export function errorBars(fine: Float64Array, coarse: Float64Array, order: number): Float64Array {
  const bars = new Float64Array(fine.length);
  for (let i = 0, at = 0; i < order; i += 1) {
    for (let j = 0; j < order; j += 1, at += 1) {
      const size = Math.abs(fine[at]);
      const scale = Math.sqrt(Math.abs(fine[i * order + i] * fine[j * order + j]));
      bars[at] = size === 0 ? 1 : (Math.abs(fine[at] - coarse[at]) + relativeFloor * size + absoluteFloor * scale) / size;
    }
  }
  return bars;
}

const relativeFloor = 1e-5;
const absoluteFloor = 3e-9;

/** The largest relative change, but of entries too weak to matter only against a ten-thousandth of the diagonal. */
export function largestChange(fine: Float64Array, coarse: Float64Array, order: number): number {
  let largest = 0;
  for (let i = 0, at = 0; i < order; i += 1) {
    for (let j = 0; j < order; j += 1, at += 1) {
      const scale = Math.sqrt(Math.abs(fine[i * order + i] * fine[j * order + j]));
      const change = Math.abs(fine[at] - coarse[at]) / Math.max(Math.abs(fine[at]), weak * scale);
      // What is not a number has to show.
      if (Number.isNaN(change)) return NaN;
      if (largest < change) largest = change;
    }
  }
  return largest;
}

const weak = 1e-4;
