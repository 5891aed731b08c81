/**
 * What a run of coupled lines answers to a ramp: waveforms at both ends and at the terminations.
 *
 * Model     lossless quasi-TEM coupled lines, each end R or R and C, with leads, and R and C across two ends (`lines.ts`)
 * Method    `unitResponse.ts` chooses between the exact lattice and the method of characteristics; `rampedWaveforms.ts` makes the
 *           ramp of it. One preparation holds the modes and every answer to a unit rise that was asked for, so that rise and
 *           fall, and windows no longer than one before, cost next to nothing
 * Source    Bewley 1933; Branin 1967; Paul, Analysis of Multiconductor Transmission Lines; from memory
 * Accuracy  reference/coupled-lines.json
 */
import { seconds, volts, type Time } from '../../units/quantity';
import { hasAcross, prepareAcross } from './across';
import type { CoupledLines, LineResponse, Ramp, Termination, Waveform } from './lines';
import type { Modes } from './modes';
import { lineNetwork, type LineNetwork } from './network';
import { rampedWaveforms, type RampedWaveforms, type RampShape } from './rampedWaveforms';
import { slowEdgeWaveforms } from './slowEdge';
import { fewestSteps, unitResponse, type UnitResponse } from './unitResponse';
import { oneWayDelay } from './window';

export interface PreparedLines {
  readonly lines: CoupledLines;
  readonly modes: Modes;
  readonly response: (ramp: Ramp, window: Time) => LineResponse;
}

export function lineResponse(lines: CoupledLines, ramp: Ramp, window: Time): LineResponse {
  return prepareLines(lines).response(ramp, window);
}

/** `refinement` divides every step of time: to measure with. */
export function prepareLines(lines: CoupledLines, refinement = 1): PreparedLines {
  const plain = (one: CoupledLines) => prepareUnbridged(one, refinement);
  return hasAcross(lines) ? prepareAcross(lines, plain) : plain(lines);
}

/** Lines of which nothing is across. */
function prepareUnbridged(lines: CoupledLines, refinement: number, shortened = false): PreparedLines {
  const network = lineNetwork(lines);
  const known = new Map<string, { readonly asked: number; readonly unit: UnitResponse }>();
  const unitFor = ({ end, line }: Ramp, horizon: number, stepsInDelay?: number): UnitResponse => {
    const key = `${end} ${line} ${stepsInDelay ?? ''}`;
    const held = known.get(key);
    if (held !== undefined && horizon <= held.asked) return held.unit;
    const unit = unitResponse(network, { end, line }, horizon, refinement, stepsInDelay);
    known.set(key, { asked: horizon, unit });
    return unit;
  };
  return {
    lines,
    modes: network.modes,
    response: (ramp, window) => {
      checkRamp(lines, ramp, window);
      const shortest = shortestDuration * network.modes.delays[0];
      const sloped = { ...ramp, duration: seconds(Math.max(ramp.duration, shortest)) };
      const wanted = Math.max(window, network.modes.delays[0]);
      const unit = unitFor(ramp, wanted);
      const across = oneWayDelay(network.modes, lines);
      // Until the edge has come and gone, or, of one that outlasts the work, until echoes are past and the circuit takes over.
      const reaches = ({ horizon }: UnitResponse) => window * (1 - 1e-9) <= horizon || (sloped.duration < horizon ? sloped.duration + 2 * across : 3 * across) <= horizon;
      // A short run in a long net: its own delay asks for small steps, its leads for many.
      const hurried = isCutShort(unit, window) && (sloped.duration < unit.horizon || !reaches(unit));
      const followed = hurried ? unitFor(ramp, wanted, fewestSteps) : unit;
      if (reaches(followed) || shortened) return rampResponse(lines, network, followed, sloped, window);
      const share = (0.4 * Math.max(followed.horizon - sloped.duration, 0.5 * followed.horizon)) / across;
      return ofItsSize(prepareUnbridged(withShorterLeads(lines, share), refinement, true).response(sloped, window));
    },
  };
}

/** Of the fastest mode's delay: a step, for every purpose, and still a slope that can be divided by. */
const shortestDuration = 1e-6;

/**
 * A run a thousand times shorter than its leads, whose waves the work allowed cannot bring to the end: with leads that it can. What
 * arrives first is the same; when echoes come is not.
 */
function withShorterLeads({ left, right, ...lines }: CoupledLines, share: number): CoupledLines {
  const shorter = (ends: readonly Termination[]) => ends.map((one) => (one.lead === null ? one : { ...one, lead: { ...one.lead, delay: seconds(one.lead.delay * share) } }));
  return { ...lines, left: shorter(left), right: shorter(right) };
}

/** Good for its size only. */
function ofItsSize(answer: LineResponse): LineResponse {
  const largest = (waveform: Waveform) => waveform.values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  return { ...answer, errorBar: answer.errorBar.map((_, line) => volts(Math.max(largest(answer.leftTermination[line]), largest(answer.rightTermination[line])))) };
}

function isCutShort({ horizon }: UnitResponse, window: number): boolean {
  return horizon < window * (1 - 1e-9);
}

/** An edge that ends before the work does is answered for as long as that reaches; a slower one goes on as a circuit. */
function rampResponse(lines: CoupledLines, network: LineNetwork, unit: UnitResponse, ramp: Ramp, asked: Time): LineResponse {
  const { order, ends: lineEnds } = network;
  const window = isCutShort(unit, asked) && ramp.duration < unit.horizon ? seconds(unit.horizon) : asked;
  const followed = isCutShort(unit, window);
  const shape = followed ? endlessRise(ramp, Math.min(unit.horizon, ramp.duration)) : { ...ramp, window };
  const ends = unit.ends.map((voltages) => rampedWaveforms(voltages, order, shape));
  const terminations = unit.terminations.map((voltages, side) => (lineEnds[side].leadDelay.some((delay) => delay !== 0) ? rampedWaveforms(voltages, order, shape) : ends[side]));
  const leftOut = Math.abs(ramp.amplitude) * (unit.dropped + rounding);
  const errors = Array.from({ length: order }, (_, line) => leftOut + Math.max(...[...ends, ...terminations].map((ramped) => ramped.errors[line])));
  const finished = (ramped: RampedWaveforms, side: 0 | 1): readonly Waveform[] => {
    if (!followed) return ramped.waveforms;
    const slow = slowEdgeWaveforms({ lines, ramp, window, settled: shape.window }, ramped.waveforms.map((waveform, line) => ({ side, line, waveform })));
    slow.forEach(({ error }, line) => (errors[line] += error));
    return slow.map(({ waveform }) => waveform);
  };
  const [leftEnds, rightEnds] = [finished(ends[0], 0), finished(ends[1], 1)];
  const beyond = (side: 0 | 1, atEnds: readonly Waveform[]) => {
    if (terminations[side] === ends[side]) return atEnds;
    const behindLeads = finished(terminations[side], side);
    return atEnds.map((waveform, line) => (lineEnds[side].leadDelay[line] === 0 ? waveform : behindLeads[line]));
  };
  const [leftTermination, rightTermination] = [beyond(0, leftEnds), beyond(1, rightEnds)];
  return { left: leftEnds, right: rightEnds, leftTermination, rightTermination, window, method: unit.method, errorBar: errors.map(volts), work: unit.work };
}

/** The ramp's slope going on beyond all that is looked at. */
function endlessRise({ amplitude, duration }: Ramp, until: number): RampShape {
  return { amplitude: amplitude * ((2 * until) / duration), duration: 2 * until, window: until };
}

/** Of the source's amplitude: what sums of a few thousand kinks may be off by. */
const rounding = 1e-12;

function checkRamp({ order }: CoupledLines, { line, amplitude, duration }: Ramp, window: Time): void {
  if (!(0 <= line && line < order)) throw new Error(`a ramp on line ${line} of ${order}`);
  if (!Number.isFinite(amplitude) || !(0 <= duration && duration < Infinity) || !(0 <= window && window < Infinity)) {
    throw new Error(`a ramp of ${amplitude} V in ${duration} s, watched for ${window} s`);
  }
}
