/**
 * Flux through a panel of a charge near it, for the kernel's logarithms: the flux of each point of the source is exact, and
 * the source is halved until its parts are short beside their distance from the target's ends, the only places where that
 * flux is singular.
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Segment, Side } from '../basis/side';
import { writeFluxMoments } from './fluxMoments';
import { plainBasis } from './fluxProduct';
import { nearRule } from './nearRules';

/** `place` is where the source, or its image, lies. */
export function addNearLogarithm(target: Side, source: Side, place: Segment, scale: number, block: Float64Array, level = 0, index = 0): void {
  const size = 2 ** -level;
  const x0 = place.x0 + (place.x1 - place.x0) * index * size;
  const y0 = place.y0 + (place.y1 - place.y0) * index * size;
  const x1 = place.x0 + (place.x1 - place.x0) * (index + 1) * size;
  const y1 = place.y0 + (place.y1 - place.y0) * (index + 1) * size;
  const distance = Math.min(pointDistance(target.x0, target.y0, x0, y0, x1, y1), pointDistance(target.x1, target.y1, x0, y0, x1, y1));
  if (level < deepest && distance < clearance * source.length * size) {
    addNearLogarithm(target, source, place, scale, block, level + 1, 2 * index);
    addNearLogarithm(target, source, place, scale, block, level + 1, 2 * index + 1);
  } else addExact(target, source, place, nearRule(source.basis, level, index, distance / (source.length * size), source.order), scale, block);
}

/** Distance from the target's ends over the length of a part of the source. */
const clearance = 0.6;
const deepest = 9;

function pointDistance(x: number, y: number, x0: number, y0: number, x1: number, y1: number): number {
  const dx = x1 - x0;
  const dy = y1 - y0;
  const t = Math.min(1, Math.max(0, ((x - x0) * dx + (y - y0) * dy) / (dx * dx + dy * dy)));
  return Math.hypot(x - x0 - t * dx, y - y0 - t * dy);
}

const moments = new Float64Array(polynomialLimit);
const rootOdd = Float64Array.from({ length: polynomialLimit }, (_, n) => Math.sqrt(2 * n + 1));

/** Source points one by one, each with its exact flux where it is near. */
function addExact(target: Side, source: Side, place: Segment, rule: PartRule, scale: number, block: Float64Array): void {
  const half = target.length / 2;
  const cosine = (target.x1 - target.x0) / target.length;
  const sine = (target.y1 - target.y0) / target.length;
  const middleX = (target.x0 + target.x1) / 2;
  const middleY = (target.y0 + target.y1) / 2;
  const rows = target.order;
  const columns = source.order;
  for (let f = 0; f < rule.count; f += 1) {
    const dx = place.x0 + (place.x1 - place.x0) * rule.t[f] - middleX;
    const dy = place.y0 + (place.y1 - place.y0) * rule.t[f] - middleY;
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
