/**
 * Readings of coupled lines at the harmonics of what repeats.
 *
 *   f0 2f0 3f0 ...           Method    where resonances are further away than a few harmonics, unknowns and their slopes are
 *   x...x.......x.....x                computed at some harmonics (x), and those between by the cubic through both
 *
 * Model     `transfer.ts`
 * Source    Hermite interpolation, textbook: a pole at a distance D is off by (h/D)^4 / 16 of its height over a step h
 * Range     any. Work: frequencies solved for, at most one for each harmonic
 * Accuracy  2e-5 of the largest voltage around, where interpolated; exact at harmonics that are computed
 */
import { hertz, type Frequency } from '../../units/quantity';
import type { ComplexNumbers } from '../../numeric/complexLu';
import { phasorsOf, phasorsRead, type Reading } from './reading';
import { checkDrives, solveAt, undampedWithin, type Drive, type PreparedTransfer } from './transfer';
import { complexNumbers } from './transferSystem';

export interface HarmonicNumbers {
  readonly fundamental: Frequency;
  readonly first: number;
  readonly last: number;
}

export interface HarmonicTransfer {
  readonly first: number;
  /** Of each reading, at index n - first. */
  readonly phasors: readonly ComplexNumbers[];
  readonly magnitudes: readonly Float64Array[];
  /** A harmonic is within a millionth of a resonance that nothing damps. */
  readonly undamped: boolean;
  readonly work: number;
}

export function transferAtHarmonics(prepared: PreparedTransfer, drives: readonly Drive[], { fundamental, first, last }: HarmonicNumbers, readings: readonly Reading[]): HarmonicTransfer {
  const { system } = prepared;
  checkDrives(system, drives, Math.max(0, last) * fundamental);
  const unit = 2 * Math.PI * fundamental;
  const phasors = readings.map(() => complexNumbers(Math.max(0, last - first + 1)));
  const tell = (n: number, { real, imaginary }: ComplexNumbers) => phasors.forEach((phasor, at) => {
    phasor.real[n - first] = real[at];
    phasor.imaginary[n - first] = imaginary[at];
  });
  let undamped = false;
  let work = 0;
  let before: Node | null = null;
  for (let n = first; n <= last; ) {
    const node = nodeAt(prepared, drives, n * unit);
    work += 1;
    if (node === null) {
      undamped = true;
      tell(n, phasorsOf(readings, prepared.at(drives, hertz(n * fundamental))));
    } else {
      tell(n, phasorsRead(system, readings, node.unknowns, node.omega));
      if (before !== null) {
        const from = Math.round(before.omega / unit);
        for (let between = from + 1; between < n; between += 1) tell(between, phasorsRead(system, readings, hermite(before, node, between * unit), between * unit));
      }
    }
    before = node;
    if (n === last) break;
    n = Math.min(last, n + Math.max(1, Math.floor((joined * (node?.clearance ?? 0)) / unit)));
  }
  const magnitudes = phasors.map(({ real, imaginary }) => real.map((value, at) => Math.hypot(value, imaginary[at])));
  return { first, phasors, magnitudes, undamped, work };
}

/** Share of the clearance that one cubic bridges. */
const joined = 1 / 8;

interface Node {
  readonly omega: number;
  readonly unknowns: ComplexNumbers;
  readonly slopes: ComplexNumbers;
  readonly clearance: number;
}

/** Null at a resonance that nothing damps. */
function nodeAt({ system }: PreparedTransfer, drives: readonly Drive[], omega: number): Node | null {
  const { modes, order } = system.network;
  const solved = solveAt(system, drives, omega, 'sloped');
  if (solved === null || solved.clearance < undampedWithin * omega) return null;
  return { omega, unknowns: solved.unknowns, slopes: solved.slopes!, clearance: Math.min(solved.clearance, 1 / modes.delays[order - 1]) };
}

function hermite(one: Node, other: Node, omega: number): ComplexNumbers {
  const step = other.omega - one.omega;
  const t = (omega - one.omega) / step;
  const values = complexNumbers(one.unknowns.real.length);
  for (const part of ['real', 'imaginary'] as const) {
    for (let k = 0; k < values.real.length; k += 1) {
      const rise = other.unknowns[part][k] - one.unknowns[part][k];
      const startBend = one.slopes[part][k] * step - rise;
      const endBend = rise - other.slopes[part][k] * step;
      values[part][k] = one.unknowns[part][k] + t * (rise + (1 - t) * ((1 - t) * startBend + t * endBend));
    }
  }
  return values;
}
