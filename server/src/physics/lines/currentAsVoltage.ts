/**
 * A current that is drawn at a termination, as the voltage that does the same behind the termination's resistance.
 *
 *    --+---+        --+--R-- e      e = - R I(t): the open-circuit voltage of I drawn from R alone. The capacitance
 *      R   v I  =     |             across the end stays where it is
 *    --+---+        --+------
 *
 * Model     Norton's and Thevenin's equivalents; a linear ramp of current is a linear ramp of voltage
 * Source    circuit theory
 * Range     R = 0: the source takes any current, and nothing moves. R above 1e7 times what the end sees counts as that: a
 *           ten-millionth of the current goes there, and a node of nothing but capacitances is right for 1e6 of its delays
 * Accuracy  rounding; 1e-7 where the end is open
 */
import { ohms, seconds, volts, type Current, type Time } from '../../units/quantity';
import type { CoupledLines, Ramp, Termination } from './lines';
import { lineNetwork } from './network';

/** The current drawn from a termination's node to the reference: from 0 to `amplitude` over `duration`, and on. */
export interface CurrentRamp {
  readonly line: number;
  readonly end: 'left' | 'right';
  readonly amplitude: Current;
  /** 0-100 % */
  readonly duration: Time;
}

export interface VoltageDriven {
  /** The same lines, but for an open end that got a resistance. */
  readonly lines: CoupledLines;
  readonly ramp: Ramp;
}

export function currentAsVoltage(lines: CoupledLines, { line, end, amplitude, duration }: CurrentRamp): VoltageDriven {
  const termination = lines[end][line];
  const limit = largestShare * lineNetwork(lines).ends[end === 'left' ? 0 : 1].seen[line];
  const resistance = Math.min(termination.resistance, limit);
  const ramp: Ramp = { line, end, amplitude: volts(-resistance * amplitude), duration: seconds(duration) };
  if (resistance === termination.resistance) return { lines, ramp };
  const replaced = (ends: readonly Termination[]) => ends.map((one, i) => (i === line ? { ...one, resistance: ohms(resistance) } : one));
  return { lines: { ...lines, [end]: replaced(lines[end]) }, ramp };
}

const largestShare = 1e7;
