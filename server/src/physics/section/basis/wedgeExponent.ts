/**
 * How the charge of a conductor grows towards an edge: sigma ~ r^(lambda - 1), r the distance from the edge.
 *
 *   metal face 2 \   angle 2, permittivity 2      Model     near an edge the potential is r^lambda times a function
 *                 \________________  interface              of the angle alone, zero on both faces
 *        (metal)  |  angle 1,                     Method    propagate potential and flux through the wedges from one
 *   metal face 1  |  permittivity 1                         face to the other; lambda is the first zero
 *
 *   Formula   one wedge of angle A          lambda = pi / A
 *             two wedges                    e1 cos(lambda A1) sin(lambda A2) + e2 sin(lambda A1) cos(lambda A2) = 0
 *   Symbols   A, A1, A2 angles of the dielectric around the edge (rad); e1, e2 relative permittivities
 *   Source    Meixner 1972; Van Bladel, Singular Electromagnetic Fields and Sources, 1991; both from memory
 *   Range     0 < A <= 2 pi, A1 + A2 <= 2 pi
 *   Accuracy  1e-15; the closed form (2/pi) atan(sqrt(1 + 2 e1/e2)) of a right-angled edge that stands on a
 *             dielectric (A1 = pi/2, A2 = pi) is met to rounding in the test
 */
import { root } from '../../../numeric/root';

export interface Wedge {
  readonly angle: number;
  readonly permittivity: number;
}

/** The smallest lambda; the wedges in order from one metal face to the other, one or two of them. */
export function wedgeExponent(first: Wedge, second: Wedge | null = null): number {
  if (second === null || first.permittivity === second.permittivity) return Math.PI / (first.angle + (second?.angle ?? 0));
  // Only the ratio counts; it is taken so that neither product overflows.
  const ratio = first.permittivity / second.permittivity;
  const wider = Math.max(first.angle, second.angle);
  const boundary = (lambda: number) =>
    ratio * Math.cos(lambda * first.angle) * Math.sin(lambda * second.angle) + Math.sin(lambda * first.angle) * Math.cos(lambda * second.angle);
  // The wider wedge's cosine vanishes at the lower end and its sine at the upper one, so that the signs differ.
  const search = root(boundary, { low: Math.PI / (2 * wider), high: Math.PI / wider, tolerance: 1e-16 });
  if (!('found' in search)) throw new Error(`no edge exponent for wedges of ${first.angle} and ${second.angle} rad, permittivities ${first.permittivity} and ${second.permittivity}`);
  return search.found;
}
