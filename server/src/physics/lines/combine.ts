/**
 * Sums of waveforms, each with a factor and a shift in time: what two nets of a pair cause, or the difference of two nets.
 *
 * Model     piecewise-linear waveforms, constant before their first point and after their last
 * Method    the union of all their times: a sum of straight pieces is straight between those, so nothing is lost
 * Range     any number of waveforms; points closer than rounding are one
 * Accuracy  rounding
 */
import { seconds, volts, type Time } from '../../units/quantity';
import type { Waveform } from './lines';
import { peakOf, type Peak } from './peak';
import { valueAt } from './waveform';

export interface CombinedTerm {
  readonly waveform: Waveform;
  /** With its sign. */
  readonly factor: number;
  /** Later by this; absent is 0. */
  readonly shift?: Time;
}

export function combinedWaveform(terms: readonly CombinedTerm[]): Waveform {
  const counted = terms.filter(({ waveform, factor }) => factor !== 0 && waveform.times.length !== 0);
  const times = unionOfTimes(counted);
  const values = new Float64Array(times.length);
  for (const { waveform, factor, shift = 0 } of counted) addSampled(values, times, waveform, factor, shift);
  return { times, values };
}

/** The part of a waveform from a moment on; one point, at that moment, where the waveform ends before. */
export function laterPart({ times, values }: Waveform, from: Time): Waveform {
  if (times.length === 0 || from <= times[0]) return { times, values };
  const first = times.findIndex((time) => from < time);
  const start = valueAt({ times, values }, from);
  if (first < 0) return { times: Float64Array.of(from), values: Float64Array.of(start) };
  return { times: prefixed(from, times.subarray(first)), values: prefixed(start, values.subarray(first)) };
}

/** What a receiver that samples `from` after the edge still sees. */
export function peakAfter(waveform: Waveform, from: Time): Peak {
  return waveform.times.length === 0 ? { value: volts(0), time: from, width: seconds(0) } : peakOf(laterPart(waveform, from));
}

/** Of the whole span: two times closer than this differ by rounding only. */
const apart = 1e-13;

function unionOfTimes(terms: readonly CombinedTerm[]): Float64Array {
  let count = 0;
  let [earliest, latest] = [Infinity, -Infinity];
  for (const { waveform: { times }, shift = 0 } of terms) {
    count += times.length;
    earliest = Math.min(earliest, times[0] + shift);
    latest = Math.max(latest, times[times.length - 1] + shift);
  }
  const all = new Float64Array(count);
  let at = 0;
  for (const { waveform: { times }, shift = 0 } of terms) for (const time of times) all[at++] = time + shift;
  all.sort();
  let used = 0;
  for (const time of all) if (used === 0 || all[used - 1] + apart * (latest - earliest) < time) all[used++] = time;
  return all.slice(0, used);
}

/** Both in order of time: one walk through the two. */
function addSampled(into: Float64Array, at: Float64Array, { times, values }: Waveform, factor: number, shift: number): void {
  const last = times.length - 1;
  let next = 0;
  for (let m = 0; m < at.length; m += 1) {
    const time = at[m] - shift;
    while (next <= last && times[next] < time) next += 1;
    if (next === 0 || last < next) {
      into[m] += factor * values[Math.min(next, last)];
      continue;
    }
    const share = (time - times[next - 1]) / (times[next] - times[next - 1]);
    into[m] += factor * (values[next - 1] + share * (values[next] - values[next - 1]));
  }
}

function prefixed(first: number, rest: Float64Array): Float64Array {
  const longer = new Float64Array(rest.length + 1);
  longer[0] = first;
  longer.set(rest, 1);
  return longer;
}
