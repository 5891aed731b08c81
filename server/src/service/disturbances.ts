/**
 * Who disturbs a net and whom it disturbs, the worst first: each with its millivolts, the ways by which they come, and the rows where
 * that happens. Read from the budgets, so that it says what they say.
 */
import type { Place, Project } from '../board/model';
import type { Budget, Contribution } from '../budget/results';
import { totalOf } from '../budget/totals';
import { placeWords, receiverInText, voltageInText } from '../rules/budgetFault';
import { rowsIn, type Lying, type Row } from './disturbances/rows';
import { percent } from './hover/markdown';
import type { Analysis, Session } from './session';

/** A net, a pair or a field in a project: what to ask about it further. */
export interface Party {
  readonly root: string;
  readonly kind: 'net' | 'pair' | 'ambient';
  readonly name: string;
}

export interface Disturbance {
  readonly party: Party;
  /** Of what is tolerated. */
  readonly share: number;
  /** `0.92 mV (46 %) on RX_IN in run BUS`: the share is that of what is tolerated. */
  readonly detail: string;
  /** Of the one that is asked for, the first of them where it does most. */
  readonly rows: readonly Row[];
  /** Of the one that was asked about. */
  readonly ownRows: readonly Place[];
}

/** On whichever of its budgets each source takes the largest share of. */
export function disturbedBy(session: Session, { root, kind, name }: Party): readonly Disturbance[] {
  const analysis = session.analyse(root);
  const own = analysis.evaluation.budgets.filter(({ subject }) => subject.kind === kind && subject.name === name);
  const shares = own.flatMap((budget) => [...bySource(budget)].map(([key, of]) => ({ key, ...shareOf(budget, of) })));
  return worstFirst(shares).map(({ budget, of, total, share }) => {
    const source = sourceOf(analysis, root, of[0]!);
    const rows = rowsIn(analysis.project, of, source);
    return { party: source, share, detail: inOneLine({ budget, of, total }, `on ${receiverInText(budget)}`), rows, ownRows: placesOf(analysis.project, of, budget.subject) };
  });
}

export function disturbs(session: Session, party: Party): readonly Disturbance[] {
  const { root, kind, name } = party;
  const analysis = session.analyse(root);
  const shares = analysis.evaluation.budgets.flatMap((budget) => {
    const of = budget.contributions.filter((contribution) => contribution.from === name && (contribution.channel === 'radiated') === (kind === 'ambient'));
    return of.length === 0 ? [] : [{ key: `${budget.subject.kind} ${budget.subject.name}`, ...shareOf(budget, of) }];
  });
  return worstFirst(shares).map(({ budget, of, total, share }) => {
    const { kind: victim, name: called } = budget.subject;
    const rows = rowsIn(analysis.project, of, budget.subject);
    return { party: { root, kind: victim, name: called }, share, detail: inOneLine({ budget, of, total }, `from ${name}`), rows, ownRows: placesOf(analysis.project, of, party) };
  });
}

function placesOf(project: Project, of: readonly Contribution[], party: Lying): readonly Place[] {
  return rowsIn(project, of, party).map(({ whole }) => whole);
}

interface Share {
  readonly budget: Budget;
  readonly of: readonly Contribution[];
  readonly total: number;
  readonly share: number;
}

function shareOf(budget: Budget, of: readonly Contribution[]): Share {
  const { total } = totalOf(of, budget.combine);
  return { budget, of, total, share: total / budget.tolerates };
}

/** What comes from nowhere but the circuit itself disturbs, and is nobody. */
function bySource({ contributions }: Budget): ReadonlyMap<string, readonly Contribution[]> {
  const sources = new Map<string, Contribution[]>();
  for (const contribution of contributions) {
    if (contribution.from === null) continue;
    const key = `${contribution.channel === 'radiated' ? 'field' : 'signal'} ${contribution.from}`;
    const known = sources.get(key);
    if (known === undefined) sources.set(key, [contribution]);
    else known.push(contribution);
  }
  return sources;
}

function worstFirst<Each extends Share & { readonly key: string }>(shares: readonly Each[]): readonly Each[] {
  const worst = new Map<string, Each>();
  for (const each of shares) if (!(each.share <= (worst.get(each.key)?.share ?? -1))) worst.set(each.key, each);
  return [...worst.values()].sort((a, b) => b.share - a.share || (a.key < b.key ? -1 : 1));
}

function sourceOf({ project }: Analysis, root: string, { from, channel }: Contribution): Party {
  return { root, name: from!, kind: channel === 'radiated' ? 'ambient' : project.pairs.has(from!) ? 'pair' : 'net' };
}

const waysShown = 3;

function inOneLine({ budget, of, total }: Omit<Share, 'share'>, whom: string): string {
  const ways = waysOf(of).map((way) => ({ way: way[0]!, value: totalOf(way, budget.combine).total })).sort((a, b) => b.value - a.value);
  const amount = `${voltageInText(total, budget)} (${percent(total / budget.tolerates)}) ${whom}`;
  const [only] = ways;
  if (ways.length === 1) return `${amount}${whereInText(only!.way)}`;
  const shown = ways.slice(0, waysShown).map(({ way, value }) => `${voltageInText(value, budget)}${whereInText(way)}`);
  const rest = ways.length - shown.length;
  return `${amount}: ${shown.join(', ')}${rest === 0 ? '' : `, less by ${rest} more ways`}`;
}

/** Edges and sines by one run, link, loop or return. */
function waysOf(of: readonly Contribution[]): readonly (readonly Contribution[])[] {
  const ways = new Map<string, Contribution[]>();
  for (const contribution of of) {
    const key = JSON.stringify([contribution.channel, contribution.where]);
    const known = ways.get(key);
    if (known === undefined) ways.set(key, [contribution]);
    else known.push(contribution);
  }
  return [...ways.values()];
}

function whereInText({ channel, where }: Contribution): string {
  return where === null ? '' : ` ${channel === 'radiated' ? 'around' : 'in'} ${channel === 'radiated' ? '' : `${placeWords[channel]} `}${where}`;
}
