/**
 * The smallest change that does: by which factor a gap has to grow or a length to shrink until the
 * noise is down to what is wanted. Coupling follows nearly a power of the distance, so the search
 * runs in logarithms, where that is a straight line.
 */
import { root } from '../numeric/root';

export interface Search {
  /** Logarithm of what there is over what is wanted, at this factor; NaN where it cannot be computed. */
  readonly excess: (factor: number) => number;
  /** `more`: the noise falls with a larger factor. */
  readonly better: 'more' | 'less';
  readonly smallest: number;
  readonly largest: number;
  /** Of the factor, relative. */
  readonly tolerance: number;
  /** The power by which the noise falls with the factor, about: where the first step goes. */
  readonly slope: number;
}

export interface SearchResult {
  /** Just enough; where nothing in reach is enough, the best in reach. */
  readonly factor: number;
  readonly enough: boolean;
  readonly evaluations: number;
}

/** Null where the excess cannot be computed. */
export function search({ excess, better, smallest, largest, tolerance, slope }: Search): SearchResult | null {
  const sign = better === 'more' ? 1 : -1;
  const [worst, best] = sign === 1 ? [Math.log(smallest), Math.log(largest)] : [-Math.log(largest), -Math.log(smallest)];
  const known = new Map<number, number>();
  const at = (step: number) => {
    const value = known.get(step) ?? excess(Math.exp(sign * step));
    known.set(step, value);
    return value;
  };
  const answer = (step: number, enough: boolean): SearchResult => ({ factor: Math.exp(sign * step), enough, evaluations: known.size });
  const here = at(0);
  const [low, high] = [Math.min(0, worst), Math.max(0, best)];
  let [near, far] = [0, 0];
  let there = here;
  let fall = slope;
  // Each step aims a little beyond where the straight line through the last two would cross.
  while (0 < there === 0 < here) {
    if (Number.isNaN(there)) return null;
    if (far === (0 < here ? high : low)) return answer(far, here <= 0);
    const aim = (beyond * there) / fall + (0 < here ? shortest : -shortest);
    near = far;
    far = Math.min(high, Math.max(low, far + Math.min(furthest, Math.max(-furthest, aim))));
    const before = there;
    there = at(far);
    const seen = (before - there) / (far - near);
    if (0 < seen) fall = seen;
  }
  if (Number.isNaN(there)) return null;
  const found = root(at, { low: Math.min(near, far), high: Math.max(near, far), tolerance, limit: mostSteps });
  return answer('found' in found ? found.found : Math.max(near, far), true);
}

/** Steps in logarithms: a tenth more than the straight line says, at least two percent, at most a factor of eight. */
const beyond = 1.1;
const shortest = 0.02;
const furthest = Math.log(8);

/** Brent's method on a nearly straight line ends after two or three. */
const mostSteps = 12;
