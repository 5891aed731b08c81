/**
 * What one moving line of a run puts on the others, for a swing of one volt: solved once for each set of numbers,
 * and kept as peaks, since the waveforms of a large board would fill the memory.
 *
 * The line's own response is looked at for the window of `physics/lines/window.ts`. A response that is slower
 * than that, such as that of a high-impedance node, is followed by the lumped circuit of the same run,
 * whose peak counts where it is larger.
 */
import { prepareLines } from '../../physics/lines/lineResponse';
import { lumpedRun } from '../../physics/lines/lumpedRun';
import type { CoupledLines, LineResponse, Ramp, Waveform } from '../../physics/lines/lines';
import { peakOf } from '../../physics/lines/peak';
import { thinnedWaveform } from '../../physics/lines/waveform';
import { couplingShares, type CouplingShares } from '../../physics/lines/shares';
import { observationWindow, oneWayDelay, stillGrowing } from '../../physics/lines/window';
import { peakInBand, type Band } from '../../physics/noise/receiverBand';
import { seconds, volts, type Frequency, type Length, type Time, type Voltage } from '../../units/quantity';
import type { Arrangement } from './excitations';
import type { RunPart } from './runParts';
import type { SolveCache } from '../solveCache';

export interface LineRequest {
  readonly part: RunPart;
  /** The part's own inductance, or that of edges too slow for its guards. */
  readonly inductance: Float64Array;
  readonly slow: boolean;
  readonly length: Length;
  readonly arrangement: Arrangement;
  readonly aggressor: number;
  /** 0–100 % */
  readonly duration: Time;
  readonly repeats: Frequency | null;
  /** Of the receivers to be read. */
  readonly receivers: readonly { readonly index: number; readonly band: Band | null }[];
}

export interface SolvedLine {
  /** Of the slowest mode over the run alone. */
  readonly delay: Time;
  /** In the order of the request's receivers. */
  readonly receivers: readonly ReceivedNoise[];
}

/** For one volt of swing; peaks are signed. */
export interface ReceivedNoise {
  readonly nearEnd: Voltage;
  readonly farEnd: Voltage;
  readonly atReceiver: Voltage;
  readonly inBand: Voltage | null;
  readonly peakTime: Time;
  readonly widthHalf: Time;
  /** Of the peak at the receiver, by the short-line split. */
  readonly capacitivePart: Voltage;
  readonly inductivePart: Voltage;
  /** Of the peak at the receiver, by the line's solution alone. */
  readonly errorBar: Voltage;
  /** Its largest value stands at the end of the window and still grows: losses decide. */
  readonly growing: boolean;
  /** Followed by the lumped circuit, whose peak was larger. */
  readonly followed: boolean;
  readonly waveform: Waveform;
}

export function solvedLine(request: LineRequest, cache: SolveCache): SolvedLine {
  return cache.line(lineKey(request), () => solve(request));
}

function lineKey({ part, slow, length, arrangement, aggressor, duration, repeats, receivers }: LineRequest): string {
  const numbers: (string | number)[] = [part.id, slow ? 'slow' : 'fast', length, aggressor, duration, repeats ?? 'once'];
  for (const side of [arrangement.left, arrangement.right]) {
    for (const { resistance, capacitance, lead } of side) numbers.push(resistance, capacitance, lead?.impedance ?? '-', lead?.delay ?? '-');
  }
  for (const from of arrangement.sourceAtLeft) numbers.push(from ? 'l' : 'r');
  for (const { index, band } of receivers) numbers.push(index, band?.from ?? '-', band?.to ?? '-');
  return numbers.join(' ');
}

function solve(request: LineRequest): SolvedLine {
  const { part, inductance, length, arrangement, aggressor, duration, repeats } = request;
  const { order, capacitance } = part.matrices;
  const lines: CoupledLines = { order, inductance, capacitance, length, left: arrangement.left, right: arrangement.right };
  const prepared = prepareLines(lines);
  const ramp: Ramp = { line: aggressor, end: arrangement.sourceAtLeft[aggressor] ? 'left' : 'right', amplitude: volts(1), duration };
  const window = observationWindow({ duration, delay: oneWayDelay(prepared.modes, lines), repeats });
  const response = prepared.response(ramp, window);
  const later = lumpedRun(lines, ramp, response.window, repeats === null ? undefined : seconds(1 / (2 * repeats)));
  const receivers = request.receivers.map((receiver) => {
    const shares = couplingShares(lines, ramp, receiver.index);
    return received(request, receiver, { response, later, shares });
  });
  return { delay: seconds(prepared.modes.delays[order - 1]), receivers };
}

interface Solution {
  readonly response: LineResponse;
  /** From where that ends. */
  readonly later: LineResponse;
  readonly shares: CouplingShares;
}

function received({ arrangement, aggressor, duration }: LineRequest, { index, band }: LineRequest['receivers'][number], { response, later, shares }: Solution): ReceivedNoise {
  const nearSide = arrangement.sourceAtLeft[aggressor] ? 'left' : 'right';
  const farSide = nearSide === 'left' ? 'right' : 'left';
  const atNearEnd = arrangement.sourceAtLeft[index] !== arrangement.sourceAtLeft[aggressor];
  const { capacitive, inductive } = atNearEnd ? shares.near : shares.far;
  const load = arrangement.sourceAtLeft[index] ? 'rightTermination' : 'leftTermination';
  const whole = (place: 'left' | 'right' | 'leftTermination' | 'rightTermination') => joined(response[place][index], later[place][index]);
  const waveform = whole(load);
  const peak = peakOf(waveform);
  const followed = response.window < peak.time;
  return {
    nearEnd: peakOf(whole(nearSide)).value,
    farEnd: peakOf(whole(farSide)).value,
    atReceiver: peak.value,
    inBand: band === null ? null : peakInBand(waveform, band).peak,
    peakTime: peak.time,
    widthHalf: peak.width,
    capacitivePart: capacitive,
    inductivePart: inductive,
    errorBar: volts(Math.max(response.errorBar[index], followed ? later.errorBar[index] : 0)),
    growing: !followed && stillGrowing(response[load][index], response.window, duration),
    followed,
    waveform: thinnedWaveform(waveform, volts(Math.abs(peak.value) * drawnWithin)),
  };
}

/** One after the other; the second begins where the first ends. */
function joined(first: Waveform, second: Waveform): Waveform {
  const end = first.times[first.times.length - 1];
  const from = second.times.findIndex((time) => end < time);
  if (from < 0) return first;
  return { times: concatenated(first.times, second.times.subarray(from)), values: concatenated(first.values, second.values.subarray(from)) };
}

function concatenated(first: Float64Array, second: Float64Array): Float64Array {
  const both = new Float64Array(first.length + second.length);
  both.set(first);
  both.set(second, first.length);
  return both;
}

/** Of the peak: a thirtieth of a line's width in a picture. */
const drawnWithin = 1e-3;
