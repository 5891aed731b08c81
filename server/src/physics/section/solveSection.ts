/**
 * Capacitance and inductance matrices per length of a trace cross-section.
 *
 *      ____        ____        Model     quasi-static; planar layers, planes infinite, conductors perfect: their charge and
 *     /____\  ..  /____\                 current flow on the surface (high-frequency limit, no internal inductance, no loss)
 *   ------------------------   Method    layered kernel, so that only conductors are discretised (kernel/); edge-weighted
 *          laminate                      polynomials on every side (basis/); Galerkin, symmetric (galerkin/)
 *   ========================   Formula   C = 2 pi eps0 B^T A^-1 B;  L = mu0 eps0 C0^-1, C0 the same with every
 *                                        permittivity 1
 *   Symbols   A double integrals of the kernel over pairs of charge distributions, B their charges; C in F/m, L in H/m;
 *             Maxwell form, of the signals, references at zero potential
 *   Source    Weeks 1970; Paul, Analysis of Multiconductor Transmission Lines; Bazdar, Djordjevic, Harrington & Sarkar
 *             1994 for Galerkin with edge conditions; all from memory
 *   Range     conductors inside single layers, in any of them; up to 64; more in validate.ts
 *   Accuracy  test/physics/section: against reference cases, exact striplines and a finer setting
 */
import { epsilon0, mu0 } from '../../units/constants';
import { inverseSpd } from '../../numeric/inverseSpd';
import { conductorSides, type Trapezoid } from './basis/conductorSides';
import { sideOrders, type Surroundings } from './basis/orders';
import type { Side } from './basis/side';
import { errorBars } from './errorBar';
import { chargeSolution, type ChargeSolution } from './galerkin/chargeSolution';
import { kernelsOf } from './kernel/kernelCache';
import { inAir, type Stack } from './kernel/stack';
import { placementOf, type Placement } from './placement';
import type { Section, SectionMatrices, SectionSolution } from './section';
import { refusalOf } from './validate';

export interface SolveOptions {
  /** Where to start and how far to go: each step adds a polynomial to every side. */
  readonly effort?: number;
  readonly mostEffort?: number;
}

/** Bars above this are worth a finer setting. */
const wantedBar = 1e-4;

export function solveSection(section: Section, { effort = 1, mostEffort = 4 }: SolveOptions = {}): SectionSolution {
  const refused = refusalOf(section);
  if (refused !== null) return { refused };
  if (section.film !== null) return { refused: { reason: 'not-covered', what: 'a mask that follows the traces' } };
  const placement = placementOf(section);
  if ('refused' in placement) return placement;
  let best: SectionMatrices | null = null;
  for (let level = effort; level <= Math.max(effort, mostEffort); level += 1) {
    const matrices = matricesAt(section, placement, level);
    if (matrices === null) continue;
    if (best === null || worstBar(matrices) < worstBar(best)) best = matrices;
    if (worstBar(matrices) <= wantedBar) break;
  }
  return best === null ? { refused: { reason: 'not-solved', what: 'the charges do not come out positive definite' } } : { solved: best };
}

const worstBar = ({ capacitanceError, inductanceError }: SectionMatrices) => Math.max(...capacitanceError, ...inductanceError);

function matricesAt(section: Section, placement: Placement, effort: number): SectionMatrices | null {
  const { stack } = placement;
  const signals = section.conductors.flatMap(({ role }, index) => (role === 'signal' ? [index] : []));
  const air = inAir(stack);
  const inAirSolution = solveIn(air, placement.conductors.map((conductor) => ({ ...conductor, layer: 0 })), signals, effort);
  if (inAirSolution === null) return null;
  const only = stack.layers.length === 1 ? stack.layers[0].permittivity : null;
  const solution = only === null ? solveIn(stack, placement.conductors, signals, effort) : scaled(inAirSolution, only);
  if (solution === null) return null;
  const { order } = solution;
  const inductance = inverseOf(inAirSolution.fine, order);
  const coarseInductance = inverseOf(inAirSolution.coarse, order);
  if (inductance === null || coarseInductance === null) return null;
  return {
    order,
    capacitance: solution.fine.map((value) => value * 2 * Math.PI * epsilon0),
    capacitanceInAir: inAirSolution.fine.map((value) => value * 2 * Math.PI * epsilon0),
    inductance: inductance.map((value) => (value * mu0) / (2 * Math.PI)),
    capacitanceError: errorBars(solution.fine, solution.coarse, order),
    inductanceError: errorBars(inductance, coarseInductance, order),
    unknowns: Math.max(solution.unknowns, inAirSolution.unknowns),
  };
}

/** In units of 2 pi eps0. */
function solveIn(stack: Stack, conductors: readonly Trapezoid[], signals: readonly number[], effort: number): ChargeSolution | null {
  const sides: Side[] = conductors.flatMap((conductor, index) => conductorSides(conductor, index, stack, sideOrders(surroundingsOf(conductor, conductors, stack), effort)));
  const open = !stack.planeBelow && !stack.planeAbove;
  return chargeSolution({ sides, conductors: signals, kernel: kernelsOf(stack), constant: open ? openConstant(conductors, stack) : null });
}

/** Larger than any negative potential that a charge can have within the section. */
function openConstant(conductors: readonly Trapezoid[], { layers }: Stack): number {
  const left = Math.min(...conductors.map(({ x }) => x));
  const right = Math.max(...conductors.map(({ x, width }) => x + width));
  const low = Math.min(...conductors.map(({ bottom }) => bottom));
  const high = Math.max(...conductors.map(({ top }) => top));
  const extent = Math.max(right - left, high - low);
  const smallest = Math.min(...layers.map(({ permittivity }) => permittivity));
  return (4 + Math.max(0, Math.log(extent))) / smallest;
}

function surroundingsOf(own: Trapezoid, all: readonly Trapezoid[], { layers, planeBelow, planeAbove }: Stack): Surroundings {
  let gap = Infinity;
  let facing = Infinity;
  for (const other of all) {
    if (other === own) continue;
    const across = Math.max(other.x - own.x - own.width, own.x - other.x - other.width, 0);
    const up = Math.max(other.bottom - own.top, own.bottom - other.top, 0);
    gap = Math.min(gap, Math.hypot(across, up));
    // Beside the face by less than the distance in front of it still bends the charge there.
    if (0 < up && across < up) facing = Math.min(facing, up);
  }
  const below = planeBelow ? own.bottom - layers[0].bottom : Infinity;
  const above = planeAbove ? layers[layers.length - 1].top - own.top : Infinity;
  const depth = Math.min(below, above, facing);
  return { width: own.width, height: own.top - own.bottom, gap, depth, facesConductor: facing < Infinity };
}

function scaled({ fine, coarse, ...rest }: ChargeSolution, factor: number): ChargeSolution {
  return { ...rest, fine: fine.map((value) => value * factor), coarse: coarse.map((value) => value * factor) };
}

function inverseOf(matrix: Float64Array, order: number): Float64Array | null {
  return inverseSpd(matrix, order);
}
