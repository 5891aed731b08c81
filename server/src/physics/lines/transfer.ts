/**
 * What sources of one frequency put on coupled lines: complex voltages at both ends and at all terminations.
 *
 *   e -R-+--[ lead ]--|== coupled ==|--[ lead ]--+-R-        drives: a voltage behind a termination's resistance, or a
 *        C                                       C  v I      current that is drawn from a termination
 *
 * Model     `transferSystem.ts`; steady state, phasors of the drives' own kind (peak in, peak out; rms in, rms out)
 * Method    one complex linear system for each frequency
 * Formula   v(t) = Re(V exp(j omega t))
 * Source    Paul, Analysis of Multiconductor Transmission Lines, from memory
 * Range     any frequency, any R‖C end. Where no resistance damps a resonance the answer is infinite: such a frequency is
 *           answered a millionth beside, and `undamped` says so
 * Accuracy  `error`: the forward bound eps |M^-1| |M| |x|, with the phase's own rounding
 */
import type { Frequency, Voltage } from '../../units/quantity';
import { hertz, volts } from '../../units/quantity';
import { complexLuFactor, complexLuSolve, type ComplexNumbers } from '../../numeric/complexLu';
import type { CoupledLines } from './lines';
import { assemble, complexNumbers, transferSystem, type TransferSystem } from './transferSystem';

export interface Drive {
  readonly line: number;
  readonly end: 'left' | 'right';
  /** A voltage behind the termination's resistance, V; or a current drawn from the termination's node to the reference, A. */
  readonly kind: 'voltage' | 'current';
  /** Signed; all drives are in step. */
  readonly amplitude: number;
}

export type Place = 'left' | 'right' | 'leftTermination' | 'rightTermination';

/** Phasors of all lines; at the terminations the same numbers as at the ends where there is no lead. */
export interface LineTransfer extends Readonly<Record<Place, ComplexNumbers>> {
  /** Other than asked only where `undamped`. */
  readonly frequency: Frequency;
  /** Of any of the voltages, absolute. */
  readonly error: Voltage;
  /** At or within a millionth of a resonance that nothing damps: losses that are not in the model decide. */
  readonly undamped: boolean;
}

export function lineTransfer(lines: CoupledLines, drives: readonly Drive[], frequency: Frequency): LineTransfer {
  return prepareTransfer(lines).at(drives, frequency);
}

export interface PreparedTransfer {
  readonly order: number;
  readonly at: (drives: readonly Drive[], frequency: Frequency) => LineTransfer;
  readonly system: TransferSystem;
}

/** Modes once, for many frequencies. */
export function prepareTransfer(lines: CoupledLines): PreparedTransfer {
  const system = transferSystem(lines);
  return { order: system.network.order, system, at: (drives, frequency) => transferAt(system, drives, frequency) };
}

/** Share of the frequency: a resonance closer than that has a quality above 5e5, which no line on a board comes near. */
export const undampedWithin = 1e-6;
/** Over the slowest delay, rad/s: nothing on a board is slower. */
export const standstill = 1e-12;

function transferAt(system: TransferSystem, drives: readonly Drive[], frequency: Frequency): LineTransfer {
  checkDrives(system, drives, frequency);
  const { network: { modes } } = system;
  const slowest = modes.delays[modes.order - 1];
  const solved = solveAt(system, drives, 2 * Math.PI * frequency, 'checked');
  if (solved !== null && Math.max(undampedWithin * 2 * Math.PI * frequency, standstill / slowest) <= solved.clearance) {
    return { ...voltagesOf(system, solved.unknowns, 2 * Math.PI * frequency), frequency, error: volts(solved.error), undamped: false };
  }
  // Beside: at zero frequency, where a node floats, a millionth of the line's own.
  const beside = frequency + Math.max(undampedWithin * frequency, undampedWithin / slowest);
  const again = solveAt(system, drives, 2 * Math.PI * beside, 'checked');
  if (again === null) throw new Error(`no answer of ${modes.order} lines at ${frequency} Hz, nor beside`);
  return { ...voltagesOf(system, again.unknowns, 2 * Math.PI * beside), frequency: hertz(beside), error: volts(again.error), undamped: true };
}

export interface SolvedFrequency {
  readonly unknowns: ComplexNumbers;
  /** Their derivative by omega; null unless asked for. */
  readonly slopes: ComplexNumbers | null;
  /** No resonance lies nearer than about this in the complex plane of omega, rad/s. 0 unless asked for. */
  readonly clearance: number;
  /** 0 unless checked. */
  readonly error: number;
}

/** `plain`: the unknowns only; `cleared`: with the clearance; `sloped`, `checked`: with slopes, or the error, as well. Null where nothing is finite. */
export function solveAt(system: TransferSystem, drives: readonly Drive[], omega: number, effort: 'plain' | 'cleared' | 'sloped' | 'checked'): SolvedFrequency | null {
  const { network: { order }, matrix, slope } = system;
  const size = 2 * order;
  assemble(system, omega);
  const magnitudes = effort === 'checked' ? matrix.real.map((value, at) => Math.hypot(value, matrix.imaginary[at])) : null;
  const exchanged = complexLuFactor(matrix, size);
  if (exchanged === null) return null;
  const unknowns = complexNumbers(size);
  for (const { line, end, kind, amplitude } of drives) {
    const row = (end === 'left' ? 0 : order) + line;
    unknowns.real[row] += kind === 'voltage' ? amplitude * system.perVolt[row] : -amplitude * system.perAmpere[row];
  }
  const sources = unknowns.real.map(Math.abs);
  complexLuSolve(matrix, exchanged, unknowns);
  if (!unknowns.real.every(Number.isFinite) || !unknowns.imaginary.every(Number.isFinite)) return null;
  const clearance = effort === 'plain' ? 0 : clearanceOf(matrix, exchanged, slope);
  const slopes = effort === 'sloped' ? slopesOf(matrix, exchanged, slope, unknowns) : null;
  const error = magnitudes === null ? 0 : forwardError(system, { exchanged, magnitudes, sources, unknowns, omega });
  return { unknowns, slopes, clearance, error };
}

/**
 * M(w + d) = M(w) (1 + d M^-1 M' + ...) is regular while |d| < 1/|M^-1 M'|, up to terms of the order of the phase across d,
 * which is kept small by counting the delays themselves: no pole of the transfer can hide inside.
 */
function clearanceOf(factors: ComplexNumbers, exchanged: Int32Array, slope: ComplexNumbers): number {
  const size = exchanged.length;
  const columns = complexNumbers(size * size);
  for (let i = 0; i < size; i += 1) {
    for (let k = 0; k < size; k += 1) {
      columns.real[k * size + i] = slope.real[i * size + k];
      columns.imaginary[k * size + i] = slope.imaginary[i * size + k];
    }
  }
  complexLuSolve(factors, exchanged, columns, size);
  let sum = 0;
  for (let at = 0; at < size * size; at += 1) sum += columns.real[at] ** 2 + columns.imaginary[at] ** 2;
  return 0 < sum && sum < Infinity ? 1 / Math.sqrt(sum) : sum === 0 ? Infinity : 0;
}

/** M x = b, whose right side does not change within a row's scale: M x' = - M' x. */
function slopesOf(factors: ComplexNumbers, exchanged: Int32Array, slope: ComplexNumbers, { real, imaginary }: ComplexNumbers): ComplexNumbers {
  const size = exchanged.length;
  const sides = complexNumbers(size);
  for (let i = 0; i < size; i += 1) {
    for (let k = 0; k < size; k += 1) {
      const at = i * size + k;
      sides.real[i] -= slope.real[at] * real[k] - slope.imaginary[at] * imaginary[k];
      sides.imaginary[i] -= slope.real[at] * imaginary[k] + slope.imaginary[at] * real[k];
    }
  }
  complexLuSolve(factors, exchanged, sides);
  return sides;
}

interface Solved {
  readonly exchanged: Int32Array;
  readonly magnitudes: Float64Array;
  readonly sources: Float64Array;
  readonly unknowns: ComplexNumbers;
  readonly omega: number;
}

/** Largest error of a line's voltage: |Tv| |M^-1| eps (|M| |x| + |b|), with eps larger by the phase that is rounded. */
function forwardError({ network: { order, modes, ends }, matrix }: TransferSystem, { exchanged, magnitudes, sources, unknowns, omega }: Solved): number {
  const size = 2 * order;
  const longest = modes.delays[order - 1] + Math.max(...ends[0].leadDelay) + Math.max(...ends[1].leadDelay);
  const unit = 4 * Number.EPSILON * (1 + omega * longest);
  const x = unknowns.real.map((value, k) => Math.hypot(value, unknowns.imaginary[k]));
  const residual = sources.map((source, i) => x.reduce((sum, value, k) => sum + magnitudes[i * size + k] * value, source) * unit);
  const inverse = complexNumbers(size * size);
  for (let k = 0; k < size; k += 1) inverse.real[k * size + k] = 1;
  complexLuSolve(matrix, exchanged, inverse, size);
  const errors = new Float64Array(size);
  for (let j = 0; j < size; j += 1) {
    for (let k = 0; k < size; k += 1) errors[k] += Math.hypot(inverse.real[j * size + k], inverse.imaginary[j * size + k]) * residual[j];
  }
  let largest = 0;
  for (let i = 0; i < order; i += 1) {
    let sum = 0;
    for (let k = 0; k < order; k += 1) sum += Math.abs(modes.voltage[i * order + k]) * (errors[k] + errors[order + k] + unit * (x[k] + x[order + k]));
    largest = Math.max(largest, sum);
  }
  return largest;
}

/** v = Tv (c u ± j s w) at both ends; through the leads to the terminations. */
function voltagesOf({ network: { order, modes, ends } }: TransferSystem, { real, imaginary }: ComplexNumbers, omega: number): Readonly<Record<Place, ComplexNumbers>> {
  const places = [0, 1].map((side) => {
    const sign = side === 0 ? 1 : -1;
    const atEnd = complexNumbers(order);
    const atTermination = complexNumbers(order);
    for (let i = 0; i < order; i += 1) {
      let currentReal = 0;
      let currentImaginary = 0;
      for (let k = 0; k < order; k += 1) {
        const c = Math.cos((omega * modes.delays[k]) / 2);
        const s = Math.sin((omega * modes.delays[k]) / 2);
        const [u, uIm, w, wIm] = [real[k], imaginary[k], sign * real[order + k], sign * imaginary[order + k]];
        atEnd.real[i] += modes.voltage[i * order + k] * (c * u - s * wIm);
        atEnd.imaginary[i] += modes.voltage[i * order + k] * (c * uIm + s * w);
        currentReal += modes.current[i * order + k] * (c * w - s * uIm);
        currentImaginary += modes.current[i * order + k] * (c * wIm + s * u);
      }
      const angle = omega * ends[side].leadDelay[i];
      const transverse = ends[side].leadImpedance[i] * Math.sin(angle);
      atTermination.real[i] = Math.cos(angle) * atEnd.real[i] - transverse * currentImaginary;
      atTermination.imaginary[i] = Math.cos(angle) * atEnd.imaginary[i] + transverse * currentReal;
    }
    return { atEnd, atTermination };
  });
  return { left: places[0].atEnd, right: places[1].atEnd, leftTermination: places[0].atTermination, rightTermination: places[1].atTermination };
}

export function checkDrives({ network: { order } }: TransferSystem, drives: readonly Drive[], frequency: number): void {
  for (const { line, amplitude } of drives) {
    if (!(0 <= line && line < order) || !Number.isFinite(amplitude)) throw new Error(`a drive of ${amplitude} on line ${line} of ${order}`);
  }
  if (!(0 <= frequency && frequency < Infinity)) throw new Error(`a transfer at ${frequency} Hz`);
}
