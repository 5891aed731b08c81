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
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Segment, Side } from '../basis/side';
import { sideBasis, type SideBasis } from '../basis/sideBasis';
import { imageOf } from '../galerkin/pairIntegral';
import { segmentDistance } from '../galerkin/segmentDistance';
import type { Family, Image, Kernel, KernelRest } from '../kernel/layeredKernel';
import { writeFluxMoments } from './fluxMoments';
import { nearRule } from './nearRules';

/** Adds scale × flux to `block`, target.order × source.order. */
export function addFluxBlock(kernel: Kernel, target: Side, source: Side, scale: number, block: Float64Array): void {
  const legendre = plainBasis();
  const longer = Math.max(target.length, source.length);
  // Images lie above or below their source: what is far enough across needs no distances.
  const across = acrossGap(target, source);
  if (farRatio * longer <= across) {
    farLines = 0;
    keepLine(scale * kernel.direct, 1, 0);
    for (const { factor, at } of kernel.mirrors) keepLine(scale * factor, -1, 2 * at);
    addProduct(target, source, legendre.whole(farPoints(across / target.length, target.order)), source.basis.whole(farPoints(across / source.length, source.order)), farLines, kernel.rest?.families ?? none, scale, block);
    return;
  }
  let nearest = Infinity;
  farLines = 0;
  if (!collinear(target, source)) nearest = placeLine(target, source, scale * kernel.direct, identity, block);
  for (const { factor, at } of kernel.mirrors) nearest = Math.min(nearest, placeLine(target, source, scale * factor, { sign: -1, shift: 2 * at }, block));
  const { rest } = kernel;
  let families: readonly Family[] = none;
  if (rest !== null) {
    let distance = Infinity;
    for (const image of rest.images) distance = Math.min(distance, segmentDistance(target, imageOf(source, image)));
    if (farRatio * longer <= distance) {
      families = rest.families;
      nearest = Math.min(nearest, distance);
    } else addNearRest(rest, target, source, distance, scale, block);
  }
  if (nearest < Infinity) {
    const targetRule = legendre.whole(farPoints(nearest / target.length, target.order));
    const sourceRule = source.basis.whole(farPoints(nearest / source.length, source.order));
    addProduct(target, source, targetRule, sourceRule, farLines, families, scale, block);
  }
}

const identity: Image = { sign: 1, shift: 0 };
const none: readonly Family[] = [];
let plain: SideBasis | null = null;
/** The Legendre polynomials that fluxes are tested with. */
export const plainBasis = () => (plain ??= sideBasis(0, 0));

/** Logarithms that are far from the target, kept for addProduct: their factors and where they put the source. */
const farFactors = new Float64Array(8);
const farSigns = new Float64Array(8);
const farShifts = new Float64Array(8);
let farLines = 0;

/** Its distance if it is far, and is kept; otherwise it has been added. */
function placeLine(target: Side, source: Side, factor: number, image: Image, block: Float64Array): number {
  const imaged = imageOf(source, image);
  const distance = segmentDistance(target, imaged);
  if (distance < farRatio * Math.max(target.length, source.length)) {
    addNearLogarithm(target, { ...source, ...imaged }, factor, block);
    return Infinity;
  }
  keepLine(factor, image.sign, image.shift);
  return distance;
}

function keepLine(factor: number, sign: number, shift: number): void {
  farFactors[farLines] = factor;
  farSigns[farLines] = sign;
  farShifts[farLines] = shift;
  farLines += 1;
}

/** How far two sides are apart across the section; below 0 where they overlap. */
export function acrossGap(a: Segment, b: Segment): number {
  return Math.max(Math.min(a.x0, a.x1) - Math.max(b.x0, b.x1), Math.min(b.x0, b.x1) - Math.max(a.x0, a.x1));
}

const farRatio = 0.8;
/** Distance from the target's ends over the length of a part of the source. */
const clearance = 0.6;
const deepest = 9;

/** Where the logarithm's own flux is zero: the charge lies in the target's line. */
function collinear(a: Segment, b: Segment): boolean {
  const dx = a.x1 - a.x0;
  const dy = a.y1 - a.y0;
  const off = (x: number, y: number) => Math.abs(dx * (y - a.y0) - dy * (x - a.x0)) <= 1e-12 * (dx * dx + dy * dy + Math.abs(dx * (x - a.x0)) + Math.abs(dy * (y - a.y0)));
  return off(b.x0, b.y0) && off(b.x1, b.y1);
}

/** Nodes that leave 1e-5 of an entry: the Gauss error is that of Bernstein's ellipse through the nearest singularity. */
function farPoints(relative: number, order: number): number {
  const ellipse = Math.log(2 * relative + Math.sqrt(4 * relative * relative + 1));
  return Math.max(Math.ceil(order / 2) + 1, Math.ceil(6 / ellipse + order / 4));
}

const row = new Float64Array(polynomialLimit);

/** From node to node: -grad of the first `lines` far logarithms and of each family, times the target's length along its normal. */
function addProduct(target: Side, source: Side, targetRule: PartRule, sourceRule: PartRule, lines: number, families: readonly Family[], scale: number, block: Float64Array): void {
  const rows = target.order;
  const columns = source.order;
  // The normal is (-up, across) / length.
  const across = target.x1 - target.x0;
  const up = target.y1 - target.y0;
  const sourceAcross = source.x1 - source.x0;
  const sourceUp = source.y1 - source.y0;
  for (let g = 0; g < targetRule.count; g += 1) {
    const x = target.x0 + across * targetRule.t[g];
    const y = target.y0 + up * targetRule.t[g];
    for (let m = 0; m < columns; m += 1) row[m] = 0;
    for (let f = 0; f < sourceRule.count; f += 1) {
      const dx = x - source.x0 - sourceAcross * sourceRule.t[f];
      const ySource = source.y0 + sourceUp * sourceRule.t[f];
      let sum = 0;
      for (let i = 0; i < lines; i += 1) {
        const dy = y - farSigns[i] * ySource - farShifts[i];
        sum += (farFactors[i] * (across * dy - up * dx)) / (dx * dx + dy * dy);
      }
      for (let i = 0; i < families.length; i += 1) {
        const family = families[i];
        sum -= scale * family.table.slope(family.observer * y + family.source * ySource + family.offset, dx < 0 ? -dx : dx, across * family.observer, dx < 0 ? up : -up);
      }
      const at = f * polynomialLimit;
      for (let m = 0; m < columns; m += 1) row[m] += sum * sourceRule.weighted[at + m];
    }
    const at = g * polynomialLimit;
    for (let n = 0; n < rows; n += 1) {
      const weight = targetRule.weighted[at + n];
      for (let m = 0; m < columns; m += 1) block[n * columns + m] += weight * row[m];
    }
  }
}

function addNearLogarithm(target: Side, source: Side, scale: number, block: Float64Array, level = 0, index = 0): void {
  const size = 2 ** -level;
  const [x0, y0, x1, y1] = [alongX(source, index * size), alongY(source, index * size), alongX(source, (index + 1) * size), alongY(source, (index + 1) * size)];
  const distance = Math.min(pointDistance(target.x0, target.y0, x0, y0, x1, y1), pointDistance(target.x1, target.y1, x0, y0, x1, y1));
  if (level < deepest && distance < clearance * source.length * size) {
    addNearLogarithm(target, source, scale, block, level + 1, 2 * index);
    addNearLogarithm(target, source, scale, block, level + 1, 2 * index + 1);
  } else addExact(target, source, nearRule(source.basis, level, index, distance / (source.length * size), source.order), scale, block);
}

function pointDistance(x: number, y: number, x0: number, y0: number, x1: number, y1: number): number {
  const dx = x1 - x0;
  const dy = y1 - y0;
  const t = Math.min(1, Math.max(0, ((x - x0) * dx + (y - y0) * dy) / (dx * dx + dy * dy)));
  return Math.hypot(x - x0 - t * dx, y - y0 - t * dy);
}

const alongX = ({ x0, x1 }: Segment, t: number) => x0 + (x1 - x0) * t;
const alongY = ({ y0, y1 }: Segment, t: number) => y0 + (y1 - y0) * t;

const moments = new Float64Array(polynomialLimit);
const rootOdd = Float64Array.from({ length: polynomialLimit }, (_, n) => Math.sqrt(2 * n + 1));

/** Source points one by one, each with its exact flux where it is near. */
function addExact(target: Side, source: Side, rule: PartRule, scale: number, block: Float64Array): void {
  const half = target.length / 2;
  const cosine = (target.x1 - target.x0) / target.length;
  const sine = (target.y1 - target.y0) / target.length;
  const middleX = (target.x0 + target.x1) / 2;
  const middleY = (target.y0 + target.y1) / 2;
  const rows = target.order;
  const columns = source.order;
  for (let f = 0; f < rule.count; f += 1) {
    const dx = source.x0 + (source.x1 - source.x0) * rule.t[f] - middleX;
    const dy = source.y0 + (source.y1 - source.y0) * rule.t[f] - middleY;
    const xi = (dx * cosine + dy * sine) / half;
    const eta = (dy * cosine - dx * sine) / half;
    if (xi * xi + eta * eta < 9) {
      writeFluxMoments(xi, eta, rows, moments);
      for (let n = 0; n < rows; n += 1) moments[n] *= rootOdd[n];
    } else writeDistantMoments(xi, eta, rows, plainBasis().whole(rows + 4));
    const at = f * polynomialLimit;
    for (let n = 0; n < rows; n += 1) {
      const value = scale * moments[n];
      for (let m = 0; m < columns; m += 1) block[n * columns + m] += value * rule.weighted[at + m];
    }
  }
}

/** The same moments by Gauss points on the target, where the recurrence would lose digits. */
function writeDistantMoments(xi: number, eta: number, rows: number, rule: PartRule): void {
  moments.fill(0, 0, rows);
  for (let g = 0; g < rule.count; g += 1) {
    const along = 2 * rule.t[g] - 1 - xi;
    const flux = (-2 * eta) / (along * along + eta * eta);
    for (let n = 0; n < rows; n += 1) moments[n] += flux * rule.weighted[g * polynomialLimit + n];
  }
}

function addNearRest({ families }: KernelRest, target: Side, source: Side, distance: number, scale: number, block: Float64Array): void {
  for (const sourceRule of partsFor(source, source.basis, distance)) {
    for (const targetRule of partsFor(target, plainBasis(), distance)) addProduct(target, source, targetRule, sourceRule, 0, families, scale, block);
  }
}

/** The whole side, or as many equal parts as make each short beside the distance of the kernel's singularity. */
function partsFor(side: Side, basis: SideBasis, distance: number): PartRule[] {
  if (side.length <= 3 * distance) return [basis.whole(farPoints(distance / side.length, side.order))];
  // Nine nodes leave 1e-5 of the rest at this length, which is itself a correction.
  const level = Math.min(6, Math.max(1, Math.ceil(Math.log2(side.length / (3 * distance)))));
  return Array.from({ length: 2 ** level }, (_, index) => basis.part(level, index));
}
