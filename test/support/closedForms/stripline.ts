/**
 * Strips between two planes, one dielectric: exact, or exact but for exponentially small interaction.
 *
 *   =============== plane        b  plane to plane, strips midway      w  width
 *      ----   ----      b        s  gap between a pair                 t  thickness
 *      | w | s |                 capacitances in F/m of relative permittivity 1
 *   =============== plane
 *
 * Sources: Cohn 1954 (Characteristic impedance of the shielded-strip transmission line), Cohn 1955 (Shielded
 * coupled-strip transmission line), both from memory.
 */
import { ellipticRatio } from '../../../server/src/numeric/ellipticK';
import { epsilon0 } from '../../../server/src/units/constants';

/** Zero thickness, one strip: C = 4 eps0 K(k)/K(k'), k = tanh(pi w / 2b). Exact for every w. */
export function stripCapacitance(w: number, b: number): number {
  const angle = (Math.PI * w) / (2 * b);
  // The complement sech carries the answer for wide strips.
  return (4 * epsilon0) / ellipticRatio(Math.tanh(angle), 1 / Math.cosh(angle));
}

/** Zero thickness, edge-coupled pair: per strip, in even and odd mode. Exact for every w, s. */
export function coupledStripCapacitance(w: number, s: number, b: number): { even: number; odd: number } {
  const inner = (Math.PI * w) / (2 * b);
  const outer = (Math.PI * (w + s)) / (2 * b);
  const even = Math.tanh(inner) * Math.tanh(outer);
  const odd = Math.tanh(inner) / Math.tanh(outer);
  // 1 - (tanh a tanh b)² and 1 - (tanh a / tanh b)², without their cancellation.
  const evenComplement = Math.sqrt((1 - even) * (1 + even));
  const oddComplement = Math.sqrt(Math.sinh(outer - inner) * Math.sinh(outer + inner)) / (Math.cosh(inner) * Math.sinh(outer));
  return { even: (4 * epsilon0) / ellipticRatio(even, evenComplement), odd: (4 * epsilon0) / ellipticRatio(odd, oddComplement) };
}

/**
 * Thick strip: two parallel-plate parts and four corners, each corner that of a half-infinite plate (exact
 * conformal map). The two edges’ interaction is left out: it falls as exp(-2 pi w / b), to 1e-4 of C by w = b
 * and 1e-7 by w = 2 b (at t = 0, against the exact form; faster for thick strips).
 */
export function thickStripCapacitance(w: number, t: number, b: number): number {
  const x = 1 / (1 - t / b);
  const corner = (2 * x * Math.log(x + 1) - (x - 1) * Math.log(x * x - 1)) / Math.PI;
  return epsilon0 * ((4 * w) / (b - t) + 4 * corner);
}
