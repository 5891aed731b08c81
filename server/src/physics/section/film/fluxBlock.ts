/**
 * Flux of the charge of one straight segment through another, for every pair of polynomials of the two.
 *
 *   block[n, m] = integral over `target` of p_n (Legendre) E_normal, of the charge w p_m of `source`
 *
 * Method    E is minus the gradient of the kernel. Near segments: the flux of each point of the source is exact
 *           (fluxMoments.ts), and the source is halved until its parts are short beside their distance from the target's
 *           ends, the only places where that flux is singular. Far segments and the kernel's smooth rest: product of
 *           Gauss rules, on parts where a segment is long beside the distance of its image
 * Accuracy  1e-7 of the largest entry (the test, against subdivision)
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Segment, Side } from '../basis/side';
import { sideBasis } from '../basis/sideBasis';
import { imageOf } from '../galerkin/pairIntegral';
import { segmentDistance } from '../galerkin/segmentDistance';
import type { Kernel, KernelRest } from '../kernel/layeredKernel';
import { writeFluxMoments } from './fluxMoments';

/** Adds scale × flux to `block`, `target.order` × `source.order`. */
export function addFluxBlock(kernel: Kernel, target: Side, source: Side, scale: number, block: Float64Array): void {
  if (!collinear(target, source)) addLineFlux(target, source, scale * kernel.direct, block);
  for (const { factor, at } of kernel.mirrors) addLineFlux(target, mirrored(source, at), scale * factor, block);
  if (kernel.rest !== null) addRestFlux(kernel.rest, target, source, scale, block);
}

/** Where the logarithmic kernel's own flux is zero: the charge lies in the target's line. */
function collinear(a: Side, b: Side): boolean {
  const dx = a.x1 - a.x0;
  const dy = a.y1 - a.y0;
  const off = (x: number, y: number) => Math.abs(dx * (y - a.y0) - dy * (x - a.x0)) <= 1e-12 * a.length * (a.length + Math.hypot(x - a.x0, y - a.y0));
  return off(b.x0, b.y0) && off(b.x1, b.y1);
}

const mirrored = (side: Side, at: number): Side => ({ ...side, ...imageOf(side, { sign: -1, shift: 2 * at }) });

const legendre = () => sideBasis(0, 0);
const moments = new Float64Array(polynomialLimit);
const rootOdd = Float64Array.from({ length: polynomialLimit }, (_, n) => Math.sqrt(2 * n + 1));
const deepest = 9;

function addLineFlux(target: Side, source: Side, scale: number, block: Float64Array): void {
  const gap = segmentDistance(target, source);
  const longer = Math.max(target.length, source.length);
  if (farEnough * longer < gap) {
    addPairs(target, source, legendre().whole(target.order + 1), source.basis.whole(source.order + 1), scale, block);
    return;
  }
  const visit = (level: number, index: number) => {
    const size = 2 ** -level;
    const a = along(source, index * size);
    const b = along(source, (index + 1) * size);
    const length = source.length * size;
    const distance = Math.min(pointDistance(target.x0, target.y0, a, b), pointDistance(target.x1, target.y1, a, b));
    if (level < deepest && distance < clearance * length) {
      visit(level + 1, 2 * index);
      visit(level + 1, 2 * index + 1);
    } else addExact(target, source, level === 0 ? source.basis.whole(wholePoints) : source.basis.part(level, index), scale, block);
  };
  visit(0, 0);
}

/** Distance over the longer segment from which few Gauss points do. */
const farEnough = 1.5;
/** Distance from the target's ends over a part's length. */
const clearance = 0.6;
const wholePoints = 14;

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
    } else writeDistantMoments(xi, eta, rows);
    const at = f * polynomialLimit;
    for (let n = 0; n < rows; n += 1) {
      const value = scale * moments[n];
      for (let m = 0; m < columns; m += 1) block[n * columns + m] += value * rule.weighted[at + m];
    }
  }
}

/** The same moments by Gauss points on the target, where the recurrence would lose digits. */
function writeDistantMoments(xi: number, eta: number, rows: number): void {
  const rule = legendre().whole(rows + 4);
  moments.fill(0, 0, rows);
  for (let g = 0; g < rule.count; g += 1) {
    const along = 2 * rule.t[g] - 1 - xi;
    const flux = (-2 * eta) / (along * along + eta * eta);
    for (let n = 0; n < rows; n += 1) moments[n] += flux * rule.weighted[g * polynomialLimit + n];
  }
}

function addPairs(target: Side, source: Side, targetRule: PartRule, sourceRule: PartRule, scale: number, block: Float64Array): void {
  const across = target.x1 - target.x0;
  const up = target.y1 - target.y0;
  addProduct(target, source, targetRule, sourceRule, block, (dx, y, ySource) => {
    const dy = y - ySource;
    // Times the length: the normal is (-up, across) / length.
    return (scale * (across * dy - up * dx)) / (dx * dx + dy * dy);
  });
}

function addRestFlux({ families, images }: KernelRest, target: Side, source: Side, scale: number, block: Float64Array): void {
  const across = target.x1 - target.x0;
  const up = target.y1 - target.y0;
  const nearest = images.reduce((least, image) => Math.min(least, segmentDistance(target, imageOf(source, image))), Infinity);
  const field = (dx: number, y: number, ySource: number) => {
    let along = 0;
    let upward = 0;
    for (let i = 0; i < families.length; i += 1) {
      const { observer, source: sourceSign, offset, table } = families[i];
      const { re, im } = table.derivative(observer * y + sourceSign * ySource + offset, Math.abs(dx));
      along += im;
      upward -= observer * re;
    }
    return scale * (across * upward - up * (dx < 0 ? -along : along));
  };
  for (const sourceRule of partsFor(source, source.basis, nearest)) {
    for (const targetRule of partsFor(target, legendre(), nearest)) addProduct(target, source, targetRule, sourceRule, block, field);
  }
}

/** The whole segment, or as many equal parts as make each short beside the distance of the kernel's singularity. */
function partsFor(segment: Side, basis: Side['basis'], distance: number): PartRule[] {
  if (segment.length < 0.6 * distance) return [basis.whole(segment.order + 1)];
  if (segment.length < 1.5 * distance) return [basis.whole(segment.order + 4)];
  const level = Math.min(7, Math.ceil(Math.log2(segment.length / (1.5 * distance))));
  return Array.from({ length: 2 ** level }, (_, index) => basis.part(level, index));
}

const row = new Float64Array(polynomialLimit);

function addProduct(target: Side, source: Side, targetRule: PartRule, sourceRule: PartRule, block: Float64Array, field: (dx: number, y: number, ySource: number) => number): void {
  const rows = target.order;
  const columns = source.order;
  for (let g = 0; g < targetRule.count; g += 1) {
    const x = target.x0 + (target.x1 - target.x0) * targetRule.t[g];
    const y = target.y0 + (target.y1 - target.y0) * targetRule.t[g];
    row.fill(0, 0, columns);
    for (let f = 0; f < sourceRule.count; f += 1) {
      const value = field(x - source.x0 - (source.x1 - source.x0) * sourceRule.t[f], y, source.y0 + (source.y1 - source.y0) * sourceRule.t[f]);
      const at = f * polynomialLimit;
      for (let m = 0; m < columns; m += 1) row[m] += value * sourceRule.weighted[at + m];
    }
    const at = g * polynomialLimit;
    for (let n = 0; n < rows; n += 1) {
      const weight = targetRule.weighted[at + n];
      for (let m = 0; m < columns; m += 1) block[n * columns + m] += weight * row[m];
    }
  }
}

interface Point { readonly x: number; readonly y: number }

const along = ({ x0, y0, x1, y1 }: Segment, t: number): Point => ({ x: x0 + (x1 - x0) * t, y: y0 + (y1 - y0) * t });

function pointDistance(x: number, y: number, a: Point, b: Point): number {
  const dx = b.x - a.x;
  const dy = b.y - a.y;
  const t = Math.min(1, Math.max(0, ((x - a.x) * dx + (y - a.y) * dy) / (dx * dx + dy * dy)));
  return Math.hypot(x - a.x - t * dx, y - a.y - t * dy);
}
