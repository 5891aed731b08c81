/**
 * Coupled lines with R and C ends, step by step: the voltages at all ends on an even grid of times, for a source that
 * rises with unit slope.
 *
 *   p(n) = smooth(n - tau/dt) + kinks(n dt - tau)       what arrives: the smooth part interpolated, the kinks exact
 *
 * Model     lossless coupled lines, leads as lines of their own; see `network.ts` for the ends
 * Method    method of characteristics on modal waves, trapezoidal companions for the capacitors. Modal delays are no whole
 *           number of steps, and interpolating a wave across a kink costs O(dt): the kinks are known exactly from the lattice, so
 *           only the rest is interpolated (cubic), which has a continuous slope. Leads shorter than a step are
 *           interpolated between the last value and the one being computed, and eliminated
 * Source    Branin 1967; Dommel 1969; trapezoidal rule and Lagrange interpolation, textbook. Taking the kinks out first is
 *           this project's own
 * Range     step at most half the fastest mode's delay
 * Accuracy  second order in the step: halving it removes three quarters of the error (test/physics/lines/characteristics)
 */
import { endEquation, type LineNetwork } from './network';
import type { Kinks, Lattice, LatticeRequest } from './lattice';
import { sampleKinks } from './sampledKinks';
import { scatteringOf } from './scattering';

export interface Grid {
  readonly step: number;
  readonly steps: number;
}

/** Rows of `steps` + 1 voltages, one for each line. */
export interface GridVoltages {
  readonly ends: readonly [Float64Array, Float64Array];
  /** Only the rows of lines with a lead hold anything. */
  readonly terminations: readonly [Float64Array, Float64Array];
}

export function gridVoltages(network: LineNetwork, lattice: Lattice, request: Pick<LatticeRequest, 'source' | 'shorted'>, grid: Grid): GridVoltages {
  const { order } = network;
  const sides = [marchedSide(network, lattice, request, grid, 0), marchedSide(network, lattice, request, grid, 1)] as const;
  const delays = network.modes.delays.map((delay) => delay / grid.step);
  const taps = Array.from(delays, tapsOf);
  for (let n = 0; n <= grid.steps; n += 1) {
    for (let k = 0; k < order; k += 1) {
      const at = k * (grid.steps + 1) + n;
      sides[0].arriving[k] = sides[0].kinksIn[at] + delayed(sides[1].smoothOut, k * sides[1].stride, n, taps[k]);
      sides[1].arriving[k] = sides[1].kinksIn[at] + delayed(sides[0].smoothOut, k * sides[0].stride, n, taps[k]);
    }
    advance(network, sides[0], n, grid);
    advance(network, sides[1], n, grid);
  }
  return { ends: [sides[0].voltages, sides[1].voltages], terminations: [sides[0].atTerminations, sides[1].atTerminations] };
}

/** One end of all lines while the march goes on. Rows by mode or line; `stride` is the length of a padded row. */
interface MarchedSide {
  readonly reflect: Float64Array;
  readonly admit: Float64Array;
  readonly kinksIn: Float64Array;
  readonly kinksOut: Float64Array;
  readonly smoothOut: Float64Array;
  readonly stride: number;
  readonly voltages: Float64Array;
  readonly atTerminations: Float64Array;
  /** Lines whose end's equation has a right side at all. */
  readonly active: readonly ActiveEnd[];
  readonly activeLines: Int32Array;
  /** The active ends' right sides at this step. */
  readonly drives: Float64Array;
  readonly arriving: Float64Array;
  readonly leaving: Float64Array;
}

interface ActiveEnd {
  readonly line: number;
  /** Of the termination: what one volt of source and of memory put into its equation. */
  readonly source: number;
  readonly history: number;
  readonly conductance: number;
  /** What the capacitor remembers. */
  memory: number;
  /** What a kink of its current inside a step adds to that: `kinkCharge`. */
  readonly charge: Float64Array;
  readonly lead: MarchedLead | null;
}

/** A lead; x runs from the termination to the lines, y back. */
interface MarchedLead {
  readonly taps: Taps;
  /** Shorter than a step: `fraction` of a step long. */
  readonly short: boolean;
  readonly fraction: number;
  /** Of the termination: reflection, and what its right side launches. */
  readonly bounce: number;
  readonly gain: number;
  readonly smoothX: Float64Array;
  readonly smoothY: Float64Array;
  readonly kinksXIn: Float64Array;
  readonly kinksXOut: Float64Array;
  readonly kinksYIn: Float64Array;
  readonly kinksYOut: Float64Array;
  /** x as it arrives = known + feedback times the y that leaves at the same moment. */
  known: number;
  readonly feedback: number;
  launched: number;
}

function marchedSide(network: LineNetwork, lattice: Lattice, { source, shorted }: Pick<LatticeRequest, 'source' | 'shorted'>, grid: Grid, side: 0 | 1): MarchedSide {
  const { order, modes } = network;
  const { steps, step } = grid;
  const ends = network.ends[side];
  const alpha = new Float64Array(order);
  const beta = new Float64Array(order);
  const active: ActiveEnd[] = [];
  for (let line = 0; line < order; line += 1) {
    // An ideal source holds its voltage whatever is across it.
    const conductance = ends.resistance[line] === 0 ? 0 : companionOf(ends.capacitance[line], step);
    const own = endEquation(ends.resistance[line], conductance, ends.seen[line]);
    const driven = source.line === line && source.end === (side === 0 ? 'left' : 'right');
    const lead = ends.leadDelay[line] === 0 ? null : marchedLead(network, lattice, grid, side, line, own);
    alpha[line] = lead === null ? own.alpha : 1 - lead.feedback;
    beta[line] = lead === null ? own.beta : ends.leadImpedance[line] * (1 + lead.feedback);
    const remembers = 0 < conductance && conductance < Infinity;
    if (lead !== null || driven || remembers) {
      active.push({
        line, source: driven ? own.source : 0, history: remembers ? own.history : 0, conductance: remembers ? conductance : 0,
        memory: 0, lead,
        // A capacitor too small to be a short circuit to a kink leaves its current to the resistor.
        charge: shorted[side][line] === 1 ? kinkCharge((lead === null ? lattice.ends : lattice.terminations)[side], order, line, grid) : new Float64Array(steps + 1),
      });
    }
  }
  const stride = steps + 1 + padding;
  const kinksIn = new Float64Array(order * (steps + 1));
  const kinksOut = new Float64Array(order * (steps + 1));
  const here = lattice.ends[side];
  const there = lattice.ends[side === 0 ? 1 : 0];
  for (let k = 0; k < order; k += 1) {
    sampleKinks({ ...there, rows: there.leaving, order, column: k, delay: modes.delays[k] }, step, kinksIn, k * (steps + 1), steps);
    sampleKinks({ ...here, rows: here.leaving, order, column: k, delay: 0 }, step, kinksOut, k * (steps + 1), steps);
  }
  return {
    ...scatteringOf(modes, alpha, beta),
    kinksIn,
    kinksOut,
    smoothOut: new Float64Array(order * stride),
    stride,
    voltages: new Float64Array(order * (steps + 1)),
    atTerminations: new Float64Array(active.some(({ lead }) => lead !== null) ? order * (steps + 1) : 0),
    active,
    activeLines: Int32Array.from(active, ({ line }) => line),
    drives: new Float64Array(active.length),
    arriving: new Float64Array(order),
    leaving: new Float64Array(order),
  };
}

/**
 * The trapezoidal rule takes the capacitor's current as straight across each step. Where it kinks at a share u of the
 * step, by g, the charge is g u (1 - u) dt²/2 less than that: known exactly, and as a memory of the capacitor g u (1 - u) dt.
 */
function kinkCharge({ count, times, current }: Kinks, order: number, line: number, { step, steps }: Grid): Float64Array {
  const charge = new Float64Array(steps + 1);
  for (let e = 0; e < count; e += 1) {
    const n = Math.ceil(times[e] / step);
    if (steps < n) break;
    const share = times[e] / step - (n - 1);
    // What flows into the line is taken from the capacitor.
    charge[n] += current[e * order + line] * share * (1 - share) * step;
  }
  return charge;
}

/** 2C/dt; what could only overflow is a short circuit. */
function companionOf(capacitance: number, step: number): number {
  const conductance = (2 * capacitance) / step;
  return conductance < 1e30 ? conductance : Infinity;
}

function marchedLead(network: LineNetwork, lattice: Lattice, { step, steps }: Grid, side: 0 | 1, line: number, own: { readonly alpha: number; readonly beta: number }): MarchedLead {
  const { order } = network;
  const impedance = network.ends[side].leadImpedance[line];
  const delay = network.ends[side].leadDelay[line];
  const sampled = (kinks: Kinks, rows: Float64Array, shift: number) => {
    const values = new Float64Array(steps + 1);
    sampleKinks({ ...kinks, rows, order, column: line, delay: shift }, step, values, 0, steps);
    return values;
  };
  const end = lattice.ends[side];
  const termination = lattice.terminations[side];
  const bounce = (own.beta - own.alpha * impedance) / (own.beta + own.alpha * impedance);
  const short = delay < step;
  const fraction = delay / step;
  return {
    taps: tapsOf(fraction),
    short,
    fraction,
    bounce,
    gain: impedance / (own.beta + own.alpha * impedance),
    smoothX: new Float64Array(steps + 1 + padding),
    smoothY: new Float64Array(steps + 1 + padding),
    kinksXIn: sampled(termination, termination.leaving, delay),
    kinksXOut: sampled(termination, termination.leaving, 0),
    kinksYIn: sampled(end, end.leavingToLeads, delay),
    kinksYOut: sampled(end, end.leavingToLeads, 0),
    known: 0,
    feedback: short ? (1 - fraction) ** 2 * bounce : 0,
    launched: 0,
  };
}

function advance({ order, modes: { voltage } }: LineNetwork, side: MarchedSide, n: number, { step, steps }: Grid): void {
  const { reflect, admit, active, activeLines, drives, arriving, leaving, voltages, kinksOut, smoothOut, stride } = side;
  for (let a = 0; a < active.length; a += 1) {
    const end = active[a];
    const rightSide = end.source * n * step + end.history * (end.memory + end.charge[n]);
    drives[a] = end.lead === null ? rightSide : 2 * foreseen(end.lead, rightSide, n);
  }
  for (let k = 0; k < order; k += 1) {
    const row = k * order;
    let sum = 0;
    for (let j = 0; j < order; j += 1) sum += reflect[row + j] * arriving[j];
    for (let a = 0; a < activeLines.length; a += 1) sum += admit[row + activeLines[a]] * drives[a];
    leaving[k] = sum;
    smoothOut[k * stride + padding + n] = sum - kinksOut[k * (steps + 1) + n];
  }
  for (let k = 0; k < order; k += 1) arriving[k] += leaving[k];
  for (let i = 0; i < order; i += 1) {
    const row = i * order;
    let sum = 0;
    for (let k = 0; k < order; k += 1) sum += voltage[row + k] * arriving[k];
    voltages[i * (steps + 1) + n] = sum;
  }
  for (let a = 0; a < active.length; a += 1) {
    const end = active[a];
    const at = end.line * (steps + 1) + n;
    let across = voltages[at];
    if (end.lead !== null) side.atTerminations[at] = across = settle(end.lead, across, n);
    end.memory = 2 * end.conductance * across - end.memory - end.charge[n];
  }
}

/** What arrives from the lead, as far as it does not depend on what leaves at the same moment. */
function foreseen(lead: MarchedLead, rightSide: number, n: number): number {
  lead.launched = lead.gain * rightSide;
  if (!lead.short) {
    lead.known = lead.kinksXIn[n] + delayed(lead.smoothX, 0, n, lead.taps);
    return lead.known;
  }
  const now = 1 - lead.fraction;
  const last = padding + n - 1;
  const arrivesBack = lead.kinksYIn[n] + lead.fraction * lead.smoothY[last] - now * lead.kinksYOut[n];
  lead.known = lead.kinksXIn[n] + lead.fraction * lead.smoothX[last] + now * (lead.bounce * arrivesBack + lead.launched - lead.kinksXOut[n]);
  return lead.known;
}

/** With the voltage at the line's end known: the waves in the lead, and the voltage across its termination. */
function settle(lead: MarchedLead, across: number, n: number): number {
  const y = (across - lead.known) / (1 + lead.feedback);
  lead.smoothY[padding + n] = y - lead.kinksYOut[n];
  const back = lead.short
    ? lead.fraction * lead.smoothY[padding + n - 1] + (1 - lead.fraction) * lead.smoothY[padding + n]
    : delayed(lead.smoothY, 0, n, lead.taps);
  const yArriving = lead.kinksYIn[n] + back;
  const x = lead.bounce * yArriving + lead.launched;
  lead.smoothX[padding + n] = x - lead.kinksXOut[n];
  return x + yArriving;
}

/** Weights of the values `whole` - 1, `whole`, `whole` + 1 and `whole` + 2 steps ago. */
interface Taps {
  readonly whole: number;
  readonly weights: readonly [number, number, number, number];
}

/** Zeros before the first value of a padded row, so that interpolation may reach back past it. */
const padding = 3;

/** Cubic Lagrange interpolation; linear where the newest of its four values is not yet known. */
function tapsOf(delay: number): Taps {
  const whole = Math.floor(delay);
  const f = delay - whole;
  if (whole < 2) return { whole, weights: [0, 1 - f, f, 0] };
  return {
    whole,
    weights: [(-f * (f - 1) * (f - 2)) / 6, ((f + 1) * (f - 1) * (f - 2)) / 2, (-(f + 1) * f * (f - 2)) / 2, ((f + 1) * f * (f - 1)) / 6],
  };
}

function delayed(row: Float64Array, start: number, n: number, { whole, weights }: Taps): number {
  if (n + 1 < whole) return 0;
  const at = start + padding + n - whole;
  return weights[0] * row[at + 1] + weights[1] * row[at] + weights[2] * row[at - 1] + weights[3] * row[at - 2];
}
