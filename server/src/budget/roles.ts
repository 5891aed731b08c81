/**
 * What a net does on its board: it is a source of noise, it listens, both, or neither; and to which pair
 * it belongs, whose `swing`, `source` and `load` are then its own.
 */
import type { End, Net, Pair, Project, Signal } from '../board/model';

export interface Role {
  readonly net: Net;
  /** Has `swing`, `sine` or `current`, its own or its pair's. */
  readonly drives: boolean;
  /** It or its pair tolerates so much. */
  readonly receives: boolean;
  readonly pair: Pair | null;
  readonly source: End | null;
  readonly load: End | null;
}

export type Roles = ReadonlyMap<Net, Role>;

export function rolesOf(project: Project): Roles {
  const pairs = new Map<Net, Pair>();
  for (const pair of project.pairs.values()) {
    for (const net of [pair.plus, pair.minus]) if (net !== null && !pairs.has(net)) pairs.set(net, pair);
  }
  const roles = new Map<Net, Role>();
  for (const net of project.nets.values()) roles.set(net, roleOf(net, pairs.get(net) ?? null));
  return roles;
}

function roleOf(net: Net, pair: Pair | null): Role {
  return {
    net,
    pair,
    drives: isSource(net) || (pair !== null && isSource(pair)),
    receives: isReceiver(net) || (pair !== null && (isReceiver(pair) || pair.commonTolerates !== null)),
    source: net.source ?? pair?.source ?? null,
    load: net.load ?? pair?.load ?? null,
  };
}

export function isSource(signal: Signal): boolean {
  return signal.swing !== null || signal.sine !== null || signal.current !== null;
}

export function isReceiver(signal: Signal): boolean {
  return signal.toleratesPeak !== null || signal.toleratesRms !== null;
}
