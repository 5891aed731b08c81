/**
 * Inductance of a loop of round wire or flat strip, with its images in planes.
 *
 * Model     the contour against itself moved aside by the geometric mean distance g of the conductor (`conductorGmd.ts`): Neumann's
 *           integral with sqrt(R² + g²), for all its sides, corners and angles alike, so that cutting a side in two changes nothing.
 *           Round wire: external inductance, current on the surface. Strip: uniform current, all of it. A circle: mu0 R (ln(8R/g) - 2)
 * Planes    images as in `planeSlab.ts`. Current that runs along a plane crowds towards it, which `overSection` mends: L per length of
 *           the same strip or wire over the same planes, from the section solver, in the place of the image's own
 *           mu0/(2 pi) ln(2h/g) (with two planes of its series) on what runs level; use it where `sectionDecides`
 * Source    Rosa & Grover, Formulas and Tables for the Calculation of Mutual and Self-Inductance, NBS Scientific Paper 169, 1912;
 *           Grover, Inductance Calculations, 1946
 * Range     conductor thinner than half of what it keeps from itself and from planes; quasi-static
 * Accuracy  order g/side: 0.02 % of a 50 by 20 mm loop of 0.2 mm trace against exact bars; error bar: rounding, quadrature, images.
 *           `internal` is what a round wire's inside adds at low frequency and is not in the value
 */
import { mu0 } from '../../units/constants';
import { henries, metres, type Inductance, type InductancePerLength, type Length } from '../../units/quantity';
import { coaxialNeumann } from './circlePotential';
import { conductorGmd, conductorHalfWidth, type LoopConductor } from './conductorGmd';
import type { Contour } from './contour';
import { contourFault } from './contourFault';
import { contourMeasures } from './contourMeasures';
import { imageIn, pathsOf, type CurrentPaths } from './currentPaths';
import type { NeumannIntegral } from './distantNeumann';
import { filamentMutual, filamentStride } from './filamentMutual';
import { nearNeumann } from './neumann';
import { basePlane, clearOf, imageNeumann, planeSlab, type PlaneSlab, type SlabRefusal } from './planeSlab';

export interface InductiveLoop {
  readonly contour: Contour;
  readonly conductor: LoopConductor;
  readonly planes?: readonly Length[];
  /** Inductance per length of the conductor over these planes at that height, for sides that run level there. */
  readonly overSection?: { readonly height: Length; readonly inductance: InductancePerLength } | null;
}

export type SelfInductance =
  | {
    readonly inductance: Inductance;
    readonly errorBar: Inductance;
    /** Left out of the value: what the inside of a round wire adds at low frequency, mu0/(8 pi) per length. */
    readonly internal: Inductance;
    readonly current: 'surface' | 'uniform';
    readonly gmd: Length;
    /** Nearest level side to a plane; Infinity without. Below twice the conductor's width the section's L per length decides. */
    readonly overPlane: Length;
    readonly sectionDecides: boolean;
    readonly work: number;
  }
  | { readonly refused: SlabRefusal | { readonly reason: 'no-conductor' | 'too-wide' | 'touches-plane' } };

export function selfInductance({ contour, conductor, planes = [], overSection = null }: InductiveLoop): SelfInductance {
  const half = conductorHalfWidth(conductor);
  const gmd = conductorGmd(conductor);
  if (!(0 < gmd && Number.isFinite(half))) return { refused: { reason: 'no-conductor' } };
  const fault = tooWide(contour, half);
  if (fault !== null) return { refused: fault };
  const paths = pathsOf(contour);
  const slab = planeSlab(paths, planes);
  if ('refused' in slab) return { refused: slab.refused };
  const base = basePlane(slab, slab.touchesAbove);
  const clear = clearOf(paths, base);
  const level = levelSides(clear, slab);
  const overPlane = Math.min(...level.map(({ gap }) => gap), Infinity);
  if (overPlane <= smallestReach(conductor)) return { refused: { reason: 'touches-plane' } };
  const own = itself(clear, gmd);
  const image = base === null ? null : imageNeumann(clear, clear, slab, base, nearNeumann(imageIn(clear, base), clear));
  const integral = own.value + (image?.value ?? 0);
  const mended = overSection === null ? 0 : mendedBy(level, slab, gmd, overSection);
  const inductance = perMetre(integral) + mended;
  // A conductor as large as its loop: the mean distance means nothing there.
  if (!(0 < inductance)) return { refused: { reason: 'too-wide' } };
  return {
    inductance: henries(inductance),
    errorBar: henries(perMetre(own.error + (image?.error ?? 0))),
    internal: henries(conductor.form === 'wire' ? (mu0 / (8 * Math.PI)) * (contour.form === 'circle' ? contourMeasures(contour).perimeter : lengthOf(clear)) : 0),
    current: conductor.form === 'wire' ? 'surface' : 'uniform',
    gmd,
    overPlane: metres(overPlane),
    sectionDecides: overPlane < 4 * half,
    work: own.work + (image?.work ?? 0),
  };
}

function tooWide(contour: Contour, half: number): { readonly reason: 'too-wide' } | null {
  if (contour.form === 'circle') return contour.radius <= half ? { reason: 'too-wide' } : null;
  const { area, perimeter } = contourMeasures(contour);
  // So small a loop that every side is a neighbour: twice its area over its length is what lies between its middle and its sides.
  if (perimeter < 24 * half && 2 * area <= half * perimeter) return { reason: 'too-wide' };
  return contourFault(contour, 2 * half) === null ? null : { reason: 'too-wide' };
}

/** What a conductor keeps a plane from its middle line with: a strip lies flat. */
function smallestReach(conductor: LoopConductor): number {
  return (conductor.form === 'wire' ? conductor.diameter : conductor.thickness) / 2;
}

function itself({ filaments, circles }: CurrentPaths, g: number): NeumannIntegral {
  const total = { value: 0, error: 0, work: 0 };
  for (let i = 0; i < filaments.length; i += filamentStride) {
    for (let j = 0; j <= i; j += filamentStride) {
      const { value, error } = filamentMutual(filaments, i, filaments, j, g);
      const times = i === j ? 1 : 2;
      total.value += times * value;
      total.error += times * (error + 4e-16 * Math.abs(value));
      total.work += 1;
    }
  }
  for (const { radius } of circles) {
    const value = coaxialNeumann(radius, radius, g);
    total.value += value;
    total.error += 4e-16 * value;
    total.work += 1;
  }
  return total;
}

interface LevelSide {
  readonly length: number;
  readonly z: number;
  /** To the nearer plane. */
  readonly gap: number;
}

function levelSides({ filaments, circles }: CurrentPaths, { below, above }: PlaneSlab): readonly LevelSide[] {
  const sides: LevelSide[] = [];
  const add = (length: number, z: number): void => {
    sides.push({ length, z, gap: Math.min(below === null ? Infinity : z - below, above === null ? Infinity : above - z) });
  };
  for (let at = 0; at < filaments.length; at += filamentStride) if (Math.abs(filaments[at + 5]) < 1e-9) add(filaments[at + 6], filaments[at + 2]);
  for (const { centre, normal, radius } of circles) if (1 - 1e-12 < Math.abs(normal[2])) add(2 * Math.PI * radius, centre[2]);
  return sides;
}

function mendedBy(level: readonly LevelSide[], slab: PlaneSlab, g: number, { height, inductance }: { height: number; inductance: number }): number {
  const there = level.filter(({ z, gap }) => Number.isFinite(gap) && Math.abs(z - height) <= 1e-9 * Math.max(Math.abs(z), gap));
  return there.reduce((sum, { length, z }) => sum + length * (inductance - imagePerLength(z, slab, g)), 0);
}

/** H/m of a thin tube between planes: one image, or the closed sum of all (sin from its infinite product). */
function imagePerLength(z: number, { below, above }: PlaneSlab, g: number): number {
  if (below === null || above === null) return (mu0 / (2 * Math.PI)) * Math.log((2 * Math.abs(z - (below ?? above ?? 0))) / g);
  const height = above - below;
  return (mu0 / (2 * Math.PI)) * Math.log(((2 * height) / (Math.PI * g)) * Math.sin((Math.PI * (z - below)) / height));
}

function lengthOf({ filaments }: CurrentPaths): number {
  let length = 0;
  for (let at = 6; at < filaments.length; at += filamentStride) length += filaments[at];
  return length;
}

function perMetre(integral: number): number {
  return (mu0 / (4 * Math.PI)) * integral;
}
