/**
 * Capacitance of conductors under a film that follows them: charges of the conductors and polarisation of the film's face.
 *
 *          .___________.    air      Model    the layers as if the film filled all the space above the laminate, plus a
 *     _____|  =======  |_____        charge s on the film's real face that makes the field right on both sides of it
 *      film                          (the conductors all lie in the film, however thick either is, so no case is special)
 *   -------------------------        Method   Galerkin: potentials tested with the conductors' own charge series, fluxes
 *        laminate                    through each panel with Legendre polynomials; both exact for near pairs
 *
 *   Formula   conductors: G(Q + s) = V;  face: pi s - kappa E_n(Q + s) = 0, n into the air
 *   Symbols   Q free charge, kappa = (e - e_out)/(e + e_out), e of the film, e_out of what lies over it; E_n mean of both sides,
 *             times e; potentials in units of Q / (2 pi eps0)
 *   Source    equivalent charge: Wei, Harrington, Mautz & Sarkar 1984, from memory; the layers as kernel and the exact
 *             fluxes are our own
 *   Accuracy  filmedSection.ts
 */
import { luInOrder, solveUnitLower, solveUpperTransposed } from '../../../numeric/luInOrder';
import { polynomialLimit, writePolynomials } from '../basis/orthonormalJacobi';
import type { Side } from '../basis/side';
import type { ChargedConductor } from '../basis/chargedConductor';
import { leftOut, type ChargeSolution } from '../galerkin/chargeSolution';
import { ownBlock } from '../galerkin/ownBlock';
import { segmentDistance } from '../galerkin/segmentDistance';
import { writeSideBlock } from '../galerkin/sideBlock';
import type { Kernel } from '../kernel/layeredKernel';
import { acrossGap, addFluxBlock, plainBasis } from './fluxBlock';
import { keptBlock, shapeOf, type Shape } from './keptBlocks';

export interface FilmProblem {
  readonly conductors: readonly ChargedConductor[];
  /** Of the matrix asked for, in order; other conductors are at zero potential. */
  readonly signals: readonly number[];
  /** From left to right along the film's face; the outermost two carry what little lies farthest out. */
  readonly panels: readonly Side[];
  readonly kernel: (lower: number, upper: number) => Kernel;
  /** Of the film, and of what lies over it. */
  readonly permittivity: number;
  readonly outside: number;
  /** A constant on every potential of a free charge, or null where planes give it a zero. */
  readonly constant: number | null;
}

/** Null where a pivot vanishes: the system means nothing then. */
export function filmCharge(problem: FilmProblem): ChargeSolution | null {
  const { conductors, panels, signals, constant } = problem;
  const layout = layOut(conductors.flatMap(({ sides }) => sides), panels);
  const { unknowns, coarse, sides, start } = layout;
  const matrix = new Float64Array(unknowns * unknowns);
  placeConductors(problem, layout, matrix);
  placePanels(problem, layout, matrix);
  if (constant !== null) {
    for (let s = 0; s < sides.length; s += 1) for (let t = 0; t < sides.length; t += 1) matrix[start[s] * unknowns + start[t]] += constant;
  }
  if (!luInOrder(matrix, unknowns)) return null;
  const count = signals.length + (constant === null ? 0 : 1);
  const excitation = new Float64Array(count * unknowns);
  sides.forEach(({ conductor }, s) => {
    const index = signals.indexOf(conductor);
    if (0 <= index) excitation[index * unknowns + start[s]] = 1;
    if (constant !== null) excitation[signals.length * unknowns + start[s]] = 1;
  });
  const charges = Float64Array.from(excitation);
  solveUnitLower(matrix, unknowns, charges, count);
  solveUpperTransposed(matrix, unknowns, excitation, count);
  const finish = (to: number) => {
    const products = innerProducts(excitation, charges, unknowns, to, count);
    return constant === null ? products : neutral(products, count);
  };
  return { order: signals.length, fine: finish(unknowns), coarse: finish(coarse), unknowns };
}

interface Layout {
  readonly sides: readonly Side[];
  /** Sides, then panels. */
  readonly all: readonly Side[];
  readonly shapes: readonly Shape[];
  readonly unknowns: number;
  /** Unknowns of the coarser system, which come first. */
  readonly coarse: number;
  /** Of each side and panel: its unknowns in the coarser system, where they start, and where the others do. */
  readonly kept: Int32Array;
  readonly start: Int32Array;
  readonly rest: Int32Array;
}

/** The coarser system lacks the highest polynomials of every side, one of every panel, and the outermost panels: all must matter little. */
function layOut(sides: readonly Side[], panels: readonly Side[]): Layout {
  const all = [...sides, ...panels];
  const kept = Int32Array.from(all, ({ order }, s) => (s < sides.length ? order - leftOut(order) : s === sides.length || s === all.length - 1 ? 0 : order - 1));
  const start = new Int32Array(all.length);
  const rest = new Int32Array(all.length);
  let at = 0;
  all.forEach((_, s) => {
    start[s] = at;
    at += kept[s];
  });
  const coarse = at;
  all.forEach(({ order }, s) => {
    rest[s] = at;
    at += order - kept[s];
  });
  return { sides, all, shapes: all.map(shapeOf), unknowns: at, coarse, kept, start, rest };
}

const rowOf = ({ kept, start, rest }: Layout, s: number, m: number) => (m < kept[s] ? start[s] + m : rest[s] + m - kept[s]);

const block = new Float64Array(polynomialLimit * polynomialLimit);

/** Into `block`: of the first side's potentials, or of the flux through it, from the second's charge. */
function writeBlock(kind: 'potential' | 'flux', kernel: Kernel, { all, shapes }: Layout, [first, second]: readonly [number, number]): void {
  const reach = nearRatio * Math.max(all[first].length, all[second].length);
  const near = acrossGap(all[first], all[second]) < reach && segmentDistance(all[first], all[second]) < reach;
  if (near) block.set(keptBlock({ kind, kernel, first: shapes[first], second: shapes[second], apart: all[second].x0 - all[first].x0 }, (a, b) => computed(kind, kernel, a, b)));
  else compute(kind, kernel, all[first], all[second]);
}

/** Pairs nearer than this part of the longer one cost enough to be worth keeping. */
const nearRatio = 1.5;

function compute(kind: 'potential' | 'flux', kernel: Kernel, first: Side, second: Side): void {
  if (kind === 'potential') writeSideBlock(first, second, kernel, block);
  else {
    block.fill(0, 0, first.order * second.order);
    addFluxBlock(kernel, first, second, 1, block);
  }
}

function computed(kind: 'potential' | 'flux', kernel: Kernel, first: Side, second: Side): Float64Array {
  compute(kind, kernel, first, second);
  return block.slice(0, first.order * second.order);
}

/** Copies `block`, the rows of it those of side or panel `row`; or its transpose. */
function place(layout: Layout, row: number, column: number, transposed: boolean, matrix: Float64Array): void {
  const rows = layout.all[row].order;
  const columns = layout.all[column].order;
  for (let m = 0; m < rows; m += 1) {
    const at = rowOf(layout, row, m) * layout.unknowns;
    for (let n = 0; n < columns; n += 1) matrix[at + rowOf(layout, column, n)] = transposed ? block[n * rows + m] : block[m * columns + n];
  }
}

/** Potentials of conductors and panels on conductors. */
function placeConductors({ conductors, kernel }: FilmProblem, layout: Layout, matrix: Float64Array): void {
  const { all, sides, unknowns } = layout;
  let first = 0;
  for (const conductor of conductors) {
    const { layer } = conductor.sides[0];
    const own = ownBlock(conductor, kernel(layer, layer));
    const rows: number[] = [];
    conductor.sides.forEach(({ order }, s) => { for (let m = 0; m < order; m += 1) rows.push(rowOf(layout, first + s, m)); });
    for (let a = 0; a < rows.length; a += 1) for (let b = 0; b < rows.length; b += 1) matrix[rows[a] * unknowns + rows[b]] = own[a * rows.length + b];
    const last = first + conductor.sides.length;
    for (let s = first; s < last; s += 1) {
      for (let t = last; t < all.length; t += 1) {
        // The kernel wants the side in the higher layer first.
        const [upper, lower] = all[s].layer < all[t].layer ? [t, s] : [s, t];
        writeBlock('potential', kernel(all[lower].layer, all[upper].layer), layout, [upper, lower]);
        place(layout, s, t, upper !== s, matrix);
        if (t < sides.length) place(layout, t, s, upper === s, matrix);
      }
    }
    first = last;
  }
}

/** Fluxes of conductors and panels through panels. */
function placePanels({ panels, kernel, permittivity, outside }: FilmProblem, layout: Layout, matrix: Float64Array): void {
  const contrast = (permittivity - outside) / (permittivity + outside);
  panels.forEach((panel, p) => {
    layout.all.forEach((source, t) => {
      writeBlock('flux', kernel(source.layer, panel.layer), layout, [layout.sides.length + p, t]);
      for (let at = 0; at < panel.order * source.order; at += 1) block[at] *= -contrast * permittivity;
      if (panel === source) addOwnCharge(panel);
      place(layout, layout.sides.length + p, t, false, matrix);
    });
  });
}

/** pi s, tested with the Legendre polynomials. */
function addOwnCharge({ basis, order }: Side): void {
  const rule = basis.whole(order);
  const legendre = plainBasis();
  const values = new Float64Array(order);
  for (let g = 0; g < rule.count; g += 1) {
    writePolynomials(legendre.recurrence, 2 * rule.t[g] - 1, Math.PI, values, 0, order);
    for (let n = 0; n < order; n += 1) {
      for (let m = 0; m < order; m += 1) block[n * order + m] += values[n] * rule.weighted[g * polynomialLimit + m];
    }
  }
}

function innerProducts(left: Float64Array, right: Float64Array, stride: number, to: number, count: number): Float64Array {
  const products = new Float64Array(count * count);
  for (let a = 0; a < count; a += 1) {
    for (let b = 0; b < count; b += 1) {
      let sum = 0;
      for (let i = 0; i < to; i += 1) sum += left[a * stride + i] * right[b * stride + i];
      products[a * count + b] = sum;
    }
  }
  return products;
}

/** C - (C 1)(1^T C) / (1^T C 1), the last row and column belonging to all conductors at potential 1 together. */
function neutral(products: Float64Array, count: number): Float64Array {
  const order = count - 1;
  const all = products[count * count - 1];
  const result = new Float64Array(order * order);
  for (let a = 0; a < order; a += 1) {
    for (let b = 0; b < order; b += 1) result[a * order + b] = products[a * count + b] - (products[a * count + order] * products[order * count + b]) / all;
  }
  return result;
}
