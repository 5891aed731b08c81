/** What a shield does at the highest frequency that its board has for it. */
import type { Project, Shield } from '../../board/model';
import { decibels, type Frequency } from '../../units/quantity';
import type { ShieldResult } from '../results';
import { highestFrequency } from '../sources';
import { throughShield } from './shielding';

export function shieldResult(project: Project, shield: Shield): ShieldResult {
  const all = [...project.ambients.map(({ to }) => to.value), ...[...project.nets.values(), ...project.pairs.values()].flatMap((signal) => highestFrequency(signal) ?? [])];
  if (all.length === 0) return { shield, frequency: null, effectivenessDb: null };
  const frequency = Math.max(...all) as Frequency;
  return { shield, frequency, effectivenessDb: decibels(-20 * Math.log10(throughShield(shield, { kind: 'plane' }, frequency))) };
}
