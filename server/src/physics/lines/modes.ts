/**
 * The modes of coupled lossless lines: the waves that travel without disturbing one another.
 *
 *   v = Tv (p+ + p-)      i = Y (p+ - p-)      p+, p- travel right and left with delay tau_k
 *
 * Model     lossless quasi-TEM, uniform along the length
 * Method    one change of variables that makes L and C diagonal at once: Tv^T C Tv = 1, Tv^-1 L Ti = Lambda;
 *           tau_k = length sqrt(Lambda_k), Y = Ti / sqrt(Lambda)
 * Symbols   p in sqrt(J/m), so that p² is a mode's energy per length; Tv in V, Y in A for each unit of p
 * Source    Paul, Analysis of Multiconductor Transmission Lines, similarity transformations; Chang 1970; from memory
 * Range     L and C symmetric positive definite. Equal delays (homogeneous dielectric) leave the choice of modes open;
 *           any choice gives the same voltages
 * Accuracy  delays to 1e-14 of the slowest (closed form of two equal lines)
 */
import type { Length } from '../../units/quantity';
import { simultaneousDiagonal } from '../../numeric/simultaneousDiagonal';

export interface Modes {
  readonly order: number;
  /** Over the whole length, s, ascending. */
  readonly delays: Float64Array;
  /** Tv: row-major, column k belongs to mode k. */
  readonly voltage: Float64Array;
  /** Y: line currents of the modal waves that travel right, row-major. */
  readonly current: Float64Array;
}

export interface MatricesPerLength {
  readonly order: number;
  /** H/m, row-major. */
  readonly inductance: Float64Array;
  /** F/m, Maxwell form, row-major. */
  readonly capacitance: Float64Array;
}

export function modesOf({ order, inductance, capacitance }: MatricesPerLength, length: Length): Modes {
  const diagonal = simultaneousDiagonal(inductance, capacitance, order);
  if (diagonal === null) throw new Error(`capacitance matrix of ${order} lines is not positive definite: ${capacitance.join(' ')}`);
  const { values, left, right } = diagonal;
  if (!(0 < values[0])) throw new Error(`inductance matrix of ${order} lines is not positive definite: ${inductance.join(' ')}`);
  const current = Float64Array.from(right, (value, at) => value / Math.sqrt(values[at % order]));
  return { order, delays: values.map((value) => length * Math.sqrt(value)), voltage: left, current };
}
