/**
 * Thermal noise of what stands at a receiver's ends. The load's resistance counts as a real, warm resistor, which is on the safe side for an
 * active input. Without `band` only a capacitance limits it, and where there is none it counts for nothing.
 */
import { networkThermalNoise, type Warmth } from '../../physics/noise/networkThermalNoise';
import type { SolveCache } from '../solveCache';
import { keptNoise } from './keptNoise';
import type { OwnCircuits } from './ownCircuits';
import { largestNoise, type OwnNoise } from './ownContribution';

export function ownThermal(circuits: OwnCircuits, warmth: Warmth, cache: SolveCache): readonly OwnNoise[] {
  const { readings, assumptions } = circuits;
  const { noise } = keptNoise(circuits, ['thermal', warmth], cache, () => ({ noise: largestNoise(readings.flatMap((reading) => networkThermalNoise(reading, warmth) ?? [])) }));
  if (noise === null || noise.rms === 0) return [];
  return [{
    channel: 'thermal',
    noise,
    method: warmth.band === null ? 'thermal noise, kT/C' : 'thermal noise of source and load over the band',
    assumptions,
  }];
}
