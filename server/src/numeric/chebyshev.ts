/**
 * Chebyshev series of a smooth function on an interval, from its values at the Chebyshev points.
 *
 * `count` coefficients c0 … , f(x) = sum c_n T_n(s), s = (2x - low - high) / (high - low).
 *
 * Method    discrete cosine sum over the points of the first kind (no end points)
 * Source    Trefethen, Approximation Theory and Approximation Practice; Clenshaw 1955 for the evaluation
 * Accuracy  geometric in `count` for analytic functions; rounding of 1e-15 times the largest value
 */
export function chebyshevSeries(f: (x: number) => number, low: number, high: number, count: number): Float64Array {
  const points = chebyshevPoints(low, high, count);
  return chebyshevCoefficients(Float64Array.from(points, f));
}

/** Points of the first kind, ascending. */
export function chebyshevPoints(low: number, high: number, count: number): Float64Array {
  const middle = (low + high) / 2;
  const half = (high - low) / 2;
  return Float64Array.from({ length: count }, (_, i) => middle - half * Math.cos((Math.PI * (i + 0.5)) / count));
}

/** Coefficients from values at `chebyshevPoints`, in their order. */
export function chebyshevCoefficients(values: Float64Array): Float64Array {
  const count = values.length;
  return Float64Array.from({ length: count }, (_, n) => {
    let sum = 0;
    // Points ascend, so the angle runs from pi down to 0.
    for (let i = 0; i < count; i += 1) sum += values[i] * Math.cos((Math.PI * n * (count - 0.5 - i)) / count);
    return ((n === 0 ? 1 : 2) * sum) / count;
  });
}

export function chebyshevValue(coefficients: Float64Array, low: number, high: number, x: number): number {
  const s = (2 * x - low - high) / (high - low);
  let next = 0;
  let afterNext = 0;
  for (let n = coefficients.length - 1; 0 < n; n -= 1) {
    const current = 2 * s * next - afterNext + coefficients[n];
    afterNext = next;
    next = current;
  }
  return s * next - afterNext + coefficients[0];
}
