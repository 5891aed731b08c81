/**
 * Mutual inductance of two closed contours, with their images in planes.
 *
 * Model     thin conductors: current on the middle line. Planes horizontal, infinite, perfect, at one potential; a contour that lies on
 *           the other side of a plane receives nothing
 * Formula   M = mu0/(4 pi) ∮∮ ds1·ds2 / R; positive where currents that run in the contours' directions strengthen each other's flux
 * Symbols   H, m
 * Source    Neumann 1845; Campbell 1915; Maxwell 1873; Grover, Inductance Calculations, 1946
 * Range     conductors that do not touch: `clearance` is half of one width and half of the other. Quasi-static: `largestOver` says
 *           whether a contour is small against the wave length
 * Accuracy  the error bar, from rounding, quadrature and image sums; against tables and quadrature in test/physics/loops
 */
import { speedOfLight, mu0 } from '../../units/constants';
import { henries, metres, ratio, type Frequency, type Inductance, type Length, type Ratio } from '../../units/quantity';
import type { Contour } from './contour';
import { pathDistance } from './contourDistance';
import { contourMeasures } from './contourMeasures';
import { pathsOf } from './currentPaths';
import type { NeumannIntegral } from './distantNeumann';
import { neumann } from './neumann';
import { basePlane, clearOf, imageNeumann, overOnePlane, planeSlab, type PlaneSlab, type SlabRefusal } from './planeSlab';

export interface MutualSettings {
  /** Heights of the faces of planes whose images count. */
  readonly planes?: readonly Length[];
  /** Middle lines have to be farther apart. */
  readonly clearance?: Length;
}

export type MutualInductance =
  | { readonly inductance: Inductance; readonly errorBar: Inductance; readonly work: number }
  | { readonly refused: SlabRefusal & { readonly contour: 'first' | 'second' } | { readonly reason: 'touching'; readonly distance: Length } };

export function mutualInductance(first: Contour, second: Contour, { planes = [], clearance = metres(0) }: MutualSettings = {}): MutualInductance {
  const paths1 = pathsOf(first);
  const paths2 = pathsOf(second);
  const slab1 = planeSlab(paths1, planes);
  if ('refused' in slab1) return { refused: { ...slab1.refused, contour: 'first' } };
  const slab2 = planeSlab(paths2, planes);
  if ('refused' in slab2) return { refused: { ...slab2.refused, contour: 'second' } };
  if (slab1.below !== slab2.below || slab1.above !== slab2.above) return { inductance: henries(0), errorBar: henries(0), work: 0 };
  const base = basePlane(slab1, slab1.touchesAbove || (slab2.touchesAbove && !slab1.touchesBelow));
  const clear1 = clearOf(paths1, base);
  const clear2 = clearOf(paths2, base);
  const distance = pathDistance(clear1, clear2);
  if (distance <= clearance) return { refused: { reason: 'touching', distance: metres(distance) } };
  const integral = base === null ? neumann(clear1, clear2) : between(slab1, base, clear1, clear2);
  return { inductance: perMetre(integral.value), errorBar: henries(Math.abs(perMetre(integral.error))), work: integral.work };
}

/** Of the wave length at that frequency: models of this room hold below a tenth. */
export function largestOver(contour: Contour, frequency: Frequency): Ratio {
  return ratio((contourMeasures(contour).extent * frequency) / speedOfLight);
}

function between(slab: PlaneSlab, base: number, first: ReturnType<typeof pathsOf>, second: ReturnType<typeof pathsOf>): NeumannIntegral {
  const one = overOnePlane(first, second, base);
  return slab.below === null || slab.above === null ? one : imageNeumann(first, second, slab, base, one);
}

function perMetre(integral: number): Inductance {
  return henries((mu0 / (4 * Math.PI)) * integral);
}
