/**
 * Shortest distance between two straight segments, each given by its start, its vector to the end, and numbers only.
 *
 * Method    the least of: the common perpendicular where its feet lie within both; each end to the other segment
 * Source    elementary geometry      Accuracy  rounding of the larger of both sizes and the distance
 */
import { cross, difference, dot, norm, sum, type Vector } from './vector';

export function segmentDistance(start1: Vector, along1: Vector, start2: Vector, along2: Vector): number {
  const between = difference(start2, start1);
  const normal = cross(along1, along2);
  const size = norm(normal);
  if (1e-12 * norm(along1) * norm(along2) < size) {
    const foot1 = dot(cross(between, along2), normal) / size / size;
    const foot2 = dot(cross(between, along1), normal) / size / size;
    if (0 <= foot1 && foot1 <= 1 && 0 <= foot2 && foot2 <= 1) return norm(difference(sum(start1, along1, foot1), sum(start2, along2, foot2)));
  }
  return Math.min(
    pointToSegment(start1, start2, along2),
    pointToSegment(sum(start1, along1), start2, along2),
    pointToSegment(start2, start1, along1),
    pointToSegment(sum(start2, along2), start1, along1),
  );
}

export function pointToSegment(point: Vector, start: Vector, along: Vector): number {
  const from = difference(point, start);
  const square = dot(along, along);
  const foot = square === 0 ? 0 : Math.min(1, Math.max(0, dot(from, along) / square));
  return norm(sum(from, along, -foot));
}
