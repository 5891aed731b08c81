/**
 * A straight side of a conductor, or a part of one, with the charge series it carries.
 *
 * Lengths are in the unit of the solve. Sides are numbered through the whole section; the unknowns are laid out
 * so that the highest polynomial of every side comes after all the others:
 *
 *   [ side 0: m = 0 … order-2 | side 1: m = 0 … order-2 | … ][ side 0: m = order-1 | side 1: m = order-1 | … ]
 *
 * One factorisation then holds the answer with one polynomial less on every side as its leading part.
 */
import type { SideBasis } from './sideBasis';

export interface Segment {
  readonly x0: number;
  readonly y0: number;
  readonly x1: number;
  readonly y1: number;
}

export interface Side extends Segment {
  readonly length: number;
  readonly basis: SideBasis;
  /** Polynomials p0 … p(order-1), at least two. */
  readonly order: number;
  readonly conductor: number;
  /** Of the stack. */
  readonly layer: number;
}

export interface SidePoints {
  readonly x: Float64Array;
  readonly y: Float64Array;
}

/** The places of rule nodes `t` on a side. */
export function pointsOn({ x0, y0, x1, y1 }: Segment, t: Float64Array): SidePoints {
  const x = new Float64Array(t.length);
  const y = new Float64Array(t.length);
  for (let i = 0; i < t.length; i += 1) {
    x[i] = x0 + (x1 - x0) * t[i];
    y[i] = y0 + (y1 - y0) * t[i];
  }
  return { x, y };
}
