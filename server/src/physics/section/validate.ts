/**
 * Which sections are refused before anything is computed: what is impossible, and what the method does not cover.
 *
 * A refusal names the conductor or the two of them, so that the text can be underlined.
 */
import type { Section, SectionConductor, SectionRefusal } from './section';

export const conductorLimit = 64;

export function refusalOf(section: Section): SectionRefusal | null {
  const { conductors, planeBelow, planeAbove } = section;
  if (!conductors.some(({ role }) => role === 'signal')) return { reason: 'no-signal' };
  if (!planeBelow && !planeAbove && !conductors.some(({ role }) => role === 'reference')) return { reason: 'no-reference' };
  if (conductorLimit < conductors.length) return { reason: 'too-many', limit: conductorLimit };
  const layers = refusedLayers(section);
  if (layers !== null) return layers;
  const degenerate = conductors.findIndex(isDegenerate);
  if (0 <= degenerate) return { reason: 'degenerate', conductor: degenerate };
  if (conductors.some(isExtreme)) return { reason: 'not-covered', what: `a conductor more than ${flattest} times as wide as thick, or as thick as wide` };
  for (let second = 1; second < conductors.length; second += 1) {
    for (let first = 0; first < second; first += 1) {
      const size = Math.min(smallSize(conductors[first]), smallSize(conductors[second]));
      // Nearly all are plainly beside each other.
      if (size < acrossGap(conductors[first], conductors[second])) continue;
      const separation = separationOf(conductors[first], conductors[second]);
      if (separation < -1e-6 * size) return { reason: 'overlap', first, second };
      if (separation <= 1e-6 * size) return { reason: 'touching', first, second };
      if (separation < closest * size) return { reason: 'not-covered', what: 'conductors nearer to each other than a two-hundredth of their size' };
    }
  }
  return null;
}

/** Of the smaller conductor. Nearer than this, the halving of the near integrals would take tenths of a second. */
const closest = 5e-3;
/** Wider conductors than this times their height, or narrower ones, would do so as well. */
const flattest = 2000;

function refusedLayers({ layers, planeBelow, planeAbove }: Section): SectionRefusal | null {
  if (layers.length === 0) return { reason: 'not-covered', what: 'a section without a dielectric' };
  for (let i = 0; i < layers.length; i += 1) {
    const { permittivity, thickness } = layers[i];
    const open = (i === 0 && !planeBelow) || (i === layers.length - 1 && !planeAbove);
    if (!(0 < permittivity && permittivity < 1e6)) return { reason: 'not-covered', what: `a permittivity of ${permittivity}` };
    if (open ? thickness !== Infinity : !(0 < thickness && thickness < 1e6)) return { reason: 'not-covered', what: `a layer of ${thickness} m` };
  }
  return null;
}

function isDegenerate({ x, y, width, height, undercut }: SectionConductor): boolean {
  const finite = [x, y, width, height, undercut].every((value) => Number.isFinite(value) && Math.abs(value) < 1e6);
  if (!finite || !(1e-12 < width) || !(0 <= height)) return true;
  if (height === 0) return undercut !== 0;
  return !(1e-3 * width < width - 2 * undercut) || !(Math.abs(undercut) < 4 * height);
}

const isExtreme = ({ width, height }: SectionConductor) => 0 < height && (flattest * height < width || flattest * width < height);

const smallSize = ({ width, height, undercut }: SectionConductor) => Math.min(width, width - 2 * undercut, 0 < height ? height : width);

function acrossGap(a: SectionConductor, b: SectionConductor): number {
  const reaching = Math.max(0, -a.undercut) + Math.max(0, -b.undercut);
  return Math.max(b.x - a.x - a.width, a.x - b.x - b.width) - reaching;
}

/** How far two trapezoids are apart along the axis that parts them best; negative where they overlap. */
function separationOf(a: SectionConductor, b: SectionConductor): number {
  let best = -Infinity;
  for (const [ux, uy] of [[1, 0], [0, 1], ...wallNormals(a), ...wallNormals(b)]) {
    const [aLow, aHigh] = extent(a, ux, uy);
    const [bLow, bHigh] = extent(b, ux, uy);
    best = Math.max(best, aLow - bHigh, bLow - aHigh);
  }
  return best;
}

function wallNormals({ height, undercut }: SectionConductor): [number, number][] {
  const length = Math.hypot(height, undercut);
  return length === 0 ? [] : [[height / length, undercut / length], [height / length, -undercut / length]];
}

function extent({ x, y, width, height, undercut }: SectionConductor, ux: number, uy: number): [number, number] {
  const corners = [x * ux + y * uy, (x + width) * ux + y * uy, (x + width - undercut) * ux + (y + height) * uy, (x + undercut) * ux + (y + height) * uy];
  return [Math.min(...corners), Math.max(...corners)];
}
