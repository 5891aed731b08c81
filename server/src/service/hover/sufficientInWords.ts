/** The gap or the length that would just do, as hints and hovers say it. */
import type { Sufficient } from '../../fixes/sufficient';
import { escaped } from './markdown';

export function sufficientInWords(kind: 'gap' | 'length', { written, enough, missedElsewhere, atReach, receivers }: Sufficient): string {
  const whom = receivers.map(escaped).join(', ');
  if (enough && atReach) return kind === 'gap' ? `Even ${written}, the least clearance, would do for ${whom}, with the headroom wanted.` : `Even ${written} would do for ${whom}, with the headroom wanted: this length does not matter.`;
  if (enough) return `${written} would just do for ${whom}, with the headroom wanted.`;
  if (missedElsewhere) return `No ${kind} here is enough for ${whom}: what comes from elsewhere is too much already.`;
  return kind === 'gap' ? `No gap up to ${written} is enough for ${whom}: a shorter run, a guard or another layer may be.` : `No length down to ${written} is enough for ${whom}: a wider gap, a guard or another layer may be.`;
}
