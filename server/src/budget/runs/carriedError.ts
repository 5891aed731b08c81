/**
 * The cross-section's error bars carried to a coupling, to first order: what couples by C or by L has the
 * relative error of that mutual, and the whole that of the self terms, which set impedance and delay.
 *
 * Accuracy  a bound where couplings are weak; where the short-line shares do not add up to the peak, as on long
 *           lines, the larger of the two mutuals' errors counts for all of it
 */
import type { SectionMatrices } from '../../physics/section/section';

export interface CarriedTo {
  readonly aggressor: number;
  readonly victim: number;
  readonly peak: number;
  readonly capacitive: number;
  readonly inductive: number;
}

export function carriedError({ order, capacitanceError, inductanceError }: SectionMatrices, { aggressor, victim, peak, capacitive, inductive }: CarriedTo): number {
  const mutual = victim * order + aggressor;
  const own = [aggressor, victim].map((line) => Math.max(capacitanceError[line * (order + 1)], inductanceError[line * (order + 1)]));
  const shares = Math.abs(capacitive) + Math.abs(inductive);
  const rest = Math.max(0, Math.abs(peak) - shares);
  const ofMutuals = part(capacitive, capacitanceError[mutual]) + part(inductive, inductanceError[mutual]) + part(rest, Math.max(capacitanceError[mutual], inductanceError[mutual]));
  return ofMutuals + part(peak, Math.max(...own));
}

/** The relative error of a mutual that is zero has no bound, and nothing couples by it. */
function part(value: number, error: number): number {
  return value === 0 ? 0 : Math.abs(value) * error;
}
