/**
 * The peak of a piecewise-linear waveform: its value of largest magnitude, when that is, and how long the waveform stays
 * beyond half of it around that moment. Exact, since the largest value of a piecewise-linear function is at a point.
 *
 *        ___
 *       /   \            width: between the two crossings of peak / 2 that enclose the peak
 *   ---/-----\--- peak/2
 */
import { seconds, volts, type Time, type Voltage } from '../../units/quantity';
import type { Waveform } from './lines';

export interface Peak {
  /** Signed. */
  readonly value: Voltage;
  /** Of the last moment, where the peak is flat: echoes lift a flat top, if ever so little, to its end. */
  readonly time: Time;
  /** At half the peak; ends at the waveform's last point where it never comes back. */
  readonly width: Time;
}

export function peakOf({ times, values }: Waveform): Peak {
  let largest = 0;
  for (let i = 0; i < values.length; i += 1) largest = Math.max(largest, Math.abs(values[i]));
  if (largest === 0) return { value: volts(0), time: seconds(times.length === 0 ? 0 : times[0]), width: seconds(0) };
  let at = 0;
  for (let i = 0; i < values.length; i += 1) if (largest * (1 - flatness) <= Math.abs(values[i])) at = i;
  const half = values[at] / 2;
  const before = crossing({ times, values }, at, -1, half);
  const after = crossing({ times, values }, at, 1, half);
  return { value: volts(Math.sign(values[at]) * largest), time: seconds(times[at]), width: seconds(after - before) };
}

/** What rounding may do to a level top. */
const flatness = 1e-9;

/** Walking from the peak in one direction, the time at which the waveform first comes down to half of it. */
function crossing({ times, values }: Waveform, at: number, direction: 1 | -1, half: number): number {
  const sign = Math.sign(half);
  for (let i = at + direction; 0 <= i && i < times.length; i += direction) {
    if (sign * half < sign * values[i]) continue;
    const inside = i - direction;
    const share = (values[inside] - half) / (values[inside] - values[i]);
    return times[inside] + share * (times[i] - times[inside]);
  }
  return direction < 0 ? times[0] : times[times.length - 1];
}
