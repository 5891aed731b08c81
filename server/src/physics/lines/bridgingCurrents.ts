/**
 * Lines with resistors and capacitors across any of their ends: what flows through those as sources of current on the lines without.
 *
 *   d(t) = d0(t) + sum_m (i(m+1) - i(m)) k(t - m h),   i = d/Ra + Ca d'
 *
 * Model     the same lossless lines; each bridge draws its current at one termination and gives it back at the other
 * Symbols   d voltage across a bridge, d0 without any bridge, i its current, k what a current that rises to one ampere within one
 *           step h puts across it
 * Method    i straight between the points of an even grid; k exact there, from the lines' own answer; one small system a step,
 *           the trapezoidal rule for Ca. At twice the step again, for the error bar
 * Source    compensation theorem; collocation for a Volterra equation of the second kind, textbook
 * Range     any ends, bridges of any R and C but short circuits. For balanced pairs `balancedPairs.ts` is exact, and used
 * Accuracy  `errorBar`; 1e-3 of the largest voltage for edges of some delays (test/physics/lines/across.test.ts)
 */
import { amperes, seconds, volts, type Time } from '../../units/quantity';
import { luFactor, luSolve } from '../../numeric/lu';
import { combinedWaveform } from './combine';
import { currentAsVoltage, type CurrentRamp } from './currentAsVoltage';
import type { PreparedLines } from './lineResponse';
import type { Across, CoupledLines, LineResponse, Ramp, Waveform } from './lines';
import { lineNetwork } from './network';
import { slowEdgeWaveforms } from './slowEdge';
import { valueAt } from './waveform';
import { oneWayDelay } from './window';

export function bridgedLines(lines: CoupledLines, prepare: (lines: CoupledLines) => PreparedLines): PreparedLines {
  const bridges = [...(lines.leftAcross ?? []).map((across): Bridge => ({ ...across, end: 'left' })), ...(lines.rightAcross ?? []).map((across): Bridge => ({ ...across, end: 'right' }))];
  for (const { resistance } of bridges) if (!(0 < resistance)) throw new Error(`${resistance} ohm across two lines`);
  const prepared = prepare(withoutBridges(lines, bridges));
  const { modes } = lineNetwork(lines);
  const delay = Math.max(oneWayDelay(modes, lines), shortestDelay);
  const settled = delaysFollowed * delay;
  return {
    lines,
    modes,
    response: (ramp, window) => {
      if (settled < ramp.duration && settled < window) return slowResponse(lines, prepared, bridges, { ramp, window, settled });
      const finest = Math.min(delay / stepsInDelay, Math.max(modes.delays[0], delay / 64) / stepsInMode);
      const wanted = 2 * Math.ceil(window / finest / 2);
      return bridgedResponse(prepared, bridges, { ramp, window, steps: Math.min(mostSteps, Math.max(stepsInWindow, wanted)) });
    },
  };
}

interface Bridge extends Across {
  readonly end: 'left' | 'right';
}

const places = ['left', 'right', 'leftTermination', 'rightTermination'] as const;
const stepsInWindow = 2400;

/** What waits long for a fast edge is followed as far as about half a second of work goes. */
const mostSteps = 9600;
const stepsInDelay = 8;
/** Of the fastest mode over the line alone: coarser steps ring between reflections that they do not tell apart. */
const stepsInMode = 4;
/** What an even grid resolves. Slower edges are carried on by the circuit. */
const delaysFollowed = stepsInWindow / stepsInDelay;
const shortestDelay = 1e-18;

/** Open terminations that a bridge draws from get the resistance that stands for it. */
function withoutBridges({ leftAcross, rightAcross, ...lines }: CoupledLines, bridges: readonly Bridge[]): CoupledLines {
  let plain: CoupledLines = lines;
  for (const { end, first, second } of bridges) for (const line of [first, second]) plain = currentAsVoltage(plain, drawn(end, line, 1, 1)).lines;
  return plain;
}

function drawn(end: 'left' | 'right', line: number, amplitude: number, duration: number): CurrentRamp {
  return { line, end, amplitude: amperes(amplitude), duration: seconds(duration) };
}

interface Followed {
  readonly ramp: Ramp;
  readonly window: Time;
  /** Even. */
  readonly steps: number;
}

function bridgedResponse(prepared: PreparedLines, bridges: readonly Bridge[], { ramp, window, steps }: Followed): LineResponse {
  const plain = prepared.response(ramp, window);
  const fine = corrections(prepared, bridges, plain, steps);
  const coarse = corrections(prepared, bridges, plain, steps / 2);
  const errors = plain.errorBar.map((bar, line) => volts(bar + Math.max(...places.map((place) => largestDifference(fine.rows[place][line], coarse.rows[place][line])))));
  const row = (place: (typeof places)[number]) => plain[place].map((waveform, line) => combinedWaveform([{ waveform, factor: 1 }, { waveform: { times: fine.times, values: fine.rows[place][line] }, factor: 1 }]));
  const [left, right] = [row('left'), row('right')];
  const beyond = (side: 'left' | 'right', atEnds: readonly Waveform[]) => {
    const place = `${side}Termination` as const;
    return plain[place] === plain[side] ? atEnds : row(place).map((waveform, line) => (prepared.lines[side][line].lead === null ? atEnds[line] : waveform));
  };
  return { ...plain, left, right, leftTermination: beyond('left', left), rightTermination: beyond('right', right), method: 'characteristics', errorBar: errors, work: plain.work + fine.work + coarse.work };
}

interface SlowRamp {
  readonly ramp: Ramp;
  readonly window: Time;
  readonly settled: number;
}

/** The echoes of an endless rise while they last, then the circuit: `slowEdge.ts`. */
function slowResponse(lines: CoupledLines, prepared: PreparedLines, bridges: readonly Bridge[], { ramp, window, settled }: SlowRamp): LineResponse {
  const rise: Ramp = { ...ramp, amplitude: volts(ramp.amplitude * ((2 * settled) / ramp.duration)), duration: seconds(2 * settled) };
  const echoes = bridgedResponse(prepared, bridges, { ramp: rise, window: seconds(settled), steps: stepsInWindow });
  const errors = echoes.errorBar.slice();
  const finished = (place: (typeof places)[number]) => {
    const side = place === 'left' || place === 'leftTermination' ? 0 : 1;
    const slow = slowEdgeWaveforms({ lines, ramp, window, settled }, echoes[place].map((waveform, line) => ({ side, line, waveform })));
    slow.forEach(({ error }, line) => (errors[line] = volts(errors[line] + error)));
    return slow.map(({ waveform }) => waveform);
  };
  const [left, right] = [finished('left'), finished('right')];
  const beyond = (side: 'left' | 'right', atEnds: readonly Waveform[]) => (echoes[`${side}Termination`] === echoes[side] ? atEnds : finished(`${side}Termination`).map((waveform, line) => (lines[side][line].lead === null ? atEnds[line] : waveform)));
  return { ...echoes, left, right, leftTermination: beyond('left', left), rightTermination: beyond('right', right), window, errorBar: errors };
}

interface Corrections {
  readonly times: Float64Array;
  readonly rows: Readonly<Record<(typeof places)[number], readonly Float64Array[]>>;
  readonly work: number;
}

/** What the bridges' currents add to every voltage. */
function corrections(prepared: PreparedLines, bridges: readonly Bridge[], plain: LineResponse, steps: number): Corrections {
  const step = plain.window / steps;
  const kernels = bridges.map((bridge) => kernelOf(prepared, bridge, step, steps));
  const changes = currentChanges(bridges, plain, kernels, step, steps);
  const rowsOf = (place: (typeof places)[number]) => plain[place].map((_, line) => {
    const values = new Float64Array(steps + 1);
    bridges.forEach((__, b) => addConvolution(values, changes[b], kernels[b].rows[place][line]));
    return values;
  });
  return {
    times: Float64Array.from({ length: steps + 1 }, (_, n) => n * step),
    rows: { left: rowsOf('left'), right: rowsOf('right'), leftTermination: rowsOf('leftTermination'), rightTermination: rowsOf('rightTermination') },
    work: steps + kernels.reduce((sum, { work }) => sum + work, 0),
  };
}

interface Kernel {
  readonly rows: Readonly<Record<(typeof places)[number], readonly Float64Array[]>>;
  readonly work: number;
}

/** All voltages, at every step, for a bridge's current that rises to one ampere within the first step. */
function kernelOf({ lines, response }: PreparedLines, { end, first, second }: Bridge, step: number, steps: number): Kernel {
  const window = seconds(step * steps);
  const taken = response(currentAsVoltage(lines, drawn(end, first, 1, step)).ramp, window);
  const given = response(currentAsVoltage(lines, drawn(end, second, -1, step)).ramp, window);
  const rowsOf = (place: (typeof places)[number]) => taken[place].map((waveform, line) => sampled(combinedWaveform([{ waveform, factor: 1 }, { waveform: given[place][line], factor: 1 }]), step, steps));
  return { rows: { left: rowsOf('left'), right: rowsOf('right'), leftTermination: rowsOf('leftTermination'), rightTermination: rowsOf('rightTermination') }, work: taken.work };
}

function sampled(waveform: Waveform, step: number, steps: number): Float64Array {
  return waveform.times.length === 0 ? new Float64Array(steps + 1) : Float64Array.from({ length: steps + 1 }, (_, n) => valueAt(waveform, seconds(n * step)));
}

/** Row a, n: by how much the current of bridge a changes from step n to n + 1. */
function currentChanges(bridges: readonly Bridge[], plain: LineResponse, kernels: readonly Kernel[], step: number, steps: number): readonly Float64Array[] {
  const count = bridges.length;
  const across = (rows: Kernel['rows'], { end, first, second }: Bridge) => rows[`${end}Termination`][first].map((value, n) => value - rows[`${end}Termination`][second][n]);
  const own = bridges.map(({ end, first, second }) => sampled(combinedWaveform([{ waveform: plain[`${end}Termination`][first], factor: 1 }, { waveform: plain[`${end}Termination`][second], factor: -1 }]), step, steps));
  const mutual = bridges.map((bridge) => kernels.map(({ rows }) => across(rows, bridge)));
  const companion = bridges.map(({ resistance, capacitance }) => 1 / resistance + (2 * capacitance) / step);
  const matrix = new Float64Array(count * count);
  for (let a = 0; a < count; a += 1) for (let b = 0; b < count; b += 1) matrix[a * count + b] = (a === b ? 1 : 0) - mutual[a][b][1] * companion[b];
  const exchanged = luFactor(matrix, count);
  if (exchanged === null) throw new Error(`the currents across ${count} pairs of ends have no answer`);
  const changes = bridges.map(() => new Float64Array(steps));
  const currents = new Float64Array(count);
  let before = new Float64Array(count);
  for (let n = 1; n <= steps; n += 1) {
    // i(n) = companion d(n) + memory, by the trapezoidal rule where there is a capacitance.
    const memory = bridges.map(({ resistance, capacitance }, a) => (capacitance === 0 ? 0 : (1 / resistance - (2 * capacitance) / step) * before[a] - currents[a]));
    const now = Float64Array.from(bridges, (_, a) => {
      let sum = own[a][n];
      for (let b = 0; b < count; b += 1) {
        sum += mutual[a][b][1] * (memory[b] - currents[b]);
        for (let m = 0; m < n - 1; m += 1) sum += changes[b][m] * mutual[a][b][n - m];
      }
      return sum;
    });
    luSolve(matrix, exchanged, now);
    for (let a = 0; a < count; a += 1) {
      const current = companion[a] * now[a] + memory[a];
      changes[a][n - 1] = current - currents[a];
      currents[a] = current;
    }
    before = now;
  }
  return changes;
}

function addConvolution(into: Float64Array, changes: Float64Array, kernel: Float64Array): void {
  for (let n = 1; n < into.length; n += 1) {
    let sum = 0;
    for (let m = 0; m < n; m += 1) sum += changes[m] * kernel[n - m];
    into[n] += sum;
  }
}

/** The coarser row has every second point. */
function largestDifference(fine: Float64Array, coarse: Float64Array): number {
  return coarse.reduce((largest, value, n) => Math.max(largest, Math.abs(value - fine[2 * n])), 0);
}
