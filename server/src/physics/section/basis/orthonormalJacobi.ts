/**
 * Polynomials p0, p1, … orthonormal under the weight (1 + u)^start (1 - u)^end on [-1, 1], the weight scaled to
 * the integral 1: p0 = 1, and the others carry no net charge.
 *
 * Method    three-term recurrence  root(b(n+1)) p(n+1) = (u - a(n)) p(n) - root(b(n)) p(n-1)
 * Source    Szegö, Orthogonal Polynomials, from memory; orthonormality is checked by quadrature in the test
 * Range     both exponents above -1
 */
/** Degrees 0 … polynomialLimit - 1 are at hand on every side. */
export const polynomialLimit = 16;

export interface Recurrence {
  readonly start: number;
  readonly end: number;
  /** a(n), n = 0 … */
  readonly centre: Float64Array;
  /** root(b(n)); entry 0 is unused. */
  readonly spread: Float64Array;
}

export function orthonormalJacobi(count: number, start: number, end: number): Recurrence {
  const centre = new Float64Array(count);
  const spread = new Float64Array(count);
  const sum = start + end;
  // The first two rows apart: the general forms are 0/0 there for start + end = 0 and -1.
  centre[0] = (start - end) / (sum + 2);
  for (let n = 1; n < count; n += 1) {
    const s = 2 * n + sum;
    centre[n] = ((start - end) * sum) / (s * (s + 2));
    spread[n] = Math.sqrt(n === 1
      ? (4 * (1 + start) * (1 + end)) / ((sum + 2) * (sum + 2) * (sum + 3))
      : (4 * n * (n + start) * (n + end) * (n + sum)) / (s * s * (s + 1) * (s - 1)));
  }
  return { start, end, centre, spread };
}

/** Writes p0(u) … p(count-1)(u) to `values` from `at` on, each times `scale`. */
export function writePolynomials({ centre, spread }: Recurrence, u: number, scale: number, values: Float64Array, at: number, count: number): void {
  let before = 0;
  let current = scale;
  values[at] = current;
  for (let n = 1; n < count; n += 1) {
    const next = ((u - centre[n - 1]) * current - spread[n - 1] * before) / spread[n];
    before = current;
    current = next;
    values[at + n] = current;
  }
}
