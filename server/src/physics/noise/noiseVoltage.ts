/** A noise voltage with its error bar, from mean squares that know nothing of each other. */
import { volts, type Voltage } from '../../units/quantity';
import type { MeanSquare } from './densityOverBand';

export interface NoiseVoltage {
  /** Infinity where nothing limits it. */
  readonly rms: Voltage;
  readonly errorBar: Voltage;
}

export function noiseVoltage(parts: readonly MeanSquare[]): NoiseVoltage {
  const square = parts.reduce((sum, { value }) => sum + value, 0);
  const error = parts.reduce((sum, each) => sum + each.error, 0);
  const rms = Math.sqrt(square);
  // The root of the upper end, less the root: holds where the square is smaller than its error, too.
  return { rms: volts(rms), errorBar: volts(error === 0 || rms === Infinity ? 0 : error / (rms + Math.sqrt(square + error))) };
}

/** Of closed forms, relative: some tens of operations. */
export const closedFormError = 1e-14;

export function closedForm(value: number): MeanSquare {
  return { value, error: closedFormError * value };
}
