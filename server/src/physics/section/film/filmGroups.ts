/**
 * A row of conductors under a film as groups: each conductor with the panels of the film's face that are nearest to it.
 *
 *    ____|____       ____|____        Groups next to each other touch and are coupled side by side; all others are far apart, and see
 *   |  ===    |_____|   ===   |_      of each other a few points and charges (groupView.ts)
 *            group 0 | group 1
 */
import type { Side } from '../basis/side';
import { leftOut } from '../galerkin/layout';
import { shapeOf, type Shape } from './keptBlocks';
import type { ChargedConductor } from '../basis/chargedConductor';

export interface FilmGroup {
  /** Index of the conductor. */
  readonly conductor: number;
  /** Left end of its foot. */
  readonly foot: number;
  /** The conductor's sides and its panels, with that foot at 0 and places rounded: equal groups are equal to the last digit. */
  readonly sides: readonly Side[];
  readonly shapes: readonly Shape[];
  /** How many of them are the conductor's. */
  readonly own: number;
  /** Of every polynomial, item after item: its unknown, those of the shorter series first. */
  readonly rows: Int32Array;
  /** First polynomial of every item. */
  readonly starts: Int32Array;
  readonly unknowns: number;
  readonly coarse: number;
  readonly left: number;
  readonly right: number;
}

export interface FilmedRow {
  readonly conductors: readonly ChargedConductor[];
  readonly panels: readonly Side[];
}

/** From left to right; null where they do not make a row, or too short a one to be worth it. */
export function filmGroups({ conductors, panels }: FilmedRow): FilmGroup[] | null {
  const order = conductors.map((_, c) => c).sort((a, b) => conductors[a].left - conductors[b].left);
  const bounds: number[] = [];
  for (let i = 1; i < order.length; i += 1) {
    const [before, after] = [conductors[order[i - 1]], conductors[order[i]]];
    if (!(before.right < after.left)) return null;
    bounds.push((before.right + after.left) / 2);
  }
  if (order.length < fewestGrouped || conductors.some(({ layer }) => layer !== panels[0].layer)) return null;
  const nearest: number[][] = order.map(() => []);
  panels.forEach(({ x0, x1 }, p) => {
    let g = 0;
    while (g < bounds.length && bounds[g] < (x0 + x1) / 2) g += 1;
    nearest[g].push(p);
  });
  return order.map((c, g) => groupOf(conductors[c], { conductor: c, panels, nearest: nearest[g] }));
}

/** Below, the two ways cost about the same. */
export const fewestGrouped = 8;

interface Gathering {
  readonly conductor: number;
  readonly panels: readonly Side[];
  readonly nearest: readonly number[];
}

function groupOf(own: ChargedConductor, { conductor, panels, nearest }: Gathering): FilmGroup {
  const faces = [...own.sides, ...nearest.map((p) => panels[p])];
  // The shorter series lacks the highest polynomials, and the outermost panels.
  const kept = faces.map(({ order }, i) => {
    if (i < own.sides.length) return order - leftOut(order);
    const p = nearest[i - own.sides.length];
    return p === 0 || p === panels.length - 1 ? 0 : order - 1;
  });
  const starts = new Int32Array(faces.length);
  let unknowns = 0;
  faces.forEach(({ order }, i) => {
    starts[i] = unknowns;
    unknowns += order;
  });
  const coarse = kept.reduce((sum, each) => sum + each, 0);
  const rows = new Int32Array(unknowns);
  let [low, high] = [0, coarse];
  faces.forEach(({ order }, i) => {
    for (let m = 0; m < order; m += 1) {
      rows[starts[i] + m] = m < kept[i] ? low : high;
      if (m < kept[i]) low += 1;
      else high += 1;
    }
  });
  const left = faces.reduce((least, { x0, x1 }) => Math.min(least, x0, x1), Infinity);
  const right = faces.reduce((most, { x0, x1 }) => Math.max(most, x0, x1), -Infinity);
  const sides = faces.map((face) => movedSide(face, -own.foot));
  return { conductor, foot: own.foot, sides, shapes: sides.map(shapeOf), own: own.sides.length, rows, starts, unknowns, coarse, left, right };
}

/** Along the section, to a whole number of grains. */
export function movedSide(side: Side, by: number): Side {
  return { ...side, x0: grains(side.x0 + by) * grain, x1: grains(side.x1 + by) * grain };
}

/** Of the unit of the solve: far below what any charge depends on, far above the rounding of places. */
export const grain = 1e-10;
export const grains = (length: number) => Math.round(length / grain);
