/**
 * Piecewise-linear waveforms: their value at a time, and one with fewer points.
 */
import type { Time, Voltage } from '../../units/quantity';
import { volts } from '../../units/quantity';
import type { Waveform } from './lines';

/** The value at a time; constant before the first point and after the last. */
export function valueAt({ times, values }: Waveform, time: Time): Voltage {
  const last = times.length - 1;
  if (last < 0 || time <= times[0]) return volts(last < 0 ? 0 : values[0]);
  if (times[last] <= time) return volts(values[last]);
  const next = firstAfter(times, time);
  const share = (time - times[next - 1]) / (times[next] - times[next - 1]);
  return volts(values[next - 1] + share * (values[next] - values[next - 1]));
}

/**
 * The same waveform with as few of its own points as stay within `tolerance` of it. A waveform that is kept
 * for a picture has hundreds of points on a straight line otherwise.
 *
 * Method    from each kept point, the furthest point whose chord has every point between within tolerance, by the cone of
 *           slopes that still fit (Reumann & Witkam 1974 in spirit; linear time)
 */
export function thinnedWaveform({ times, values }: Waveform, tolerance: Voltage): Waveform {
  const kept = [0];
  let anchor = 0;
  let lowest = -Infinity;
  let highest = Infinity;
  for (let i = 1; i < times.length; i += 1) {
    const span = times[i] - times[anchor];
    const slope = (values[i] - values[anchor]) / span;
    if (slope < lowest || highest < slope) {
      anchor = i - 1;
      kept.push(anchor);
      lowest = -Infinity;
      highest = Infinity;
    }
    const reach = times[i] - times[anchor];
    const rise = values[i] - values[anchor];
    lowest = Math.max(lowest, (rise - tolerance) / reach);
    highest = Math.min(highest, (rise + tolerance) / reach);
  }
  if (1 < times.length) kept.push(times.length - 1);
  return times.length === 0 ? { times, values } : { times: Float64Array.from(kept, (i) => times[i]), values: Float64Array.from(kept, (i) => values[i]) };
}

/** Index of the first time later than `time`; the count where there is none. */
function firstAfter(times: Float64Array, time: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle] <= time) low = middle + 1;
    else high = middle;
  }
  return low;
}
