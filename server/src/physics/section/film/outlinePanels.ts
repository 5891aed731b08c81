/**
 * The film's outer face cut into straight panels that its polarisation charge is expanded on.
 *
 *          .-|-----|-.        Method    panels shrink towards the corners, where the charge is singular, down to the
 *          |         |                  film's thickness (the copper's own edges lie that near) and to the nearest other
 *   __|__|_|         |_|__|____|_ _     corner; flat film beyond the outermost box is followed outwards by widening
 *                                       panels, since its charge dies away only as the distance squared
 */
import { sideBasis } from '../basis/sideBasis';
import type { Side } from '../basis/side';
import type { OutlinePoint } from './outline';

export interface PanelSetting {
  /** Longest panel next to a corner, and over the distance to the nearest other corner. */
  readonly first: number;
  readonly firstOverNearest: number;
  /** End of a panel over its start, both as distances from the corner. */
  readonly ratio: number;
  /** No panel between two corners is longer; and none on a roof over several conductors, whose edges lie beneath it. */
  readonly longest: number;
  readonly longestOverEdges: number;
  /** Where conductors begin and end. */
  readonly edges: readonly number[];
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
  const panels: Side[] = [];
  const first = corners.map((corner) => Math.min(setting.first, setting.firstOverNearest * nearestOther(corner, corners)));
  const [left, right] = [corners[0], corners[corners.length - 1]];
  addCut({ x: left.x - setting.reach, y: left.y }, left, outwards(first[0], setting).reverse(), { start: false, end: true });
  for (let i = 1; i < corners.length; i += 1) {
    const { x, y } = corners[i - 1];
    const length = Math.abs(corners[i].x - x) + Math.abs(corners[i].y - y);
    // The edges of the outermost conductors under a roof lie at its corners, where panels are short anyway.
    const beneath = setting.edges.filter((edge) => x < edge && edge < corners[i].x).length;
    const longest = 2 < beneath ? setting.longestOverEdges : setting.longest;
    addCut(corners[i - 1], corners[i], betweenCorners(length, [first[i - 1], first[i]], setting.ratio, longest), { start: true, end: true });
  }
  addCut(right, { x: right.x + setting.reach, y: right.y }, outwards(first[corners.length - 1], setting), { start: true, end: false });
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

function nearestOther({ x, y }: OutlinePoint, corners: readonly OutlinePoint[]): number {
  return corners.reduce((least, other) => (other.x === x && other.y === y ? least : Math.min(least, Math.hypot(other.x - x, other.y - y))), Infinity);
}

/** Sizes from one corner to the next, graded from both. */
function betweenCorners(length: number, [firstLeft, firstRight]: readonly [number, number], ratio: number, longest: number): number[] {
  const left: number[] = [];
  const right: number[] = [];
  let [fromLeft, fromRight] = [0, 0];
  // What may follow, and what may span the middle, when `covered` lies behind.
  const next = (covered: number, first: number) => Math.min(longest, covered === 0 ? first : (ratio - 1) * covered);
  for (;;) {
    const middle = length - fromLeft - fromRight;
    const [nextLeft, nextRight] = [next(fromLeft, firstLeft), next(fromRight, firstRight)];
    if (middle <= Math.min(longest, 2 * Math.min(nextLeft, nextRight))) return [...left, middle, ...right.reverse()];
    if (nextLeft <= nextRight) {
      left.push(Math.min(nextLeft, middle / 2));
      fromLeft += left[left.length - 1];
    } else {
      right.push(Math.min(nextRight, middle / 2));
      fromRight += right[right.length - 1];
    }
  }
}

/** Sizes outwards from an outermost corner. */
function outwards(first: number, { ratio, reach }: PanelSetting): number[] {
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
