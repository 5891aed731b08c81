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
}

export interface SearchResult {
  /** Just enough; where nothing in reach is enough, the best in reach. */
  readonly factor: number;
  readonly enough: boolean;
  readonly evaluations: number;
}

/** Null where the excess cannot be computed. */
export function search({ excess, better, smallest, largest, tolerance }: Search): SearchResult | null {
  const sign = better === 'more' ? 1 : -1;
  const [worst, best] = sign === 1 ? [Math.log(smallest), Math.log(largest)] : [-Math.log(largest), -Math.log(smallest)];
  const known = new Map<number, number>();
  const at = (step: number) => {
    const value = known.get(step) ?? excess(Math.exp(sign * step));
    known.set(step, value);
    return value;
  };
  const here = at(0);
  if (Number.isNaN(here)) return null;
  const towards = 0 < here ? best : worst;
  // The crossing is rarely far: doubling steps keep the bracket narrow and the odd far-off section unsolved.
  let [near, far] = [0, 0];
  for (;;) {
    if (far === towards) return { factor: Math.exp(sign * far), enough: here <= 0, evaluations: known.size };
    near = far;
    far = 0 < towards ? Math.min(towards, far + Math.LN2) : Math.max(towards, far - Math.LN2);
    const there = at(far);
    if (Number.isNaN(there)) return null;
    if (0 < there !== 0 < here) break;
  }
  const found = root(at, { low: Math.min(near, far), high: Math.max(near, far), tolerance, limit: mostSteps });
  const step = 'found' in found ? found.found : Math.max(near, far);
  return { factor: Math.exp(sign * step), enough: true, evaluations: known.size };
}

/** Brent's method on a nearly straight line ends after three or four. */
const mostSteps = 12;
