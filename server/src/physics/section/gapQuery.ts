/**
 * Matrices of a section as a function of one of its gaps, from few solves: what is asked for at many gaps costs a sum over those.
 *
 *     ____            ____        Model     all stays as it is but the conductors in `moved`, which go sideways together
 *    |____|<-- g -->|____| ->     Method    interpolation of ln|entry| in ln g at the Chebyshev points with both ends, which nest:
 *                                           5, 9, 17, … until three points that are none of them agree, and the tail has died
 *   Symbols   g gap (m), between `smallest` and `largest`; C in F/m, L in H/m
 *   Source    Trefethen, Approximation Theory and Approximation Practice, for the points and the barycentric form; from memory
 *   Range     entries that keep their sign, as those of Maxwell's form do; null where one does not, where a gap in reach is
 *             refused, or where the finest grid does not agree: so between two planes, where a mutual dies below the solver's
 *             own error within reach
 *   Accuracy  the bars of the points beside it, and what the unused points and the tail say: test/physics/section/gapQuery.test.ts
 */
import { metres, type Length } from '../../units/quantity';
import type { Section, SectionMatrices } from './section';
import { solveSection } from './solveSection';

export interface GapRange {
  readonly section: Section;
  /** Indices of the conductors that go with the gap. */
  readonly moved: readonly number[];
  /** As it stands in `section`. */
  readonly gap: Length;
  readonly smallest: Length;
  readonly largest: Length;
}

export interface GapQuery {
  /** Null outside the range. */
  at(gap: Length): SectionMatrices | null;
  /** Sections solved to make it. */
  readonly solves: number;
}

export type Solve = (section: Section) => SectionMatrices | null;

export function gapQuery(range: GapRange, solve: Solve = solvedAfresh): GapQuery | null {
  const { smallest, largest } = range;
  if (!(0 < smallest && smallest < largest && largest < Infinity)) return null;
  const known = new Map<number, SectionMatrices | null>();
  // Places are counted on the finest grid, so that a point is the same in every grid that has it.
  const solvedAt = (place: number) => {
    const before = known.get(place);
    if (before !== undefined) return before;
    const made = solve(sectionWithGap(range, gapAt(range, place)));
    known.set(place, made);
    return made;
  };
  for (let intervals = fewest; intervals <= finest / 2; intervals *= 2) {
    const grid = gridOf(solvedAt, intervals);
    if (grid === null) return null;
    const checked = checkedAgainst(grid, solvedAt);
    if (checked === null) return null;
    if (checked.every((error, index) => error <= permitted(grid, index))) {
      return { at: (gap) => (smallest <= gap && gap <= largest ? matricesAt(grid, checked, coordinate(range, gap)) : null), solves: known.size };
    }
  }
  return null;
}

/** The section at another gap. */
export function sectionWithGap({ section, moved, gap }: Pick<GapRange, 'section' | 'moved' | 'gap'>, to: number): Section {
  const going = new Set(moved);
  return { ...section, conductors: section.conductors.map((conductor, index) => (going.has(index) ? { ...conductor, x: metres(conductor.x + (to - gap)) } : conductor)) };
}

const solvedAfresh: Solve = (section) => {
  const solution = solveSection(section);
  return 'solved' in solution ? solution.solved : null;
};

const fewest = 4;
const finest = 128;
/** Of an entry, relative; the solver's own error is of this size. */
const wanted = 3e-5;
/** Of the diagonal: an entry that falls below it somewhere in reach is the solver's own noise there before it is a smooth curve. */
const weak = 1e-4;
/** A curve that misses by more is of no use, and would spoil its strong end as well. */
const most = 1e-3;

const interpolated = ['capacitance', 'capacitanceInAir', 'inductance'] as const;
type Name = (typeof interpolated)[number];

interface Grid {
  readonly intervals: number;
  /** In ascending order of the gap. */
  readonly points: readonly SectionMatrices[];
  /** ln|entry|: of each matrix and entry, its values at the points. */
  readonly logarithms: readonly Float64Array[];
}

function gapAt({ smallest, largest }: GapRange, place: number): number {
  // The ends exactly: a smallest gap that is a limit must not be passed by its last bit.
  if (place === 0) return smallest;
  if (place === finest) return largest;
  const s = -Math.cos((Math.PI * place) / finest);
  return Math.sqrt(smallest * largest) * (largest / smallest) ** (s / 2);
}

function coordinate({ smallest, largest }: GapRange, gap: number): number {
  return (2 * Math.log(gap / smallest)) / Math.log(largest / smallest) - 1;
}

function gridOf(solvedAt: (place: number) => SectionMatrices | null, intervals: number): Grid | null {
  const points: SectionMatrices[] = [];
  for (let at = 0; at <= intervals; at += 1) {
    const point = solvedAt((at * finest) / intervals);
    if (point === null || (0 < points.length && !haveSameSigns(point, points[0]!))) return null;
    points.push(point);
  }
  const entries = points[0]!.order ** 2;
  const logarithms = interpolated.flatMap((name) => Array.from({ length: entries }, (_, entry) => Float64Array.from(points, (point) => Math.log(Math.abs(point[name][entry]!)))));
  return { intervals, points, logarithms };
}

/** Where an entry is weak, as across a wide gap between two planes, the error may be larger; its bar then says so. */
function permitted({ points }: Grid, index: number): number {
  const { order } = points[0]!;
  const name = interpolated[Math.floor(index / order ** 2)]!;
  const [i, j] = [Math.floor((index % order ** 2) / order), index % order];
  const weakest = points.map(({ [name]: matrix }) => Math.sqrt(matrix[i * order + i]! * matrix[j * order + j]!) / Math.abs(matrix[i * order + j]!));
  return Math.min(most, wanted * Math.max(1, weak * Math.max(...weakest)));
}

/** An entry that is nothing, or changes its sign, has no logarithm to follow. */
function haveSameSigns(point: SectionMatrices, first: SectionMatrices): boolean {
  return point.order === first.order && interpolated.every((name) => point[name].every((value, entry) => value !== 0 && Math.sign(value) === Math.sign(first[name][entry]!)));
}

/** Of each logarithm its error: what is missed at points that are none of the grid's, or left in the tail. Null where such a point has no solution. */
function checkedAgainst({ intervals, logarithms, points }: Grid, solvedAt: (place: number) => SectionMatrices | null): readonly number[] | null {
  const errors = logarithms.map(tail);
  const entries = points[0]!.order ** 2;
  const half = finest / intervals / 2;
  // Points of the next grid, so that none is wasted: at both ends, and in the middle, where the grid is widest.
  for (const place of [half, finest / 2 + half, finest - half]) {
    const point = solvedAt(place);
    if (point === null || !haveSameSigns(point, points[0]!)) return null;
    const weights = weightsAt(intervals, -Math.cos((Math.PI * place) / finest));
    for (const [index, values] of logarithms.entries()) {
      const truth = Math.log(Math.abs(point[interpolated[Math.floor(index / entries)]!][index % entries]!));
      errors[index] = Math.max(errors[index]!, Math.abs(sumOf(weights, values) - truth));
    }
  }
  return errors;
}

/** The last two coefficients of the Chebyshev series: one alone may vanish by symmetry. */
function tail(values: Float64Array): number {
  const intervals = values.length - 1;
  const coefficient = (n: number) => {
    let sum = 0;
    for (let at = 0; at <= intervals; at += 1) sum += values[at]! * Math.cos((Math.PI * n * at) / intervals) * (at === 0 || at === intervals ? 0.5 : 1);
    return ((n === intervals ? 1 : 2) * Math.abs(sum)) / intervals;
  };
  return coefficient(intervals) + coefficient(intervals - 1);
}

/** By which each point counts at s, from -1 to 1; they sum to one. */
function weightsAt(intervals: number, s: number): Float64Array {
  const weights = new Float64Array(intervals + 1);
  let sum = 0;
  for (let at = 0; at <= intervals; at += 1) {
    const away = s + Math.cos((Math.PI * at) / intervals);
    if (away === 0) return weights.fill(0).fill(1, at, at + 1);
    weights[at] = ((at % 2 === 0 ? 1 : -1) * (at === 0 || at === intervals ? 0.5 : 1)) / away;
    sum += weights[at]!;
  }
  return weights.map((weight) => weight / sum);
}

function sumOf(weights: Float64Array, values: Float64Array): number {
  let sum = 0;
  for (let at = 0; at < weights.length; at += 1) sum += weights[at]! * values[at]!;
  return sum;
}

function matricesAt({ intervals, points, logarithms }: Grid, errors: readonly number[], s: number): SectionMatrices {
  const weights = weightsAt(intervals, Math.min(1, Math.max(-1, s)));
  const spread = weights.reduce((sum, weight) => sum + Math.abs(weight), 0);
  const entries = points[0]!.order ** 2;
  const matrix = (name: Name) => {
    const first = interpolated.indexOf(name) * entries;
    return Float64Array.from({ length: entries }, (_, entry) => Math.sign(points[0]![name][entry]!) * Math.exp(sumOf(weights, logarithms[first + entry]!)));
  };
  const beside = pointsBeside(intervals, s).map((at) => points[at]!);
  const bars = (name: Name, bar: 'capacitanceError' | 'inductanceError') => {
    const first = interpolated.indexOf(name) * entries;
    return Float64Array.from({ length: entries }, (_, entry) => spread * Math.max(...beside.map((point) => point[bar][entry]!)) + safety * errors[first + entry]!);
  };
  return {
    order: points[0]!.order,
    capacitance: matrix('capacitance'),
    capacitanceInAir: matrix('capacitanceInAir'),
    inductance: matrix('inductance'),
    capacitanceError: bars('capacitance', 'capacitanceError'),
    inductanceError: bars('inductance', 'inductanceError'),
    unknowns: Math.max(...points.map(({ unknowns }) => unknowns)),
  };
}

/** The errors are measured at three points, not everywhere. */
const safety = 2;

/** The two to either side and the next beyond: a point's own error reaches that far. */
function pointsBeside(intervals: number, s: number): readonly number[] {
  const at = (Math.acos(-Math.min(1, Math.max(-1, s))) * intervals) / Math.PI;
  const left = Math.floor(at);
  return [left - 1, left, left + 1, left + 2].filter((point) => 0 <= point && point <= intervals);
}
