/**
 * Resistance and partial inductance of plated vias in parallel.
 *
 *    |#|   |#|     barrel: a tube, its outside the drill, its wall the plating
 *
 * Formula   R = rho l / (pi (d - s) s), s the wall or, above that, the skin depth;
 *           L = mu0/(2 pi) (l asinh(l/r) - sqrt(l² + r²) + r), current on the surface of a wire of radius r = d/2
 * Source    Rosa, Bull. Bur. Stand. 4 (1908), surface current; circuit theory
 * Range     l above d. Left out: the mutual inductance of vias side by side (L/n is too little where they stand close, as a share of ln
 *           of their distance), pads, and what a neighbour that carries the current back takes away
 * Accuracy  5 % of one straight via by itself; half of L where several stand close
 */
import { mu0 } from '../../units/constants';
import { henries, metres, ohms, type Frequency, type Inductance, type Length, type Resistance, type Temperature } from '../../units/quantity';
import { copperAt, skinDepth } from '../resistance/copper';

export interface Vias {
  readonly count: number;
  readonly drill: Length;
  readonly length: Length;
  readonly temperature: Temperature;
}

/** Common practice, no source: what board makers plate at least. */
export const assumedPlating = metres(25e-6);

export function viaResistance({ count, drill, length, temperature }: Vias, frequency: Frequency): Resistance {
  const resistivity = copperAt(temperature);
  const wall = Math.min(assumedPlating, drill / 2, skinDepth(resistivity, frequency));
  return ohms((resistivity * length) / (Math.PI * (drill - wall) * wall * count));
}

export function viaInductance({ count, drill, length }: Vias): Inductance {
  const radius = drill / 2;
  return henries(((mu0 / (2 * Math.PI)) * (length * Math.asinh(length / radius) - Math.hypot(length, radius) + radius)) / count);
}
