/**
 * What a run of coupled lines answers to a ramp: waveforms at both ends and at the terminations.
 *
 * Model     lossless quasi-TEM coupled lines, each end R or R and C, with leads (`lines.ts`)
 * Method    `unitResponse.ts` chooses between the exact lattice and the method of characteristics; `rampedWaveforms.ts` makes the
 *           ramp of it. One preparation holds the modes and every answer to a unit rise that was asked for, so that rise and
 *           fall, and windows no longer than one before, cost next to nothing
 * Source    Bewley 1933; Branin 1967; Paul, Analysis of Multiconductor Transmission Lines; from memory
 * Accuracy  reference/coupled-lines.json
 */
import { seconds, volts, type Time } from '../../units/quantity';
import type { CoupledLines, LineResponse, Ramp } from './lines';
import type { Modes } from './modes';
import { lineNetwork } from './network';
import { rampedWaveforms, type RampShape } from './rampedWaveforms';
import { unitResponse, type UnitResponse } from './unitResponse';

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
  const network = lineNetwork(lines);
  const known = new Map<string, { readonly asked: number; readonly unit: UnitResponse }>();
  const unitFor = ({ end, line }: Ramp, horizon: number): UnitResponse => {
    const key = `${end} ${line}`;
    const held = known.get(key);
    if (held !== undefined && horizon <= held.asked) return held.unit;
    const unit = unitResponse(network, { end, line }, horizon, refinement);
    known.set(key, { asked: horizon, unit });
    return unit;
  };
  return {
    lines,
    modes: network.modes,
    response: (ramp, window) => {
      checkRamp(lines, ramp, window);
      const shortest = shortestDuration * network.modes.delays[0];
      const shape = { amplitude: ramp.amplitude, duration: Math.max(ramp.duration, shortest), window };
      return rampResponse(lines, unitFor(ramp, Math.max(window, network.modes.delays[0])), shape);
    },
  };
}

/** Of the fastest mode's delay: a step, for every purpose, and still a slope that can be divided by. */
const shortestDuration = 1e-6;

function rampResponse({ order, left, right }: CoupledLines, unit: UnitResponse, shape: RampShape): LineResponse {
  const ends = unit.ends.map((voltages) => rampedWaveforms(voltages, order, shape));
  const terminations = unit.terminations.map((voltages, side) => (hasLeads([left, right][side]) ? rampedWaveforms(voltages, order, shape) : ends[side]));
  const beyond = (side: 0 | 1) => [left, right][side].map(({ lead }, line) => (lead === null ? ends : terminations)[side].waveforms[line]);
  const leftOut = Math.abs(shape.amplitude) * (unit.dropped + rounding);
  return {
    left: ends[0].waveforms,
    right: ends[1].waveforms,
    leftTermination: beyond(0),
    rightTermination: beyond(1),
    window: seconds(shape.window),
    method: unit.method,
    errorBar: Array.from({ length: order }, (_, line) => volts(leftOut + Math.max(...[...ends, ...terminations].map(({ errors }) => errors[line])))),
    work: unit.work,
  };
}

/** Of the source's amplitude: what sums of a few thousand kinks may be off by. */
const rounding = 1e-12;

function hasLeads(terminations: CoupledLines['left']): boolean {
  return terminations.some(({ lead }) => lead !== null);
}

function checkRamp({ order }: CoupledLines, { line, amplitude, duration }: Ramp, window: Time): void {
  if (!(0 <= line && line < order)) throw new Error(`a ramp on line ${line} of ${order}`);
  if (!Number.isFinite(amplitude) || !(0 <= duration && duration < Infinity) || !(0 <= window && window < Infinity)) {
    throw new Error(`a ramp of ${amplitude} V in ${duration} s, watched for ${window} s`);
  }
}
