/**
 * What a receiver's first-order band leaves of a waveform: its largest value.
 *
 *    u --[ low pass f2 ]-- y --[ high pass f1 ]-- z     Model    passive sections, neither loads the other,
 *                                                                at rest before the waveform and after it
 *    Method    exact in every straight piece of u: y and the high pass's own state q are a line and two
 *              exponentials, and z = y - q has at most one extreme inside, in closed form
 *    Formula   y' = w2 (u - y),  q' = w1 (y - q),  z = y - q,  w = 2 pi f
 *    Source    linear circuit theory
 *    Range     0 <= f1 < f2      Accuracy  rounding; test/physics/noise/receiverBand.test.ts
 */
import type { Waveform } from '../lines/lines';
import { seconds, volts, type Frequency, type Time, type Voltage } from '../../units/quantity';

export interface Band {
  readonly from: Frequency;
  readonly to: Frequency;
}

/** The value of largest magnitude, with its sign, and when it is reached; of what is left from the moment `after` on, where given. */
export function peakInBand(waveform: Waveform, band: Band, after: Time | null = null): { readonly peak: Voltage; readonly time: Time } {
  const w1 = 2 * Math.PI * band.from;
  // The two exponentials must differ; a band narrower than this is one frequency.
  const w2 = 2 * Math.PI * Math.max(band.to, band.from * (1 + 1e-6));
  const { times, values } = after === null ? waveform : splitAt(waveform, after, w1, w2);
  let best = { peak: 0, time: after ?? times[0] ?? 0 };
  let y = 0;
  let q = 0;
  for (let index = 0; index + 1 < times.length; index += 1) {
    const duration = times[index + 1] - times[index];
    if (!(0 < duration)) continue;
    const piece: Piece = { y, q, level: values[index], slope: (values[index + 1] - values[index]) / duration, w1, w2 };
    const inside = extremeInside(piece);
    for (const time of 0 < inside && inside < duration ? [inside, duration] : [duration]) {
      const state = stateAfter(time, piece);
      if (after !== null && times[index] + time < after) continue;
      if (Math.abs(best.peak) < Math.abs(state.y - state.q)) best = { peak: state.y - state.q, time: times[index] + time };
    }
    ({ y, q } = stateAfter(duration, piece));
  }
  return { peak: volts(best.peak), time: seconds(best.time) };
}

/** With a point at the moment, and held at its last value until both filters have settled. */
function splitAt({ times, values }: Waveform, moment: number, w1: number, w2: number): Waveform {
  const last = times.length - 1;
  if (last < 0) return { times, values };
  const settled = 40 / w2 + (w1 === 0 ? 0 : 40 / w1);
  const found = times.findIndex((time) => moment <= time);
  const next = found < 0 ? last + 1 : found;
  const inserted = next === 0 || times[next] === moment ? [] : [moment];
  const between = inserted.map(() => (last < next ? values[last] : values[next - 1] + ((moment - times[next - 1]) / (times[next] - times[next - 1])) * (values[next] - values[next - 1])));
  const joined = (before: Float64Array, middle: readonly number[], after: Float64Array, end: number) => {
    const all = new Float64Array(before.length + middle.length + after.length + 1);
    all.set(before);
    all.set(middle, before.length);
    all.set(after, before.length + middle.length);
    all[all.length - 1] = end;
    return all;
  };
  return {
    times: joined(times.subarray(0, next), inserted, times.subarray(next), Math.max(times[last], moment) + settled),
    values: joined(values.subarray(0, next), between, values.subarray(next), values[last]),
  };
}

interface Piece {
  /** States at the piece's start. */
  readonly y: number;
  readonly q: number;
  /** The input: `level + slope t`. */
  readonly level: number;
  readonly slope: number;
  readonly w1: number;
  readonly w2: number;
}

/** Amplitude of the exponential that the low pass adds to the line it settles on. */
function lowPassAmplitude({ y, level, slope, w2 }: Piece): number {
  return y - level + slope / w2;
}

function stateAfter(time: number, piece: Piece): { readonly y: number; readonly q: number } {
  const { q, level, slope, w1, w2 } = piece;
  const amplitude = lowPassAmplitude(piece);
  const fast = Math.exp(-w2 * time);
  const y = level + slope * (time - 1 / w2) + amplitude * fast;
  if (w1 === 0) return { y, q: 0 };
  // Written around 1 - exp(-w1 t), so that a corner of a few hertz under a fast edge does not cancel away.
  const settled = -Math.expm1(-w1 * time);
  const line = (level - slope / w2) * settled + slope * (time - settled / w1);
  return { y, q: q * (1 - settled) + line + (amplitude * w1 * (fast - 1 + settled)) / (w1 - w2) };
}

/** The time at which z' = 0, or NaN. */
function extremeInside(piece: Piece): number {
  const { q, level, slope, w1, w2 } = piece;
  const amplitude = lowPassAmplitude(piece);
  if (w1 === 0) return -Math.log(slope / (w2 * amplitude)) / w2;
  // z = slope/w1 + A w2/(w2-w1) exp(-w2 t) - B exp(-w1 t): where the two slopes cancel. Named here is w1 B, which stays finite as w1 vanishes.
  const slow = w1 * (q - level + slope / w2) + slope - (amplitude * w1 * w1) / (w1 - w2);
  return -Math.log((slow * (w2 - w1)) / (amplitude * w2 * w2)) / (w2 - w1);
}
