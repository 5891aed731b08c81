/**
 * Where the unknowns stand in the matrix: the highest polynomials of every side after all the others.
 *
 *   [ side 0: m = 0 … kept-1 | side 1: m = 0 … kept-1 | … ][ side 0: the others | side 1: the others | … ]
 *
 * One factorisation then holds the answer with a shorter series on every side as its leading part.
 */
import type { ChargedConductor } from '../basis/chargedConductor';

export interface Layout {
  readonly unknowns: number;
  /** Unknowns without the highest polynomials. */
  readonly coarse: number;
  /** Of each conductor: the row of every polynomial, side after side. */
  readonly rows: readonly Int32Array[];
  /** Of each conductor: the rows of its sides' net charges. */
  readonly charges: readonly Int32Array[];
}

/** Polynomials that the coarser answer goes without: an even and an odd one, but at least one is kept with one. */
export const leftOut = (order: number) => (order < 4 ? 1 : 2);

export function layOut(conductors: readonly ChargedConductor[]): Layout {
  let coarse = 0;
  for (const { sides } of conductors) for (const { order } of sides) coarse += order - leftOut(order);
  let start = 0;
  let highest = coarse;
  const charges = conductors.map(({ sides }) => new Int32Array(sides.length));
  const rows = conductors.map(({ sides }, c) => {
    const own = new Int32Array(sides.reduce((sum, { order }) => sum + order, 0));
    let at = 0;
    sides.forEach(({ order }, s) => {
      const kept = order - leftOut(order);
      charges[c][s] = start;
      for (let m = 0; m < order; m += 1) own[at + m] = m < kept ? start + m : highest + m - kept;
      at += order;
      start += kept;
      highest += order - kept;
    });
    return own;
  });
  return { unknowns: highest, coarse, rows, charges };
}
