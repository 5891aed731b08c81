/**
 * Partial self inductance of a straight bar of rectangular cross-section, with the current spread evenly over it.
 *
 * Formula   Lp = 4/(w² t²) ∫∫ (w - x)(t - y) M(l, sqrt(x² + y²)) dx dy,  M the mutual of two filaments of length l, d apart:
 *           M = mu0/(2 pi) (l asinh(l/d) - sqrt(l² + d²) + d)
 * Method    the weight is what two points of the cross-section are apart; triangles from the corner, so that ln d is smooth
 * Source    Neumann 1845; Rosa, Bull. Bur. Stand. 4 (1908); Ruehli, IBM J. Res. Dev. 16 (1972): partial inductance, from memory
 * Range     any; the limit of low frequency. A high one leaves the surface current's, a few per cent less
 * Accuracy  1e-9 against the closed form of Hoer & Love 1965 (reference/inductance.json)
 */
import { gaussJacobi } from '../../numeric/gaussJacobi';
import { mu0 } from '../../units/constants';
import { henries, type Inductance, type Length } from '../../units/quantity';

export function barInductance(length: Length, width: Length, thickness: Length): Inductance {
  if (length === 0) return henries(0);
  // In units of the length: the integral has no scale of its own.
  const [w, t] = [width / length, thickness / length];
  return henries(length * (triangle(w, t) + triangle(t, w)));
}

const { nodes, weights } = gaussJacobi(24, 0, 0);
const panels = 12;

/** Of the part of the rectangle between its side along x and its diagonal: y = slope u x. */
function triangle(w: number, t: number): number {
  let sum = 0;
  // Graded towards the corner, where ln x is.
  let from = 0;
  for (let panel = panels - 1; 0 <= panel; panel -= 1) {
    const to = w * 0.2 ** panel;
    for (let i = 0; i < nodes.length; i += 1) {
      const x = from + ((to - from) * (1 + nodes[i])) / 2;
      let inner = 0;
      // A thin bar's slope is steep near u = 0, where the distance hardly changes: graded as well.
      let below = 0;
      for (let part = 3; 0 <= part; part -= 1) {
        const above = 0.2 ** part;
        for (let j = 0; j < nodes.length; j += 1) {
          const u = below + ((above - below) * (1 + nodes[j])) / 2;
          const y = (t / w) * u * x;
          inner += ((weights[j] * (above - below)) / 2) * (t - y) * filaments(Math.hypot(x, y));
        }
        below = above;
      }
      sum += ((weights[i] * (to - from)) / 2) * (w - x) * (t / w) * x * inner;
    }
    from = to;
  }
  return (4 * sum) / (w * w * t * t);
}

/** H/m of two filaments of length 1, d apart. */
function filaments(d: number): number {
  return (mu0 / (2 * Math.PI)) * (Math.asinh(1 / d) - Math.sqrt(1 + d * d) + d);
}
