/** Which waiver hides a finding: the first that names its rule and its subject. */
import type { Waiver } from '../board/model';
import type { Finding } from './rule';

export function waiverOf({ rule, subject }: Pick<Finding, 'rule' | 'subject'>, waivers: readonly Waiver[]): Waiver | null {
  if (subject === null) return null;
  return waivers.find((waiver) => waiver.rule === rule && waiver.subjects.includes(subject.name)) ?? null;
}
