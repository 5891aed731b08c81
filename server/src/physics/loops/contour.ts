/**
 * The path of a loop's current: a closed polygon, or a circle, in space.
 *
 *      y ^   4 ---<--- 3      rectangle: along +x first, anticlockwise seen from above
 *        |   |         |      circle: anticlockwise about its normal, which is +z before it is turned
 *        |   1 --->--- 2      path: in the order of its points, the last joined to the first
 *        +-----------> x      trace: out along +x at its own height, back along -x at that of the plane
 *
 * Model     a line without thickness along the middle of the conductor; `turns` rotate about the shape's centre, one after the other,
 *           by the right-hand rule about fixed axes. The centre of a path is the middle of the box around it
 * Range     sizes from 1e-13 m to 1e7 m, at most 1000 points
 * Refuses   what is not a closed line: see ContourRefusal; it never throws on numbers
 */
import { metres, type Angle, type Length } from '../../units/quantity';
import { contourFault, type ContourFault } from './contourFault';
import { cross, difference, norm, type Vector } from './vector';

export type Contour = PolygonContour | CircleContour;

export interface PolygonContour {
  readonly form: 'polygon';
  /** x, y, z of each corner in the direction of the current; m. */
  readonly points: Float64Array;
}

export interface CircleContour {
  readonly form: 'circle';
  readonly centre: Vector;
  /** Of length 1; the current runs anticlockwise about it. */
  readonly normal: Vector;
  readonly radius: Length;
}

export interface ContourPoint {
  readonly x: Length;
  readonly y: Length;
  readonly z: Length;
}

/** Every height stated: where a conductor's middle lies is for the caller to say. */
export type ContourShape =
  /** `at`: the corner of smallest x and y. */
  | { readonly form: 'rectangle'; readonly width: Length; readonly height: Length; readonly at: ContourPoint }
  | { readonly form: 'circle'; readonly diameter: Length; readonly at: ContourPoint }
  | { readonly form: 'path'; readonly points: readonly ContourPoint[] }
  /** `at`: where the trace starts; `planeZ`: the face of the plane that the current returns in. */
  | { readonly form: 'trace'; readonly length: Length; readonly planeZ: Length; readonly at: ContourPoint };

export interface ContourTurn {
  readonly angle: Angle;
  readonly axis: 'x' | 'y' | 'z';
}

export type ContourRefusal = { readonly reason: 'not-a-number' | 'no-size' | 'out-of-range' } | { readonly reason: 'too-many-points'; readonly limit: number } | ContourFault;

export type LoopContour = { readonly contour: Contour } | { readonly refused: ContourRefusal };

export function loopContour(shape: ContourShape, turns: readonly ContourTurn[] = []): LoopContour {
  if (turns.some(({ angle }) => !Number.isFinite(angle))) return { refused: { reason: 'not-a-number' } };
  return shape.form === 'circle' ? circle(shape, turns) : polygon(shape, turns);
}

/** Of the work that a mutual inductance takes, which grows with the square. */
export const mostPoints = 1000;
const smallest = 1e-13;
const largest = 1e7;

function circle({ diameter, at }: Extract<ContourShape, { form: 'circle' }>, turns: readonly ContourTurn[]): LoopContour {
  const centre: Vector = [at.x, at.y, at.z];
  if (![...centre, diameter].every(Number.isFinite)) return { refused: { reason: 'not-a-number' } };
  if (!(0 < diameter)) return { refused: { reason: 'no-size' } };
  if (diameter < smallest || largest < diameter || centre.some((value) => largest < Math.abs(value))) return { refused: { reason: 'out-of-range' } };
  const normal = turned([0, 0, 1], turns);
  const size = norm(normal);
  return { contour: { form: 'circle', centre, normal: [normal[0] / size, normal[1] / size, normal[2] / size], radius: metres(diameter / 2) } };
}

function polygon(shape: Exclude<ContourShape, { form: 'circle' }>, turns: readonly ContourTurn[]): LoopContour {
  if (shape.form === 'path' && mostPoints < shape.points.length) return { refused: { reason: 'too-many-points', limit: mostPoints } };
  const corners = cornersOf(shape);
  if (!corners.flat().every(Number.isFinite)) return { refused: { reason: 'not-a-number' } };
  if (shape.form === 'rectangle' && !(0 < shape.width && 0 < shape.height)) return { refused: { reason: 'no-size' } };
  if (shape.form === 'trace' && !(0 < shape.length && shape.at.z !== shape.planeZ)) return { refused: { reason: 'no-size' } };
  const box = boxOf(corners);
  const size = norm(difference(box.high, box.low));
  if (size === 0) return { refused: { reason: 'no-size' } };
  if (size < smallest || corners.some((corner) => corner.some((value) => largest < Math.abs(value)))) return { refused: { reason: 'out-of-range' } };
  const centre: Vector = [(box.low[0] + box.high[0]) / 2, (box.low[1] + box.high[1]) / 2, (box.low[2] + box.high[2]) / 2];
  const placed = turns.length === 0 ? corners : corners.map((corner) => moved(turned(difference(corner, centre), turns), centre));
  const points = withoutRepeats(placed, 1e-12 * size);
  if (points.length < 3) return { refused: { reason: 'no-size' } };
  const contour: PolygonContour = { form: 'polygon', points: Float64Array.from(points.flat()) };
  const fault = contourFault(contour, 1e-13 * size);
  return fault === null ? { contour } : { refused: fault };
}

function cornersOf(shape: Exclude<ContourShape, { form: 'circle' }>): readonly Vector[] {
  if (shape.form === 'path') return shape.points.map(({ x, y, z }): Vector => [x, y, z]);
  const { x, y, z } = shape.at;
  if (shape.form === 'trace') return [[x, y, z], [x + shape.length, y, z], [x + shape.length, y, shape.planeZ], [x, y, shape.planeZ]];
  return [[x, y, z], [x + shape.width, y, z], [x + shape.width, y + shape.height, z], [x, y + shape.height, z]];
}

function boxOf(corners: readonly Vector[]): { low: Vector; high: Vector } {
  const low: [number, number, number] = [Infinity, Infinity, Infinity];
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity];
  for (const corner of corners) {
    for (let axis = 0; axis < 3; axis += 1) {
      low[axis] = Math.min(low[axis], corner[axis]);
      high[axis] = Math.max(high[axis], corner[axis]);
    }
  }
  return corners.length === 0 ? { low: [0, 0, 0], high: [0, 0, 0] } : { low, high };
}

function turned(vector: Vector, turns: readonly ContourTurn[]): Vector {
  return turns.reduce<Vector>((now, { angle, axis }) => {
    const about: Vector = [axis === 'x' ? 1 : 0, axis === 'y' ? 1 : 0, axis === 'z' ? 1 : 0];
    const { cosine, sine } = rotation(angle);
    const aside = cross(about, now);
    const along = now[axis === 'x' ? 0 : axis === 'y' ? 1 : 2];
    return [0, 1, 2].map((i) => cosine * now[i] + sine * aside[i] + (1 - cosine) * along * about[i]) as unknown as Vector;
  }, vector);
}

/** Quarter turns exactly: a loop that was turned by 90 deg stands at right angles, not nearly so. */
function rotation(angle: number): { cosine: number; sine: number } {
  const quarters = (2 * angle) / Math.PI;
  const nearest = Math.round(quarters);
  if (Math.abs(quarters - nearest) < 1e-12) {
    const quarter = ((nearest % 4) + 4) % 4;
    return { cosine: [1, 0, -1, 0][quarter], sine: [0, 1, 0, -1][quarter] };
  }
  return { cosine: Math.cos(angle), sine: Math.sin(angle) };
}

function moved(vector: Vector, by: Vector): Vector {
  return [vector[0] + by[0], vector[1] + by[1], vector[2] + by[2]];
}

/** A point written twice, as the first one again at the end, is one corner. */
function withoutRepeats(corners: readonly Vector[], within: number): readonly Vector[] {
  const kept = corners.filter((corner, at) => at === 0 || within < norm(difference(corner, corners[at - 1])));
  while (1 < kept.length && norm(difference(kept[0], kept[kept.length - 1])) <= within) kept.pop();
  return kept;
}
