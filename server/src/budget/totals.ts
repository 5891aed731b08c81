/**
 * One number out of many contributions (physics.md of the design, "budgets"): what one cause (a source, or a group that
 * switches together) makes adds as magnitudes, wherever it arises; causes know nothing of each other, and add
 * as magnitudes (`worst`) or as squares (`rss`).
 */
import { volts, type Voltage } from '../units/quantity';
import type { Contribution } from './results';

export interface Total {
  readonly total: Voltage;
  readonly errorBar: Voltage;
}

type Adding = Pick<Contribution, 'cause' | 'value' | 'errorBar' | 'spectrum'>;

export function totalOf(contributions: readonly Adding[], combine: 'worst' | 'rss'): Total {
  const causes = causesOf(contributions);
  if (combine === 'worst') return { total: volts(sum(causes.map(({ value }) => value))), errorBar: volts(sum(causes.map(({ errorBar }) => errorBar))) };
  // hypot does not overflow or vanish where the squares would.
  const total = causes.reduce((root, { value }) => Math.hypot(root, value), 0);
  const errorBar = total === 0 ? 0 : sum(causes.map(({ value, errorBar }) => (value / total) * errorBar));
  return { total: volts(total), errorBar: volts(errorBar) };
}

interface Cause {
  readonly value: number;
  readonly errorBar: number;
}

function causesOf(contributions: readonly Adding[]): readonly Cause[] {
  const members = new Map<string, Adding[]>();
  for (const contribution of contributions) {
    const known = members.get(contribution.cause);
    if (known === undefined) members.set(contribution.cause, [contribution]);
    else known.push(contribution);
  }
  // Summed largest first, whatever the order of the text: a total must not depend on it in its last digit.
  return [...members.values()].map(causeOf).sort((a, b) => b.value - a.value || b.errorBar - a.errorBar);
}

function causeOf(members: readonly Adding[]): Cause {
  const sorted = [...members].sort((a, b) => b.value - a.value || b.errorBar - a.errorBar);
  const errorBar = sum(sorted.map((member) => member.errorBar));
  const spectra = sorted.filter(({ spectrum }) => spectrum !== null);
  if (spectra.length < 2) return { value: sum(sorted.map(({ value }) => value)), errorBar };
  // Harmonics of different frequencies know nothing of each other, even of one cause.
  const byFrequency = new Map<string, number>();
  for (const { spectrum } of spectra) {
    const { fundamental, first, rms } = spectrum!;
    rms.forEach((value, at) => {
      const key = ((first + at) * fundamental).toPrecision(12);
      byFrequency.set(key, (byFrequency.get(key) ?? 0) + value);
    });
  }
  const ofSpectra = [...byFrequency.values()].sort((a, b) => b - a).reduce((root, value) => Math.hypot(root, value), 0);
  return { value: ofSpectra + sum(sorted.filter(({ spectrum }) => spectrum === null).map(({ value }) => value)), errorBar };
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
