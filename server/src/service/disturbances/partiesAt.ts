/** Of whom it can be asked at a point who disturbs them: the net or pair that is named there, or lies in the row of a run there. */
import type { Net, Pair, Place, Project } from '../../board/model';
import type { Evaluation } from '../../budget/results';
import { budgetLine } from '../budgetLine';
import { disturbs, type Disturbance, type Party } from '../disturbances';
import { percent } from '../hover/markdown';
import { namesAt } from '../namesAt';
import type { Session } from '../session';
import type { Row } from './rows';

export interface PartyAt extends Party {
  /** Its worst budget, or what it does most: `1.84 mV of 2.00 mV · 0.7 dB left`. */
  readonly detail: string;
  readonly at: Row;
}

export function partiesAt(session: Session, path: string, offset: number): readonly PartyAt[] {
  const found = session.projectsOf(path).flatMap((root) => {
    const project = session.project(root);
    const named = namedAt(session, project, { path, offset });
    const { evaluation } = named.length === 0 ? { evaluation: null } : session.analyse(root);
    return named.slice(0, most).flatMap(({ signal, at }) => withPair(project, evaluation!, signal).map((each) => partyOf(session, { root, evaluation: evaluation! }, { signal: each, at })));
  });
  // What a file of shared parts is to two boards in the same words is one thing.
  return [...new Map(found.map((party) => [JSON.stringify([party.kind, party.name, party.detail]), party])).values()];
}

/** `D[0..31]` is many names, and nobody reads as many trees. */
const most = 16;

interface Signalled {
  readonly signal: Net | Pair;
  readonly at: Row;
}

function namedAt(session: Session, project: Project, { path, offset }: { readonly path: string; readonly offset: number }): readonly Signalled[] {
  const here = namesAt(session, path, offset).find((names) => names.project === project);
  const signals = (here?.records ?? []).flatMap(({ kind, name }) => (kind === 'net' ? (project.nets.get(name) ?? []) : kind === 'pair' ? (project.pairs.get(name) ?? []) : []));
  if (0 < signals.length) return signals.map((signal) => ({ signal, at: declarationOr(signal, here!.place) }));
  const isHere = (place: Place) => place.path === path && place.span.start <= offset && offset <= place.span.end;
  for (const run of project.runs) {
    if (!isHere(run.whole)) continue;
    const traces = run.rows.flatMap(({ conductors }) => conductors.flatMap((conductor) => (conductor.kind === 'trace' && isHere(conductor.whole) ? [conductor] : [])));
    return traces.map(({ net, whole, place }) => ({ signal: net, at: { whole, name: place } }));
  }
  return [];
}

/** Where it was asked: the rows that belong to it there are then shown in that file. */
function declarationOr({ place, whole }: Net | Pair, here: Place): Row {
  return here.path === place.path && here.span.start === place.span.start ? { whole, name: place } : { whole: here, name: here };
}

/** A net that has no part of its own is asked for as its pair. */
function withPair({ pairs }: Project, { budgets }: Evaluation, signal: Net | Pair): readonly (Net | Pair)[] {
  const isOwn = signal.kind === 'pair' || budgets.some(({ subject }) => subject === signal) || signal.swing !== null || signal.sine !== null || signal.current !== null;
  const of = isOwn ? [] : [...pairs.values()].filter(({ plus, minus }) => plus === signal || minus === signal);
  return of.length === 0 ? [signal] : of;
}

function partyOf(session: Session, { root, evaluation }: { readonly root: string; readonly evaluation: Evaluation }, { signal, at }: Signalled): PartyAt {
  const party: Party = { root, kind: signal.kind, name: signal.name };
  const own = evaluation.budgets.filter(({ subject }) => subject === signal).sort((a, b) => (b.total ?? 0) / b.tolerates - (a.total ?? 0) / a.tolerates);
  const [worst] = own;
  return { ...party, detail: worst === undefined ? doesInWords(disturbs(session, party)) : budgetLine(worst), at };
}

function doesInWords([most, ...others]: readonly Disturbance[]): string {
  if (most === undefined) return 'disturbs no receiver, and states nothing that it tolerates';
  return `disturbs ${others.length === 0 ? '' : 'most of all '}${most.party.name} · ${percent(most.share)}${others.length === 0 ? '' : `, and ${others.length} more`}`;
}
