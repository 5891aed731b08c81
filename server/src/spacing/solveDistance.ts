/**
 * The longest run and the smallest gap that still do. Both are rounded to the safe side and seen to do after rounding; what is
 * longer or narrower is not promised.
 */
import { search } from '../fixes/search';
import { root } from '../numeric/root';
import { metres, type Length } from '../units/quantity';

export type Found =
  | { readonly kind: 'found'; readonly value: Length }
  /** However long, up to the length of the nets; however near, down to the clearance. */
  | { readonly kind: 'any' }
  | { readonly kind: 'none' }
  /** Part of it has no number. */
  | { readonly kind: 'unknown' };

/** Logarithm of what there is over what is wanted at a distance; NaN where it has no number. */
export interface ExcessAt {
  /** For a search. */
  readonly near: (distance: number) => number;
  /** For a promise; never less. */
  readonly sure: (distance: number) => number;
}

/** `isSteady`: the noise grows with the length until it stays. That of a sine has its resonances. */
export function longestRun(excess: ExcessAt, longest: number, isSteady: boolean): Found {
  if (longest <= shortest) return atEnd(excess.sure(longest));
  if (isSteady) {
    const found = search({ excess: (factor) => excess.near(factor * start), better: 'less', smallest: shortest / start, largest: longest / start, tolerance, slope: 1 });
    if (found === null) return { kind: 'unknown' };
    const length = found.factor * start;
    if (!found.enough) return { kind: 'none' };
    // A dip on the way down would be a length that does between two that do not.
    if ([0.25, 0.5, 0.75].every((part) => excess.near(Math.max(shortest, part * length)) <= 0)) return roundedDown(excess, length, longest);
  }
  return firstFromBelow(excess, longest);
}

/** Shorter than this, two nets lie beside each other anyway, m. */
const shortest = 1e-3;
const start = 10e-3;
/** Relative: what is found is rounded to two figures and a half. */
const tolerance = 5e-3;

const atEnd = (excess: number): Found => ({ kind: Number.isNaN(excess) ? 'unknown' : excess <= 0 ? 'any' : 'none' });

/** The first length at which it is too much, looked for in steps of a quarter. */
function firstFromBelow(excess: ExcessAt, longest: number): Found {
  let fine = 0;
  for (let length = shortest; ; length = Math.min(1.25 * length, longest)) {
    const there = excess.near(length);
    if (Number.isNaN(there)) return { kind: 'unknown' };
    if (0 < there) {
      if (fine === 0) return { kind: 'none' };
      const found = root((logarithm) => excess.near(Math.exp(logarithm)), { low: Math.log(fine), high: Math.log(length), tolerance });
      return 'found' in found ? roundedDown(excess, Math.exp(found.found), longest) : { kind: 'unknown' };
    }
    if (length === longest) return roundedDown(excess, longest, longest);
    fine = length;
  }
}

/** In steps of a hundredth of it or less, until it is seen to do. */
function roundedDown({ sure }: ExcessAt, length: number, longest: number): Found {
  if (longest * (1 - tolerance) <= length && sure(longest) <= 0) return { kind: 'any' };
  const digit = 10 ** (Math.floor(Math.log10(length)) - 2);
  const step = digit * (length < 200 * digit ? 1 : length < 500 * digit ? 2 : 5);
  for (let count = Math.floor(length / step + tolerance); shortest <= count * step; count -= 1) {
    const there = sure(count * step);
    if (Number.isNaN(there)) return { kind: 'unknown' };
    if (there <= 0) return { kind: 'found', value: tidy(count, step) };
  }
  return sure(shortest) <= 0 ? { kind: 'found', value: metres(shortest) } : { kind: 'none' };
}

/** The wider, the quieter, between two nets with nothing between them. */
export function smallestGap(excess: ExcessAt, clearance: number): Found {
  const near = excess.near(clearance);
  if (near <= 0 && excess.sure(clearance) <= 0) return { kind: 'any' };
  const found = search({ excess: (factor) => excess.near(factor * clearance), better: 'more', smallest: 1, largest: widest / clearance, tolerance, slope: 1.5 });
  if (found === null) return { kind: 'unknown' };
  if (!found.enough) return { kind: 'none' };
  for (let count = Math.max(Math.ceil(clearance / grid - 1e-6), Math.floor(found.factor * clearance / grid)); count * grid <= widest; count += 1) {
    const there = excess.sure(count * grid);
    if (Number.isNaN(there)) return { kind: 'unknown' };
    if (there <= 0) return { kind: 'found', value: tidy(count, grid) };
  }
  return { kind: 'none' };
}

/** Wider than any lane that a board has to spare, m. */
const widest = 10e-3;
/** What a gap is drawn on, m. */
const grid = 1e-5;

/** Without the last bits of a product: 0.00012 and not 0.00012000000000000002. */
const tidy = (count: number, step: number): Length => metres(Number((count * step).toPrecision(12)));
