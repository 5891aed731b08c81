/**
 * Guards of which the ties are too far apart for the fastest edge beside them: a guard is at zero potential
 * only while its ties are closer than a twentieth of the wavelength at the knee frequency.
 *
 * Formula   largest = 1 / (20 · knee · delay), with the slowest propagation in the run
 */
import type { Run } from '../../board/model';
import { kneeFrequency } from '../../physics/lines/knee';
import { metres, type Time } from '../../units/quantity';
import type { LooseGuard } from '../results';
import type { RunPart } from './runParts';

/** `fastest`: the shortest 10–90 % time of what moves in the part; null where nothing does. */
export function looseGuards(run: Run, part: RunPart, fastest: Time | null): readonly Omit<LooseGuard, 'past'>[] {
  // Without planes a guard is a return, which has no ties to be judged by.
  if (fastest === null || !(part.section.planeAbove || part.section.planeBelow)) return [];
  const slowest = Math.max(...part.alone.map(({ delay }) => delay));
  const largest = metres(1 / (20 * kneeFrequency(fastest) * slowest));
  return part.conductors.flatMap((guard) => {
    if (guard.kind !== 'guard') return [];
    // Tied at both ends whatever is stated: ties further apart than the run is long are its length apart.
    const spacing = metres(Math.min(run.length.value, guard.stitched?.value ?? Infinity));
    return largest < spacing ? [{ guard, spacing, largest }] : [];
  });
}
