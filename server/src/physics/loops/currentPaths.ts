/**
 * Contours as the integrals see them: straight filaments in one flat array, and circles. A contour over a plane and its image are one
 * set of paths, without what lies in the plane: there current and image cancel.
 */
import type { Contour, CircleContour } from './contour';
import { filamentStride } from './filamentMutual';
import type { Vector } from './vector';

export interface CurrentPaths {
  /** `filamentStride` numbers each: start, unit direction, length; m. */
  readonly filaments: Float64Array;
  readonly circles: readonly CirclePath[];
}

export interface CirclePath {
  readonly centre: Vector;
  readonly normal: Vector;
  readonly radius: number;
}

export interface Ball {
  readonly centre: Vector;
  readonly radius: number;
}

export function pathsOf(contour: Contour): CurrentPaths {
  return contour.form === 'circle' ? { filaments: new Float64Array(0), circles: [contour satisfies CircleContour] } : { filaments: filamentsOf(contour.points), circles: [] };
}

/** Those of a contour that lie in the plane at height z are left out. */
export function withoutPlane({ filaments, circles }: CurrentPaths, z: number, within: number): CurrentPaths {
  const kept: number[] = [];
  for (let at = 0; at < filaments.length; at += filamentStride) {
    const start = filaments[at + 2];
    const end = start + filaments[at + 5] * filaments[at + 6];
    if (within < Math.abs(start - z) || within < Math.abs(end - z)) for (let i = 0; i < filamentStride; i += 1) kept.push(filaments[at + i]);
  }
  return { filaments: Float64Array.from(kept), circles: circles.filter(({ centre, normal }) => within < Math.abs(centre[2] - z) || Math.abs(normal[2]) < 1 - 1e-12) };
}

/** The image in the horizontal plane at height z: mirrored, with its current reversed. */
export function imageIn({ filaments, circles }: CurrentPaths, z: number): CurrentPaths {
  const mirrored = new Float64Array(filaments.length);
  for (let at = 0; at < filaments.length; at += filamentStride) {
    const length = filaments[at + 6];
    // From the mirrored end to the mirrored start.
    mirrored[at] = filaments[at] + length * filaments[at + 3];
    mirrored[at + 1] = filaments[at + 1] + length * filaments[at + 4];
    mirrored[at + 2] = 2 * z - filaments[at + 2] - length * filaments[at + 5];
    mirrored[at + 3] = -filaments[at + 3];
    mirrored[at + 4] = -filaments[at + 4];
    mirrored[at + 5] = filaments[at + 5];
    mirrored[at + 6] = length;
  }
  // A mirror turns the sense of rotation about the horizontal part of a normal, the reversed current about all of it.
  return {
    filaments: mirrored,
    circles: circles.map(({ centre: [x, y, height], normal: [a, b, c], radius }) => ({ centre: [x, y, 2 * z - height], normal: [a, b, -c], radius })),
  };
}

export function lifted({ filaments, circles }: CurrentPaths, by: number): CurrentPaths {
  const moved = filaments.slice();
  for (let at = 2; at < moved.length; at += filamentStride) moved[at] += by;
  return { filaments: moved, circles: circles.map(({ centre: [x, y, z], ...circle }) => ({ ...circle, centre: [x, y, z + by] })) };
}

export function together(first: CurrentPaths, second: CurrentPaths): CurrentPaths {
  const filaments = new Float64Array(first.filaments.length + second.filaments.length);
  filaments.set(first.filaments);
  filaments.set(second.filaments, first.filaments.length);
  return { filaments, circles: [...first.circles, ...second.circles] };
}

/** Around all of it: the middle of the box, and the farthest place from there. */
export function ballAround({ filaments, circles }: CurrentPaths): Ball {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  const include = (x: number, y: number, z: number): void => [x, y, z].forEach((value, axis) => {
    low[axis] = Math.min(low[axis], value);
    high[axis] = Math.max(high[axis], value);
  });
  const ends = (visit: (x: number, y: number, z: number) => void): void => {
    for (let at = 0; at < filaments.length; at += filamentStride) {
      const length = filaments[at + 6];
      visit(filaments[at], filaments[at + 1], filaments[at + 2]);
      visit(filaments[at] + length * filaments[at + 3], filaments[at + 1] + length * filaments[at + 4], filaments[at + 2] + length * filaments[at + 5]);
    }
  };
  ends(include);
  for (const { centre, radius } of circles) for (const side of [-radius, radius]) include(centre[0] + side, centre[1] + side, centre[2] + side);
  const centre: Vector = [(low[0] + high[0]) / 2, (low[1] + high[1]) / 2, (low[2] + high[2]) / 2];
  let radius = 0;
  ends((x, y, z) => (radius = Math.max(radius, Math.hypot(x - centre[0], y - centre[1], z - centre[2]))));
  for (const circle of circles) radius = Math.max(radius, Math.hypot(circle.centre[0] - centre[0], circle.centre[1] - centre[1], circle.centre[2] - centre[2]) + circle.radius);
  return { centre, radius };
}

function filamentsOf(points: Float64Array): Float64Array {
  const filaments = new Float64Array((points.length / 3) * filamentStride);
  for (let corner = 0, at = 0; corner < points.length; corner += 3, at += filamentStride) {
    const next = (corner + 3) % points.length;
    const x = points[next] - points[corner];
    const y = points[next + 1] - points[corner + 1];
    const z = points[next + 2] - points[corner + 2];
    const length = Math.hypot(x, y, z);
    filaments.set([points[corner], points[corner + 1], points[corner + 2], x / length, y / length, z / length, length], at);
  }
  return filaments;
}
