/**
 * Nodes on the sides of a conductor, with what a potential there is worth to each polynomial, close enough for potentials whose
 * sources are away to the left and to the right.
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Side } from '../basis/side';
import { farRatio } from './pairIntegral';
import { farPoints } from './sideBlock';

export interface Moments {
  readonly count: number;
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** count × polynomialLimit: what a potential at the node is worth to the polynomials of its side. */
  readonly weighted: Float64Array;
  /** Of each node, the first of its side's polynomials, all sides' counted one after the other; and how many they are. */
  readonly start: Int32Array;
  readonly order: Int32Array;
  readonly left: number;
  readonly right: number;
  readonly bottom: number;
  readonly top: number;
}

/** Where sources may begin: x below `left`, and above `right`. */
export interface Clear {
  readonly left: number;
  readonly right: number;
}

/** Nodes of one half, and their images about the middle: their own where they lie there. */
export interface MirrorPairs {
  readonly own: Int32Array;
  readonly mirrored: Int32Array;
}

export function nodesWithin(sides: readonly Side[], clear: Clear): Moments {
  const found: { side: Side; rule: PartRule; row: number }[] = [];
  let row = 0;
  let count = 0;
  for (const side of sides) {
    const start = row;
    visit(side, 0, 0, clear, (rule) => {
      found.push({ side, rule, row: start });
      count += rule.count;
    });
    row += side.order;
  }
  const [x, y, weighted] = [new Float64Array(count), new Float64Array(count), new Float64Array(count * polynomialLimit)];
  const [start, order] = [new Int32Array(count), new Int32Array(count)];
  let at = 0;
  for (const { side: { x0, y0, x1, y1, order: own }, rule, row: first } of found) {
    weighted.set(rule.weighted.subarray(0, rule.count * polynomialLimit), at * polynomialLimit);
    for (let i = 0; i < rule.count; i += 1, at += 1) {
      x[at] = x0 + (x1 - x0) * rule.t[i];
      y[at] = y0 + (y1 - y0) * rule.t[i];
      start[at] = first;
      order[at] = own;
    }
  }
  return { count, x, y, weighted, start, order, ...extentOf(sides) };
}

/** Of a conductor, which is its own mirror image. */
export function mirrorPairs({ x, y, left, right }: Moments): MirrorPairs {
  const tolerance = 1e-9 * (right - left);
  const own: number[] = [];
  const mirrored: number[] = [];
  for (let i = 0; i < x.length; i += 1) {
    const image = left + right - x[i];
    if (image + tolerance < x[i]) continue;
    let j = 0;
    while (j < x.length && !(Math.abs(x[j] - image) <= tolerance && Math.abs(y[j] - y[i]) <= tolerance)) j += 1;
    if (j === x.length) throw new Error(`node ${i} at ${x[i]}, ${y[i]} has no mirror image`);
    own.push(i);
    mirrored.push(j);
  }
  return { own: Int32Array.from(own), mirrored: Int32Array.from(mirrored) };
}

export function extentOf(sides: readonly Side[]) {
  let [left, right, bottom, top] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const { x0, x1, y0, y1 } of sides) {
    left = Math.min(left, x0, x1);
    right = Math.max(right, x0, x1);
    bottom = Math.min(bottom, y0, y1);
    top = Math.max(top, y0, y1);
  }
  return { left, right, bottom, top };
}

/** Sides longer than this over the distance are cut. */
const wholeRatio = 0.3;

function visit(side: Side, level: number, index: number, clear: Clear, take: (rule: PartRule) => void): void {
  const size = 2 ** -level;
  const from = side.x0 + (side.x1 - side.x0) * index * size;
  const to = from + (side.x1 - side.x0) * size;
  const near = Math.min(Math.min(from, to) - clear.left, clear.right - Math.max(from, to));
  const length = side.length * size;
  if (level === 0 && wholeRatio * length <= near) take(side.basis.whole(Math.max(farPoints(near / length), side.order)));
  else if (0 < level && farRatio * length <= near) take(side.basis.part(level, index));
  else {
    visit(side, level + 1, 2 * index, clear, take);
    visit(side, level + 1, 2 * index + 1, clear, take);
  }
}
