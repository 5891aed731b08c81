/**
 * A run as a lumped circuit, followed from a moment on for as long as it moves: how a node of high impedance, or a current
 * through low ones, goes on long after the echoes on the lines have died.
 *
 * Model     `lumpedCircuit.ts`. It knows nothing of echoes: only what comes after them is told
 * Range     any ends; nothing is computed where nothing can outlast `from`, by the time constants of each line with its ends
 * Accuracy  reference/lumped.json, to 1e-5
 */
import { seconds, volts, type Time } from '../../units/quantity';
import type { CoupledLines, LineResponse, Ramp, Waveform } from './lines';
import { endCapacitance, leadInductance, lumpedVoltages, voltageWithin, type LumpedVoltages } from './lumpedCircuit';

/** From `from` until nothing moves, at most to `until`. Waveforms of one point, 0 V, where nothing outlasts `from`. */
export function lumpedRun(lines: CoupledLines, ramp: Ramp, from: Time, until: Time = seconds(Infinity)): LineResponse {
  const { order } = lines;
  if (until <= from || slowestConstant(lines) < from - ramp.duration) {
    const nothing = Array.from({ length: order }, (): Waveform => ({ times: Float64Array.of(from), values: Float64Array.of(0) }));
    return response(nothing, nothing, { window: from, error: 0, work: 0 });
  }
  const voltages = lumpedVoltages(lines, ramp, from, until);
  const waveforms = Array.from({ length: 2 * order }, (_, node) => waveformFrom(voltages, node, from));
  const { solution, scale, largest } = voltages;
  return response(waveforms.slice(0, order), waveforms.slice(order), { window: seconds(solution.times[solution.count - 1] * scale), error: integrationError * largest, work: solution.count });
}

const integrationError = 1e-6;

function response(left: readonly Waveform[], right: readonly Waveform[], { window, error, work }: { readonly window: Time; readonly error: number; readonly work: number }): LineResponse {
  return { left, right, leftTermination: left, rightTermination: right, window, method: 'lumped', errorBar: left.map(() => volts(error)), work };
}

/** When everything has come within 5e-5 of where it goes, as far as each line alone can tell. */
function slowestConstant({ order, inductance, capacitance, length, left, right }: CoupledLines): number {
  let slowest = 0;
  for (let i = 0; i < order; i += 1) {
    const ends = endCapacitance(left[i]) + endCapacitance(right[i]);
    const charge = capacitance[i * (order + 1)] * length + ends;
    const flux = inductance[i * (order + 1)] * length + leadInductance(left[i]) + leadInductance(right[i]);
    const conductance = 1 / left[i].resistance + 1 / right[i].resistance;
    const resistance = left[i].resistance + right[i].resistance;
    // A coil against the ends' capacitors swings for a while before it shows its peak.
    slowest = Math.max(slowest, timesWatched * (charge / conductance), timesWatched * (flux / resistance), 2 * Math.PI * Math.sqrt(flux * ends));
  }
  return slowest;
}

const timesWatched = 10;

/** The steps' own points, and the extremes between them. */
function waveformFrom(voltages: LumpedVoltages, node: number, from: number): Waveform {
  const { solution, scale, order } = voltages;
  const times: number[] = [];
  const values: number[] = [];
  const add = (n: number, share: number) => {
    const time = (solution.times[n] + share * (solution.times[n + 1] - solution.times[n])) * scale;
    if (times.length !== 0 && time <= times[times.length - 1]) return;
    times.push(time);
    values.push(voltageWithin(voltages, node, n, share));
  };
  for (let n = 0; n + 1 < solution.count; n += 1) {
    const end = solution.times[n + 1] * scale;
    if (end <= from) continue;
    const begin = solution.times[n] * scale;
    if (times.length === 0) {
      times.push(from);
      values.push(voltageWithin(voltages, node, n, (from - begin) / (end - begin)));
    }
    const extreme = turningPoint(solution.rates[3 * order * n + node], solution.rates[3 * order * (n + 1) + node]);
    if (extreme !== null) add(n, extreme);
    add(n, 1);
  }
  if (times.length === 0) return { times: Float64Array.of(from), values: Float64Array.of(0) };
  return { times: Float64Array.from(times), values: Float64Array.from(values) };
}

/** Where, in a step, a rate that changes sign is zero, taken as straight between. */
function turningPoint(before: number, after: number): number | null {
  return before * after < 0 ? before / (before - after) : null;
}
