/**
 * Between which planes a contour lies, and Neumann's integral with the images in them.
 *
 *   ======= above        Model     horizontal planes, infinite, perfectly conducting, at one potential; nothing passes through one
 *     a     H            Method    one plane: N(a + a', b), a' mirrored with reversed current. Two: the images of a + a' repeat every 2H;
 *   ======= below                  their sum is extrapolated in 1/(n + 1/2)², in which its tail is a power series
 *     a'                 Source    method of images; Richardson's extrapolation
 *                        Range     a contour may lie in part in one plane (its current there and the image cancel), not in two
 *                        Accuracy  the error handed back; 1e-9 for two planes unless contours are hundreds of H apart
 */
import { imageIn, lifted, together, withoutPlane, type CurrentPaths } from './currentPaths';
import { filamentStride } from './filamentMutual';
import type { NeumannIntegral } from './distantNeumann';
import { farNeumann, nearNeumann } from './neumann';

export interface PlaneSlab {
  /** Height of the planes; null where there is none on that side. */
  readonly below: number | null;
  readonly above: number | null;
  readonly touchesBelow: boolean;
  readonly touchesAbove: boolean;
}

export type SlabRefusal = { readonly reason: 'crosses-plane' | 'lies-in-plane' | 'joins-two-planes' };

export function planeSlab(paths: CurrentPaths, planes: readonly number[]): PlaneSlab | { readonly refused: SlabRefusal } {
  const { low, high } = heights(paths);
  const within = touchingShare * sizeOf(paths);
  if (planes.some((z) => low + within < z && z < high - within)) return { refused: { reason: 'crosses-plane' } };
  if (planes.some((z) => Math.abs(low - z) <= within && Math.abs(high - z) <= within)) return { refused: { reason: 'lies-in-plane' } };
  const below = Math.max(...planes.filter((z) => z <= low + within), -Infinity);
  const above = Math.min(...planes.filter((z) => high - within <= z), Infinity);
  const touchesBelow = Math.abs(low - below) <= within;
  const touchesAbove = Math.abs(above - high) <= within;
  if (touchesBelow && touchesAbove) return { refused: { reason: 'joins-two-planes' } };
  return { below: Number.isFinite(below) ? below : null, above: Number.isFinite(above) ? above : null, touchesBelow, touchesAbove };
}

/** Of a contour's size: nearer than that it lies in the plane. */
const touchingShare = 1e-9;
const closeEnough = 1e-9;
const mostImages = 1024;
/** Of filaments, all images together: about a second of work. */
const mostPairs = 2e6;

/** The plane that images are first made in: the one that is touched, else the one below. */
export function basePlane({ below, above }: PlaneSlab, touchesAbove: boolean): number | null {
  return touchesAbove || below === null ? above : below;
}

/** Without what lies in the plane. */
export function clearOf(paths: CurrentPaths, plane: number | null): CurrentPaths {
  return plane === null ? paths : withoutPlane(paths, plane, touchingShare * sizeOf(paths));
}

/** All images of a slab; both contours already `clearOf` the base plane, `from` their integral with the images in that one. */
export function imageNeumann(first: CurrentPaths, second: CurrentPaths, { below, above }: PlaneSlab, base: number, from: NeumannIntegral): NeumannIntegral {
  if (below === null || above === null) return from;
  const period = 2 * (above - below);
  const pairs = pairsOf(first, second);
  let { value, error, work } = from;
  const partial: { x: number; value: number }[] = [];
  let before = NaN;
  for (let n = 1; n <= mostImages; n += 1) {
    for (const side of [n, -n]) {
      const term = doubled(first, second, base, side * period);
      value += term.value;
      error += term.error;
      work += term.work;
    }
    if ((n & (n - 1)) !== 0) continue;
    partial.push({ x: (n + 0.5) ** -2, value });
    const now = extrapolated(partial.slice(-4));
    const off = Math.abs(now - before);
    before = now;
    if (4 <= n && off <= closeEnough * Math.abs(now)) return { value: now, error: error + off, work };
    if (2 <= n && mostPairs < 2 * n * pairs) return { value: now, error: error + (Number.isNaN(off) ? Math.abs(now) : off), work };
  }
  return { value: before, error: error + Math.abs(before - value), work };
}

/** The integral of two contours with the images in one plane. */
export function overOnePlane(first: CurrentPaths, second: CurrentPaths, base: number): NeumannIntegral {
  return doubled(first, second, base, 0);
}

/**
 * What the first and its image put into the second, lifted. A path whose other half lies in the plane is open, which the sum over pairs does
 * not mind; the expansion far away does, and gets the second with its image as well: by symmetry that is twice as much.
 */
function doubled(first: CurrentPaths, second: CurrentPaths, base: number, lift: number): NeumannIntegral {
  const both = together(first, imageIn(first, base));
  const other = lifted(together(second, imageIn(second, base)), lift);
  const far = farNeumann(both, other);
  if (far === null) return nearNeumann(both, lifted(second, lift));
  return { value: far.value / 2, error: far.error / 2, work: far.work };
}

function pairsOf(first: CurrentPaths, second: CurrentPaths): number {
  const weight = ({ filaments, circles }: CurrentPaths): number => filaments.length / filamentStride + 30 * circles.length;
  return 4 * weight(first) * weight(second);
}

/** Neville's scheme at x = 0. */
function extrapolated(points: readonly { x: number; value: number }[]): number {
  const values = points.map(({ value }) => value);
  for (let order = 1; order < points.length; order += 1) {
    for (let i = 0; i < points.length - order; i += 1) {
      const { x: near } = points[i + order];
      const { x: far } = points[i];
      values[i] = (far * values[i + 1] - near * values[i]) / (far - near);
    }
  }
  return values[0];
}

function heights({ filaments, circles }: CurrentPaths): { low: number; high: number } {
  let low = Infinity;
  let high = -Infinity;
  for (let at = 0; at < filaments.length; at += filamentStride) {
    low = Math.min(low, filaments[at + 2]);
    high = Math.max(high, filaments[at + 2]);
  }
  for (const { centre, normal, radius } of circles) {
    const reach = radius * Math.hypot(normal[0], normal[1]);
    low = Math.min(low, centre[2] - reach);
    high = Math.max(high, centre[2] + reach);
  }
  return { low, high };
}

function sizeOf({ filaments, circles }: CurrentPaths): number {
  let size = 0;
  for (let at = 6; at < filaments.length; at += filamentStride) size = Math.max(size, filaments[at]);
  for (const { radius } of circles) size = Math.max(size, radius);
  return size;
}
