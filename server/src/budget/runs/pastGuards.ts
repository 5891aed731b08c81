/** What passes a part's loose guards as they are tied, and what would if their ties held: the largest of any source and receiver. */
import { volts } from '../../units/quantity';
import type { PastGuard } from '../results';
import type { Roles } from '../roles';
import { partReceivers, partSources } from './partPlayers';
import type { HeardPart } from './solvedRun';
import { isFiniteNoise, scaleOf, worstNoise, type Found, type NoiseContext } from './worstNoise';

/** `held`: to compute as if all ties held. */
export function pastGuards(part: HeardPart, roles: Roles, held: NoiseContext): PastGuard | null {
  const receivers = partReceivers(part, roles);
  let largest: PastGuard | null = null;
  partSources(part, roles).forEach((source, nth) => {
    const ideal = worstNoise(part, source, receivers, held);
    for (const [index, found] of part.noise[nth]!.edges) {
      const other = ideal.get(index);
      if (found.tied === null || other === undefined || !isFiniteNoise(found) || !isFiniteNoise(other)) continue;
      if (largest === null || largest.asTied < peakOf(found)) largest = { receiver: receivers[index]!.receiver.subject.name, asTied: volts(peakOf(found)), stitched: volts(peakOf(other)) };
    }
  });
  return largest;
}

function peakOf({ edge, noise }: Found): number {
  return Math.abs(scaleOf(edge) * (noise.counted ?? noise.atReceiver));
}
