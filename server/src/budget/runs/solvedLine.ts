/**
 * What the moving lines of a run put on the others, for one edge: solved once for each set of numbers, and kept as
 * peaks, since the waveforms of a large board would fill the memory.
 *
 * The line's own response is looked at for the window of `physics/lines/window.ts`. A response that is slower
 * than that, such as that of a high-impedance node, is followed by the lumped circuit of the same run,
 * whose peak counts where it is larger.
 */
import { prepareLines, type PreparedLines } from '../../physics/lines/lineResponse';
import { lumpedRun } from '../../physics/lines/lumpedRun';
import type { CoupledLines, LineResponse, Ramp, Waveform } from '../../physics/lines/lines';
import { peakOf } from '../../physics/lines/peak';
import { thinnedWaveform } from '../../physics/lines/waveform';
import { couplingShares, type Shares } from '../../physics/lines/shares';
import { shortLineSplit } from '../../physics/lines/shortLineSplit';
import { observationWindow, oneWayDelay, stillGrowing } from '../../physics/lines/window';
import { combinedWaveform, type CombinedTerm } from '../../physics/lines/combine';
import { currentAsVoltage } from '../../physics/lines/currentAsVoltage';
import type { Band } from '../../physics/noise/receiverBand';
import { seconds, volts, type Current, type Frequency, type Length, type Time, type Voltage } from '../../units/quantity';
import { countedPeak } from '../countedPeak';
import type { Swing } from '../sources';
import type { Arrangement } from './arrangements';
import { preparedWithGuards, type GuardLines } from './guardLines';
import type { RunPart } from './runParts';
import type { SolveCache } from '../solveCache';

export interface LineRequest {
  readonly part: RunPart;
  /** The part's own inductance, or that of edges too slow for its guards. */
  readonly inductance: Float64Array;
  readonly slow: boolean;
  /** The part's loose guards as lines; null where all count as at zero potential. */
  readonly tied: GuardLines | null;
  readonly length: Length;
  readonly arrangement: Arrangement;
  /** Which lines move, and with which sign. */
  readonly moving: readonly { readonly index: number; readonly sign: 1 | -1 }[];
  readonly voltage: Swing<Voltage> | null;
  /** Drawn at the load ends; its sign against the voltage is not known, and the larger result of both counts. */
  readonly current: Swing<Current> | null;
  readonly repeats: Frequency | null;
  /** What is to be read, each a sum of lines. */
  readonly readings: readonly Reading[];
}

export interface Reading {
  readonly terms: readonly { readonly index: number; readonly weight: number }[];
  /** Of the mean of the terms, what adds to their sum with a sign that is not known. */
  readonly leak: number;
  /** What a filter ahead of the receiver leaves; null where all counts. */
  readonly band: Band | null;
  /** Only what is left this long after the edge began; null where all counts. */
  readonly after: Time | null;
}

export interface SolvedLine {
  /** Of the slowest mode over the run alone. */
  readonly delay: Time;
  /** In the order of the request's readings. */
  readonly readings: readonly ReceivedNoise[];
}

/** Peaks are signed; for a rising edge. */
export interface ReceivedNoise {
  readonly nearEnd: Voltage;
  readonly farEnd: Voltage;
  /** Of all times, and of all frequencies. */
  readonly atReceiver: Voltage;
  /** What the filter and the moment of sampling leave of it; null where all counts. */
  readonly counted: Voltage | null;
  readonly peakTime: Time;
  readonly widthHalf: Time;
  /** Of the peak at the receiver, by the short-line split; solved when it is first asked for. */
  readonly split: () => Shares;
  /** About how much came by either field, whatever cancels: what errors are carried by. */
  readonly gross: { readonly capacitive: Voltage; readonly inductive: Voltage };
  /** Of the peak at the receiver, by the line's solution alone. */
  readonly errorBar: Voltage;
  /** Its largest value stands at the end of the window and still grows: losses decide. */
  readonly growing: boolean;
  /** Followed by the lumped circuit, whose peak was larger. */
  readonly followed: boolean;
  readonly waveform: Waveform;
  /** At the victim's ends of the run; made when they are asked for. */
  readonly ends: () => { readonly near: Waveform; readonly far: Waveform };
  /** Up to when all of these were computed. */
  readonly until: Time;
}

export function solvedLine(request: LineRequest, cache: SolveCache): SolvedLine {
  return cache.line(lineKey(request), () => solve(request));
}

function lineKey({ voltage, current, repeats, readings, ...request }: LineRequest): string {
  const numbers: (string | number)[] = [lineKeyOf(request), repeats ?? 'once'];
  for (const swing of [voltage, current]) numbers.push(swing?.amplitude ?? '-', swing?.duration ?? '-');
  for (const { terms, leak, band, after } of readings) {
    numbers.push('reads', leak, band?.from ?? '-', band?.to ?? '-', after ?? '-');
    for (const { index, weight } of terms) numbers.push(index, weight);
  }
  return numbers.join(' ');
}

/** Of the lines with their ends, and what of them moves. */
export function lineKeyOf({ part, slow, length, arrangement, moving, tied = null }: Pick<LineRequest, 'part' | 'slow' | 'length' | 'arrangement' | 'moving'> & Partial<Pick<LineRequest, 'tied'>>): string {
  const numbers: (string | number)[] = [part.id, slow ? 'slow' : 'fast', length];
  for (const { index, sign } of moving) numbers.push(index, sign);
  for (const side of [arrangement.left, arrangement.right]) {
    for (const { resistance, capacitance, lead } of side) numbers.push(resistance, capacitance, lead?.impedance ?? '-', lead?.delay ?? '-');
  }
  for (const across of [arrangement.leftAcross, arrangement.rightAcross]) {
    numbers.push('across');
    for (const { first, second, resistance, capacitance } of across) numbers.push(first, second, resistance, capacitance);
  }
  for (const from of arrangement.sourceAtLeft) numbers.push(from ? 'l' : 'r');
  if (tied !== null) {
    numbers.push('tied', tied.id);
    for (const { line, at, inductance } of tied.ties) numbers.push(line, at, inductance);
  }
  return numbers.join(' ');
}

function solve(request: LineRequest): SolvedLine {
  const { part, inductance, length, arrangement, voltage, current, repeats } = request;
  const { order, capacitance } = part.matrices;
  const { left, right, leftAcross, rightAcross } = arrangement;
  const lines: CoupledLines = { order, inductance, capacitance, length, left, right, leftAcross, rightAcross };
  const prepare = (given: CoupledLines) => (request.tied === null ? prepareLines(given) : preparedWithGuards(given, request.tied));
  const prepared = prepare(lines);
  const duration = seconds(Math.max(voltage?.duration ?? 0, current?.duration ?? 0));
  const window = observationWindow({ duration, delay: oneWayDelay(prepared.modes, lines), repeats });
  const answersTo = (driven: PreparedLines, ramp: Ramp, sign: 1 | -1): Answer => {
    const response = driven.response(ramp, window);
    return { lines: driven.lines, ramp, sign, response, later: lumpedRun(driven.lines, ramp, response.window, repeats === null ? undefined : seconds(1 / (2 * repeats))) };
  };
  const byVoltage = voltage === null ? [] : request.moving.map(({ index, sign }) => answersTo(prepared, { line: index, end: sideOf(arrangement, index, 'source'), ...voltage }, sign));
  const byCurrent = current === null ? [] : request.moving.map(({ index, sign }) => {
    const driven = currentAsVoltage(lines, { line: index, end: sideOf(arrangement, index, 'load'), ...current });
    return answersTo(driven.lines === lines ? prepared : prepare(driven.lines), driven.ramp, sign);
  });
  const readings = request.readings.map((reading) => received(request, reading, { duration, byVoltage, byCurrent }));
  return { delay: seconds(prepared.modes.delays[order - 1]), readings };
}

export function sideOf({ sourceAtLeft }: Arrangement, index: number, end: 'source' | 'load'): 'left' | 'right' {
  return sourceAtLeft[index] === (end === 'source') ? 'left' : 'right';
}

interface Answer {
  /** With a resistance where a current is drawn from an open end. */
  readonly lines: CoupledLines;
  readonly ramp: Ramp;
  readonly sign: 1 | -1;
  readonly response: LineResponse;
  /** From where that ends. */
  readonly later: LineResponse;
}

interface Answers {
  readonly duration: Time;
  readonly byVoltage: readonly Answer[];
  readonly byCurrent: readonly Answer[];
}

/** One way in which the unknown signs can fall: those of the current against the voltage, and of the mean against the difference. */
interface Signs {
  readonly current: 1 | -1;
  readonly leak: number;
}

function received(request: LineRequest, reading: Reading, answers: Answers): ReceivedNoise {
  const currents: readonly (1 | -1)[] = answers.byVoltage.length === 0 || answers.byCurrent.length === 0 ? [1] : [1, -1];
  const leaks = reading.leak === 0 || reading.terms.length < 2 ? [0] : [reading.leak, -reading.leak];
  let worst: ReceivedNoise | null = null;
  for (const current of currents) {
    for (const leak of leaks) {
      const noise = receivedWith(request, reading, answers, { current, leak });
      if (worst === null || Math.abs(worst.counted ?? worst.atReceiver) < Math.abs(noise.counted ?? noise.atReceiver)) worst = noise;
    }
  }
  return worst!;
}

type LinePlace = 'left' | 'right' | 'leftTermination' | 'rightTermination';

function receivedWith({ arrangement, moving }: LineRequest, { terms, band, after }: Reading, answers: Answers, signs: Signs): ReceivedNoise {
  const mean = signs.leak / terms.length;
  const weighted = terms.map(({ index, weight }) => ({ index, weight: weight + mean }));
  const nearSide = sideOf(arrangement, moving[0]!.index, 'source');
  const farSide = nearSide === 'left' ? 'right' : 'left';
  const all = [...answers.byVoltage.map((answer) => ({ answer, sign: answer.sign })), ...answers.byCurrent.map((answer) => ({ answer, sign: signs.current * answer.sign }))];
  const sumAt = (placeOf: (index: number) => LinePlace, part: 'whole' | 'response') => summed(weighted.flatMap(({ index, weight }) => all.map(({ answer: { response, later }, sign }) => {
    const place = placeOf(index);
    return { factor: weight * sign, waveform: part === 'response' ? response[place][index] : joined(response[place][index], later[place][index]) };
  })));
  const loadOf = (index: number) => `${sideOf(arrangement, index, 'load')}Termination` as const;
  const waveform = sumAt(loadOf, 'whole');
  const peak = peakOf(waveform);
  const window = Math.max(...all.map(({ answer: { response } }) => response.window));
  const followed = window < peak.time;
  const parts = weighted.flatMap(({ index, weight }) => all.map(({ answer: { lines, ramp } }) => {
    const shares = couplingShares(lines, ramp, index);
    const { capacitive, inductive } = sideOf(arrangement, index, 'load') === ramp.end ? shares.near : shares.far;
    return { capacitive: Math.abs(weight * capacitive), inductive: Math.abs(weight * inductive) };
  }));
  const sumOf = (values: readonly number[]) => volts(values.reduce((sum, value) => sum + value, 0));
  const errorBar = weighted.reduce((sum, { index, weight }) => sum + all.reduce((inner, { answer: { response, later } }) => inner + Math.abs(weight) * Math.max(response.errorBar[index], followed ? later.errorBar[index] : 0), 0), 0);
  return {
    nearEnd: peakOf(sumAt(() => nearSide, 'whole')).value,
    farEnd: peakOf(sumAt(() => farSide, 'whole')).value,
    atReceiver: peak.value,
    counted: countedPeak(waveform, { band, after }),
    peakTime: peak.time,
    widthHalf: peak.width,
    split: onceAsked(() => splitOf({ arrangement, weighted, all }, seconds(1.05 * Math.max(peak.time, answers.duration)))),
    gross: { capacitive: sumOf(parts.map((each) => each.capacitive)), inductive: sumOf(parts.map((each) => each.inductive)) },
    errorBar: volts(errorBar),
    growing: !followed && stillGrowing(sumAt(loadOf, 'response'), seconds(window), answers.duration),
    followed,
    waveform: forPicture(waveform),
    ends: () => ({ near: forPicture(sumAt(() => nearSide, 'whole')), far: forPicture(sumAt(() => farSide, 'whole')) }),
    until: seconds(waveform.times[waveform.times.length - 1]),
  };
}

interface Summed {
  readonly arrangement: Arrangement;
  readonly weighted: Reading['terms'];
  readonly all: readonly { readonly answer: Answer; readonly sign: number }[];
}

function splitOf({ arrangement, weighted, all }: Summed, until: Time): Shares {
  let [capacitive, inductive] = [0, 0];
  for (const { index, weight } of weighted) {
    for (const { answer: { lines, ramp }, sign } of all) {
      const { near, far } = shortLineSplit(lines, ramp, index, until);
      const shares = sideOf(arrangement, index, 'load') === ramp.end ? near : far;
      capacitive += weight * sign * shares.capacitive;
      inductive += weight * sign * shares.inductive;
    }
  }
  return { capacitive: volts(capacitive), inductive: volts(inductive) };
}

function onceAsked<Value extends object>(make: () => Value): () => Value {
  let made: Value | null = null;
  return () => (made ??= make());
}

/** One line, moved by one other, is nothing to add up. */
function summed(terms: readonly CombinedTerm[]): Waveform {
  return terms.length === 1 && terms[0]!.factor === 1 ? terms[0]!.waveform : combinedWaveform(terms);
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

function forPicture(waveform: Waveform): Waveform {
  return thinnedWaveform(waveform, volts(Math.abs(peakOf(waveform).value) * drawnWithin));
}

/** Of the peak: a thirtieth of a line's width in a picture. */
const drawnWithin = 1e-3;
