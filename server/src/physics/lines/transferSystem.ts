/**
 * Coupled lines at one frequency as a system of linear equations for what every mode does at the middle of the lines.
 *
 *   |<------- theta ------->|      u, w   voltage and current of mode k at the middle, in modal units
 *   left       u,w      right      left   v = Tv (c u + j s w),   i =   Y (c w + j s u)
 *   |-----------|-----------|      right  v = Tv (c u - j s w),   i = - Y (c w - j s u)      currents into the line
 *
 * Model     lossless coupled lines; terminations R and C, with R and C across pairs of them; leads as lines
 * Method    each termination is a row  sum_j alpha_ij v_j + beta_i i_i = source,  carried through the lead by its chain matrix.
 *           Everything is an entire function of the frequency: no resonance of a line or a lead divides by zero. At the middle
 *           what charges a line (u) and what flows through it (w) stay apart at low frequencies, where waves would cancel
 * Symbols   theta = omega tau_k, c = cos(theta/2), s = sin(theta/2); Tv, Y, tau_k of `modes.ts`
 * Source    Paul, Analysis of Multiconductor Transmission Lines, chain parameters and modes, from memory; the unknowns at the
 *           middle are this project's own
 * Range     0 <= omega; R from 0 to Infinity. An `across` below a millionth of the lines' impedance counts as that millionth
 */
import type { ComplexNumbers } from '../../numeric/complexLu';
import type { Across, CoupledLines } from './lines';
import { lineNetwork, type LineNetwork } from './network';

export interface TransferSystem {
  readonly network: LineNetwork;
  readonly across: readonly [readonly AcrossEnd[], readonly AcrossEnd[]];
  /** Of 2 `order` equations: rows left then right, columns u then w. Overwritten by each assembly. */
  readonly matrix: ComplexNumbers;
  /** Derivative of the matrix by omega, rows scaled alike. */
  readonly slope: ComplexNumbers;
  /** Of every termination (left, then right): what a source of one volt and a current of one ampere put into its row. */
  readonly perVolt: Float64Array;
  readonly perAmpere: Float64Array;
  readonly rows: EndRows;
}

interface AcrossEnd {
  readonly first: number;
  readonly second: number;
  readonly conductance: number;
  readonly capacitance: number;
}

/** Rows of one end: A v + B i = source, with their derivatives; `order` squared numbers each. */
interface EndRows {
  readonly a: ComplexNumbers;
  readonly b: ComplexNumbers;
  readonly aSlope: ComplexNumbers;
  readonly bSlope: ComplexNumbers;
}

export function transferSystem(lines: CoupledLines): TransferSystem {
  const network = lineNetwork(lines);
  const { order } = network;
  return {
    network,
    across: [acrossEnds(network, lines.leftAcross ?? []), acrossEnds(network, lines.rightAcross ?? [])],
    matrix: complexNumbers(4 * order * order),
    slope: complexNumbers(4 * order * order),
    perVolt: new Float64Array(2 * order),
    perAmpere: new Float64Array(2 * order),
    rows: { a: complexNumbers(order * order), b: complexNumbers(order * order), aSlope: complexNumbers(order * order), bSlope: complexNumbers(order * order) },
  };
}

/** Fills matrix, slope and sources for the angular frequency. */
export function assemble(system: TransferSystem, omega: number): void {
  for (const side of [0, 1] as const) {
    fillEndRows(system, omega, side);
    combineWithModes(system, omega, side);
  }
}

export function complexNumbers(count: number): ComplexNumbers {
  return { real: new Float64Array(count), imaginary: new Float64Array(count) };
}

const leastAcross = 1e-6;

function acrossEnds({ order, impedance }: LineNetwork, across: readonly Across[]): AcrossEnd[] {
  return across.map(({ first, second, resistance, capacitance }) => {
    if (!(0 <= first && first < order && 0 <= second && second < order) || first === second || !(0 <= resistance) || !(0 <= capacitance)) {
      throw new Error(`${resistance} ohm and ${capacitance} F across lines ${first} and ${second} of ${order}`);
    }
    return { first, second, conductance: 1 / Math.max(resistance, leastAcross * Math.min(impedance[first], impedance[second])), capacitance };
  });
}

function fillEndRows({ network, across, rows, perVolt, perAmpere }: TransferSystem, omega: number, side: 0 | 1): void {
  const { order } = network;
  const ends = network.ends[side];
  for (const { real, imaginary } of Object.values(rows) as ComplexNumbers[]) {
    real.fill(0);
    imaginary.fill(0);
  }
  for (let i = 0; i < order; i += 1) {
    const beside = across[side].filter(({ first, second }) => first === i || second === i);
    const held = ends.resistance[i] === 0;
    let conductance = held ? 1 : 1 / ends.resistance[i];
    let charge = held ? 0 : ends.capacitance[i];
    if (!held) {
      for (const one of beside) {
        conductance += one.conductance;
        charge += one.capacitance;
      }
    }
    // Rows near one whatever the end: an ideal source's row is its voltage itself.
    const scale = held ? 1 : 1 / (conductance + omega * charge + 1 / ends.seen[i]);
    perVolt[side * order + i] = held ? 1 : scale / ends.resistance[i];
    perAmpere[side * order + i] = held ? 0 : scale;
    addTermination(network, side, rows, { omega, row: i, column: i, real: conductance * scale, slope: charge * scale, beta: held ? 0 : scale });
    if (held) continue;
    for (const one of beside) {
      const column = one.first === i ? one.second : one.first;
      addTermination(network, side, rows, { omega, row: i, column, real: -one.conductance * scale, slope: -one.capacitance * scale, beta: 0 });
    }
  }
}

interface TerminationEntry {
  readonly omega: number;
  readonly row: number;
  readonly column: number;
  /** alpha = real + j omega slope */
  readonly real: number;
  readonly slope: number;
  readonly beta: number;
}

/** Carries alpha u + beta i from the termination to the line's end: u = cos v + j Z sin i, i there = j sin / Z v + cos i. */
function addTermination(network: LineNetwork, side: 0 | 1, { a, b, aSlope, bSlope }: EndRows, { omega, row, column, real, slope, beta }: TerminationEntry): void {
  const at = row * network.order + column;
  const imaginary = omega * slope;
  const delay = network.ends[side].leadDelay[column];
  if (delay === 0) {
    a.real[at] += real;
    a.imaginary[at] += imaginary;
    aSlope.imaginary[at] += slope;
    b.real[at] += beta;
    return;
  }
  const impedance = network.ends[side].leadImpedance[column];
  const cosine = Math.cos(omega * delay);
  const sine = Math.sin(omega * delay);
  a.real[at] += real * cosine;
  a.imaginary[at] += imaginary * cosine + (beta * sine) / impedance;
  b.real[at] += beta * cosine - imaginary * impedance * sine;
  b.imaginary[at] += real * impedance * sine;
  aSlope.real[at] -= real * delay * sine;
  aSlope.imaginary[at] += slope * cosine - imaginary * delay * sine + (beta * delay * cosine) / impedance;
  bSlope.real[at] -= beta * delay * sine + slope * impedance * sine + imaginary * impedance * delay * cosine;
  bSlope.imaginary[at] += real * impedance * delay * cosine;
}

/** M = A Tv [c, ± j s] + B Y [j s, ± c] and its derivative by omega. */
function combineWithModes({ network, matrix, slope, rows: { a, b, aSlope, bSlope } }: TransferSystem, omega: number, side: 0 | 1): void {
  const { order, modes: { voltage, current, delays } } = network;
  const sign = side === 0 ? 1 : -1;
  for (let i = 0; i < order; i += 1) {
    for (let k = 0; k < order; k += 1) {
      const va = product(a, voltage, order, i, k);
      const ib = product(b, current, order, i, k);
      const vaSlope = product(aSlope, voltage, order, i, k);
      const ibSlope = product(bSlope, current, order, i, k);
      const half = delays[k] / 2;
      const c = Math.cos(omega * half);
      const s = Math.sin(omega * half);
      const u = (side * order + i) * 2 * order + k;
      const w = u + order;
      matrix.real[u] = va.real * c - ib.imaginary * s;
      matrix.imaginary[u] = va.imaginary * c + ib.real * s;
      matrix.real[w] = sign * (ib.real * c - va.imaginary * s);
      matrix.imaginary[w] = sign * (ib.imaginary * c + va.real * s);
      slope.real[u] = vaSlope.real * c - ibSlope.imaginary * s - half * (va.real * s + ib.imaginary * c);
      slope.imaginary[u] = vaSlope.imaginary * c + ibSlope.real * s - half * (va.imaginary * s - ib.real * c);
      slope.real[w] = sign * (ibSlope.real * c - vaSlope.imaginary * s - half * (ib.real * s + va.imaginary * c));
      slope.imaginary[w] = sign * (ibSlope.imaginary * c + vaSlope.real * s - half * (ib.imaginary * s - va.real * c));
    }
  }
}

/** Entry of a complex matrix, of which most entries are zero, times a real one. */
function product({ real, imaginary }: ComplexNumbers, other: Float64Array, order: number, i: number, k: number): { readonly real: number; readonly imaginary: number } {
  let re = 0;
  let im = 0;
  for (let j = 0; j < order; j += 1) {
    re += real[i * order + j] * other[j * order + k];
    im += imaginary[i * order + j] * other[j * order + k];
  }
  return { real: re, imaginary: im };
}
