/**
 * Charges of conductors at unit potentials, and from them the capacitance matrix, at two degrees of the charge series at once.
 *
 * Method    conductors beside each other, as nearly always: each by what the others see of it (rowSolution.ts); where one stands
 *           above another, side by side (sidesSolution.ts)
 * Accuracy  C in units of 2 pi eps0; the two ways agree to 1e-5 (the test)
 */
import type { ChargedConductor } from '../basis/chargedConductor';
import type { Kernel } from '../kernel/layeredKernel';
import { distancesBeside } from './distancesBeside';
import { rowSolution } from './rowSolution';
import { sidesSolution } from './sidesSolution';

export { leftOut } from './layout';

export interface ChargeProblem {
  readonly conductors: readonly ChargedConductor[];
  /** Of the matrix asked for, in order; other conductors are at zero potential. */
  readonly signals: readonly number[];
  readonly kernel: (lower: number, upper: number) => Kernel;
  /** On every potential, or null where planes give it a zero. */
  readonly constant: number | null;
}

export interface ChargeSolution {
  readonly order: number;
  readonly fine: Float64Array;
  readonly coarse: Float64Array;
  readonly unknowns: number;
}

/** Null where the matrix is not positive definite: some integral was not accurate enough. */
export function chargeSolution(problem: ChargeProblem): ChargeSolution | null {
  const distances = distancesBeside(problem.conductors);
  return distances === null ? sidesSolution(problem) : rowSolution(problem, distances);
}
