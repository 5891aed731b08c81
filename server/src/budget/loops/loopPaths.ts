/**
 * What loops carry into loops: the current of a source, in all loops that carry it, induces in all loops that sense a receiver.
 *
 *   source --R--[ La ]-- load          e = M dI/dt, M the sum over every carrying and every sensing loop, with signs:
 *                 M                    a current that a net carries through several loops is one current
 *   source --R--[ Lv ]-- load
 */
import type { Loop, Net, Pair, Project, SignalCurrent } from '../../board/model';
import type { MutualInductance } from '../../physics/loops/mutualInductance';
import { henries, ohms, type Frequency } from '../../units/quantity';
import { assumptionsInWords, hasUnstatedSource } from '../ends';
import { currentFeed, isSilent, voltageFeed } from '../lumped/feeds';
import type { Feed, LumpedPath, NodeTerm, Variant } from '../lumped/lumpedPath';
import { Wiring, type SeriesPart, type WiredNet } from '../lumped/wiring';
import type { Receiver } from '../receivers';
import { hears, type Roles } from '../roles';
import { shieldsBetween, shieldsInWords, throughShields } from '../shields/shielding';
import { highestFrequency, isSource, type Source } from '../sources';
import { refusalInWords } from './loopLimits';
import type { LoopInductances } from './loopInductances';

export interface LoopPaths {
  readonly paths: readonly LumpedPath[];
  readonly lacking: readonly { readonly receiver: Receiver; readonly unaccounted: { readonly what: string; readonly place: Loop['place'] } }[];
}

export function loopPaths(project: Project, roles: Roles, receivers: readonly Receiver[], inductances: LoopInductances): LoopPaths {
  const carriers = carriersOf(project, roles);
  const paths: LumpedPath[] = [];
  const lacking: LoopPaths['lacking'][number][] = [];
  for (const receiver of receivers) {
    const sensing = project.loops.filter((loop) => loop.senses.some(({ signal }) => listensTo(receiver, signal)));
    if (sensing.length === 0) continue;
    for (const [source, carrying] of carriers) {
      if (!hears(receiver, source)) continue;
      const meeting = meetingOf(project, { source, receiver, carrying, sensing }, roles, inductances);
      if ('lacks' in meeting) lacking.push(...meeting.lacks.map(({ what, loop }) => ({ receiver, unaccounted: { what, place: loop.place } })));
      else paths.push(meeting.path);
    }
  }
  return { paths, lacking };
}

/** A loop in which a net's current runs; null where the net states none and its circuit decides. */
interface Carrying {
  readonly loop: Loop;
  readonly net: Net;
  readonly sign: 1 | -1;
  readonly current: SignalCurrent | null;
}

function carriersOf(project: Project, roles: Roles): ReadonlyMap<Source, readonly Carrying[]> {
  const carriers = new Map<Source, Carrying[]>();
  // A net that is no source by itself is one where loops say what it carries.
  const carriedOnly = new Map<Net, Source>();
  const sourcesOf = (net: Net, current: SignalCurrent | null): readonly Source[] => {
    const { sources } = roles.get(net)!;
    if (0 < sources.length || current === null) return sources;
    const known = carriedOnly.get(net) ?? { signal: { ...net, current }, moves: [{ net, sign: 1 }] };
    carriedOnly.set(net, known);
    return [known];
  };
  for (const loop of project.loops) {
    for (const { net, current } of loop.carries) {
      for (const source of sourcesOf(net, current)) {
        const { sign } = source.moves.find((move) => move.net === net)!;
        const known = carriers.get(source) ?? [];
        carriers.set(source, known);
        known.push({ loop, net, sign, current: current ?? source.signal.current });
      }
    }
  }
  return carriers;
}

function listensTo({ subject, terms }: Receiver, signal: Net | Pair): boolean {
  return signal === subject || terms.some(({ net }) => net === signal);
}

interface Meeting {
  readonly source: Source;
  readonly receiver: Receiver;
  readonly carrying: readonly Carrying[];
  readonly sensing: readonly Loop[];
}

/** Sums over loops, with their signs. */
interface Sum {
  readonly inductance: number;
  readonly error: number;
}

function meetingOf(project: Project, meeting: Meeting, roles: Roles, inductances: LoopInductances): { readonly path: LumpedPath } | { readonly lacks: readonly { readonly what: string; readonly loop: Loop }[] } {
  const { source, receiver, carrying, sensing } = meeting;
  const lacks: { what: string; loop: Loop }[] = [];
  const shields = [...new Set(sensing.flatMap((to) => carrying.flatMap(({ loop }) => shieldsBetween(project, to, loop))))];
  const mutual = (one: Loop, other: Loop): Sum => {
    const found: MutualInductance | null = one === other ? { inductance: henries(0), errorBar: henries(0), work: 0 } : inductances.mutual(one, other);
    if (found !== null && 'inductance' in found) return { inductance: found.inductance, error: found.errorBar };
    lacks.push({ what: `loop ${other.name} into loop ${one.name} is not counted: ${refusalInWords(found, inductances, one, other)}`, loop: other });
    return { inductance: 0, error: 0 };
  };
  const own = (loops: readonly Loop[]): number => loops.reduce((sum, one, at) => sum + ownOf(one, inductances) + 2 * loops.slice(0, at).reduce((inner, other) => inner + mutual(one, other).inductance, 0), 0);
  const into = (loops: readonly Carrying[], frequency: Frequency) => (sensed: Net | Pair): Sum => {
    const pairs = sensing.filter(({ senses }) => senses.some(({ signal }) => signal === sensed)).flatMap((to) => loops.map(({ loop }) => {
      const { inductance, error } = mutual(to, loop);
      const between = shields.length === 0 ? [] : shieldsBetween(project, to, loop);
      const through = between.length === 0 ? 1 : throughShields(between, { kind: 'magnetic', distance: inductances.distance(to, loop) }, frequency);
      return { inductance: through * inductance, error: through * error };
    }));
    return { inductance: pairs.reduce((sum, each) => sum + each.inductance, 0), error: pairs.reduce((sum, each) => sum + each.error, 0) };
  };
  const nets = [...new Set([...source.moves.map(({ net }) => net), ...receiver.terms.map(({ net }) => net)])];
  const unstated = nets.some((net) => hasUnstatedSource(roles.get(net)!)) ? (['short', 'open'] as const) : (['none'] as const);
  const choice = { meeting, roles, own, into, shielded: 0 < shields.length };
  const variants = unstated.map((assumed) => variant(choice, assumed));
  if (0 < lacks.length) return { lacks: [...new Map(lacks.map((each) => [each.what, each])).values()] };
  const [total, error] = variants[0]!.size;
  const loops = [...new Set(carrying.map(({ loop }) => loop))];
  const without = [...loops, ...sensing].filter((loop) => loop.conductor === null).map(({ name }) => name);
  return {
    path: {
      channel: 'loop', origins: loops.map(({ name }) => name), place: loops[0]!.place, source, receiver,
      variants: variants.map(({ variant: each }) => each),
      method: 'mutual inductance of the loops (Neumann’s integral), in the circuits of both nets',
      assumptions: [
        ...assumptionsInWords(receiver.terms.map(({ net }) => roles.get(net)!)),
        ...[...loops, ...sensing].flatMap((loop) => inductances.of(loop).assumptions.map((words) => `loop ${loop.name}: ${words}`)),
        ...(without.length === 0 ? [] : [`no inductance of its own for ${without.join(', ')}: neither \`strip\` nor \`wire\` is stated`]),
        ...shieldsInWords(shields),
        ...(shields.length === 0 ? [] : ['of an edge, shields let through what they do at its knee']),
        'its current and what it induces are in step over all of each loop',
      ],
      valueError: total === 0 ? 1 : Math.min(1, error / Math.abs(total)),
    },
  };
}

function ownOf(loop: Loop, inductances: LoopInductances): number {
  const { own } = inductances.of(loop);
  return own !== null && 'inductance' in own ? own.inductance : 0;
}

interface Choice {
  readonly meeting: Meeting;
  readonly roles: Roles;
  readonly own: (loops: readonly Loop[]) => number;
  readonly into: (loops: readonly Carrying[], frequency: Frequency) => (sensed: Net | Pair) => Sum;
  readonly shielded: boolean;
}

function variant({ meeting: { source: { signal, moves }, receiver, carrying, sensing }, roles, own, into, shielded }: Choice, unstated: 'none' | 'short' | 'open'): { readonly variant: Variant; readonly size: readonly [number, number] } {
  const wired = (frequency: Frequency) => {
    const wiring = new Wiring();
    // A pair's loop lies in the way of both its nets: half of it in either, of opposite signs.
    const shares = receiver.terms.map(({ net }) => ({ net, parts: [{ sensed: net as Net | Pair, share: 1 }, ...pairShare(receiver, net)] }));
    const heard = new Map<Net, WiredNet>();
    for (const { net, parts } of shares) {
      const series = parts.map(({ sensed, share }): SeriesPart => ({ resistance: ohms(0), inductance: henries(Math.abs(share) * own(sensing.filter(({ senses }) => senses.some(({ signal: each }) => each === sensed)))) }));
      heard.set(net, wiring.net(roles.get(net)!, { moves: false, unstated, series }));
    }
    wiring.pairs(heard, roles);
    let [total, error] = [0, 0];
    const couple = (by: number, loops: readonly Carrying[]) => {
      for (const { net, parts } of shares) {
        parts.forEach(({ sensed, share }, at) => {
          const sum = into(loops, frequency)(sensed);
          total += Math.abs(share * sum.inductance);
          error += Math.abs(share) * sum.error;
          wiring.mutual(by, heard.get(net)!.series[at]!, henries(share * sum.inductance));
        });
      }
    };
    const feeds: Feed[] = [];
    for (const { net, sign } of moves) {
      const through = carrying.filter((each) => each.net === net);
      const byCircuit = through.filter(({ current }) => current === null);
      for (const each of through.filter(({ current }) => current !== null)) {
        // Whatever it takes to drive it: a stated current is that current.
        const node = wiring.node();
        couple(wiring.branch(node, 0, { resistance: ohms(0), inductance: henries(0) }), [each]);
        feeds.push(currentFeed(signal, { kind: 'current', node }, sign, { current: each.current }));
      }
      if (byCircuit.length === 0 || !isSource({ ...signal, current: null })) continue;
      const loops = byCircuit.map(({ loop }) => loop);
      const { sourceBranch, series } = wiring.net(roles.get(net)!, { moves: true, unstated, series: [{ resistance: ohms(0), inductance: henries(own(loops)) }] });
      couple(series[0]!, byCircuit);
      if (sourceBranch !== null) feeds.push(voltageFeed(signal, { kind: 'voltage', branch: sourceBranch }, sign));
    }
    const terms = receiver.terms.map(({ net, weight }): NodeTerm => ({ node: heard.get(net)!.load, against: 0, weight }));
    return { circuit: wiring.circuit(), feeds: feeds.filter((feed) => !isSilent(feed)), terms, size: [total, error] as const };
  };
  const { circuit, feeds, terms, size } = wired(highestFrequency(signal) ?? (0 as Frequency));
  return { variant: { circuit: (frequency) => (shielded ? wired(frequency).circuit : circuit), feeds, terms }, size };
}

function pairShare({ subject, terms }: Receiver, net: Net): readonly { readonly sensed: Net | Pair; readonly share: number }[] {
  return subject.kind === 'pair' ? [{ sensed: subject, share: (terms.findIndex((term) => term.net === net) === 0 ? 1 : -1) / terms.length }] : [];
}
