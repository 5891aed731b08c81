/**
 * Waveforms of a ramp from the answer to an endless rise: v(t) = A/T (u(t) - u(t - T)).
 *
 * Method    superposition of a rise at 0 and a fall at T; the kinks are exact, the smooth part is interpolated (cubic). Times are
 *           the grid's and every kink's, so that a peak that stands on a kink is met; the smooth part's largest and smallest
 *           values get a point of their own, by the parabola through three grid points
 * Accuracy  that of the answer it starts from
 */
import type { Waveform } from './lines';
import type { SmoothPart, UnitVoltages } from './unitResponse';

export interface RampShape {
  readonly amplitude: number;
  readonly duration: number;
  readonly window: number;
}

export interface RampedWaveforms {
  /** Of each line. */
  readonly waveforms: readonly Waveform[];
  /** Of each line: estimated error before Richardson's correction, V; 0 where exact. */
  readonly errors: Float64Array;
}

export function rampedWaveforms(unit: UnitVoltages, order: number, ramp: RampShape): RampedWaveforms {
  const { smooth } = unit;
  const slopes = slopeChanges(unit.kinks, ramp);
  const times = markTimes(slopes, smooth, ramp.window);
  const rows = Array.from({ length: order }, () => new Float64Array(times.length));
  addKinks(rows, times, slopes, unit.kinks.voltage, order);
  const errors = new Float64Array(order);
  if (smooth === null) return { waveforms: rows.map((values) => ({ times, values })), errors };
  addSmooth(rows, times, smooth, ramp);
  for (let i = 0; i < order; i += 1) errors[i] = rampedError(smooth, i, ramp);
  const waveforms = rows.map((values, line) => withVertices({ times, values }, smooth, (from, to) => kinkiness(slopes, unit.kinks.voltage, order, line, from, to)));
  return { waveforms, errors };
}

/** Every kink twice: as it is at the ramp's start, and the other way at its end. In order of time. */
interface SlopeChanges {
  readonly count: number;
  readonly times: Float64Array;
  /** Row of the kink's voltages. */
  readonly kink: Int32Array;
  readonly factor: Float64Array;
}

function slopeChanges(kinks: UnitVoltages['kinks'], { amplitude, duration, window }: RampShape): SlopeChanges {
  const times = new Float64Array(2 * kinks.count);
  const kink = new Int32Array(2 * kinks.count);
  const factor = new Float64Array(2 * kinks.count);
  const scale = amplitude / duration;
  let count = 0;
  let start = 0;
  let end = 0;
  while (end < kinks.count) {
    const isStart = start < kinks.count && kinks.times[start] <= kinks.times[end] + duration;
    const time = isStart ? kinks.times[start] : kinks.times[end] + duration;
    if (window < time) break;
    times[count] = time;
    kink[count] = isStart ? start : end;
    factor[count] = isStart ? scale : -scale;
    count += 1;
    if (isStart) start += 1;
    else end += 1;
  }
  return { count, times, kink, factor };
}

/** 0, the window's end, every change of slope and every step of the grid, strictly rising. */
function markTimes({ count, times }: SlopeChanges, smooth: SmoothPart | null, window: number): Float64Array {
  const steps = smooth === null ? 0 : Math.min(smooth.steps, Math.floor(window / smooth.step));
  const step = smooth?.step ?? 0;
  const marks = new Float64Array(count + steps + 2);
  // Closer than this two times differ by rounding only.
  const apart = 1e-12 * window;
  let used = 1;
  let next = 0;
  let n = 1;
  while (next < count || n <= steps) {
    const time = n <= steps && (next === count || n * step <= times[next]) ? n++ * step : times[next++];
    if (marks[used - 1] + apart < time) marks[used++] = time;
  }
  if (marks[used - 1] + apart < window) marks[used++] = window;
  return marks.slice(0, used);
}

function addKinks(rows: readonly Float64Array[], marks: Float64Array, { count, times, kink, factor }: SlopeChanges, voltage: Float64Array, order: number): void {
  const value = new Float64Array(order);
  const slope = new Float64Array(order);
  let next = 0;
  for (let m = 0; m < marks.length; m += 1) {
    const now = marks[m];
    const since = m === 0 ? 0 : now - marks[m - 1];
    for (let i = 0; i < order; i += 1) value[i] += slope[i] * since;
    while (next < count && times[next] <= now) {
      for (let i = 0; i < order; i += 1) {
        const change = factor[next] * voltage[kink[next] * order + i];
        value[i] += change * (now - times[next]);
        slope[i] += change;
      }
      next += 1;
    }
    for (let i = 0; i < order; i += 1) rows[i][m] = value[i];
  }
}

function addSmooth(rows: readonly Float64Array[], marks: Float64Array, smooth: SmoothPart, { amplitude, duration }: RampShape): void {
  const scale = amplitude / duration;
  addDelayed(rows, marks, smooth, 0, scale);
  addDelayed(rows, marks, smooth, duration, -scale);
}

function addDelayed(rows: readonly Float64Array[], marks: Float64Array, { values, steps, step }: SmoothPart, delay: number, factor: number): void {
  const weights = new Float64Array(4);
  for (let m = 0; m < marks.length; m += 1) {
    if (marks[m] <= delay) continue;
    const position = (marks[m] - delay) / step;
    const point = Math.min(steps, Math.round(position));
    if (Math.abs(position - point) < 1e-9) {
      for (let i = 0; i < rows.length; i += 1) rows[i][m] += factor * values[i * (steps + 1) + point];
      continue;
    }
    const first = weigh(position, steps, weights);
    for (let i = 0; i < rows.length; i += 1) {
      const at = i * (steps + 1) + first;
      // The smooth part starts with value and slope 0: before its first point there is nothing to add.
      const before = first < 0 ? 0 : weights[0] * values[at];
      rows[i][m] += factor * (before + weights[1] * values[at + 1] + weights[2] * values[at + 2] + weights[3] * values[at + 3]);
    }
  }
}

/** Cubic Lagrange weights at a place between grid points; answers the first of the four points used. */
function weigh(position: number, steps: number, weights: Float64Array): number {
  const first = Math.max(-1, Math.min(Math.floor(position) - 1, steps - 3));
  const u = Math.min(position, steps) - first - 1;
  weights[0] = (-u * (u - 1) * (u - 2)) / 6;
  weights[1] = ((u + 1) * (u - 1) * (u - 2)) / 2;
  weights[2] = (-(u + 1) * u * (u - 2)) / 2;
  weights[3] = ((u + 1) * u * (u - 1)) / 6;
  return first;
}

/** Largest difference of the two resolutions, for the ramp and not for the endless rise, whose error may grow without harm. */
function rampedError({ error, coarseSteps, step }: SmoothPart, line: number, { amplitude, duration, window }: RampShape): number {
  const row = line * (coarseSteps + 1);
  const shift = duration / (2 * step);
  const whole = Math.floor(shift);
  const part = shift - whole;
  const last = Math.min(coarseSteps, Math.ceil(window / (2 * step)));
  let largest = 0;
  for (let n = 0; n <= last; n += 1) {
    const late = n <= whole ? 0 : (1 - part) * error[row + n - whole] + part * error[row + n - whole - 1];
    largest = Math.max(largest, Math.abs(error[row + n] - late));
  }
  return (largest * Math.abs(amplitude)) / duration;
}

/** Sum of one line's changes of slope between two times. */
function kinkiness({ count, times, kink, factor }: SlopeChanges, voltage: Float64Array, order: number, line: number, from: number, to: number): number {
  let sum = 0;
  for (let e = 0; e < count && times[e] <= to; e += 1) if (from <= times[e]) sum += Math.abs(factor[e] * voltage[kink[e] * order + line]);
  return sum;
}

/** Adds the top of the parabola through the value of largest magnitude, and through the other extreme where it is not small. */
function withVertices(waveform: Waveform, { step }: SmoothPart, kinkinessBetween: (from: number, to: number) => number): Waveform {
  const highest = extremeIndex(waveform.values, 1);
  const lowest = extremeIndex(waveform.values, -1);
  const largest = Math.max(waveform.values[highest], -waveform.values[lowest]);
  // The later one first, so that the index of the other stays right.
  return [highest, lowest]
    .filter((at) => 0.1 * largest < Math.abs(waveform.values[at]))
    .sort((a, b) => b - a)
    .reduce((known, at) => withVertex(known, at, step, kinkinessBetween), waveform);
}

function extremeIndex(values: Float64Array, sign: 1 | -1): number {
  let at = 0;
  for (let i = 1; i < values.length; i += 1) if (sign * values[at] < sign * values[i]) at = i;
  return at;
}

function withVertex({ times, values }: Waveform, at: number, step: number, kinkinessBetween: (from: number, to: number) => number): Waveform {
  const unchanged = { times, values };
  // Kinks put extra points between the grid's: neighbours at least half a step away make a parabola that means something.
  let left = at - 1;
  let right = at + 1;
  while (0 < left && times[at] - times[left] < step / 2) left -= 1;
  while (right < times.length - 1 && times[right] - times[at] < step / 2) right += 1;
  if (left < 0 || times.length <= right) return unchanged;
  const before = (values[at] - values[left]) / (times[at] - times[left]);
  const after = (values[right] - values[at]) / (times[right] - times[at]);
  const curvature = (2 * (after - before)) / (times[right] - times[left]);
  if (curvature === 0 || 0.1 * Math.abs(after - before) < kinkinessBetween(times[left], times[right])) return unchanged;
  const slope = before + (curvature * (times[at] - times[left])) / 2;
  const offset = -slope / curvature;
  const time = times[at] + offset;
  const value = values[at] + (slope * offset) / 2;
  const neighbour = offset < 0 ? at : at + 1;
  if (offset === 0 || time <= times[left] || times[right] <= time) return unchanged;
  if ((0 < neighbour && time <= times[neighbour - 1]) || (neighbour < times.length && times[neighbour] <= time)) return unchanged;
  return { times: inserted(times, neighbour, time), values: inserted(values, neighbour, value) };
}

function inserted(numbers: Float64Array, at: number, value: number): Float64Array {
  const longer = new Float64Array(numbers.length + 1);
  longer.set(numbers.subarray(0, at));
  longer[at] = value;
  longer.set(numbers.subarray(at), at + 1);
  return longer;
}
