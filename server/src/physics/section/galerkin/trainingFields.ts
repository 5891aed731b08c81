/**
 * Potentials at the nodes of a conductor that stand for whatever lies `distance` or more to its left and right: line charges on two
 * upright lines there, dense beside the conductor and ever wider apart above and below.
 *
 * Any field from beyond the lines is one of charges on them. Sums and differences of left and right, at the nodes of one half:
 * the other's follow.
 */
import type { MirrorPairs, Moments } from './momentNodes';

export interface TrainingFields {
  /** Of the charges, above the conductor's middle and over its size. */
  readonly heights: Float64Array;
  readonly even: FieldValues;
  readonly odd: FieldValues;
}

export interface FieldValues {
  readonly count: number;
  /** Of node v of the half, field f: at v × count + f. */
  readonly values: Float64Array;
}

export function trainingFields({ x, y, left, right, bottom, top }: Moments, { own }: MirrorPairs, distance: number, effort: number): TrainingFields {
  const heights = heightsBeside({ bottom, top, distance, reach: 4 * (right - left + top - bottom), density: 2 + 0.4 * effort });
  const nodes = own.length;
  const count = heights.length;
  const even = new Float64Array(nodes * (count + 1));
  const odd = new Float64Array(nodes * count);
  const [middle, centre] = [(left + right) / 2, (bottom + top) / 2];
  for (let f = 0; f < count; f += 1) {
    const reference = Math.log((right + distance - middle) ** 2 + (heights[f] - centre) ** 2);
    for (let v = 0; v < nodes; v += 1) {
      const up = (y[own[v]] - heights[f]) ** 2;
      const fromLeft = Math.log((x[own[v]] - left + distance) ** 2 + up) - reference;
      const fromRight = Math.log((x[own[v]] - right - distance) ** 2 + up) - reference;
      even[v * (count + 1) + f] = (fromRight + fromLeft) / 4;
      odd[v * count + f] = (fromRight - fromLeft) / 4;
    }
  }
  // Whatever else is there, a constant has to be exact.
  for (let v = 0; v < nodes; v += 1) even[v * (count + 1) + count] = constantWeight;
  return { heights: Float64Array.from(heights, (height) => (height - centre) / (top - bottom + right - left)), even: { count: count + 1, values: even }, odd: { count, values: odd } };
}

const constantWeight = 30;

export interface Beside {
  readonly bottom: number;
  readonly top: number;
  readonly distance: number;
  /** How far above and below. */
  readonly reach: number;
  /** Charges in the length of the distance. */
  readonly density: number;
}

export function heightsBeside({ bottom, top, distance, reach, density }: Beside): number[] {
  // As good as a line of charge to e^(-2 pi density).
  const steps = Math.min(8 * density, Math.ceil((density * (top - bottom)) / distance));
  const heights = Array.from({ length: steps + 1 }, (_, i) => bottom + (0 < steps ? ((top - bottom) * i) / steps : 0));
  for (let off = distance / density; off < 2 * reach; off += Math.max(distance / density, (1.2 / density) * off)) heights.push(bottom - off, top + off);
  return heights;
}
