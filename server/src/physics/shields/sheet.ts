/**
 * How much of a field a metal sheet and its longest opening let through.
 *
 *    field --> |  | -->       S = R + A + B: reflection at both faces, absorption, and what goes to and fro inside
 *              slot           the slot lets through what half a wave length over twice its length says
 *
 * Formula   T = 4 Zw Zs/(Zw + Zs)² e^-g / (1 - ((Zw - Zs)/(Zw + Zs))² e^-2g),  g = (1 + j) t/depth,  Zs = (1 + j)/(sigma depth);
 *           Zw: plane wave eta; near a magnetic source j w mu0 r; near an electric one 1/(j w eps0 r). Slot: min(1, 2 l/wave length)
 * Symbols   t m; r m from the source; l m the longest opening
 * Source    Schelkunoff, Electromagnetic Waves, 1943, by transmission lines; slot: Ott, Electromagnetic Compatibility Engineering;
 *           both from memory
 * Range     sheets large against their distance; one opening. Joints, corners and what passes through on wires are not in it
 * Accuracy  exact for the infinite sheet; a slot's rule is good to some 6 dB (common practice)
 */
import { epsilon0, mu0, speedOfLight } from '../../units/constants';
import type { Frequency, Length } from '../../units/quantity';

export type FieldSource = { readonly kind: 'plane' } | { readonly kind: 'magnetic' | 'electric'; readonly distance: Length };

export interface Sheet {
  /** S/m */
  readonly conductivity: number;
  readonly permeability: number;
  readonly thickness: Length;
}

/** Of the field, 0 to 1. */
export function throughSheet({ conductivity, permeability, thickness }: Sheet, source: FieldSource, frequency: Frequency): number {
  if (frequency === 0) return 1;
  if (thickness === 0) return 1;
  const angular = 2 * Math.PI * frequency;
  const depth = Math.sqrt(2 / (angular * mu0 * permeability * conductivity));
  const wave = waveImpedance(source, angular);
  const metal: Complex = [1 / (conductivity * depth), 1 / (conductivity * depth)];
  const sum = plus(wave, metal);
  const reflected = over(minus(wave, metal), sum);
  const once = exponential([-thickness / depth, -thickness / depth]);
  const back = times(times(reflected, reflected), times(once, once));
  const through = over(times(times([4, 0], times(wave, metal)), once), times(times(sum, sum), minus([1, 0], back)));
  return Math.min(1, Math.hypot(...through));
}

export function throughSlot(slot: Length, frequency: Frequency): number {
  return Math.min(1, (2 * slot * frequency) / speedOfLight);
}

type Complex = readonly [re: number, im: number];

function waveImpedance(source: FieldSource, angular: number): Complex {
  const free = mu0 * speedOfLight;
  switch (source.kind) {
    case 'plane': return [free, 0];
    // Further away than that the wave is a plane one.
    case 'magnetic': return angular * mu0 * source.distance < free ? [0, angular * mu0 * source.distance] : [free, 0];
    case 'electric': return free < 1 / (angular * epsilon0 * source.distance) ? [0, -1 / (angular * epsilon0 * source.distance)] : [free, 0];
  }
}

const plus = (a: Complex, b: Complex): Complex => [a[0] + b[0], a[1] + b[1]];
const minus = (a: Complex, b: Complex): Complex => [a[0] - b[0], a[1] - b[1]];
const times = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];

function over(a: Complex, b: Complex): Complex {
  const square = b[0] * b[0] + b[1] * b[1];
  return [(a[0] * b[0] + a[1] * b[1]) / square, (a[1] * b[0] - a[0] * b[1]) / square];
}

function exponential([re, im]: Complex): Complex {
  return [Math.exp(re) * Math.cos(im), Math.exp(re) * Math.sin(im)];
}
