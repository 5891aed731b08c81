/**
 * Resistance per length of a flat trace, with the current that crowds to its surface, its corners and its plane.
 *
 *        w                     Model     magneto-quasi-static, two-dimensional: uniform field along the trace, its return far away
 *   +---------+ t                        or as an image in a perfect plane. What a real plane itself drops is not in it
 *   +---------+                Method    current constant in graded cells, each with its resistance and the mutual inductances to all
 *        h                               others and to their images; one complex solution, R = Re(1 / sum of currents)
 *   ===========                Formula   j w A_ij = -j w mu0/(2 pi) mean of ln r over both cells (`currentCells.ts`)
 *
 * Symbols   perLength ohm/m
 * Source    Silvester, Proc. IEEE 54 (1966); Weeks, Wu, McAllister, Singh, IBM J. Res. Dev. 23 (1979), from memory
 * Range     dc to where the depth is a thousandth of the trace; smooth copper: roughness adds up to as much again beyond 1 GHz
 * Accuracy  1 % against twice as fine cells, 1 % of the reference case; round-wire and dc limits in the test
 */
import { complexLuFactor, complexLuSolve } from '../../numeric/complexLu';
import { mu0 } from '../../units/constants';
import type { Frequency, Length, Temperature } from '../../units/quantity';
import { copperAt, skinDepth } from './copper';
import { gradedEdges, meanLogarithm, type Cell } from './currentCells';

export interface TraceConductor {
  readonly width: Length;
  readonly thickness: Length;
  /** Of the lower face over a plane; null where none carries the current back. */
  readonly overPlane: Length | null;
  readonly temperature: Temperature;
}

export interface TraceResistance {
  /** Ohm/m. */
  readonly perLength: number;
  /** Relative. */
  readonly errorBar: number;
}

export function traceResistance(trace: TraceConductor, frequency: Frequency, refinement = 1): TraceResistance {
  const { width, thickness, temperature } = trace;
  const resistivity = copperAt(temperature);
  const dc = resistivity / (width * thickness);
  const depth = skinDepth(resistivity, frequency);
  // Far below, the current is uniform: R rises with the fourth power of size over depth.
  if (Math.min(width, thickness) * Math.max(width, thickness) < uniformBelow * depth * depth) return { perLength: dc, errorBar: uniformError };
  const cells = trace.overPlane === null ? quarterCells(trace, depth, refinement) : halfCells(trace, depth, refinement);
  const images = imagesOf(trace);
  const total = totalCurrent(cells, images, { resistivity, angular: 2 * Math.PI * frequency });
  return { perLength: total.real / (total.real ** 2 + total.imaginary ** 2), errorBar: cellError };
}

const uniformBelow = 0.1;
const uniformError = 1e-3;
const cellError = 0.02;

function edgesFor(half: number, depth: number, refinement: number): readonly number[] {
  return gradedEdges(half, Math.max(0.4 * depth, half / 4096) / refinement, 1 + 0.5 / refinement);
}

/** Of the right upper quarter; y from the middle. */
function quarterCells({ width, thickness }: TraceConductor, depth: number, refinement: number): readonly Cell[] {
  return cellsOf(fromMiddle(width / 2, edgesFor(width / 2, depth, refinement)), fromMiddle(thickness / 2, edgesFor(thickness / 2, depth, refinement)));
}

/** Of the right half. */
function halfCells({ width, thickness }: TraceConductor, depth: number, refinement: number): readonly Cell[] {
  const upper = fromMiddle(thickness / 2, edgesFor(thickness / 2, depth, refinement));
  return cellsOf(fromMiddle(width / 2, edgesFor(width / 2, depth, refinement)), [...upper, ...upper.map((edge) => -edge)]);
}

/** Edges counted from the surface, as heights above the middle. */
function fromMiddle(half: number, edges: readonly number[]): readonly number[] {
  return edges.map((edge) => half - edge);
}

function cellsOf(xs: readonly number[], ys: readonly number[]): readonly Cell[] {
  const [across, up] = [[...new Set(xs)].sort((a, b) => a - b), [...new Set(ys)].sort((a, b) => a - b)];
  return up.slice(1).flatMap((top, j) => across.slice(1).map((right, i) => ({ x: (right + across[i]) / 2, y: (top + up[j]) / 2, halfWidth: (right - across[i]) / 2, halfHeight: (top - up[j]) / 2 })));
}

/** Where the same current, or its image, stands as well. */
type Image = { readonly flipX: 1 | -1; readonly flipY: 1 | -1; readonly shift: number; readonly sign: 1 | -1 };

function imagesOf({ thickness, overPlane }: TraceConductor): readonly Image[] {
  if (overPlane === null) return ([1, -1] as const).flatMap((flipX) => ([1, -1] as const).map((flipY): Image => ({ flipX, flipY, shift: 0, sign: 1 })));
  const down = -(2 * overPlane + thickness);
  return ([1, -1] as const).flatMap((flipX): readonly Image[] => [{ flipX, flipY: 1, shift: 0, sign: 1 }, { flipX, flipY: -1, shift: down, sign: -1 }]);
}

interface Medium {
  readonly resistivity: number;
  /** Rad/s. */
  readonly angular: number;
}

/** For 1 V/m along the trace; of all cells and their mirror images in the trace itself. */
function totalCurrent(cells: readonly Cell[], images: readonly Image[], { resistivity, angular }: Medium): { readonly real: number; readonly imaginary: number } {
  const order = cells.length;
  const matrix = { real: new Float64Array(order * order), imaginary: new Float64Array(order * order) };
  const field = { real: new Float64Array(order).fill(1), imaginary: new Float64Array(order) };
  cells.forEach((cell, i) => {
    matrix.real[i * (order + 1)] = resistivity / (4 * cell.halfWidth * cell.halfHeight);
    for (let j = 0; j <= i; j += 1) {
      const other = cells[j];
      const logarithm = images.reduce((sum, { flipX, flipY, shift, sign }) => sum + sign * meanLogarithm(cell, other, cell.x - flipX * other.x, cell.y - flipY * other.y - shift), 0);
      const reactance = (-angular * mu0 * logarithm) / (2 * Math.PI);
      matrix.imaginary[i * order + j] = reactance;
      matrix.imaginary[j * order + i] = reactance;
    }
  });
  const exchanged = complexLuFactor(matrix, order);
  if (exchanged === null) return { real: NaN, imaginary: NaN };
  complexLuSolve(matrix, exchanged, field);
  const copies = images.filter(({ sign }) => sign === 1).length;
  return { real: copies * sum(field.real), imaginary: copies * sum(field.imaginary) };
}

function sum(values: Float64Array): number {
  return values.reduce((total, value) => total + value, 0);
}
