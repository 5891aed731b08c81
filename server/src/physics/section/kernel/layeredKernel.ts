/**
 * Potential of a line charge in planar layers, split so that each part can be integrated well.
 *
 *   G(dx, y, y') = - direct ln r - sum of mirror ln r(mirrored) + rest,     potential = G Q / (2 pi eps0)
 *
 *   direct    the charge itself: 1/e in its own layer, transmitted into another one
 *   mirrors   its images in the two interfaces next to the points, which conductors may touch, and in a single plane
 *   rest      smooth: the images between two planes in closed form, and the remainder of the spectra as tables
 *
 * Model     source and observer each anywhere in one layer of the stack
 * Method    the mirrors are the limits of the spectra as k goes to infinity; what they and the plane images
 *           (groundImages.ts) leave of each spectrum is bounded and dies away, and goes to a table (remainder.ts)
 * Formula   limits: (e - e_below)/(e + e_below) and alike above, -1 at a plane; transmitted 2 e_m/(e_m + e_m+1) at
 *           each interface
 * Symbols   see reflection.ts
 * Accuracy  4e-10 absolute in units of the direct part (the test, against image series and interface conditions)
 */
import { groundImages, type ScaledPlanes } from './groundImages';
import { imagesBetweenPlanes } from './planePair';
import { remainderFamilies, type Family } from './remainder';
import type { Stack, StackLayer } from './stack';

export interface Kernel {
  readonly direct: number;
  readonly mirrors: readonly Mirror[];
  readonly rest: KernelRest | null;
}

/** - factor ln of the distance from the source's image in the height `at`. */
export interface Mirror {
  readonly factor: number;
  readonly at: number;
}

export interface KernelRest {
  readonly planes: ScaledPlanes | null;
  readonly families: readonly Family[];
  /** Where the rest is singular, or as good as: images of the source. */
  readonly images: readonly Image[];
}

/** y'' = sign y' + shift. */
export interface Image {
  readonly sign: 1 | -1;
  readonly shift: number;
}

export type { Family } from './remainder';

/** Source in layer `lower`, observer in layer `upper`, which is the same or one above. */
export function layeredKernel(stack: Stack, lower: number, upper: number): Kernel {
  const { layers } = stack;
  const ground = groundImages(stack, lower, upper);
  const [source, observer] = [layers[lower], layers[upper]];
  let direct = 1 / source.permittivity;
  for (let i = lower; i < upper; i += 1) direct *= (2 * layers[i].permittivity) / (layers[i].permittivity + layers[i + 1].permittivity);
  const limits = {
    direct,
    below: source.bottom === -Infinity ? 0 : direct * reflection(source, layers[lower - 1]) + planeShare(ground.planes, layers[lower - 1]),
    above: observer.top === Infinity ? 0 : direct * reflection(observer, layers[upper + 1]) + planeShare(ground.planes, layers[upper + 1]),
  };
  const mirrors = [{ factor: limits.below, at: source.bottom }, { factor: limits.above, at: observer.top }, ...ground.mirrors]
    .filter(({ factor }) => negligible * direct < Math.abs(factor));
  const families = layers.length === 1 ? [] : remainderFamilies(stack, lower, upper, limits, ground);
  const images = [...families.map(imageOfFamily), ...planeImages(ground.planes)];
  return { direct, mirrors, rest: images.length === 0 ? null : { planes: ground.planes, families, images } };
}

/** `y` in the layer `upper`, `ySource` in the layer `lower` for which the kernel was made. */
export function restValue({ planes, families }: KernelRest, dx: number, y: number, ySource: number): number {
  const images = planes === null ? 0 : planes.factor * imagesBetweenPlanes(planes, dx, y, ySource);
  return images + remainderValue(families, dx, y, ySource);
}

/** The part of the rest that is in tables. */
export function remainderValue(families: readonly Family[], dx: number, y: number, ySource: number): number {
  const across = dx < 0 ? -dx : dx;
  let sum = 0;
  for (let i = 0; i < families.length; i += 1) {
    const family = families[i];
    sum += family.table.value(family.observer * y + family.source * ySource + family.offset, across);
  }
  return sum;
}

const negligible = 1e-15;

const reflection = ({ permittivity }: StackLayer, beyond: StackLayer | undefined) =>
  (beyond === undefined ? -1 : (permittivity - beyond.permittivity) / (permittivity + beyond.permittivity));

/** At a plane the closed form holds an image already, if not in its full strength. */
const planeShare = (planes: ScaledPlanes | null, beyond: StackLayer | undefined) => (beyond === undefined ? planes?.factor ?? 0 : 0);

function imageOfFamily({ observer, source, offset }: Family): Image {
  // observer y + source y' + offset = 0 at y = -observer (source y' + offset).
  return { sign: observer === source ? -1 : 1, shift: -observer * offset };
}

function planeImages(planes: ScaledPlanes | null): Image[] {
  if (planes === null) return [];
  const { low, high } = planes;
  return [{ sign: -1, shift: 2 * low }, { sign: -1, shift: 2 * high }, { sign: 1, shift: 2 * (high - low) }, { sign: 1, shift: -2 * (high - low) }];
}
