/**
 * One number out of many contributions (physics.md of the design, "budgets"): what one source or one group
 * that switches together causes adds as magnitudes, wherever it arises; groups, sources and the circuit's
 * own noise, which know nothing of each other, then add as magnitudes (`worst`) or as squares (`rss`).
 */
import { volts, type Voltage } from '../units/quantity';
import type { Contribution } from './results';

export interface Total {
  readonly total: Voltage;
  readonly errorBar: Voltage;
}

export function totalOf(contributions: readonly Contribution[], combine: 'worst' | 'rss'): Total {
  const sources = unrelatedSources(contributions);
  if (combine === 'worst') return { total: volts(sum(sources.map(({ value }) => value))), errorBar: volts(sum(sources.map(({ errorBar }) => errorBar))) };
  // hypot does not overflow or vanish where the squares would.
  const total = sources.reduce((root, { value }) => Math.hypot(root, value), 0);
  const errorBar = total === 0 ? 0 : sum(sources.map(({ value, errorBar }) => (value / total) * errorBar));
  return { total: volts(total), errorBar: volts(errorBar) };
}

function unrelatedSources(contributions: readonly Contribution[]): readonly { value: number; errorBar: number }[] {
  const sources = new Map<string, { value: number; errorBar: number }>();
  for (const contribution of contributions) {
    const key = sourceKey(contribution);
    const known = sources.get(key) ?? { value: 0, errorBar: 0 };
    sources.set(key, { value: known.value + contribution.value, errorBar: known.errorBar + contribution.errorBar });
  }
  // Summed largest first, whatever the order of the text: a total must not depend on it in its last digit.
  return [...sources.values()].sort((a, b) => b.value - a.value || b.errorBar - a.errorBar);
}

/** A group and a net may have one name; they are not one source. */
function sourceKey({ group, from, channel }: Contribution): string {
  if (group !== null) return `group ${group}`;
  return from === null ? `own ${channel}` : `net ${from}`;
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
