/**
 * What coupled lines answer in the Laplace domain: the voltages at all ends and terminations for a source of one volt.
 *
 *   |<------ s tau_k ------>|      u, w   voltage and current of mode k at the middle, in modal units
 *   left       u,w      right      left   v = Tv (c u + h w),   i =   Y (c w + h u)
 *   |-----------|-----------|      right  v = Tv (c u - h w),   i = - Y (c w - h u)
 *
 * Model     as `transferSystem.ts`, nothing across two ends
 * Method    one complex system of 2 `order` equations for each s; a lead by its chain matrix. Every entry is an entire function of s
 * Symbols   s complex frequency, 1/s; c = cosh(s tau_k / 2), h = sinh(s tau_k / 2); Tv, Y, tau_k of `modes.ts`
 * Source    Paul, Analysis of Multiconductor Transmission Lines, chain parameters and modes, from memory
 * Range     Re(s) times the longest delay between -300 and 300, so that no hyperbolic function overflows
 */
import { complexLuFactor, complexLuSolve, type ComplexNumbers } from '../../numeric/complexLu';
import type { Ramp } from './lines';
import type { LineEnds, LineNetwork } from './network';

export interface Complex {
  readonly re: number;
  readonly im: number;
}

/** Rows: left ends, right ends, left terminations, right terminations; `order` of each. Null where nothing finite answers. */
export function laplaceVoltages(network: LineNetwork, source: Pick<Ramp, 'line' | 'end'>, s: Complex): ComplexNumbers | null {
  const { order, ends, modes: { voltage, current, delays } } = network;
  const size = 2 * order;
  const halves = Array.from(delays, (delay) => hyperbolic(s, delay / 2));
  const matrix = complexArrays(size * size);
  const unknowns = complexArrays(size);
  const leads = ends.map((side) => Array.from(side.leadDelay, (delay) => (delay === 0 ? null : hyperbolic(s, delay))));
  for (const side of [0, 1] as const) {
    const sign = side === 0 ? 1 : -1;
    for (let i = 0; i < order; i += 1) {
      const { a, b, drive } = endRow(ends[side], i, s, leads[side][i]);
      const row = (side * order + i) * size;
      for (let k = 0; k < order; k += 1) {
        const { c, h } = halves[k];
        const va = scaled(a, voltage[i * order + k]);
        const ib = scaled(b, current[i * order + k]);
        store(matrix, row + k, sum(product(va, c), product(ib, h)));
        store(matrix, row + order + k, scaled(sum(product(va, h), product(ib, c)), sign));
      }
      if (source.line === i && source.end === (side === 0 ? 'left' : 'right')) unknowns.real[side * order + i] = drive;
    }
  }
  const exchanged = complexLuFactor(matrix, size);
  if (exchanged === null) return null;
  complexLuSolve(matrix, exchanged, unknowns);
  const voltages = complexArrays(4 * order);
  for (const side of [0, 1] as const) {
    const sign = side === 0 ? 1 : -1;
    for (let i = 0; i < order; i += 1) {
      let v: Complex = { re: 0, im: 0 };
      let entering: Complex = v;
      for (let k = 0; k < order; k += 1) {
        const { c, h } = halves[k];
        const u = load(unknowns, k);
        const w = scaled(load(unknowns, order + k), sign);
        v = sum(v, scaled(sum(product(c, u), product(h, w)), voltage[i * order + k]));
        entering = sum(entering, scaled(sum(product(c, w), product(h, u)), current[i * order + k]));
      }
      const lead = leads[side][i];
      store(voltages, side * order + i, v);
      store(voltages, (2 + side) * order + i, lead === null ? v : sum(product(lead.c, v), scaled(product(lead.h, entering), ends[side].leadImpedance[i])));
    }
  }
  return voltages;
}

interface Hyperbolic {
  readonly c: Complex;
  readonly h: Complex;
}

function hyperbolic({ re, im }: Complex, delay: number): Hyperbolic {
  const [a, b] = [re * delay, im * delay];
  return {
    c: { re: Math.cosh(a) * Math.cos(b), im: Math.sinh(a) * Math.sin(b) },
    h: { re: Math.sinh(a) * Math.cos(b), im: Math.cosh(a) * Math.sin(b) },
  };
}

/** a v + b i = drive e at the line's end: the termination's equation carried through the lead, rows near one. */
function endRow({ resistance, capacitance, seen, leadImpedance }: LineEnds, i: number, s: Complex, lead: Hyperbolic | null): { readonly a: Complex; readonly b: Complex; readonly drive: number } {
  const held = resistance[i] === 0;
  const charge = capacitance[i];
  const scale = held ? 1 : 1 / (1 / resistance[i] + Math.hypot(s.re, s.im) * charge + 1 / seen[i]);
  const alpha = held ? { re: 1, im: 0 } : { re: (1 / resistance[i] + s.re * charge) * scale, im: s.im * charge * scale };
  const beta = held ? 0 : scale;
  const drive = held ? 1 : scale / resistance[i];
  if (lead === null) return { a: alpha, b: { re: beta, im: 0 }, drive };
  const impedance = leadImpedance[i];
  return {
    a: sum(product(alpha, lead.c), scaled(lead.h, beta / impedance)),
    b: sum(scaled(product(alpha, lead.h), impedance), scaled(lead.c, beta)),
    drive,
  };
}

function complexArrays(count: number): ComplexNumbers {
  return { real: new Float64Array(count), imaginary: new Float64Array(count) };
}

function load({ real, imaginary }: ComplexNumbers, at: number): Complex {
  return { re: real[at], im: imaginary[at] };
}

function store({ real, imaginary }: ComplexNumbers, at: number, { re, im }: Complex): void {
  real[at] = re;
  imaginary[at] = im;
}

function sum(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

function scaled({ re, im }: Complex, factor: number): Complex {
  return { re: re * factor, im: im * factor };
}

export function product(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}
