/**
 * A few nodes of a film's group by which all groups but its neighbours see it, and it sees them.
 *
 * Method    as galerkin/skeleton.ts, of a group that is no mirror image of itself, and with one more kind of thing that follows from
 *           the potential at the nodes: a far field's flux through each panel, which is a field of charges on the two lines too
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import { nodesWithin, type Clear, type Moments } from '../galerkin/momentNodes';
import { pivotedBasis } from '../galerkin/pivotedBasis';
import { gather } from '../galerkin/skeleton';
import { heightsBeside } from '../galerkin/trainingFields';
import type { Side } from '../basis/side';
import type { FilmGroup } from './filmGroups';
import { plainBasis } from './fluxProduct';

export interface GroupSkeleton {
  readonly points: number;
  /** From the left end of the conductor's foot, and absolute. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** points × unknowns: the charges' moments, gathered in the points. */
  readonly charges: Float64Array;
  /** points × unknowns: what the potential at a point adds to each row. */
  readonly rows: Float64Array;
  /** fields × points: potentials that far charges of 1 might make there. */
  readonly fields: Float64Array;
}

export interface FarReach {
  readonly clear: Clear;
  /** From the group to the nearer of the two lines. */
  readonly distance: number;
  /** Of the polarisation: kappa times the film's permittivity. */
  readonly strength: number;
  readonly effort: number;
}

/** Of a field that changes by 1. */
const tolerance = 3e-7;
const constantWeight = 30;

export function groupSkeleton(group: FilmGroup, { clear, distance, strength, effort }: FarReach): GroupSkeleton {
  const { sides, own, rows, starts, unknowns } = group;
  const nodes = nodesWithin(sides, clear);
  const places = withPlacesAbove(nodes, sides.slice(own));
  const sources = sourcesOf(nodes, clear, distance);
  const fluxes = sides.slice(own).reduce((sum, { order }) => sum + order, 0);
  const length = sources.x.length + 1;
  const eligible = places.x.length;
  const count = eligible + fluxes;
  const vectors = new Float64Array(count * length);
  writePotentials(places, sources, vectors, length);
  writeFluxes(group, sources, vectors, eligible, length);
  const given = Float64Array.from(vectors.subarray(0, eligible * length));
  const { count: points, pivots, parts: [parts] } = pivotedBasis([{ vectors, count, length, eligible }], tolerance / 3 ** (effort - 1), eligible);
  const skeleton = { points, x: new Float64Array(points), y: new Float64Array(points), charges: new Float64Array(points * unknowns), rows: new Float64Array(points * unknowns), fields: new Float64Array((length - 1) * points) };
  pivots.forEach((node, p) => {
    skeleton.x[p] = places.x[node];
    skeleton.y[p] = places.y[node];
    for (let f = 0; f < length - 1; f += 1) skeleton.fields[f * points + p] = given[node * length + f];
  });
  const weights = new Float64Array(points);
  const ownPolynomials = starts[own] ?? unknowns;
  for (let v = 0; v < count; v += 1) {
    if (nodes.count <= v && v < eligible) continue;
    writeWeights(parts, pivots, v, count, weights);
    for (let p = 0; p < points; p += 1) {
      if (v < nodes.count) {
        gather(nodes, v, weights[p], skeleton.charges, rows, p);
        // A potential on the conductor is tested with its charges.
        if (nodes.start[v] < ownPolynomials) gather(nodes, v, weights[p], skeleton.rows, rows, p);
      } else skeleton.rows[p * unknowns + rows[ownPolynomials + v - eligible]] -= strength * weights[p];
    }
  }
  return skeleton;
}

interface Places {
  readonly x: Float64Array;
  readonly y: Float64Array;
}

/**
 * The nodes, and places above each horizontal panel: a field whose potential is zero all along a line may have any flux
 * through it, so that no nodes on the line can tell.
 */
function withPlacesAbove({ x, y }: Moments, panels: readonly Side[]): Places {
  const above = panels.filter(({ y0, y1 }) => y0 === y1).flatMap(({ x0, x1, y0, length }) => [0.1, 0.5, 0.9].map((t) => ({ x: x0 + (x1 - x0) * t, y: y0 + length / 2 })));
  return { x: Float64Array.from([...x, ...above.map((place) => place.x)]), y: Float64Array.from([...y, ...above.map((place) => place.y)]) };
}

interface Sources {
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** The logarithm that is taken off each one's potential. */
  readonly reference: Float64Array;
}

function sourcesOf({ left, right, bottom, top }: Moments, clear: Clear, distance: number): Sources {
  const heights = heightsBeside({ bottom, top, distance, reach: 4 * (Math.min(right - left, 40 * distance) + top - bottom), density: 2.4 });
  const places = [clear.left, clear.right].filter(Number.isFinite).flatMap((x) => heights.map((y) => ({ x, y })));
  return {
    x: Float64Array.from(places, ({ x }) => x),
    y: Float64Array.from(places, ({ y }) => y),
    reference: Float64Array.from(places, ({ x, y }) => {
      const across = x < left ? left - x : x - right;
      return Math.log(Math.hypot(across + distance, y - (bottom + top) / 2));
    }),
  };
}

function writePotentials({ x, y }: Places, sources: Sources, vectors: Float64Array, length: number): void {
  for (let i = 0; i < x.length; i += 1) {
    for (let f = 0; f < length - 1; f += 1) vectors[i * length + f] = 0.5 * Math.log((x[i] - sources.x[f]) ** 2 + (y[i] - sources.y[f]) ** 2) - sources.reference[f];
    vectors[i * length + length - 1] = constantWeight;
  }
}

/** Through every panel, tested with each of the Legendre polynomials. */
function writeFluxes({ sides, own }: FilmGroup, sources: Sources, vectors: Float64Array, from: number, length: number): void {
  let at = from;
  for (const { x0, y0, x1, y1, order } of sides.slice(own)) {
    const rule = plainBasis().whole(order + 20);
    const [across, up] = [x1 - x0, y1 - y0];
    for (let g = 0; g < rule.count; g += 1) {
      const [x, y] = [x0 + across * rule.t[g], y0 + up * rule.t[g]];
      for (let f = 0; f < length - 1; f += 1) {
        const [dx, dy] = [x - sources.x[f], y - sources.y[f]];
        const flux = (up * dx - across * dy) / (dx * dx + dy * dy);
        for (let n = 0; n < order; n += 1) vectors[(at + n) * length + f] += flux * rule.weighted[g * polynomialLimit + n];
      }
    }
    at += order;
  }
}

function writeWeights(triangle: Float64Array, pivots: Int32Array, v: number, count: number, weights: Float64Array): void {
  const taken = pivots.indexOf(v);
  if (0 <= taken) {
    weights.fill(0);
    weights[taken] = 1;
    return;
  }
  for (let p = pivots.length - 1; 0 <= p; p -= 1) {
    let sum = triangle[p * count + v];
    for (let q = p + 1; q < pivots.length; q += 1) sum -= triangle[p * count + pivots[q]] * weights[q];
    const pivot = triangle[p * count + pivots[p]];
    weights[p] = pivot === 0 ? 0 : sum / pivot;
  }
}
