/**
 * What currents that share a return put on receivers that measure against its far end.
 *
 *   source --R--+-- load        source --R--+-- receiver's load
 *                    |                            |              the far end g: both loads refer to it,
 *                    g ---------------------------+              and what is read is the load against g
 *                    R + L
 *                    |
 *               true reference
 */
import type { Net, Place, Project } from '../../board/model';
import { henries, type Frequency, type Inductance, type Resistance } from '../../units/quantity';
import { assumptionsInWords, hasUnstatedSource } from '../ends';
import { currentFeed, isSilent, voltageFeed } from '../lumped/feeds';
import type { Feed, LumpedPath, Variant } from '../lumped/lumpedPath';
import { Wiring, type WiredNet } from '../lumped/wiring';
import type { Receiver } from '../receivers';
import { hears, type Roles } from '../roles';
import type { SolveCache } from '../solveCache';
import { isSource, type Source } from '../sources';
import { returnImpedance } from './returnImpedance';

export function returnPaths(project: Project, roles: Roles, receivers: readonly Receiver[], cache: SolveCache): readonly LumpedPath[] {
  return project.returns.flatMap((shared) => {
    const carried = new Set(shared.carries.map(({ net }) => net));
    const listening = receivers.filter(({ subject, terms }) => shared.refers.some(({ signal }) => signal === subject || terms.some(({ net }) => net === signal)));
    const sources = new Set([...carried].flatMap((net) => roles.get(net)!.sources));
    if (listening.length === 0 || sources.size === 0) return [];
    const impedance = returnImpedance(shared, project, cache);
    const whole: Shared = { ...impedance, name: shared.name, place: shared.place, assumptions: [...impedance.assumptions] };
    return [...sources].flatMap((source) => listening.filter((receiver) => hears(receiver, source)).map((receiver) => {
      // Of a pair, what refers to the return alone is lifted by its drop.
      const lifted = receiver.terms.filter(({ net }) => shared.refers.some(({ signal }) => signal === receiver.subject || signal === net)).map(({ net }) => net);
      return returnPath(whole, { source, receiver, lifted, carried, roles });
    }));
  });
}

export interface Shared {
  readonly name: string;
  readonly place: Place;
  readonly resistance: (frequency: Frequency) => Resistance;
  readonly inductance: Inductance;
  readonly errorBar: number;
  readonly assumptions: readonly string[];
}

export interface Sharing {
  readonly source: Source;
  readonly receiver: Receiver;
  /** Nets of the receiver that measure against the far end. */
  readonly lifted: readonly Net[];
  readonly carried: ReadonlySet<Net>;
  readonly roles: Roles;
}

export function returnPath(shared: Shared, sharing: Sharing): LumpedPath {
  const { source, receiver, carried, roles } = sharing;
  const nets = [...source.moves.filter(({ net }) => carried.has(net)).map(({ net }) => net), ...receiver.terms.map(({ net }) => net)];
  const unstated = nets.some((net) => hasUnstatedSource(roles.get(net)!)) ? (['short', 'open'] as const) : (['none'] as const);
  const stated = source.signal.current !== null;
  return {
    channel: 'shared return',
    origins: [shared.name],
    place: shared.place,
    source,
    receiver,
    variants: unstated.map((assumed) => variant(shared, sharing, assumed)),
    method: stated ? 'drop of the stated current over the return’s resistance and inductance' : 'drop over the return’s resistance and inductance, in the series circuit of the net’s ends',
    assumptions: [...assumptionsInWords((stated ? receiver.terms.map(({ net }) => net) : nets).map((net) => roles.get(net)!)), ...shared.assumptions],
    valueError: shared.errorBar,
  };
}

function variant({ resistance, inductance }: Shared, { source: { signal, moves }, receiver, lifted, carried, roles }: Sharing, unstated: 'none' | 'short' | 'open'): Variant {
  const wired = (ofReturn: Resistance) => {
    const wiring = new Wiring();
    const far = wiring.node();
    wiring.branch(far, 0, { resistance: ofReturn, inductance: henries(inductance) });
    const heard = new Map<Net, WiredNet>();
    for (const { net } of receiver.terms) heard.set(net, wiring.net(roles.get(net)!, { moves: false, unstated, loadReference: lifted.includes(net) ? far : 0 }));
    wiring.pairs(heard, roles);
    const feeds: Feed[] = [];
    for (const { net, sign } of moves.filter((move) => carried.has(move.net))) {
      if (signal.current !== null) {
        feeds.push(currentFeed(signal, { kind: 'current', node: far }, sign));
        continue;
      }
      if (!isSource(signal)) continue;
      const { sourceBranch } = wiring.net(roles.get(net)!, { moves: true, unstated, loadReference: far });
      if (sourceBranch !== null) feeds.push(voltageFeed(signal, { kind: 'voltage', branch: sourceBranch }, sign));
    }
    const terms = receiver.terms.map(({ net, weight }) => ({ node: heard.get(net)!.load, against: lifted.includes(net) ? far : 0, weight }));
    return { circuit: wiring.circuit(), feeds, terms };
  };
  const { feeds, terms } = wired(resistance(0 as Frequency));
  return { circuit: (frequency) => wired(resistance(frequency)).circuit, feeds: feeds.filter((feed) => !isSilent(feed)), terms };
}
