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
import { settledRise, type SettledRise } from './settledRise';
import { settledWaveforms } from './settledWaveforms';
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
  const unitFor = ({ end, line, duration }: Ramp, horizon: number, stepsInDelay?: number, shownOnly = false): UnitResponse => {
    const finest = shownOnly ? usefulStep(duration) : 0;
    const key = `${end} ${line} ${stepsInDelay ?? ''} ${finest}`;
    const held = known.get(key);
    if (held !== undefined && horizon <= held.asked) return held.unit;
    const unit = unitResponse(network, { end, line }, horizon, { refinement, stepsInDelay, finest });
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
      const across = oneWayDelay(network.modes, lines);
      const settled = settledResponse({ network, ramp: sloped, window, across, unitFor });
      if (settled !== null) return settled;
      const unit = unitFor(ramp, wanted);
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

interface SettledRequest {
  readonly network: LineNetwork;
  readonly ramp: Ramp;
  readonly window: Time;
  readonly across: number;
  readonly unitFor: (ramp: Ramp, horizon: number, stepsInDelay: number | undefined, shownOnly: boolean) => UnitResponse;
}

/** Marched for a part of the window, where what is left of the echoes by then is too little to matter; null where it is not. */
function settledResponse(request: SettledRequest): LineResponse | null {
  const { network, ramp, window, across, unitFor } = request;
  let horizon = firstMarch * across;
  for (let march = 0; march < mostMarches && worthwhile * horizon < Math.min(window, ramp.duration); march += 1) {
    const unit = unitFor(ramp, horizon, hasLeads(network) ? undefined : stepsOfSlow, true);
    if (unit.horizon < horizon * (1 - 1e-9)) return null;
    const rise = settledRise(network, ramp, horizon / 2, window);
    if (rise === null) return null;
    const { response, missing, fading } = settledAt(request, { ...unit, horizon }, rise);
    if (missing <= 1) return response;
    // What rings dies as an exponential: marched until it has, and a little longer.
    const further = fading < 1 ? Math.log(2 * missing) / -Math.log(fading) : Infinity;
    horizon *= Math.max(1.5, Math.min(1 + further / 2, 8));
  }
  return null;
}

interface Settled {
  readonly response: LineResponse;
  /** What is left of the echoes over what may be: one or less is enough. */
  readonly missing: number;
  /** Of the worst line, by what factor it fell over the second half of the march. */
  readonly fading: number;
}

function settledAt({ network, ramp, window }: SettledRequest, unit: UnitResponse, rise: SettledRise): Settled {
  const { order } = network;
  const leads = hasLeads(network);
  const edge = { order, ramp, window, unit, rise };
  const ends = unit.ends.map((voltages, side) => settledWaveforms(edge, voltages, side * order));
  const terminations = leads ? unit.terminations.map((voltages, side) => settledWaveforms(edge, voltages, (2 + side) * order)) : ends;
  const placesOf = (line: number) => [...ends, ...terminations.filter((_, side) => leads && network.ends[side].leadDelay[line] !== 0)];
  const allowed = Array.from({ length: order }, (_, line) => diedTo * Math.max(...placesOf(line).map(({ waveforms }) => largestOf(waveforms[line]))) + negligible * Math.abs(ramp.amplitude));
  let [missing, fading] = [0, 0];
  const errorBar = allowed.map((died, line) => {
    const marched = Math.max(...placesOf(line).map((place) => place.marched[line]));
    // Steps that err more than that say so themselves.
    const enough = Math.max(died, marched);
    const left = Math.max(...placesOf(line).map((place) => place.left[line]));
    if (missing < left / enough) [missing, fading] = [left / enough, left / Math.max(...placesOf(line).map((place) => place.before[line]))];
    return volts(Math.abs(ramp.amplitude) * (unit.dropped + rounding) + left + marched + slowPartError * (died / diedTo));
  });
  const behind = (side: 0 | 1) => ends[side].waveforms.map((waveform, line) => (network.ends[side].leadDelay[line] === 0 ? waveform : terminations[side].waveforms[line]));
  const response: LineResponse = { left: ends[0].waveforms, right: ends[1].waveforms, leftTermination: behind(0), rightTermination: behind(1), window, method: unit.method, errorBar, work: unit.work + rise.work };
  return { response, missing: Number.isFinite(missing) ? missing : Infinity, fading };
}

function hasLeads({ ends }: LineNetwork): boolean {
  return ends.some(({ leadDelay }) => leadDelay.some((delay) => delay !== 0));
}

/** In the fastest mode's delay: an edge that outlasts ten ways is steady where the line rings, and shows little of it. */
const stepsOfSlow = 16;
/** Of one way: how far the first march goes. */
const firstMarch = 12;
const mostMarches = 4;
/** A march of most of the window might as well go on. */
const worthwhile = 1.5;
/** Of a line's peak, and of the source's volts: what may be left of echoes when the march ends. */
const diedTo = 5e-4;
const negligible = 1e-12;
/** Of a line's peak: contours and the cubics between their times. */
const slowPartError = 1e-7;

function largestOf({ values }: Waveform): number {
  let most = 0;
  for (const value of values) most = Math.max(most, Math.abs(value));
  return most;
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

/** An edge shows nothing of what is much quicker; a power of two, so that edges of about the same duration share an answer. */
function usefulStep(duration: number): number {
  return 2 ** Math.floor(Math.log2(duration / stepsInEdge));
}

const stepsInEdge = 48;

/** Good for its size only. */
function ofItsSize(answer: LineResponse): LineResponse {
  return { ...answer, errorBar: answer.errorBar.map((_, line) => volts(Math.max(largestOf(answer.leftTermination[line]), largestOf(answer.rightTermination[line])))) };
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
