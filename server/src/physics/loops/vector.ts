/** Vectors of three, plain numbers: what the kernels of this room calculate with. */
export type Vector = readonly [x: number, y: number, z: number];

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

export function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

export function sum(a: Vector, b: Vector, times = 1): Vector {
  return [a[0] + times * b[0], a[1] + times * b[1], a[2] + times * b[2]];
}

export function difference(a: Vector, b: Vector): Vector {
  return [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
}

/** Neither overflows nor underflows before the answer does. */
export function norm(a: Vector): number {
  return Math.hypot(a[0], a[1], a[2]);
}

/** Two unit vectors that complete a unit vector to a right-handed frame. */
export function frameAround(normal: Vector): readonly [Vector, Vector] {
  const least = Math.abs(normal[0]) <= Math.abs(normal[1]) ? (Math.abs(normal[0]) <= Math.abs(normal[2]) ? 0 : 2) : Math.abs(normal[1]) <= Math.abs(normal[2]) ? 1 : 2;
  const aside = cross(normal, [least === 0 ? 1 : 0, least === 1 ? 1 : 0, least === 2 ? 1 : 0]);
  const size = norm(aside);
  const first: Vector = [aside[0] / size, aside[1] / size, aside[2] / size];
  return [first, cross(normal, first)];
}
