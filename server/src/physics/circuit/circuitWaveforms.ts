/**
 * What a small circuit answers to a ramp: the voltages of its nodes over time.
 *
 * Method    `circuit.ts` marched by an L-stable method (`numeric/stiffLinear.ts`), twice: the first pass finds how large each unknown
 *           gets, the second holds each to the tolerance at its own size. A receiver's millivolts beside a driver's volts lose no digit
 * Range     what still rings after some twenty periods is damped away, as losses do
 * Accuracy  1e-6 of each node's own peak; test/physics/circuit
 */
import { stiffLinear, type StiffSolution } from '../../numeric/stiffLinear';
import { seconds, volts, type Time, type Voltage } from '../../units/quantity';
import type { Waveform } from '../lines/lines';
import { circuitMatrices, drivenRow, type Circuit, type CircuitMatrices, type Drive } from './circuit';

export interface CircuitRamp {
  readonly drive: Drive;
  /** Volts or amperes. */
  readonly amplitude: number;
  /** 0-100 % */
  readonly duration: Time;
}

export interface CircuitWaveforms {
  /** Of every node, from node 1. */
  readonly nodes: readonly Waveform[];
  /** Absolute, of any value of that node's; Infinity where it was not followed to the end. */
  readonly errorBar: readonly Voltage[];
}

/** Followed until nothing moves, at most until `until`. */
export function circuitWaveforms(circuit: Circuit, ramp: CircuitRamp, until: Time = seconds(Infinity)): CircuitWaveforms {
  const duration = Math.max(ramp.duration, shortest);
  const driven: DrivenCircuit = { ...circuitMatrices(circuit), row: drivenRow(circuit, ramp.drive), amplitude: ramp.amplitude, duration };
  const first = march(driven, new Float64Array(driven.order).fill(1), { until, tolerance: 1e-5 });
  const sizes = Float64Array.from({ length: driven.order }, (_, at) => largestOf(first, driven.order, at) || 1);
  const solution = march(driven, sizes, { until, tolerance: 1e-8 });
  const nodes = Array.from({ length: circuit.nodes }, (_, node) => node);
  return {
    nodes: nodes.map((node) => waveformOf(solution, { order: driven.order, node, volts: sizes[node], seconds: duration })),
    errorBar: nodes.map((node) => volts(solution.finished ? integrationError * sizes[node] * largestOf(solution, driven.order, node) : Infinity)),
  };
}

/** Of the largest value: the local tolerance times the steps that it takes. */
const integrationError = 1e-6;
/** A step, for every circuit of a board. */
const shortest = 1e-15;
interface DrivenCircuit extends CircuitMatrices {
  readonly row: number;
  readonly amplitude: number;
  readonly duration: number;
}

/** Time in units of the ramp, unknowns in units of their own size, every row in units of its largest entry. */
function march({ order, mass, stiffness, row, amplitude, duration }: DrivenCircuit, sizes: Float64Array, { until, tolerance }: { readonly until: number; readonly tolerance: number }): StiffSolution {
  const scaled = { order, mass: new Float64Array(order * order), stiffness: new Float64Array(order * order), forcing: new Float64Array(order) };
  for (let i = 0; i < order; i += 1) {
    let scale = 0;
    for (let j = 0; j < order; j += 1) scale = Math.max(scale, (Math.abs(mass[i * order + j]) / duration) * sizes[j], Math.abs(stiffness[i * order + j]) * sizes[j]);
    for (let j = 0; j < order; j += 1) {
      scaled.mass[i * order + j] = (mass[i * order + j] * sizes[j]) / (duration * scale);
      scaled.stiffness[i * order + j] = (stiffness[i * order + j] * sizes[j]) / scale;
    }
    if (i === row) scaled.forcing[i] = amplitude / scale;
  }
  return stiffLinear(scaled, {
    input: (time) => Math.min(1, time),
    kink: 1,
    until: Math.min(until / duration, longestFollowed),
    atLeast: 0,
    firstStep: 1 / 64,
    leastShare: 1 / 400,
    tolerance,
    mostSteps: 8000,
  });
}

/** In units of the ramp. */
const longestFollowed = 1e12;

function largestOf({ count, states }: StiffSolution, order: number, at: number): number {
  let largest = 0;
  for (let n = 0; n < count; n += 1) largest = Math.max(largest, Math.abs(states[n * order + at]));
  return largest;
}

/** After a kink of the ramp: what jumps there has rates of no meaning at first, and small steps instead. */
const roughSteps = 4;

/** The steps' own points, and the extremes between them by the cubic through values and rates. */
function waveformOf({ count, times, states, rates }: StiffSolution, unit: { order: number; node: number; volts: number; seconds: number }): Waveform {
  const at: number[] = [];
  const values: number[] = [];
  let rough = 0;
  for (let n = 0; n < count; n += 1) {
    const here = n * unit.order + unit.node;
    at.push(times[n] * unit.seconds);
    values.push(states[here] * unit.volts);
    if (n + 1 === count) break;
    if (times[n] === 0 || times[n] === 1) rough = n + roughSteps;
    if (n < rough) continue;
    const next = here + unit.order;
    if (0 <= rates[here] * rates[next]) continue;
    const step = times[n + 1] - times[n];
    const share = rates[here] / (rates[here] - rates[next]);
    const rise = states[next] - states[here];
    const bend = (1 - share) * (rates[here] * step - rise) + share * (rise - rates[next] * step);
    at.push((times[n] + share * step) * unit.seconds);
    values.push((states[here] + share * (rise + (1 - share) * bend)) * unit.volts);
  }
  return { times: Float64Array.from(at), values: Float64Array.from(values) };
}
