/**
 * A zero of a continuous function between two places where its signs differ.
 *
 * Never leaves the bracket and always ends: bisection at worst, inverse quadratic steps where the function is smooth.
 * Says how it went instead of throwing: a missing sign change or a value that is not a number is an answer as well.
 *
 * Method    Brent's combination of secant, inverse quadratic interpolation and bisection
 * Source    Brent, Algorithms for Minimization without Derivatives, 1973, ch. 4, from memory
 * Accuracy  the bracket ends narrower than `tolerance` + 4e-16 |x|, or the function is exactly zero
 */
export interface RootSearch {
  readonly low: number;
  readonly high: number;
  /** Absolute, on x. */
  readonly tolerance: number;
  /** Evaluations after the two at the ends. */
  readonly limit?: number;
}

export type RootResult =
  | { readonly found: number; readonly evaluations: number }
  | { readonly missing: 'no-sign-change' | 'not-a-number' | 'limit'; readonly evaluations: number };

export function root(f: (x: number) => number, { low, high, tolerance, limit = 100 }: RootSearch): RootResult {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  let evaluations = 2;
  if (Number.isNaN(fa) || Number.isNaN(fb)) return { missing: 'not-a-number', evaluations };
  if (fa === 0) return { found: a, evaluations };
  if (fb === 0) return { found: b, evaluations };
  if (fa < 0 === fb < 0) return { missing: 'no-sign-change', evaluations };
  // b is the best place so far, [b, c] the bracket, a the place before b.
  let c = a;
  let fc = fa;
  let step = b - a;
  let before = step;
  for (let used = 0; used <= limit; used += 1) {
    if (fb < 0 === fc < 0) {
      c = a;
      fc = fa;
      step = before = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      [a, b, c] = [b, c, b];
      [fa, fb, fc] = [fb, fc, fb];
    }
    const enough = 2 * Number.EPSILON * Math.abs(b) + tolerance / 2;
    const half = (c - b) / 2;
    if (Math.abs(half) <= enough || fb === 0) return { found: b, evaluations };
    const proposed = Math.abs(fa) <= Math.abs(fb) || Math.abs(before) < enough ? null : interpolatedStep({ a, b, c, fa, fb, fc });
    // An interpolated step must stay well inside the bracket and shrink twice as fast as the one before last.
    const accepted = proposed !== null && 0 < proposed / half && Math.abs(proposed) < Math.min(1.5 * Math.abs(half) - enough / 2, Math.abs(before) / 2);
    before = accepted ? step : half;
    step = accepted ? proposed : half;
    a = b;
    fa = fb;
    b += enough < Math.abs(step) ? step : half < 0 ? -enough : enough;
    fb = f(b);
    evaluations += 1;
    if (Number.isNaN(fb)) return { missing: 'not-a-number', evaluations };
  }
  return { missing: 'limit', evaluations };
}

/** Where the inverse parabola through three points, or the secant through two, meets zero; as a step from b. */
function interpolatedStep({ a, b, c, fa, fb, fc }: Record<'a' | 'b' | 'c' | 'fa' | 'fb' | 'fc', number>): number {
  const s = fb / fa;
  if (a === c) return -(s * (c - b)) / (1 - s);
  const q = fa / fc;
  const r = fb / fc;
  const numerator = s * ((c - b) * q * (q - r) - (b - a) * (r - 1));
  return -numerator / ((q - 1) * (r - 1) * (s - 1));
}
