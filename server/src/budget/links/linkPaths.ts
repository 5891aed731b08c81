/**
 * What links carry: a measured capacitance and a measured mutual inductance between the load ends of nets that no
 * cross-section describes. All links between one source and one receiver are one circuit, so that the nets of a pair add with their signs.
 *
 *   source --R--[ i ]--+-- load          v_M = M di/dt in the receiver's own way to its load
 *                      = C
 *   source --R--[ v ]--+-- load
 */
import type { Link, Net, Project } from '../../board/model';
import { farads, henries, ohms } from '../../units/quantity';
import { assumptionsInWords, hasUnstatedSource } from '../ends';
import { currentFeed, isSilent, voltageFeed } from '../lumped/feeds';
import type { Feed, LumpedPath, Variant } from '../lumped/lumpedPath';
import { Wiring, type WiredNet } from '../lumped/wiring';
import type { Receiver } from '../receivers';
import { hears, type Roles } from '../roles';
import type { Source } from '../sources';

export function linkPaths(project: Project, roles: Roles): readonly LumpedPath[] {
  const paths: LumpedPath[] = [];
  const linksOf = new Map<Source, Map<Receiver, Link[]>>();
  for (const link of project.links) {
    for (const [from, to] of [[link.from, link.to], [link.to, link.from]] as const) {
      for (const source of roles.get(from)?.sources ?? []) {
        for (const receiver of roles.get(to)?.receivers ?? []) {
          if (!hears(receiver, source)) continue;
          const ofSource = linksOf.get(source) ?? new Map<Receiver, Link[]>();
          linksOf.set(source, ofSource);
          const known = ofSource.get(receiver);
          if (known === undefined) ofSource.set(receiver, [link]);
          else if (!known.includes(link)) known.push(link);
        }
      }
    }
  }
  for (const [source, byReceiver] of linksOf) for (const [receiver, links] of byReceiver) paths.push(linkPath(source, receiver, links, roles));
  return paths;
}

function linkPath(source: Source, receiver: Receiver, links: readonly Link[], roles: Roles): LumpedPath {
  const nets = new Set<Net>([...source.moves.map(({ net }) => net), ...receiver.terms.map(({ net }) => net)]);
  const unstated = [...nets].some((net) => hasUnstatedSource(roles.get(net)!)) ? (['short', 'open'] as const) : (['none'] as const);
  const capacitive = links.some(({ capacitance }) => capacitance !== null);
  const inductive = links.some(({ mutual }) => mutual !== null);
  const polarities = capacitive && inductive ? ([1, -1] as const) : ([1] as const);
  const signUnknown = 1 < polarities.length ? ['the sign of the mutual inductance against the capacitance is not known: the larger result counts'] : [];
  return {
    channel: 'link',
    origins: links.map(({ name }) => name),
    place: links[0]!.place,
    source,
    receiver,
    variants: unstated.flatMap((assumed) => polarities.map((polarity) => variant(source, receiver, { links, nets, roles, assumed, polarity }))),
    method: 'lumped circuit of the link with both nets’ ends',
    assumptions: [...assumptionsInWords([...nets].map((net) => roles.get(net)!)), ...signUnknown],
    valueError: 0,
  };
}

interface Choice {
  readonly links: readonly Link[];
  readonly nets: ReadonlySet<Net>;
  readonly roles: Roles;
  readonly assumed: 'none' | 'short' | 'open';
  readonly polarity: 1 | -1;
}

function variant({ signal, moves }: Source, { terms }: Receiver, { links, nets, roles, assumed, polarity }: Choice): Variant {
  const wiring = new Wiring();
  const wired = new Map<Net, WiredNet>();
  const moving = new Set(moves.map(({ net }) => net));
  for (const net of nets) wired.set(net, wiring.net(roles.get(net)!, { moves: moving.has(net), unstated: assumed, series: [{ resistance: ohms(0), inductance: henries(0) }] }));
  wiring.pairs(wired, roles);
  for (const { from, to, capacitance, mutual } of links) {
    const [one, other] = [wired.get(from)!, wired.get(to)!];
    if (capacitance !== null) wiring.shunt(one.load, other.load, { resistance: ohms(Infinity), capacitance: farads(capacitance.value) });
    // Of the source on the receiver only: coils that are not stated cannot react.
    const [by, into] = moving.has(from) ? [one, other] : [other, one];
    if (mutual !== null) wiring.mutual(by.series[0]!, into.series[0]!, henries(polarity * mutual.value));
  }
  const feeds = moves.flatMap(({ net, sign }): readonly Feed[] => {
    const { sourceBranch, load } = wired.get(net)!;
    const byVoltage = sourceBranch === null ? [] : [voltageFeed(signal, { kind: 'voltage', branch: sourceBranch }, sign)];
    return [...byVoltage, currentFeed(signal, { kind: 'current', node: load }, sign, { eitherSign: true })];
  });
  const circuit = wiring.circuit();
  return { circuit: () => circuit, feeds: feeds.filter((feed) => !isSilent(feed)), terms: terms.map(({ net, weight }) => ({ node: wired.get(net)!.load, against: 0, weight })) };
}
