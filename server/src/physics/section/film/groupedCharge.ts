/**
 * Capacitance of a row of conductors under a film, group by group: what filmCharge.ts says of all at once, for sixteen at a third of the time.
 *
 *   A_ii = L_i U_i            With U_i x_i for unknowns and L_i^-1 on the rows a group by itself is the unit matrix, and
 *                             E_ij = L_i^-1 A_ij U_j^-1 is how much one group makes of another's charge; pivots are shared
 *                             out between L and U
 *
 * Method    between groups that touch E_ij is computed; between all others it is R_i K S_j^T, K kernel values between the points of
 *           two skeletons. Charges that no other group causes and none notices are left out: a group has its conductor's own, its answers
 *           to the fields of others, and what others see of it, and is tested with the same: what is left out is of
 *           second order in C (Galerkin)
 * Source    recursive skeletonisation: Martinsson & Rokhlin 2005; reduced bases: textbook; both from memory
 * Accuracy  1e-6 of self entries, 2e-4 of mutuals of a ten-thousandth (the test, against all at once)
 */
import { luInOrder, solveUnitLower, solveUpperTransposed } from '../../../numeric/luInOrder';
import { productTransposed } from '../../../numeric/productTransposed';
import { stepsOfRootTwo } from '../galerkin/distancesBeside';
import { writeKernelValues } from '../galerkin/kernelValues';
import { NodeSet } from '../galerkin/nodeSet';
import type { ChargeSolution } from '../galerkin/chargeSolution';
import type { FilmProblem } from './filmCharge';
import { grain, grains, type FilmGroup } from './filmGroups';
import type { Kernel } from '../kernel/layeredKernel';
import { groupSkeleton, type GroupSkeleton } from './groupSkeleton';
import { groupBlock, groupFactors, type GroupContext } from './groupSystem';
import { reducedGroup, type ReducedGroup } from './reducedGroup';

/** Null where a pivot vanishes. */
export function groupedCharge(problem: FilmProblem, groups: readonly FilmGroup[]): ChargeSolution | null {
  const { conductors, panels, permittivity, outside, signals } = problem;
  const strength = (permittivity * (permittivity - outside)) / (permittivity + outside);
  const context: GroupContext = { kernel: problem.kernel(panels[0].layer, panels[0].layer), conductors, strength };
  const row = rowOf(groups, context);
  if (row === null) return null;
  const reduced = groups.map((_, g) => row.known(`reduced ${row.key(g)}`, () => reducedGroup(row, g)));
  const [fine, coarse] = [capacitance(row, reduced, 'fine', signals), capacitance(row, reduced, 'coarse', signals)];
  if (fine === null || coarse === null) return null;
  return { order: signals.length, fine, coarse, unknowns: groups.reduce((sum, { unknowns }) => sum + unknowns, 0) };
}

/** Everything in the groups' own coordinates. */
export interface GroupRow {
  readonly groups: readonly FilmGroup[];
  readonly context: GroupContext;
  readonly skeletons: readonly GroupSkeleton[];
  readonly known: Memory;
  /** Equal for groups that are alike and stand alike. */
  readonly key: (g: number) => string;
  /** L^-1 of the potentials 1 on the conductor, and U^-T of its net charge. */
  readonly driven: readonly Float64Array[];
  readonly collected: readonly Float64Array[];
  /** Of group g + 1's charges in group g, transposed; and of group g's in group g + 1. */
  readonly fromRight: readonly Float64Array[];
  readonly fromLeft: readonly Float64Array[];
}

function rowOf(groups: readonly FilmGroup[], context: GroupContext): GroupRow | null {
  const keys = groups.map((group) => keyOf(group, context));
  const known = memoryOf(context.kernel);
  const factors: Float64Array[] = [];
  for (let g = 0; g < groups.length; g += 1) {
    const own = known(`own ${keys[g]}`, () => groupFactors(groups[g], context));
    if (own === null) return null;
    factors.push(own);
  }
  const net = groups.map(({ unknowns, own, rows, starts }) => {
    const one = new Float64Array(unknowns);
    for (let s = 0; s < own; s += 1) one[rows[starts[s]]] = 1;
    return one;
  });
  const reaches = groups.map((_, g) => reachOf(groups, g, context));
  const skeletons = groups.map((group, g) => known(`skeleton ${keys[g]} ${reaches[g].key}`, () => {
    const skeleton = groupSkeleton(group, reaches[g]);
    lowerSolved(factors[g], group.unknowns, skeleton.rows, skeleton.points);
    upperSolved(factors[g], group.unknowns, skeleton.charges, skeleton.points);
    return skeleton;
  }));
  const apart = (first: number, second: number) => grains(groups[second].foot - groups[first].foot);
  const between = (first: number, second: number) => known(`between ${keys[first]} ${keys[second]} ${apart(first, second)}`, () => {
    const [rows, columns] = [groups[first].unknowns, groups[second].unknowns];
    const values = groupBlock(groups[first], groups[second], apart(first, second), context);
    upperSolved(factors[second], columns, values, rows);
    const across = transposed(values, rows, columns);
    lowerSolved(factors[first], rows, across, columns);
    return across;
  });
  return {
    groups, context, skeletons, known,
    // How large the neighbours' charges are likely to be is their neighbours' matter too.
    key: (g) => [g - 2, g - 1, g, g + 1, g + 2].map((near) => (near in groups ? `${keys[near]} ${apart(g, near)}` : '')).join() + reaches[g].key,
    driven: net.map((one, g) => solvedBy(lowerSolved, factors[g], one)),
    collected: net.map((one, g) => solvedBy(upperSolved, factors[g], one)),
    fromRight: groups.slice(1).map((_, g) => between(g, g + 1)),
    fromLeft: groups.slice(1).map((_, g) => between(g + 1, g)),
  };
}

type Memory = <T>(key: string, make: () => T) => T;

const memories = new WeakMap<Kernel, Memory>();
/** Things kept for one kernel: 10 kB each. */
const keptLimit = 4000;

/** What was made for one group serves those that are alike, in this row and after an edit of another gap. */
function memoryOf(kernel: Kernel): Memory {
  const found = memories.get(kernel);
  if (found !== undefined) return found;
  const made = new Map<string, unknown>();
  const memory = <T>(key: string, make: () => T): T => {
    if (made.has(key)) return made.get(key) as T;
    const value = make();
    if (keptLimit <= made.size) made.clear();
    made.set(key, value);
    return value;
  };
  memories.set(kernel, memory);
  return memory;
}

/** All that the group is by itself. */
const keyOf = ({ sides, shapes, conductor }: FilmGroup, { strength, conductors }: GroupContext) =>
  `${strength} ${conductors[conductor].effort} ${sides.map(({ x0 }, i) => `${shapes[i].id} ${grains(x0)}`).join()}`;

/** L^-1 and U^-T with the roots of the pivots on either: as far as the matrix is symmetric, so is what comes of it. */
function lowerSolved(factors: Float64Array, order: number, rightSides: Float64Array, count: number): void {
  solveUnitLower(factors, order, rightSides, count);
  for (let at = 0; at < count * order; at += 1) rightSides[at] /= Math.sqrt(Math.abs(factors[(at % order) * (order + 1)]));
}

function upperSolved(factors: Float64Array, order: number, rightSides: Float64Array, count: number): void {
  solveUpperTransposed(factors, order, rightSides, count);
  for (let at = 0; at < count * order; at += 1) rightSides[at] *= Math.sqrt(Math.abs(factors[(at % order) * (order + 1)]));
}

function solvedBy(solve: typeof lowerSolved, factors: Float64Array, given: Float64Array): Float64Array {
  const right = Float64Array.from(given);
  solve(factors, given.length, right, 1);
  return right;
}

export function transposed(values: Float64Array, rows: number, columns: number): Float64Array {
  const result = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i += 1) for (let j = 0; j < columns; j += 1) result[j * rows + i] = values[i * columns + j];
  return result;
}

/** The groups that a group does not touch lie beyond these lines. */
function reachOf(groups: readonly FilmGroup[], g: number, { conductors, strength }: GroupContext) {
  const { left, right, conductor, foot } = groups[g];
  const most = conductors[conductor].reach;
  const steps = (distance: number) => stepsOfRootTwo(Math.min(grains(distance) * grain, most));
  const toLeft = 1 < g ? steps(left - groups[g - 2].right) : Infinity;
  const toRight = g + 2 < groups.length ? steps(groups[g + 2].left - right) : Infinity;
  const clear = { left: grains(left - foot) * grain - toLeft, right: grains(right - foot) * grain + toRight };
  return { clear, distance: Math.min(toLeft, toRight), strength, effort: conductors[conductor].effort, key: `${toLeft} ${toRight}` };
}

const firstNodes = new NodeSet();
const secondNodes = new NodeSet();

function capacitance(row: GroupRow, reduced: readonly ReducedGroup[], which: 'fine' | 'coarse', signals: readonly number[]): Float64Array | null {
  const { groups, context } = row;
  const alike = groups.map((_, g) => row.key(g));
  const starts: number[] = [];
  let order = 0;
  for (const group of reduced) {
    starts.push(order);
    order += group[which].count;
  }
  const matrix = new Float64Array(order * order);
  const place = (values: Float64Array, g: number, h: number) => {
    const [rows, columns] = [reduced[g][which].count, reduced[h][which].count];
    for (let m = 0; m < rows; m += 1) for (let n = 0; n < columns; n += 1) matrix[(starts[g] + m) * order + starts[h] + n] = values[m * columns + n];
  };
  for (let g = 0; g < groups.length; g += 1) {
    for (let m = 0; m < reduced[g][which].count; m += 1) matrix[(starts[g] + m) * (order + 1)] = 1;
    if (g + 1 < groups.length) {
      place(reduced[g].between(which, row.fromRight[g], reduced[g + 1]), g, g + 1);
      place(reduced[g + 1].between(which, row.fromLeft[g], reduced[g]), g + 1, g);
    }
    for (let h = g + 2; h < groups.length; h += 1) {
      const apart = grains(groups[g].foot - groups[h].foot);
      const blocks = row.known(`far ${which} ${alike[g]} ${alike[h]} ${apart}`, () => {
        const values = row.known(`kernel ${alike[g]} ${alike[h]} ${apart}`, () => kernelBetween(row.skeletons[g], row.skeletons[h], apart * grain, context));
        const [p, q] = [row.skeletons[g].points, row.skeletons[h].points];
        return [farBlock(reduced[g][which], reduced[h][which], values, p, q), farBlock(reduced[h][which], reduced[g][which], transposed(values, p, q), q, p)];
      });
      place(blocks[0], g, h);
      place(blocks[1], h, g);
    }
  }
  const count = signals.length;
  const [rights, lefts] = [new Float64Array(count * order), new Float64Array(count * order)];
  groups.forEach(({ conductor }, g) => {
    const index = signals.indexOf(conductor);
    if (index < 0) return;
    rights.set(reduced[g][which].driven, index * order + starts[g]);
    lefts.set(reduced[g][which].collected, index * order + starts[g]);
  });
  if (!luInOrder(matrix, order)) return null;
  solveUnitLower(matrix, order, rights, count);
  solveUpperTransposed(matrix, order, lefts, count);
  const products = new Float64Array(count * count);
  productTransposed(lefts, 0, rights, 0, { rows: count, columns: count, length: order }, products);
  return products;
}

function kernelBetween(first: GroupSkeleton, second: GroupSkeleton, apart: number, { kernel }: GroupContext): Float64Array {
  firstNodes.placePoints(first.x, first.y, apart);
  secondNodes.placePoints(second.x, second.y, 0);
  const values = new Float64Array(first.points * second.points);
  writeKernelValues(kernel, firstNodes, secondNodes, values);
  return values;
}

/** Tests of the first on charges of the second, through the kernel between their points. */
function farBlock(first: ReducedGroup['fine'], second: ReducedGroup['fine'], values: Float64Array, p: number, q: number): Float64Array {
  const half = new Float64Array(second.count * p);
  productTransposed(second.charges, 0, values, 0, { rows: second.count, columns: p, length: q }, half);
  const block = new Float64Array(first.count * second.count);
  productTransposed(first.tests, 0, half, 0, { rows: first.count, columns: second.count, length: p }, block);
  return block;
}
