/**
 * The film's outer face cut into straight panels that its polarisation charge is expanded on.
 *
 *          .-|-----|-.        Method    panels shrink towards the corners, where the charge is singular and the copper's
 *          |         |                  own edges are near; flat film beyond the outermost box is followed outwards by
 *   __|__|_|         |_|__|____|_ _     widening panels, since its charge dies away only as the distance squared
 */
import { sideBasis } from '../basis/sideBasis';
import type { Side } from '../basis/side';
import type { OutlinePoint } from './outline';

export interface PanelSetting {
  /** Length of the panel next to a corner. */
  readonly first: number;
  /** End of a panel over its start, both as distances from the corner. */
  readonly ratio: number;
  /** No panel between two corners is longer. */
  readonly longest: number;
  /** How far flat film is followed beyond the outermost corners. */
  readonly reach: number;
  /** Polynomials on a panel at a corner, and on one between others. */
  readonly cornerOrder: number;
  readonly middleOrder: number;
  /** Of the stack: the film's. */
  readonly layer: number;
  /** Exponent of the charge at a corner: lambda - 1. */
  readonly edge: number;
}

/** Of a panel's `conductor`: it is none. */
export const noConductor = -1;

/** From left to right; the film lies to the right of the direction of travel, air to the left. */
export function outlinePanels(corners: readonly OutlinePoint[], setting: PanelSetting): Side[] {
  const first = corners[0];
  const last = corners[corners.length - 1];
  const panels: Side[] = [];
  const far = reachSizes(setting);
  addCut({ x: first.x - setting.reach, y: first.y }, first, [...far].reverse(), { start: false, end: true });
  for (let i = 1; i < corners.length; i += 1) {
    const { x, y } = corners[i - 1];
    addCut(corners[i - 1], corners[i], betweenCorners(Math.abs(corners[i].x - x) + Math.abs(corners[i].y - y), setting), { start: true, end: true });
  }
  addCut(last, { x: last.x + setting.reach, y: last.y }, far, { start: true, end: false });
  return panels;

  function addCut(from: OutlinePoint, to: OutlinePoint, sizes: readonly number[], corner: { start: boolean; end: boolean }) {
    const total = sizes.reduce((sum, size) => sum + size, 0);
    let done = 0;
    sizes.forEach((size, i) => {
      const [a, b] = [done / total, i === sizes.length - 1 ? 1 : (done + size) / total];
      const start = corner.start && i === 0;
      const end = corner.end && i === sizes.length - 1;
      const [x0, y0, x1, y1] = [from.x + (to.x - from.x) * a, from.y + (to.y - from.y) * a, from.x + (to.x - from.x) * b, from.y + (to.y - from.y) * b];
      panels.push({
        x0, y0, x1, y1,
        length: Math.abs(x1 - x0) + Math.abs(y1 - y0),
        basis: sideBasis(start ? setting.edge : 0, end ? setting.edge : 0),
        order: start || end ? setting.cornerOrder : setting.middleOrder,
        conductor: noConductor,
        layer: setting.layer,
      });
      done += size;
    });
  }
}

/** Sizes from one corner to the next, the same from both ends. */
function betweenCorners(length: number, { first, ratio, longest }: PanelSetting): number[] {
  const sizes: number[] = [];
  let covered = 0;
  for (;;) {
    const middle = length - 2 * covered;
    if (middle <= Math.min(longest, covered === 0 ? 2 * first : 2 * (ratio - 1) * covered)) return [...sizes, middle, ...[...sizes].reverse()];
    const size = Math.min(covered === 0 ? first : (ratio - 1) * covered, longest, middle / 3);
    sizes.push(size);
    covered += size;
  }
}

/** Sizes outwards from the outermost corner. */
function reachSizes({ first, ratio, reach }: PanelSetting): number[] {
  const sizes: number[] = [];
  let covered = 0;
  while (covered < reach) {
    const size = covered === 0 ? first : (ratio - 1) * covered;
    // The last one takes the rest rather than leave a sliver.
    sizes.push(reach < covered + 1.5 * size ? reach - covered : size);
    covered += sizes[sizes.length - 1];
  }
  return sizes;
}
