/**
 * The largest voltage that sources of one magnitude cause anywhere in a range of frequencies, at every place of coupled lines.
 *
 *   |V|      /\                 Method    a march whose step is half the distance to the nearest resonance, as far as
 *        ___/  \___/\____                 `transfer.ts` can tell, so that none hides between two steps however sharp or weak
 *      ..........|||...||..  f            it is; then each place's largest step, and all that come near it, by golden section
 *
 * Range     0 <= from <= to. Steps end at a millionth of the frequency, where `undamped` is said, and at the work allowed,
 *           beyond which they are evenly spread and `resolved` is false
 * Accuracy  1e-6 of each magnitude, where resolved (measured against a brute-force scan in the test)
 */
import { hertz, volts, type Frequency, type Voltage } from '../../units/quantity';
import type { CoupledLines } from './lines';
import { magnitudesRead, type Reading } from './reading';
import { checkDrives, prepareTransfer, solveAt, standstill, undampedWithin, type Drive, type Place, type PreparedTransfer } from './transfer';

export interface FrequencyRange {
  readonly from: Frequency;
  readonly to: Frequency;
  /** What a receiver's filter leaves of each frequency: smooth over octaves. */
  readonly weight?: (frequency: Frequency) => number;
}

export interface WorstTransfer {
  /** In the order of the readings. */
  readonly readings: readonly WorstReading[];
  /** Somewhere in the range nothing damps a resonance: losses that are not in the model decide. */
  readonly undamped: boolean;
  /** The work allowed was enough to leave no resonance out. */
  readonly resolved: boolean;
  /** Frequencies solved for. */
  readonly work: number;
}

export interface WorstReading {
  readonly magnitude: Voltage;
  readonly frequency: Frequency;
}

export function worstTransfer(lines: CoupledLines | PreparedTransfer, drives: readonly Drive[], range: FrequencyRange, readings: readonly Reading[] = everyPlace(lines.order)): WorstTransfer {
  const prepared = 'system' in lines ? lines : prepareTransfer(lines);
  checkDrives(prepared.system, drives, range.from);
  checkDrives(prepared.system, drives, range.to);
  if (range.to < range.from) throw new Error(`a range from ${range.from} Hz down to ${range.to} Hz`);
  const march = marched(prepared, drives, range, readings);
  let work = march.work;
  const worst = readings.map((_, at) => {
    const found = refined(march, at, (omega) => {
      work += 1;
      const solved = solveAt(prepared.system, drives, omega, 'plain');
      return solved === null ? 0 : weightOf(range, omega) * magnitudesRead(prepared.system, [readings[at]], solved.unknowns, omega)[0];
    });
    return { magnitude: volts(found.magnitude), frequency: hertz(found.omega / (2 * Math.PI)) };
  });
  return { readings: worst, undamped: march.undamped, resolved: march.resolved, work };
}

/** Every line at every place: left ends, right ends, left terminations, right terminations. */
export function everyPlace(order: number): readonly Reading[] {
  const places: readonly Place[] = ['left', 'right', 'leftTermination', 'rightTermination'];
  return places.flatMap((place) => Array.from({ length: order }, (_, line) => [{ line, place, factor: 1 }]));
}

interface March {
  readonly omegas: readonly number[];
  /** Of each step, of each reading. */
  readonly magnitudes: readonly Float64Array[];
  readonly undamped: boolean;
  readonly resolved: boolean;
  readonly work: number;
}

/** Share of the distance to the nearest resonance. */
const stride = 0.5;
/** Of the slowest mode's and the leads' delays together, rad: where there is no resonance at all. */
const longestStride = 0.25;
/** Equations cubed times frequencies: what one answer may cost, about a second. */
const mostWork = 2.5e8;
const mostSteps = 20_000;
/** Of the range's end: below it a weight counts as one step. */
const weightFrom = 1e-9;

function weightOf({ weight }: FrequencyRange, omega: number): number {
  return weight === undefined ? 1 : weight(hertz(omega / (2 * Math.PI)));
}

function marched(prepared: PreparedTransfer, drives: readonly Drive[], range: FrequencyRange, readings: readonly Reading[]): March {
  const { system } = prepared;
  const { order, modes, ends } = system.network;
  const longest = modes.delays[order - 1] + Math.max(...ends[0].leadDelay) + Math.max(...ends[1].leadDelay);
  const [from, to] = [2 * Math.PI * range.from, 2 * Math.PI * range.to];
  const allowed = Math.min(mostSteps, Math.ceil(mostWork / (2 * order) ** 3));
  const omegas: number[] = [];
  const magnitudes: Float64Array[] = [];
  let undamped = false;
  let resolved = true;
  let work = 0;
  for (let omega = from; ; ) {
    const solved = solveAt(system, drives, omega, 'cleared');
    work += 1;
    const shortest = Math.max(undampedWithin * omega, standstill / longest);
    const clearance = solved?.clearance ?? 0;
    if (clearance < shortest) undamped = true;
    else {
      omegas.push(omega);
      magnitudes.push(magnitudesRead(system, readings, solved!.unknowns, omega).map((magnitude) => weightOf(range, omega) * magnitude));
    }
    if (to <= omega) break;
    const smooth = range.weight === undefined ? Infinity : Math.max(stride * omega, weightFrom * to);
    const wanted = Math.max(shortest, Math.min(stride * clearance, longestStride / longest, smooth));
    // Half the work follows every resonance; the rest must reach the end.
    const spread = (to - omega) / Math.max(1, allowed - work);
    if (allowed / 2 < work && wanted < spread) resolved = false;
    omega = Math.min(to, omega + (allowed / 2 < work ? Math.max(wanted, spread) : wanted));
  }
  return { omegas, magnitudes, undamped, resolved, work };
}

/** Steps near a resonance are half its width: a maximum between two of them stands at most this much above both. */
const hiddenRise = 1.5;
const mostRefined = 8;

function refined({ omegas, magnitudes }: March, reading: number, magnitude: (omega: number) => number): { readonly omega: number; readonly magnitude: number } {
  let best = { omega: omegas[0] ?? 0, magnitude: 0 };
  const maxima: number[] = [];
  for (let at = 0; at < omegas.length; at += 1) {
    const own = magnitudes[at][reading];
    if (best.magnitude < own) best = { omega: omegas[at], magnitude: own };
    const rises = at === 0 || magnitudes[at - 1][reading] <= own;
    const falls = at === omegas.length - 1 || magnitudes[at + 1][reading] <= own;
    if (rises && falls) maxima.push(at);
  }
  const near = maxima.filter((at) => best.magnitude <= hiddenRise * magnitudes[at][reading]).sort((a, b) => magnitudes[b][reading] - magnitudes[a][reading]);
  for (const at of near.slice(0, mostRefined)) {
    const found = highest(magnitude, omegas[Math.max(0, at - 1)], omegas[Math.min(omegas.length - 1, at + 1)]);
    if (best.magnitude < found.magnitude) best = found;
  }
  return best;
}

/** Golden section. A maximum is flat: a thousandth of the bracket is a millionth of its height. */
function highest(magnitude: (omega: number) => number, from: number, to: number): { readonly omega: number; readonly magnitude: number } {
  const golden = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from, to];
  let one = high - golden * (high - low);
  let other = low + golden * (high - low);
  let [atOne, atOther] = [magnitude(one), magnitude(other)];
  for (let n = 0; n < 18 && low < high; n += 1) {
    if (atOne < atOther) {
      low = one;
      [one, atOne] = [other, atOther];
      other = low + golden * (high - low);
      atOther = magnitude(other);
    } else {
      high = other;
      [other, atOther] = [one, atOne];
      one = high - golden * (high - low);
      atOne = magnitude(one);
    }
  }
  return atOne < atOther ? { omega: other, magnitude: atOther } : { omega: one, magnitude: atOne };
}
