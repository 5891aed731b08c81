/**
 * Waveforms of an edge that outlasts its echoes: step by step until they have died, and their slow part alone from there.
 *
 *   march        |      slow part                | slow part - march        v(t) = A/T (u(t) - u(t - T)), u marched
 *   0 --------- settled ----------------------- T ------------- window      up to `settled` and slow beyond
 *
 * Method    `settledRise.ts` for what is slow; the marched answer over the second half of its time says how far the echoes have died
 * Accuracy  what march and slow part differ by there, and neighbouring contours of the slow part, is the error that is said
 */
import type { Ramp, Waveform } from './lines';
import { rampedWaveforms } from './rampedWaveforms';
import type { SettledRise } from './settledRise';
import type { UnitResponse, UnitVoltages } from './unitResponse';

export interface SettledEdge {
  readonly order: number;
  readonly ramp: Ramp;
  readonly window: number;
  readonly unit: UnitResponse;
  readonly rise: SettledRise;
}

export interface SettledPlace {
  readonly waveforms: readonly Waveform[];
  /** Of each line, V: of the march; and of what had not died when it ended. */
  readonly marched: Float64Array;
  readonly left: Float64Array;
  /** The same when half of it was marched. */
  readonly before: Float64Array;
}

/** `row`: where the place's lines begin in the rows of the rise. */
export function settledWaveforms({ order, ramp: { amplitude, duration }, window, unit: { horizon }, rise }: SettledEdge, voltages: UnitVoltages, row: number): SettledPlace {
  const slope = amplitude / duration;
  const first = rampedWaveforms(voltages, order, { amplitude, duration, window: horizon });
  // The slope alone, for as long as the march went.
  const endless = rampedWaveforms(voltages, order, { amplitude: 2 * slope * horizon, duration: 2 * horizon, window: horizon });
  const { left, before } = difference({ rise, slope, row }, endless.waveforms, horizon);
  const steady = new Float64Array(order);
  const times = lateTimes({ duration, horizon, window }, endless.waveforms);
  const late = endless.waveforms.map(() => new Float64Array(times.length));
  const after = endless.waveforms.map((waveform) => interpolated(waveform, times, duration));
  for (let m = 0; m < times.length; m += 1) {
    const since = times[m] - duration;
    rise.at(times[m], row, steady);
    for (let i = 0; i < order; i += 1) late[i][m] = slope * steady[i];
    if (since <= 0) continue;
    if (horizon < since) rise.at(since, row, steady);
    for (let i = 0; i < order; i += 1) late[i][m] -= horizon < since ? slope * steady[i] : after[i][m];
  }
  return {
    waveforms: first.waveforms.map((waveform, i) => ({ times: joined(waveform.times, times), values: joined(waveform.values, late[i]) })),
    marched: first.errors.map((error, i) => Math.max(error, endless.errors[i])),
    left,
    before,
  };
}

/** How far march and slow part are apart as the march ends, and in its middle, for the ramp's slope. */
function difference({ rise, slope, row }: { readonly rise: SettledRise; readonly slope: number; readonly row: number }, marched: readonly Waveform[], horizon: number): Pick<SettledPlace, 'left' | 'before'> {
  const steady = new Float64Array(marched.length);
  const largestBy = (end: number, least: Float64Array) => {
    const times = Float64Array.from({ length: compared }, (_, n) => end * (1 - lastShare + (lastShare * (n + 1)) / compared));
    const values = marched.map((waveform) => interpolated(waveform, times, 0));
    times.forEach((time, n) => {
      rise.at(time, row, steady);
      for (let i = 0; i < least.length; i += 1) least[i] = Math.max(least[i], Math.abs(values[i][n] - slope * steady[i]));
    });
    return least;
  };
  const seams = Float64Array.from(marched, (_, i) => Math.abs(slope) * rise.apart[row + i]);
  return { left: largestBy(horizon, seams), before: largestBy(horizon * (1 / 2 + lastShare / 4), new Float64Array(marched.length)) };
}

/** Of the march: long enough to hold a swing, the first of them at least two ways there and back. */
const lastShare = 1 / 3;
/** Moments at which march and slow part are compared. */
const compared = 32;
/** Between neighbouring times of the slow part. */
const growth = 1.02;

/** From the march's end: in equal ratios, and after the edge every time of the march. */
function lateTimes({ duration, horizon, window }: { readonly duration: number; readonly horizon: number; readonly window: number }, marched: readonly Waveform[]): Float64Array {
  const found: number[] = [];
  for (let time = horizon * growth; time < Math.min(duration, window); time *= growth) found.push(time);
  if (horizon < duration && duration < window) found.push(duration);
  for (const { times } of marched) for (const time of times) if (horizon < duration + time && duration + time < window) found.push(duration + time);
  for (let since = horizon * growth; duration + since < window; since *= growth) found.push(duration + since);
  found.push(window);
  const sorted = Float64Array.from(found).sort();
  let last = horizon;
  return sorted.filter((time) => {
    if (time - last <= 1e-12 * window) return false;
    last = time;
    return true;
  });
}

/** At times that ascend, of a waveform that begins at `start`; 0 before, its last value beyond its end. */
function interpolated({ times, values }: Waveform, at: Float64Array, start: number): Float64Array {
  let n = 0;
  return at.map((time) => {
    const since = time - start;
    if (since <= 0) return 0;
    while (n + 2 < times.length && times[n + 1] <= since) n += 1;
    const share = Math.min(1, (since - times[n]) / (times[n + 1] - times[n]));
    return values[n] + share * (values[n + 1] - values[n]);
  });
}

function joined(first: Float64Array, second: Float64Array): Float64Array {
  const both = new Float64Array(first.length + second.length);
  both.set(first);
  both.set(second, first.length);
  return both;
}
