/**
 * Takes a receiver, or what disturbs it, out of a return that they share: it then has a way back of its own, which the
 * text says by naming it there no longer.
 */
import type { Place, SharedReturn } from '../board/model';
import type { BudgetFault } from '../rules/budgetFault';
import type { Finding } from '../rules/rule';
import type { Edit, FixContext, Proposal } from './fix';
import { removal } from './removal';
import { statementAt } from './statementAt';

export function separatedReturns({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget: { subject }, largest } = fault as BudgetFault;
  if (largest === null || largest.channel !== 'shared return') return [];
  // The return conductor of a run has a name, too, and stands elsewhere.
  const shared = context.project.returns.find(({ place }) => place === largest.place);
  if (shared === undefined) return [];
  const { nets, pairs } = context.project;
  const listening = [subject, ...(subject.kind === 'pair' ? [subject.plus, subject.minus] : [])];
  const source = nets.get(largest.from ?? '') ?? pairs.get(largest.from ?? '');
  const moving = source === undefined ? [] : source.kind === 'net' ? [source] : [source.plus, source.minus];
  return [
    ...without(context, shared, { name: subject.name, places: shared.refers.filter(({ signal }) => listening.includes(signal)).map(({ place }) => place) }),
    ...without(context, shared, { name: largest.from ?? '', places: shared.carries.filter(({ net }) => moving.includes(net)).map(({ place }) => place) }),
  ];
}

interface Leaving {
  readonly name: string;
  /** Its names in the return. */
  readonly places: readonly Place[];
}

function without(context: FixContext, shared: SharedReturn, { name, places }: Leaving): readonly Proposal[] {
  const text = context.text(shared.place.path);
  const statements = places.map(({ span }) => statementAt(text, span));
  const spans = statements.flatMap((statement) => (statement === null || statement.block !== null ? [] : [statement.span]));
  // What stands in one range with others cannot leave alone.
  const others = [...shared.carries, ...shared.refers].filter(({ place }) => !places.includes(place) && spans.some(({ start, end }) => start <= place.span.start && place.span.end <= end));
  if (places.length === 0 || spans.length < places.length || 0 < others.length) return [];
  const distinct = [...new Map(spans.map((span) => [span.start, span])).values()];
  const edits = distinct.map((span): Edit => removal(text, { path: shared.place.path, span }));
  return [{ words: `Give ${name} a return of its own, apart from ${shared.name}`, edits, moves: lengthOf(shared) }];
}

/** Of the copper that has to be laid once more. */
function lengthOf({ pieces }: SharedReturn): number {
  return Math.max(shortestReturn, pieces.reduce((sum, piece) => sum + (piece.form === 'strip' ? piece.length.value : 0), 0));
}

const shortestReturn = 5e-3;
