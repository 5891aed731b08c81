/**
 * What keeps a polygon from being the path of one current: it folds back on itself, or meets itself.
 *
 * Method    every side against every other; boxes first, so that most pairs cost a comparison
 */
import type { PolygonContour } from './contour';
import { segmentDistance } from './segmentDistance';
import { cross, difference, dot, norm, type Vector } from './vector';

/** Sides by their number from 0; side n leads away from corner n. */
export type ContourFault = { readonly reason: 'folds-back' | 'meets-itself'; readonly first: number; readonly second: number };

/**
 * `clearance`: sides that are no neighbours have to be farther from each other; m. Not those whose middles the contour itself joins
 * within three times as much: a curve of short sides is no fault.
 */
export function contourFault({ points }: PolygonContour, clearance: number): ContourFault | null {
  const count = points.length / 3;
  const corner = (at: number): Vector => [points[3 * (at % count)], points[3 * (at % count) + 1], points[3 * (at % count) + 2]];
  const corners = Array.from({ length: count }, (_, at) => corner(at));
  const sides = Array.from({ length: count }, (_, at) => difference(corner(at + 1), corner(at)));
  for (let at = 0; at < count; at += 1) {
    const next = (at + 1) % count;
    const turn = norm(cross(sides[at], sides[next]));
    if (turn <= 1e-9 * norm(sides[at]) * norm(sides[next]) && dot(sides[at], sides[next]) < 0) return { reason: 'folds-back', first: at, second: next };
  }
  const reached = new Float64Array(count + 1);
  for (let at = 0; at < count; at += 1) reached[at + 1] = reached[at] + norm(sides[at]);
  const low = new Float64Array(points.length);
  const high = new Float64Array(points.length);
  for (let at = 0; at < points.length; at += 1) {
    const next = points[(at + 3) % points.length];
    low[at] = Math.min(points[at], next) - clearance;
    high[at] = Math.max(points[at], next) + clearance;
  }
  for (let first = 0; first < count; first += 1) {
    for (let second = first + 2; second < count; second += 1) {
      if (first === 0 && second === count - 1) continue;
      const between = (reached[second] + reached[second + 1] - reached[first] - reached[first + 1]) / 2;
      if (Math.min(between, reached[count] - between) < 3 * clearance) continue;
      const a = 3 * first;
      const b = 3 * second;
      if (high[a] < low[b] || high[b] < low[a] || high[a + 1] < low[b + 1] || high[b + 1] < low[a + 1] || high[a + 2] < low[b + 2] || high[b + 2] < low[a + 2]) continue;
      if (segmentDistance(corners[first], sides[first], corners[second], sides[second]) <= clearance) return { reason: 'meets-itself', first, second };
    }
  }
  return null;
}
