/**
 * What a net does on its board: which sources move it, which receivers read it, and to which pair it belongs, whose
 * ends, length and directions are its own where it states none.
 */
import type { End, Net, Pair, Project } from '../board/model';
import type { Length } from '../units/quantity';
import type { Receiver } from './receivers';
import { sourcesOf, type Source } from './sources';

export interface Role {
  readonly net: Net;
  /** Its own, and its pair's. */
  readonly sources: readonly Source[];
  readonly receivers: readonly Receiver[];
  readonly drives: boolean;
  readonly receives: boolean;
  readonly pair: Pair | null;
  readonly source: End | null;
  readonly load: End | null;
  readonly bothWays: boolean;
  /** The whole routed length; 0 where none is stated. */
  readonly length: Length;
}

export type Roles = ReadonlyMap<Net, Role>;

export function rolesOf(project: Project, receivers: readonly Receiver[]): Roles {
  const pairs = new Map<Net, Pair>();
  for (const pair of project.pairs.values()) {
    for (const net of [pair.plus, pair.minus]) if (net !== null && !pairs.has(net)) pairs.set(net, pair);
  }
  const sources = byNet(sourcesOf(project), ({ moves }) => moves);
  const readers = byNet(receivers, ({ terms }) => terms);
  const roles = new Map<Net, Role>();
  for (const net of project.nets.values()) roles.set(net, roleOf(net, pairs.get(net) ?? null, { sources: sources.get(net) ?? [], receivers: readers.get(net) ?? [] }));
  return roles;
}

function byNet<Thing>(things: readonly Thing[], netsOf: (thing: Thing) => readonly { readonly net: Net }[]): ReadonlyMap<Net, readonly Thing[]> {
  const found = new Map<Net, Thing[]>();
  for (const thing of things) {
    for (const { net } of netsOf(thing)) {
      const known = found.get(net);
      if (known === undefined) found.set(net, [thing]);
      else known.push(thing);
    }
  }
  return found;
}

function roleOf(net: Net, pair: Pair | null, { sources, receivers }: Pick<Role, 'sources' | 'receivers'>): Role {
  return {
    net,
    pair,
    sources,
    receivers,
    drives: 0 < sources.length,
    receives: 0 < receivers.length,
    source: net.source ?? pair?.source ?? null,
    load: net.load ?? pair?.load ?? null,
    bothWays: net.bothWays || pair?.bothWays === true,
    length: net.length?.value ?? pair?.length?.value ?? (0 as Length),
  };
}

/** A source is no noise to itself: what reads a net that it moves does not hear it. */
export function hears({ terms }: Receiver, { moves }: Source): boolean {
  return !terms.some(({ net }) => moves.some((move) => move.net === net));
}
