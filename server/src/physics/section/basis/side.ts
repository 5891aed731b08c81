/**
 * A straight side of a conductor, or a part of one, with the charge series it carries.
 *
 * Lengths are in the unit of the solve.
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
  return { x: t.map((at) => x0 + (x1 - x0) * at), y: t.map((at) => y0 + (y1 - y0) * at) };
}
