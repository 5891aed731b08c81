/** Which waiver hides a finding: the first that names its rule and its subject. */
import type { Waiver } from '../board/model';
import type { Finding } from './rule';

export function waiverOf(finding: Pick<Finding, 'rule' | 'subject'>, waivers: readonly Waiver[]): Waiver | null {
  return finding.subject === null ? null : (indexOf(waivers).get(keyOf(finding.rule, finding.subject.name)) ?? null);
}

/** What it hides or would hide, were it the only one. */
export function waivedBy({ rule, subjects }: Waiver): readonly string[] {
  return subjects.map((subject) => keyOf(rule, subject));
}

export function keyOf(rule: string, subject: string): string {
  return JSON.stringify([rule, subject]);
}

/** One look for each finding, however many waivers there are. */
const indexes = new WeakMap<readonly Waiver[], ReadonlyMap<string, Waiver>>();

function indexOf(waivers: readonly Waiver[]): ReadonlyMap<string, Waiver> {
  const known = indexes.get(waivers);
  if (known !== undefined) return known;
  const index = new Map<string, Waiver>();
  for (const waiver of waivers) for (const key of waivedBy(waiver)) if (!index.has(key)) index.set(key, waiver);
  indexes.set(waivers, index);
  return index;
}
