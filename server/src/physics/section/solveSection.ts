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
import { chargedConductors, openConstant } from './basis/chargedConductor';
import type { Trapezoid } from './basis/conductorSides';
import { errorBars, largestChange } from './errorBar';
import { solveFilmed } from './film/solveFilmed';
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

/** A larger one is worth a finer setting: it is 5 to 50 times the error. */
const wantedChange = 2e-4;

export function solveSection(section: Section, { effort = usualEffort(section), mostEffort = 4 }: SolveOptions = {}): SectionSolution {
  const refused = refusalOf(section);
  if (refused !== null) return { refused };
  if (section.film !== null) {
    return solveFilmed(section, { bare: (without) => solveSection(without, { effort, mostEffort }), effort, mostEffort });
  }
  const placement = placementOf(section);
  if ('refused' in placement) return placement;
  let best: Attempt | null = null;
  for (let level = effort; level <= Math.max(effort, mostEffort); level += 1) {
    const attempt = attemptAt(section, placement, level);
    // A number that is none would pass for the best, and every other be measured against it.
    if (attempt === null || !Number.isFinite(attempt.change)) continue;
    if (best === null || attempt.change < best.change) best = attempt;
    if (attempt.change <= wantedChange) break;
  }
  return best === null ? { refused: { reason: 'not-solved', what: 'the charges do not come out positive definite' } } : { solved: best.matrices };
}

/** Of three or more, some mutual is weak enough to want the second setting, which costs little more than the first. */
const usualEffort = ({ conductors, film }: Section) => (film === null && 2 < conductors.length ? 1 : 0);

interface Attempt {
  readonly matrices: SectionMatrices;
  /** Between the two degrees, relative, over all entries that matter. */
  readonly change: number;
}

function attemptAt(section: Section, placement: Placement, effort: number): Attempt | null {
  const { stack } = placement;
  const signals = section.conductors.flatMap(({ role }, index) => (role === 'signal' ? [index] : []));
  const air = inAir(stack);
  const inAirSolution = solveIn(air, placement.conductors.map((conductor) => ({ ...conductor, layer: 0 })), signals, effort);
  if (inAirSolution === null) return null;
  const only = stack.layers.length === 1 ? stack.layers[0].permittivity : null;
  const solution = only === null ? solveIn(stack, placement.conductors, signals, effort) : scaled(inAirSolution, only);
  if (solution === null) return null;
  const { order } = solution;
  const inductance = inverseSpd(inAirSolution.fine, order);
  const coarseInductance = inverseSpd(inAirSolution.coarse, order);
  if (inductance === null || coarseInductance === null) return null;
  const matrices: SectionMatrices = {
    order,
    capacitance: times(solution.fine, 2 * Math.PI * epsilon0),
    capacitanceInAir: times(inAirSolution.fine, 2 * Math.PI * epsilon0),
    inductance: times(inductance, mu0 / (2 * Math.PI)),
    capacitanceError: errorBars(solution.fine, solution.coarse, order),
    inductanceError: errorBars(inductance, coarseInductance, order),
    unknowns: Math.max(solution.unknowns, inAirSolution.unknowns),
  };
  return { matrices, change: Math.max(largestChange(solution.fine, solution.coarse, order), largestChange(inductance, coarseInductance, order)) };
}

/** In units of 2 pi eps0. */
function solveIn(stack: Stack, conductors: readonly Trapezoid[], signals: readonly number[], effort: number): ChargeSolution | null {
  return chargeSolution({ conductors: chargedConductors(conductors, stack, effort), signals, kernel: kernelsOf(stack), constant: openConstant(conductors, stack) });
}

function scaled({ fine, coarse, ...rest }: ChargeSolution, factor: number): ChargeSolution {
  return { ...rest, fine: times(fine, factor), coarse: times(coarse, factor) };
}

function times(values: Float64Array, factor: number): Float64Array {
  const scaledValues = new Float64Array(values.length);
  for (let at = 0; at < values.length; at += 1) scaledValues[at] = factor * values[at];
  return scaledValues;
}
