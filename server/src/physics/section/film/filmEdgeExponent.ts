/**
 * How the polarisation charge of a dielectric grows towards a right-angled edge of it: s ~ r^(lambda - 1).
 *
 *        air          Model    near the edge the potential is r^lambda times a function of the angle alone, even about
 *     ----.  90°               the edge's diagonal; the odd one has the exponent 2 - lambda and does not grow
 *    film |           Method   potential and flux agree on both faces; the same root serves an edge of film in air and
 *                              an edge of air in film, with even and odd exchanged
 *
 *   Formula   e tan(lambda pi/4) + tan(3 lambda pi/4) = 0 in (2/3, 1)
 *   Symbols   e permittivity of the dielectric relative to its surroundings, or its inverse, whichever is above 1
 *   Source    Meixner 1972; Van Bladel, Singular Electromagnetic Fields and Sources, 1991; both from memory
 *   Accuracy  1e-15; 0.8241 for 3.4
 */
import { root } from '../../../numeric/root';

export function filmEdgeExponent(contrast: number): number {
  const ratio = Math.max(contrast, 1 / contrast);
  // Multiplied by both cosines, which vanish inside the bracket's ends only.
  const mismatch = (lambda: number) => {
    const narrow = (lambda * Math.PI) / 4;
    const wide = 3 * narrow;
    return ratio * Math.sin(narrow) * Math.cos(wide) + Math.sin(wide) * Math.cos(narrow);
  };
  const search = root(mismatch, { low: 2 / 3, high: 1, tolerance: 1e-16 });
  if (!('found' in search)) throw new Error(`no edge exponent for a film of relative permittivity ${contrast}`);
  return search.found;
}
