/**
 * Relative error bars of a matrix from the same with the highest polynomials of every side left out.
 *
 * Formula   |fine - coarse| + 1e-5 |fine| + 3e-9 sqrt(fine_ii fine_jj), over |fine|
 * Model     the series converges geometrically, so the last step is larger than all that follow; the two floors
 *           are the integrals' and the kernel's own error, which no degree changes
 * Accuracy  holds the truth in all of the seeded random sections of the test; above 1e-5 it is 5 to 50 times too large
 */
export function errorBars(fine: Float64Array, coarse: Float64Array, order: number): Float64Array {
  return fine.map((value, at) => {
    const i = Math.floor(at / order);
    const j = at % order;
    const scale = Math.sqrt(Math.abs(fine[i * order + i] * fine[j * order + j]));
    const bar = Math.abs(value - coarse[at]) + relativeFloor * Math.abs(value) + absoluteFloor * scale;
    return value === 0 ? 1 : bar / Math.abs(value);
  });
}

const relativeFloor = 1e-5;
const absoluteFloor = 3e-9;

/** The largest relative change, but of entries too weak to matter only against a ten-thousandth of the diagonal. */
export function largestChange(fine: Float64Array, coarse: Float64Array, order: number): number {
  return fine.reduce((largest, value, at) => {
    const scale = Math.sqrt(Math.abs(fine[Math.floor(at / order) * (order + 1)] * fine[(at % order) * (order + 1)]));
    return Math.max(largest, Math.abs(value - coarse[at]) / Math.max(Math.abs(value), weak * scale));
  }, 0);
}

const weak = 1e-4;
