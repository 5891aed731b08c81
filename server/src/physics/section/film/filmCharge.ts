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
import type { Side } from '../basis/side';
import type { ChargedConductor } from '../basis/chargedConductor';
import { leftOut, type ChargeSolution } from '../galerkin/chargeSolution';
import { ownBlock } from '../galerkin/ownBlock';
import type { Kernel } from '../kernel/layeredKernel';
import { block, writeBlock, writePolarisation } from './filmBlocks';
import { filmGroups } from './filmGroups';
import { groupedCharge } from './groupedCharge';
import { FoldedSystem } from './foldedSystem';
import { shapeOf, type Shape } from './keptBlocks';
import { mirrorImages } from '../basis/mirrorImages';

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
  const { constant } = problem;
  const groups = constant === null ? filmGroups(problem) : null;
  const grouped = groups === null ? null : groupedCharge(problem, groups);
  return grouped ?? ungroupedCharge(problem);
}

/** All sides and panels at once. */
export function ungroupedCharge(problem: FilmProblem): ChargeSolution | null {
  const { conductors, panels, signals, constant } = problem;
  const sides = conductors.flatMap((conductor) => conductor.sides);
  const all = [...sides, ...panels];
  const images = mirrorImages(all);
  const kept = keptOrders(sides, panels);
  const signs = images === null ? [1 as const] : [1 as const, -1 as const];
  const systems = signs.map((sign, i) => new FoldedSystem(all, { images, sign, kept }, (size) => memoryOf(i, size)));
  const assembly = { problem, all, shapes: all.map(shapeOf), sides: sides.length, images, systems };
  placeConductors(assembly);
  placePanels(assembly);
  const everySide = sides.map((_, s) => s);
  const sets = signals.map((signal) => everySide.filter((s) => sides[s].conductor === signal));
  if (constant !== null) {
    sets.push(everySide);
    for (const system of systems) system.addConstant(sides.length, constant);
  }
  const count = sets.length;
  const fine = new Float64Array(count * count);
  const coarse = new Float64Array(count * count);
  let unknowns = 0;
  for (const system of systems) {
    const products = system.products(sets);
    if (products === null) return null;
    products.fine.forEach((value, at) => { fine[at] += value; });
    products.coarse.forEach((value, at) => { coarse[at] += value; });
    unknowns += system.unknowns;
  }
  const finish = (products: Float64Array) => (constant === null ? products : neutral(products, count));
  return { order: signals.length, fine: finish(fine), coarse: finish(coarse), unknowns };
}

/** One for each system: hundreds of kilobytes, which made afresh cost as much as filling them. */
const memories: Float64Array[] = [];

function memoryOf(index: number, size: number): Float64Array {
  if (!(size <= memories[index]?.length)) memories[index] = new Float64Array(size);
  return memories[index];
}

/** The coarser system lacks the highest polynomials of every side, one of every panel, and the outermost panels: all must matter little. */
function keptOrders(sides: readonly Side[], panels: readonly Side[]): Int32Array {
  return Int32Array.from([...sides, ...panels], ({ order }, s) => {
    if (s < sides.length) return order - leftOut(order);
    return s === sides.length || s === sides.length + panels.length - 1 ? 0 : order - 1;
  });
}

interface Assembly {
  readonly problem: FilmProblem;
  /** Sides, then panels. */
  readonly all: readonly Side[];
  readonly shapes: readonly Shape[];
  /** How many of them are sides. */
  readonly sides: number;
  readonly images: Int32Array | null;
  readonly systems: readonly FoldedSystem[];
}

/** Whether rows of side or panel `s` are asked for: those of its image say the same. */
const leads = ({ images }: Assembly, s: number) => images === null || s <= images[s];

/** Adds entries to every system's matrix, `values` as FoldedSystem.add takes them. */
function place({ systems }: Assembly, row: number, column: number, values: Float64Array, from: number, down: number, along: number): void {
  for (let i = 0; i < systems.length; i += 1) systems[i].add(row, column, values, from, down, along);
}

/** Potentials of conductors and panels on conductors. */
function placeConductors(assembly: Assembly): void {
  const { problem: { conductors, kernel }, all, sides } = assembly;
  let first = 0;
  for (const conductor of conductors) {
    const last = first + conductor.sides.length;
    placeOwn(assembly, conductor, first);
    for (let s = first; s < last; s += 1) {
      for (let t = last; t < all.length; t += 1) {
        const mirrored = t < sides && leads(assembly, t);
        if (!leads(assembly, s) && !mirrored) continue;
        // The kernel wants the side in the higher layer first.
        const [upper, lower] = all[s].layer < all[t].layer ? [t, s] : [s, t];
        writeBlock('potential', kernel(all[lower].layer, all[upper].layer), assembly, upper, lower);
        const stride = all[lower].order;
        if (leads(assembly, s)) place(assembly, s, t, block, 0, upper === s ? stride : 1, upper === s ? 1 : stride);
        if (mirrored) place(assembly, t, s, block, 0, upper === t ? stride : 1, upper === t ? 1 : stride);
      }
    }
    first = last;
  }
}

/** Of a conductor on itself; `first` is the first of its sides. */
function placeOwn(assembly: Assembly, conductor: ChargedConductor, first: number): void {
  const { layer } = conductor.sides[0];
  const own = ownBlock(conductor, assembly.problem.kernel(layer, layer));
  const stride = conductor.sides.reduce((sum, { order }) => sum + order, 0);
  let row = 0;
  conductor.sides.forEach((side, s) => {
    let column = 0;
    if (leads(assembly, first + s)) {
      conductor.sides.forEach(({ order }, t) => {
        place(assembly, first + s, first + t, own, row * stride + column, stride, 1);
        column += order;
      });
    }
    row += side.order;
  });
}

/** Fluxes of conductors and panels through panels. */
function placePanels(assembly: Assembly): void {
  const { problem: { kernel, permittivity, outside }, all, sides } = assembly;
  const contrast = (permittivity - outside) / (permittivity + outside);
  for (let p = sides; p < all.length; p += 1) {
    if (!leads(assembly, p)) continue;
    const panel = all[p];
    for (let t = 0; t < all.length; t += 1) {
      const source = all[t];
      writePolarisation(kernel(source.layer, panel.layer), assembly, p, t, contrast * permittivity);
      place(assembly, p, t, block, 0, source.order, 1);
    }
  }
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
