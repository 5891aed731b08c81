/**
 * Who moves and who listens in a part of a run, as lines of its matrices. A net with several traces there moves, and is read, by each of
 * them; of a pair, the first trace of the one net goes with the first of the other, and so on.
 */
import type { Net } from '../../board/model';
import { seconds, type Time } from '../../units/quantity';
import type { Receiver } from '../receivers';
import { hears, type Roles } from '../roles';
import { highestFrequency, type Source } from '../sources';
import { roleOf } from './arrangements';
import type { RunPart, Trace } from './runParts';

export interface PartSource {
  readonly source: Source;
  /** Nets and signs as the source's moves; only what lies in the part. */
  readonly lines: readonly { readonly index: number; readonly sign: 1 | -1 }[];
}

export interface PartReceiver {
  readonly receiver: Receiver;
  readonly terms: readonly { readonly index: number; readonly weight: number }[];
}

type Lines = Pick<RunPart, 'traces' | 'read'>;

/** In the order of the part's traces. */
export function partSources({ traces }: Pick<Lines, 'traces'>, roles: Roles): readonly PartSource[] {
  return together(traces, (trace) => roleOf(roles, trace).sources, ({ moves }) => moves)
    .map(({ thing, members }) => ({ source: thing, lines: members.map(({ index, of: { sign } }) => ({ index, sign })) }));
}

/** Of what is read here: where each receiver has a part of its own, that with its first trace. */
export function partReceivers({ traces, read }: Lines, roles: Roles): readonly PartReceiver[] {
  return together(traces, (trace) => roleOf(roles, trace).receivers, ({ terms }) => terms)
    .filter(({ members }) => read.includes(members[0]!.index))
    .map(({ thing, members }) => ({ receiver: thing, terms: members.map(({ index, of: { weight } }) => ({ index, weight })) }));
}

/** The receivers of a part that hear a source in it: indices into `receivers`. */
export function listeners(receivers: readonly PartReceiver[], { source }: PartSource): readonly number[] {
  return receivers.flatMap(({ receiver }, index) => (hears(receiver, source) ? [index] : []));
}

/** 10–90 %; of the highest sine that of an edge with as much in it. */
export function fastestEdge(part: Pick<Lines, 'traces'>, roles: Roles): Time | null {
  const highest = partSources(part, roles).flatMap(({ source: { signal } }) => highestFrequency(signal) ?? []);
  return highest.length === 0 ? null : seconds(0.35 / Math.max(...highest));
}

interface Member<Of> {
  readonly index: number;
  readonly of: Of;
}

/** Things that stand on several nets, with the traces of those nets that go together. */
function together<Thing, Of extends { readonly net: Net }>(traces: readonly Trace[], thingsOf: (trace: Trace) => readonly Thing[], netsOf: (thing: Thing) => readonly Of[]): readonly { readonly thing: Thing; readonly members: readonly Member<Of>[] }[] {
  const tracesOf = new Map<Net, number[]>();
  traces.forEach(({ net }, index) => tracesOf.set(net, [...(tracesOf.get(net) ?? []), index]));
  const seen = new Map<Net, number>();
  const found: { readonly thing: Thing; readonly members: readonly Member<Of>[] }[] = [];
  for (const trace of traces) {
    const nth = seen.get(trace.net) ?? 0;
    seen.set(trace.net, nth + 1);
    for (const thing of thingsOf(trace)) {
      const members = netsOf(thing).flatMap((of): readonly Member<Of>[] => {
        const index = tracesOf.get(of.net)?.[nth];
        return index === undefined ? [] : [{ index, of }];
      });
      // Said once, at the first of its traces from the left.
      const first = Math.min(...members.map(({ index }) => index));
      if (traces[first] === trace) found.push({ thing, members: [...members].sort((a, b) => a.index - b.index) });
    }
  }
  return found;
}
