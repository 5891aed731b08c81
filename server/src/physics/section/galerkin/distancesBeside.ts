/**
 * Of conductors that stand beside each other: how far each one's view has to clear it, in steps of root 2, so that views are found
 * again; null where one stands above another.
 *
 * Beyond the reach of free fields the distance counts no further: the planes take them away, and what a view may miss of a field
 * has to stay small beside it.
 */
import type { ChargedConductor } from '../basis/chargedConductor';

export function distancesBeside(conductors: readonly ChargedConductor[]): Float64Array | null {
  const distances = new Float64Array(conductors.length);
  for (let c = 0; c < conductors.length; c += 1) {
    const { left, right, reach } = conductors[c];
    let least = reach;
    for (let d = 0; d < conductors.length; d += 1) {
      if (d === c) continue;
      const across = Math.max(conductors[d].left - right, left - conductors[d].right);
      if (!(thinnest * (right - left) < across)) return null;
      if (across < least) least = across;
    }
    distances[c] = stepsOfRootTwo(least);
  }
  return distances;
}

/** Of the width: a narrower gap would need views of a hundred points, and is no more than a few pairs. */
const thinnest = 0.02;

export const stepsOfRootTwo = (distance: number) => 2 ** (Math.floor(2 * Math.log2(distance)) / 2);
