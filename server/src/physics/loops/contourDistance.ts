/**
 * Nearest approach of two contours, middle line to middle line.
 *
 * Method    sides pair by pair, most of them dismissed by the balls around them; a circle's distance to a point is closed, and its
 *           smallest value along another path is searched from samples by golden sections
 * Accuracy  rounding for polygons; 1e-8 of the path with a circle
 */
import { metres, type Length } from '../../units/quantity';
import type { Contour } from './contour';
import { pathsOf, type CirclePath, type CurrentPaths } from './currentPaths';
import { filamentStride } from './filamentMutual';
import { segmentDistance } from './segmentDistance';
import { cross, difference, dot, frameAround, norm, sum, type Vector } from './vector';

export function contourDistance(first: Contour, second: Contour): Length {
  return metres(pathDistance(pathsOf(first), pathsOf(second)));
}

export function pathDistance(first: CurrentPaths, second: CurrentPaths): number {
  let least = filamentsApart(first.filaments, second.filaments);
  const circleToFilaments = (circle: CirclePath, filaments: Float64Array): void => {
    for (let at = 0; at < filaments.length; at += filamentStride) {
      const start: Vector = [filaments[at], filaments[at + 1], filaments[at + 2]];
      const direction: Vector = [filaments[at + 3], filaments[at + 4], filaments[at + 5]];
      least = Math.min(least, smallest((t) => fromCircle(circle, sum(start, direction, t)), 0, filaments[at + 6], 16));
    }
  };
  for (const circle of first.circles) circleToFilaments(circle, second.filaments);
  for (const circle of second.circles) circleToFilaments(circle, first.filaments);
  for (const circle of first.circles) {
    for (const { centre, normal, radius } of second.circles) {
      const [u, v] = frameAround(normal);
      const place = (angle: number): Vector => sum(sum(centre, u, radius * Math.cos(angle)), v, radius * Math.sin(angle));
      least = Math.min(least, smallest((angle) => fromCircle(circle, place(angle)), 0, 2 * Math.PI, 64));
    }
  }
  return least;
}

function filamentsApart(first: Float64Array, second: Float64Array): number {
  let least = Infinity;
  for (let i = 0; i < first.length; i += filamentStride) {
    const half = first[i + 6] / 2;
    for (let j = 0; j < second.length; j += filamentStride) {
      const other = second[j + 6] / 2;
      const x = first[i] + half * first[i + 3] - second[j] - other * second[j + 3];
      const y = first[i + 1] + half * first[i + 4] - second[j + 1] - other * second[j + 4];
      const z = first[i + 2] + half * first[i + 5] - second[j + 2] - other * second[j + 5];
      if (least <= Math.sqrt(x * x + y * y + z * z) - half - other) continue;
      least = Math.min(least, segmentDistance(placeOf(first, i), alongOf(first, i), placeOf(second, j), alongOf(second, j)));
    }
  }
  return least;
}

function placeOf(filaments: Float64Array, at: number): Vector {
  return [filaments[at], filaments[at + 1], filaments[at + 2]];
}

function alongOf(filaments: Float64Array, at: number): Vector {
  const length = filaments[at + 6];
  return [length * filaments[at + 3], length * filaments[at + 4], length * filaments[at + 5]];
}

function fromCircle({ centre, normal, radius }: CirclePath, place: Vector): number {
  const from = difference(place, centre);
  return Math.hypot(norm(cross(from, normal)) - radius, dot(from, normal));
}

/** Around every sample that is lower than its neighbours. */
function smallest(f: (t: number) => number, low: number, high: number, samples: number): number {
  const step = (high - low) / samples;
  const values = Array.from({ length: samples + 1 }, (_, at) => f(low + at * step));
  let least = Infinity;
  values.forEach((value, at) => {
    if ((values[at - 1] ?? Infinity) < value || (values[at + 1] ?? Infinity) < value) return;
    least = Math.min(least, value, goldenSection(f, Math.max(low, low + (at - 1) * step), Math.min(high, low + (at + 1) * step)));
  });
  return least;
}

const golden = (Math.sqrt(5) - 1) / 2;

function goldenSection(f: (t: number) => number, from: number, to: number): number {
  let [low, high] = [from, to];
  let left = high - golden * (high - low);
  let right = low + golden * (high - low);
  let [atLeft, atRight] = [f(left), f(right)];
  for (let step = 0; step < 45; step += 1) {
    if (atLeft < atRight) {
      [high, right, atRight] = [right, left, atLeft];
      left = high - golden * (high - low);
      atLeft = f(left);
    } else {
      [low, left, atLeft] = [left, right, atRight];
      right = low + golden * (high - low);
      atRight = f(right);
    }
  }
  return Math.min(atLeft, atRight);
}
