/**
 * The voltages above which insulation matters to people: touch limits for dry, normal conditions.
 *
 * Source  IEC 61010-1, from memory; other standards and wet conditions have lower or different ones.
 */
import type { Net, Pair, Project, Signal } from '../board/model';
import { inText } from '../units/inText';

const limits = { rms: 30, peak: 42.4, dc: 60 } as const;

export interface HazardousVoltage {
  /** At the upper end of its tolerance, V. */
  readonly value: number;
  readonly measure: keyof typeof limits;
  readonly limit: number;
  /** Where it was stated. */
  readonly stated: 'working' | 'swing' | 'sine';
}

/** The first of its working, sine and swing voltage that is over the limits; a pair's count for both of its nets. */
export function hazardousVoltage(net: Net, project: Project): HazardousVoltage | null {
  for (const signal of signalsOf(net, project)) {
    for (const stated of voltagesOf(signal)) {
      const limit = limits[stated.measure];
      if (limit < stated.value) return { ...stated, limit };
    }
  }
  return null;
}

/** Whatever its size, a working voltage says that distances to this net are not for noise to decide. */
export function insulationMatters(net: Net, project: Project): boolean {
  return hazardousVoltage(net, project) !== null || signalsOf(net, project).some(({ working }) => working !== null);
}

/** `230 V rms`, as stated. */
export function hazardInText({ value, measure }: HazardousVoltage): string {
  return `${inText(value, 'voltage')} ${measure}`;
}

/** The net and the pairs that it is part of: what a pair states holds for both of its nets. */
export function signalsOf(net: Net, project: Project): readonly Signal[] {
  return [net, ...(pairsIn(project).get(net.name) ?? [])];
}

const pairsByNet = new WeakMap<Project, ReadonlyMap<string, readonly Pair[]>>();

function pairsIn(project: Project): ReadonlyMap<string, readonly Pair[]> {
  const known = pairsByNet.get(project);
  if (known !== undefined) return known;
  const index = new Map<string, Pair[]>();
  for (const pair of project.pairs.values()) {
    for (const net of [pair.plus, pair.minus]) if (net !== null) index.set(net.name, [...(index.get(net.name) ?? []), pair]);
  }
  pairsByNet.set(project, index);
  return index;
}

function voltagesOf({ working, sine, swing }: Signal): Omit<HazardousVoltage, 'limit'>[] {
  const found: Omit<HazardousVoltage, 'limit'>[] = [];
  if (working !== null) found.push({ value: Math.abs(working.voltage.value) + working.voltage.tolerance, measure: working.measure, stated: 'working' });
  if (sine !== null) found.push({ value: Math.abs(sine.amplitude.value) + sine.amplitude.tolerance, measure: sine.measure, stated: 'sine' });
  if (swing !== null) found.push({ value: Math.max(Math.abs(swing.low), Math.abs(swing.high)) + swing.tolerance, measure: 'peak', stated: 'swing' });
  return found;
}
