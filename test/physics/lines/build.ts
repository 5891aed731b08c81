/** Lines and ends for the tests, from plain numbers. */
import { readFileSync } from 'node:fs';
import type { CoupledLines, Ramp, Termination } from '../../../server/src/physics/lines/lines';
import { farads, metres, ohms, seconds, volts } from '../../../server/src/units/quantity';

export function end(resistance: number, capacitance = 0, lead: { readonly impedance: number; readonly delay: number } | null = null): Termination {
  return {
    resistance: ohms(resistance),
    capacitance: farads(capacitance),
    lead: lead === null ? null : { impedance: ohms(lead.impedance), delay: seconds(lead.delay) },
  };
}

export interface Plain {
  readonly inductance: readonly (readonly number[])[];
  readonly capacitance: readonly (readonly number[])[];
  readonly length: number;
  readonly left: readonly Termination[];
  readonly right: readonly Termination[];
}

export function lines({ inductance, capacitance, length, left, right }: Plain): CoupledLines {
  return { order: inductance.length, inductance: symmetric(inductance), capacitance: symmetric(capacitance), length: metres(length), left, right };
}

/** The halves of reference matrices differ in their last digits. */
function symmetric(rows: readonly (readonly number[])[]): Float64Array {
  return Float64Array.from(rows.flatMap((row, i) => row.map((value, j) => (value + rows[j][i]) / 2)));
}

/** Two equal lines from what one feels of the other; in a homogeneous dielectric where both ratios are equal. */
export function pair(own: { readonly impedance: number; readonly slowness: number }, ratios: { readonly inductive: number; readonly capacitive: number }) {
  const l = own.impedance * own.slowness;
  const c = own.slowness / own.impedance;
  return {
    inductance: [[l, l * ratios.inductive], [l * ratios.inductive, l]],
    capacitance: [[c, -c * ratios.capacitive], [-c * ratios.capacitive, c]],
  };
}

/** A row of lines whose mutuals fall with distance; microstrip-like, positive definite. */
export function rowOfLines(order: number, strength = 0.1) {
  const at = (i: number, j: number, own: number, first: number, fall: number) => (i === j ? own : first * fall ** (Math.abs(i - j) - 1));
  const matrix = (own: number, first: number, fall: number) => Array.from({ length: order }, (_, i) => Array.from({ length: order }, (__, j) => at(i, j, own, first, fall)));
  return {
    inductance: matrix(380e-9, 380e-9 * strength * 1.6, 0.4),
    capacitance: matrix(90e-12 * (1 + strength), -90e-12 * strength, 0.15),
  };
}

export function ramp(line: number, side: 'left' | 'right', amplitude: number, duration: number): Ramp {
  return { line, end: side, amplitude: volts(amplitude), duration: seconds(duration) };
}

/** From the tests' own copy of the reference cases. */
export function referenceCases(file: string): readonly Record<string, any>[] {
  return (JSON.parse(readFileSync(`test/reference/${file}`, 'utf8')) as { cases: Record<string, any>[] }).cases;
}
