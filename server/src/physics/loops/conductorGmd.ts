/**
 * Geometric mean distance of a conductor from itself: the thin tube that has the same inductance.
 *
 * Model     round wire: current on the surface (high frequency), the distance is the radius. Flat strip: current uniform over the
 *           section (low frequency), the mean of ln R over all pairs of its points
 * Formula   ln g = ln sqrt(w² + t²) - (w²/(12 t²)) ln(1 + t²/w²) - (t²/(12 w²)) ln(1 + w²/t²)
 *                  + (2w/(3t)) atan(t/w) + (2t/(3w)) atan(w/t) - 25/12;     near 0.2235 (w + t) for every w/t
 * Symbols   w width, t thickness (m)
 * Source    Maxwell, Treatise 1873, art. 692; Grover, Inductance Calculations, 1946, ch. 3; from memory, checked against quadrature
 * Accuracy  1e-10; the strip at high frequency carries its current at its edges, g then nearer to w/4 (a lone thin strip)
 */
import { metres, type Length } from '../../units/quantity';

export type LoopConductor =
  | { readonly form: 'wire'; readonly diameter: Length }
  | { readonly form: 'strip'; readonly width: Length; readonly thickness: Length };

export function conductorGmd(conductor: LoopConductor): Length {
  if (conductor.form === 'wire') return metres(conductor.diameter / 2);
  const w = Math.max(conductor.width, conductor.thickness);
  const r = Math.min(conductor.width, conductor.thickness) / w;
  // Below that the strip is as thin as one without thickness, and squares of 1/r would lose digits.
  if (r < 1e-6) return metres(w * Math.exp(-1.5));
  const square = r * r;
  const exponent = Math.log1p(square) / 2 - Math.log1p(square) / (12 * square) - (square / 12) * Math.log1p(1 / square) + (2 / (3 * r)) * Math.atan(r) + ((2 * r) / 3) * Math.atan(1 / r) - 25 / 12;
  return metres(w * Math.exp(exponent));
}

/** Half of its largest size across. */
export function conductorHalfWidth(conductor: LoopConductor): Length {
  return metres((conductor.form === 'wire' ? conductor.diameter : Math.max(conductor.width, conductor.thickness)) / 2);
}
