/**
 * A few nodes of a conductor that stand for all: whatever fields come from outside, the others' values follow from theirs.
 *
 * Method    interpolative decomposition: of the training fields' values at the nodes, the columns that the others are combinations
 *           of. A conductor is its own mirror image, so fields even and odd about its middle are told apart, each needs the
 *           nodes of one half only, and nodes are taken in pairs: what comes of it is the same in a mirror
 * Source    Cheng, Gimbutas, Martinsson & Rokhlin 2005, from memory
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { MirrorPairs, Moments } from './momentNodes';
import { pivotedBasis, type PivotedBasis } from './pivotedBasis';
import type { TrainingFields } from './trainingFields';

export interface Skeleton {
  readonly points: number;
  /** From the left end of the conductor's foot, and absolute. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Of the points' first half, which of the half's nodes they are; the second half is their mirror image. */
  readonly taken: Int32Array;
  /** points × unknowns: the moments of all nodes, gathered in these. */
  readonly moments: Float64Array;
}

export interface SkeletonSetting {
  /** Of every polynomial, side after side, the unknown. */
  readonly rows: Int32Array;
  readonly effort: number;
  readonly lean: -1 | 0 | 1;
}

/** For what is higher, or lower: a board and its mirror that lies flat are to choose alike. */
export function preferenceOf(count: number, height: (v: number) => number, lean: -1 | 0 | 1): Float64Array {
  return Float64Array.from({ length: count }, (_, v) => 1 + 1e-3 * lean * Math.max(-100, Math.min(100, height(v))));
}

/** Of a field that changes by 1. */
const tolerance = 5e-7;

export function skeletonOf(nodes: Moments, { own, mirrored }: MirrorPairs, { even, odd }: TrainingFields, { rows, effort, lean }: SkeletonSetting): Skeleton {
  const { x, y, left, right, bottom, top } = nodes;
  const unknowns = rows.length;
  const count = own.length;
  const preference = preferenceOf(count, (v) => (y[own[v]] - (bottom + top) / 2) / (top - bottom + right - left), lean);
  const sets = [even, odd].map(({ values, count: length }) => ({ vectors: Float64Array.from(values), count, length, preference }));
  const basis = pivotedBasis(sets, tolerance / 6 ** effort, count);
  const half = basis.count;
  const gathered = new Float64Array(2 * half * unknowns);
  const symmetric = new Float64Array(half);
  const opposite = new Float64Array(half);
  for (let v = 0; v < count; v += 1) {
    writeWeights(basis, 0, v, count, symmetric);
    writeWeights(basis, 1, v, count, opposite);
    // A node in the middle is its own image.
    const share = own[v] === mirrored[v] ? 0.25 : 0.5;
    for (let p = 0; p < half; p += 1) {
      // A value is its even and its odd part.
      const same = share * (symmetric[p] + opposite[p]);
      const across = share * (symmetric[p] - opposite[p]);
      gather(nodes, own[v], same, gathered, rows, p);
      gather(nodes, own[v], across, gathered, rows, half + p);
      gather(nodes, mirrored[v], across, gathered, rows, p);
      gather(nodes, mirrored[v], same, gathered, rows, half + p);
    }
  }
  const taken = Array.from(basis.pivots, (v) => own[v]);
  return {
    points: 2 * half,
    x: Float64Array.from([...taken.map((node) => x[node]), ...taken.map((node) => left + right - x[node])]),
    y: Float64Array.from([...taken, ...taken], (node) => y[node]),
    taken: basis.pivots,
    moments: gathered,
  };
}

/** Adds `share` of a node's moments to those of point `p`. */
export function gather({ weighted, start, order }: Moments, node: number, share: number, gathered: Float64Array, rows: Int32Array, p: number): void {
  const to = p * rows.length;
  const from = node * polynomialLimit;
  for (let m = 0; m < order[node]; m += 1) gathered[to + rows[start[node] + m]] += share * weighted[from + m];
}

/** What vector `v` of a set is of its pivots: their triangle, from below. */
function writeWeights({ count: points, pivots, parts }: PivotedBasis, set: number, v: number, count: number, weights: Float64Array): void {
  const triangle = parts[set];
  const taken = pivots.indexOf(v);
  if (0 <= taken) {
    weights.fill(0);
    weights[taken] = 1;
    return;
  }
  for (let p = points - 1; 0 <= p; p -= 1) {
    let sum = triangle[p * count + v];
    for (let q = p + 1; q < points; q += 1) sum -= triangle[p * count + pivots[q]] * weights[q];
    const pivot = triangle[p * count + pivots[p]];
    weights[p] = pivot === 0 ? 0 : sum / pivot;
  }
}
