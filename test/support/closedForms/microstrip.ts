/**
 * Single microstrip, static.
 *
 *       w           u = w/h
 *     _____  t      Source    Hammerstad & Jensen 1980 (Accurate models for microstrip computer-aided design), from memory
 *   -----------     Range     0.01 <= u <= 100, relative permittivity up to 128
 *       | h, er     Accuracy  stated: impedance in air 0.03 %, effective permittivity 0.2 %, both at zero thickness;
 *   ===========               none is stated for the thickness correction
 */
import { speedOfLight } from '../../../server/src/units/constants';

export interface LineConstants {
  /** F/m */
  readonly capacitance: number;
  /** H/m */
  readonly inductance: number;
}

/** The impedance in which the formula is stated: sqrt(mu0/eps0). */
const freeSpaceImpedance = 376.730313668;

export function microstrip(w: number, t: number, h: number, permittivity: number): LineConstants {
  const u = w / h;
  const widening = t === 0 ? 0 : thicknessWidening(u, t / h);
  const air = microstripImpedanceInAir(u + widening);
  const part = (1 + 1 / Math.cosh(Math.sqrt(permittivity - 1))) / 2;
  const inDielectric = u + part * widening;
  const effective = microstripEffectivePermittivity(inDielectric, permittivity) * (air / microstripImpedanceInAir(inDielectric)) ** 2;
  return { capacitance: effective / (speedOfLight * air), inductance: air / speedOfLight };
}

export function microstripImpedanceInAir(u: number): number {
  const f = 6 + (2 * Math.PI - 6) * Math.exp(-((30.666 / u) ** 0.7528));
  return (freeSpaceImpedance / (2 * Math.PI)) * Math.log(f / u + Math.sqrt(1 + (2 / u) ** 2));
}

export function microstripEffectivePermittivity(u: number, permittivity: number): number {
  const a = 1 + Math.log((u ** 4 + (u / 52) ** 2) / (u ** 4 + 0.432)) / 49 + Math.log(1 + (u / 18.1) ** 3) / 18.7;
  const b = 0.564 * ((permittivity - 0.9) / (permittivity + 3)) ** 0.053;
  return (permittivity + 1) / 2 + ((permittivity - 1) / 2) * (1 + 10 / u) ** (-a * b);
}

/** How much wider a flat strip would have to be, in air. */
function thicknessWidening(u: number, t: number): number {
  const coth = 1 / Math.tanh(Math.sqrt(6.517 * u));
  return (t / Math.PI) * Math.log1p((4 * Math.E) / (t * coth * coth));
}
