/**
 * Edge-coupled microstrip pair of zero thickness, static even and odd mode.
 *
 *     w    s    w       u = w/h, g = s/h
 *   -----     -----     Source    Kirschning & Jansen 1984, with the corrections of 1985, from memory; Q1 … Q10 are theirs
 *   ---------------     Range     0.1 <= u <= 10, 0.1 <= g <= 10, permittivity 1 to 18
 *         h, er         Accuracy  stated: impedances 0.6 %, effective permittivity 0.7 % even, 0.5 % odd
 *   ===============
 */
import { microstripEffectivePermittivity, microstripImpedanceInAir } from './microstrip';

export interface Mode {
  readonly impedance: number;
  readonly effectivePermittivity: number;
}

export function coupledMicrostrip(u: number, g: number, permittivity: number): { readonly even: Mode; readonly odd: Mode } {
  const effective = microstripEffectivePermittivity(u, permittivity);
  const single = microstripImpedanceInAir(u) / Math.sqrt(effective);
  const { even: q4, odd: q10 } = impedanceTerms(u, g);
  const mode = (effectivePermittivity: number, q: number): Mode => ({
    impedance: (single * Math.sqrt(effective / effectivePermittivity)) / (1 - (single / 377) * Math.sqrt(effective) * q),
    effectivePermittivity,
  });
  return { even: mode(evenPermittivity(u, g, permittivity), q4), odd: mode(oddPermittivity(u, g, permittivity, effective), q10) };
}

function evenPermittivity(u: number, g: number, permittivity: number): number {
  const v = (u * (20 + g * g)) / (10 + g * g) + g * Math.exp(-g);
  return microstripEffectivePermittivity(v, permittivity);
}

function oddPermittivity(u: number, g: number, permittivity: number, single: number): number {
  const mean = (permittivity + 1) / 2;
  const a = 0.7287 * (single - mean) * (1 - Math.exp(-0.179 * u));
  const b = (0.747 * permittivity) / (0.15 + permittivity);
  const c = b - (b - 0.207) * Math.exp(-0.414 * u);
  const d = 0.593 + 0.694 * Math.exp(-0.562 * u);
  return (mean + a - single) * Math.exp(-c * g ** d) + single;
}

function impedanceTerms(u: number, g: number): { even: number; odd: number } {
  const q1 = 0.8695 * u ** 0.194;
  const q2 = 1 + 0.7519 * g + 0.189 * g ** 2.31;
  const q3 = 0.1975 + (16.6 + (8.4 / g) ** 6) ** -0.387 + Math.log(g ** 10 / (1 + (g / 3.4) ** 10)) / 241;
  const q4 = ((2 * q1) / q2) / (Math.exp(-g) * u ** q3 + (2 - Math.exp(-g)) * u ** -q3);
  const q5 = 1.794 + 1.14 * Math.log(1 + 0.638 / (g + 0.517 * g ** 2.43));
  const q6 = 0.2305 + Math.log(g ** 10 / (1 + (g / 5.8) ** 10)) / 281.3 + Math.log(1 + 0.598 * g ** 1.154) / 5.1;
  const q7 = (10 + 190 * g * g) / (1 + 82.3 * g ** 3);
  const q8 = Math.exp(-6.5 - 0.95 * Math.log(g) - (g / 0.15) ** 5);
  const q9 = Math.log(q7) * (q8 + 1 / 16.5);
  return { even: q4, odd: (q2 * q4 - q5 * Math.exp(Math.log(u) * q6 * u ** -q9)) / q2 };
}
