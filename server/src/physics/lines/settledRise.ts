/**
 * What coupled lines answer to a source of unit slope once their echoes have died: the slow part alone, at any time, however
 * long after.
 *
 *        ring  x   | x  ring         Bromwich integral of V(s)/s² along a parabola around the negative real axis: the poles of
 *              ____|                 what is slow lie inside, those of the echoes outside, where exp(s t) has let them die
 *   --xx-x--x-(----o--- Re s
 *             `----|                 one parabola for times from t to 4 t
 *
 * Method    trapezoidal rule on s = mu (1 + j theta)², N nodes in the upper half plane, mu = pi N / (4 sqrt(8 L + 1) t1),
 *           step sqrt(8 L + 1) / N for times from t1 / L to t1; the lines by `laplace.ts`, exact
 * Source    Weideman & Trefethen, Parabolic and hyperbolic contours for computing the Bromwich integral, 2007, from memory
 * Accuracy  3e-9 of a value (measured; exp(-2 pi N / sqrt(8 L + 1)) times what grows as t), besides what has not died: `apart` is
 *           how much neighbouring parabolas differ at the times that they share, of which one may hold a pole that the other does not
 */
import type { Ramp } from './lines';
import { laplaceVoltages, product, type Complex } from './laplace';
import type { LineNetwork } from './network';

export interface SettledRise {
  /**
   * V for 1 V/s, at a time between `from` and `until`: as many rows as `into` is long, beginning with `row`, of left ends, right
   * ends, left terminations and right ones.
   */
  readonly at: (time: number, row: number, into: Float64Array) => void;
  /** Of each row, the largest difference between two parabolas where both hold. */
  readonly apart: Float64Array;
  /** Frequencies solved. */
  readonly work: number;
}

/** Null where the lines have no finite answer on a contour. */
export function settledRise(network: LineNetwork, source: Pick<Ramp, 'line' | 'end'>, from: number, until: number): SettledRise | null {
  const rows = 4 * network.order;
  const contours: Contour[] = [];
  for (let start = from; contours.length === 0 || start < until; start *= span) {
    const contour = contourFor(network, source, start * span);
    if (contour === null) return null;
    contours.push(contour);
  }
  const apart = new Float64Array(rows);
  const [one, other] = [new Float64Array(rows), new Float64Array(rows)];
  for (let n = 1; n < contours.length; n += 1) {
    for (const share of sharedTimes) {
      const time = contours[n - 1].until * share;
      evaluate(contours[n - 1], time, 0, one);
      evaluate(contours[n], time, 0, other);
      for (let i = 0; i < rows; i += 1) apart[i] = Math.max(apart[i], Math.abs(one[i] - other[i]));
    }
  }
  const table = tabulated(contours, from, until, rows);
  return { at: (time, row, into) => interpolate(table, time, row, into), apart, work: contours.length * nodes };
}

/** Values and rates at times in equal ratios. */
interface Table {
  readonly from: number;
  readonly rows: number;
  readonly count: number;
  readonly values: Float64Array;
  readonly rates: Float64Array;
}

/** Cubics through values and rates are then good to a billionth of what is smooth on the scale of the time passed. */
const ratio = 1.06;
const perTime = 1 / Math.log(ratio);

function tabulated(contours: readonly Contour[], from: number, until: number, rows: number): Table {
  const count = Math.max(2, Math.ceil(Math.log(until / from) * perTime) + 1);
  const values = new Float64Array(count * rows);
  const rates = new Float64Array(count * rows);
  let contour = 0;
  for (let n = 0; n < count; n += 1) {
    const time = from * ratio ** n;
    while (contour + 1 < contours.length && contours[contour].until < time) contour += 1;
    evaluate(contours[contour], time, 0, values.subarray(n * rows, (n + 1) * rows), rates.subarray(n * rows, (n + 1) * rows));
  }
  return { from, rows, count, values, rates };
}

function interpolate({ from, rows, count, values, rates }: Table, time: number, row: number, into: Float64Array): void {
  const n = Math.max(0, Math.min(count - 2, Math.floor(Math.log(time / from) * perTime)));
  const begin = from * ratio ** n;
  const step = begin * (ratio - 1);
  const u = (time - begin) / step;
  for (let i = 0; i < into.length; i += 1) {
    const at = n * rows + row + i;
    const rise = values[at + rows] - values[at];
    const startBend = rates[at] * step - rise;
    const endBend = rise - rates[at + rows] * step;
    into[i] = values[at] + u * (rise + (1 - u) * ((1 - u) * startBend + u * endBend));
  }
}

interface Contour {
  readonly until: number;
  readonly s: readonly Complex[];
  /** Of each node: V(s)/s² times the weight, rows one after the other. */
  readonly real: readonly Float64Array[];
  readonly imaginary: readonly Float64Array[];
}

const span = 4;
const nodes = 24;
const root = Math.sqrt(8 * span + 1);
/** Of the time at which one parabola ends and the next begins. */
const sharedTimes = [0.94, 0.97, 1, 1.03];

function contourFor(network: LineNetwork, source: Pick<Ramp, 'line' | 'end'>, until: number): Contour | null {
  const mu = (Math.PI * nodes) / (4 * root * until);
  const step = root / nodes;
  const s: Complex[] = [];
  const real: Float64Array[] = [];
  const imaginary: Float64Array[] = [];
  for (let k = 0; k < nodes; k += 1) {
    const theta = (k + 0.5) * step;
    const at = { re: mu * (1 - theta * theta), im: 2 * mu * theta };
    const voltages = laplaceVoltages(network, source, at);
    if (voltages === null) return null;
    // ds = 2 mu (j - theta) d(theta); the lower half plane adds the conjugate.
    const squared = product(at, at);
    const size = squared.re ** 2 + squared.im ** 2;
    const slope = { re: 2 * mu, im: 2 * mu * theta };
    const weight = product({ re: (slope.re * step) / Math.PI, im: (slope.im * step) / Math.PI }, { re: squared.re / size, im: -squared.im / size });
    s.push(at);
    real.push(voltages.real.map((value, i) => value * weight.re - voltages.imaginary[i] * weight.im));
    imaginary.push(voltages.imaginary.map((value, i) => value * weight.re + voltages.real[i] * weight.im));
  }
  return real.every((row) => row.every(Number.isFinite)) && imaginary.every((row) => row.every(Number.isFinite)) ? { until, s, real, imaginary } : null;
}

/** Rates only where there is room for them. */
function evaluate({ s, real, imaginary }: Contour, time: number, row: number, into: Float64Array, rates: Float64Array | null = null): void {
  into.fill(0);
  for (let k = 0; k < s.length; k += 1) {
    const size = Math.exp(s[k].re * time);
    const [c, d] = [size * Math.cos(s[k].im * time), size * Math.sin(s[k].im * time)];
    const [re, im] = [real[k], imaginary[k]];
    for (let i = 0; i < into.length; i += 1) into[i] += re[row + i] * c - im[row + i] * d;
    if (rates === null) continue;
    const [e, f] = [s[k].re * c - s[k].im * d, s[k].re * d + s[k].im * c];
    for (let i = 0; i < rates.length; i += 1) rates[i] += re[row + i] * e - im[row + i] * f;
  }
}
