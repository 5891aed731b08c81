/**
 * Flux of the charge of one straight side through a panel, for every pair of polynomials of the two.
 *
 *   block[n, m] = integral over `target` of p_n (Legendre) E_normal, of the charge w p_m of `source`
 *
 * Method    E is minus the gradient of the kernel. Each part of the kernel that is far is taken from node to node. Near
 *           logarithms: the flux of each point of the source is exact (fluxMoments.ts), and the source is halved until
 *           its parts are short beside their distance from the target's ends, the only places where that flux is
 *           singular. The near rest: product of Gauss rules on parts short beside the distance of its image
 * Accuracy  1e-6 of the largest entry (the test, against subdivision)
 */
import type { Segment, Side } from '../basis/side';
import { segmentDistance } from '../galerkin/segmentDistance';
import type { Family, Kernel } from '../kernel/layeredKernel';
import { addNearLogarithm } from './fluxLogarithm';
import { addProduct, farPoints, forgetLines, keepLine, plainBasis } from './fluxProduct';
import { addNearRest } from './fluxRest';

/** Adds scale × flux to `block`, target.order × source.order. */
export function addFluxBlock(kernel: Kernel, target: Side, source: Side, scale: number, block: Float64Array): void {
  const legendre = plainBasis();
  const longer = Math.max(target.length, source.length);
  // Images lie above or below their source: what is far enough across needs no distances.
  const across = acrossGap(target, source);
  if (farRatio * longer <= across) {
    forgetLines();
    keepLine(scale * kernel.direct, 1, 0);
    for (const { factor, at } of kernel.mirrors) keepLine(scale * factor, -1, 2 * at);
    addProduct(target, source, legendre.whole(farPoints(across / target.length, target.order)), source.basis.whole(farPoints(across / source.length, source.order)), kernel.rest?.families ?? none, scale, block);
    return;
  }
  let nearest = Infinity;
  const { rest } = kernel;
  let families: readonly Family[] = none;
  forgetLines();
  if (rest !== null) {
    let distance = Infinity;
    for (const { sign, shift } of rest.images) distance = Math.min(distance, segmentDistance(target, writeImage(source, sign, shift)));
    if (farRatio * longer <= distance) {
      families = rest.families;
      nearest = distance;
    } else addNearRest(rest, target, source, scale, block);
  }
  if (!collinear(target, source)) nearest = Math.min(nearest, placeLine(target, source, scale * kernel.direct, 1, 0, block));
  for (const { factor, at } of kernel.mirrors) nearest = Math.min(nearest, placeLine(target, source, scale * factor, -1, 2 * at, block));
  if (nearest < Infinity) {
    const targetRule = legendre.whole(farPoints(nearest / target.length, target.order));
    const sourceRule = source.basis.whole(farPoints(nearest / source.length, source.order));
    addProduct(target, source, targetRule, sourceRule, families, scale, block);
  }
}

const none: readonly Family[] = [];

/** Its distance if it is far, and is kept; otherwise it has been added. */
function placeLine(target: Side, source: Side, factor: number, sign: 1 | -1, shift: number, block: Float64Array): number {
  const image = writeImage(source, sign, shift);
  const distance = segmentDistance(target, image);
  if (distance < farRatio * Math.max(target.length, source.length)) {
    addNearLogarithm(target, source, image, factor, block);
    return Infinity;
  }
  keepLine(factor, sign, shift);
  return distance;
}

const imaged = { x0: 0, y0: 0, x1: 0, y1: 0 };

/** Into `imaged`: the source mirrored and shifted in height. */
function writeImage({ x0, y0, x1, y1 }: Segment, sign: 1 | -1, shift: number): Segment {
  imaged.x0 = x0;
  imaged.y0 = sign * y0 + shift;
  imaged.x1 = x1;
  imaged.y1 = sign * y1 + shift;
  return imaged;
}

/** How far two sides are apart across the section; below 0 where they overlap. */
export function acrossGap(a: Segment, b: Segment): number {
  return Math.max(Math.min(a.x0, a.x1) - Math.max(b.x0, b.x1), Math.min(b.x0, b.x1) - Math.max(a.x0, a.x1));
}

const farRatio = 0.8;
/** Where the logarithm's own flux is zero: the charge lies in the target's line. */
function collinear(a: Segment, b: Segment): boolean {
  const dx = a.x1 - a.x0;
  const dy = a.y1 - a.y0;
  const off = (x: number, y: number) => Math.abs(dx * (y - a.y0) - dy * (x - a.x0)) <= 1e-12 * (dx * dx + dy * dy + Math.abs(dx * (x - a.x0)) + Math.abs(dy * (y - a.y0)));
  return off(b.x0, b.y0) && off(b.x1, b.y1);
}
