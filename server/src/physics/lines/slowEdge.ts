/**
 * Edges that last hundreds of delays: echoes are computed until they have died, and the lumped circuit carries on.
 *
 *   echoes + circuit |        circuit + what was left        | echoes of the edge's end + circuit
 *   0 ------------- settled ------------------------------ T ------------- window
 *
 * Model     what the line adds to its lumped circuit is the ringing after each kink of the edge, and a constant
 * Method    d = line - circuit for an endless rise, up to `settled`; then v(t) = circuit(t) + d(min(t, settled)) - d(t - T)
 * Range     edge and window longer than the work that an answer may cost allows to follow step by step
 * Accuracy  what still rings at `settled` is in the error bar
 */
import type { CoupledLines, Ramp, Waveform } from './lines';
import { lumpedVoltages, voltageWithin, type LumpedVoltages } from './lumpedCircuit';

export interface SlowEdge {
  readonly lines: CoupledLines;
  readonly ramp: Ramp;
  readonly window: number;
  /** End of the endless rises. */
  readonly settled: number;
}

export interface EndlessRise {
  readonly side: 0 | 1;
  readonly line: number;
  /** The line's answer to the ramp's slope that never stops, up to `settled`. */
  readonly waveform: Waveform;
}

export interface SlowEdgeWaveform {
  readonly waveform: Waveform;
  readonly error: number;
}

export function slowEdgeWaveforms({ lines, ramp, window, settled }: SlowEdge, rises: readonly EndlessRise[]): readonly SlowEdgeWaveform[] {
  const circuit = lumpedVoltages(lines, ramp, window, window);
  return rises.map(({ side, line, waveform }) => {
    const node = side * lines.order + line;
    const early = beforeEnd(waveform, settled);
    const difference = subtracted(early, circuitValues(circuit, node, early.times));
    const left = difference[difference.length - 1];
    const middle = stepTimes(circuit, settled, Math.min(ramp.duration, window));
    const late = early.times.filter((time) => ramp.duration + time <= window).map((time) => ramp.duration + time);
    const times = rising(early.times, middle, late);
    const values = circuitValues(circuit, node, times);
    let next = 0;
    for (let m = 0; m < times.length; m += 1) {
      values[m] += m < difference.length ? difference[m] : left;
      if (ramp.duration <= times[m]) {
        while (next < late.length && late[next] < times[m]) next += 1;
        if (next < late.length) values[m] -= difference[next];
      }
    }
    return { waveform: { times, values }, error: stillRinging(early.times, difference) };
  });
}

function beforeEnd({ times, values }: Waveform, end: number): Waveform {
  const count = times.findIndex((time) => end < time);
  return count < 0 ? { times, values } : { times: times.subarray(0, count), values: values.subarray(0, count) };
}

function subtracted({ values }: Waveform, others: Float64Array): Float64Array {
  return values.map((value, at) => value - others[at]);
}

/** Times ascend. */
function circuitValues(circuit: LumpedVoltages, node: number, times: Float64Array): Float64Array {
  const { solution, scale } = circuit;
  const values = new Float64Array(times.length);
  let n = 0;
  for (let m = 0; m < times.length; m += 1) {
    const time = times[m] / scale;
    while (n + 2 < solution.count && solution.times[n + 1] < time) n += 1;
    const share = (time - solution.times[n]) / (solution.times[n + 1] - solution.times[n]);
    values[m] = voltageWithin(circuit, node, n, Math.min(1, Math.max(0, share)));
  }
  return values;
}

function stepTimes({ solution, scale }: LumpedVoltages, from: number, to: number): Float64Array {
  return solution.times.subarray(0, solution.count).map((time) => time * scale).filter((time) => from < time && time < to);
}

/** One after the other, without what would not rise. */
function rising(...parts: readonly Float64Array[]): Float64Array {
  const times: number[] = [];
  for (const part of parts) for (const time of part) if (times.length === 0 || times[times.length - 1] < time) times.push(time);
  return Float64Array.from(times);
}

/** How far the difference still swings in the last tenth of the time. */
function stillRinging(times: Float64Array, difference: Float64Array): number {
  const from = 0.9 * times[times.length - 1];
  let lowest = Infinity;
  let highest = -Infinity;
  for (let m = times.length - 1; 0 <= m && from <= times[m]; m -= 1) {
    lowest = Math.min(lowest, difference[m]);
    highest = Math.max(highest, difference[m]);
  }
  return highest - lowest;
}
