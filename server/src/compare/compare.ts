/**
 * Which margins of a board moved between two revisions, by how much, and because of what. Each change is set back on its own in the
 * new board, and that is evaluated: what the total loses by it is what the change made. What the changes make only together is the rest.
 */
import { resolveProject } from '../board/project';
import { evaluate } from '../budget/evaluate';
import type { Budget, Evaluation } from '../budget/results';
import type { SolveCache } from '../budget/solveCache';
import { parse } from '../syntax/parse';
import type { SourceTree } from '../syntax/tree';
import { changesBetween, type Change } from './changes';
import { declarationsOf, type Declaration } from './declarations';

export interface Comparison {
  readonly changes: readonly Change[];
  /** Those that moved: what is over now and was not comes first, then by how much the margin shrank. */
  readonly moved: readonly BudgetMove[];
  /** Budgets of both that did not move. */
  readonly unmoved: number;
}

export interface BudgetMove {
  /** Null where there was none, and where there is none any more. */
  readonly before: Budget | null;
  readonly after: Budget | null;
  /** Over now, or without a margin, and neither before. */
  readonly isWorseThanAllowed: boolean;
  /** Largest first; V that the change added to the total. */
  readonly because: readonly { readonly change: Change; readonly added: number }[];
  /** V that the changes add only together; null where it is not known. */
  readonly together: number | null;
}

/** `trees`: those of every file of a board. Yields before each change, so that whoever waits can be told how far it is. */
export function* comparisonOf(before: readonly SourceTree[], after: readonly SourceTree[], cache: SolveCache): Generator<{ readonly done: number; readonly of: number }, Comparison> {
  const [old, now] = [declarationsOf(before), declarationsOf(after)];
  const changes = changesBetween(old, now);
  const evaluated = (declarations: Iterable<Declaration>) => evaluatedText([...declarations].map(({ text }) => text).join('\n'), cache);
  const [was, is] = [evaluated(old.values()), evaluated(now.values())];
  const setBack = new Map<Change, Evaluation>();
  for (const change of changes.slice(0, mostSetBack)) {
    yield { done: setBack.size, of: Math.min(changes.length, mostSetBack) };
    setBack.set(change, evaluated(withoutChange(now.values(), change)));
  }
  const pairs = paired(was, is);
  const moves = pairs.filter(([a, b]) => a === null || b === null || hasMoved(a, b)).map(([a, b]) => moveOf(a, b, setBack));
  return { changes, moved: moves.sort(worstFirst), unmoved: pairs.length - moves.length };
}

/** Each is an evaluation of the board. */
const mostSetBack = 60;

function evaluatedText(text: string, cache: SolveCache): Evaluation {
  const tree = parse(text);
  return evaluate(resolveProject('board', { read: (path) => (path === 'board' ? { tree } : { problem: 'missing' }) }), cache);
}

function withoutChange(now: Iterable<Declaration>, { before, after }: Change): readonly Declaration[] {
  const kept = [...now].flatMap((each) => (each === after ? (before === null ? [] : [before]) : [each]));
  return after === null && before !== null ? [...kept, before] : kept;
}

function paired({ budgets: old }: Evaluation, { budgets: now }: Evaluation): readonly (readonly [Budget | null, Budget | null])[] {
  const left = [...old];
  const found = now.map((budget): readonly [Budget | null, Budget | null] => {
    const at = left.findIndex((other) => isSame(other, budget));
    return [at < 0 ? null : left.splice(at, 1)[0], budget];
  });
  return [...found, ...left.map((budget) => [budget, null] as const)];
}

const isSame = (a: Budget, b: Budget) => a.subject.name === b.subject.name && a.kind === b.kind && a.measure === b.measure;

/** Less is how the same board is solved in another way. */
const smallest = 1e-6;

function hasMoved(before: Budget, after: Budget): boolean {
  const totals = before.total === null || after.total === null ? before.total !== after.total : smallest * after.tolerates < Math.abs(after.total - before.total);
  return totals || before.tolerates !== after.tolerates || before.verdict !== after.verdict;
}

const isBad = (budget: Budget | null) => budget !== null && (budget.verdict === 'over' || budget.verdict === 'unknown');

function moveOf(before: Budget | null, after: Budget | null, setBack: ReadonlyMap<Change, Evaluation>): BudgetMove {
  const isWorseThanAllowed = isBad(after) && !isBad(before);
  if (before === null || after === null || before.total === null || after.total === null) return { before, after, isWorseThanAllowed, because: [], together: null };
  const { total } = after;
  const because = [...setBack].flatMap(([change, evaluation]) => {
    const without = evaluation.budgets.find((budget) => isSame(budget, after))?.total ?? null;
    const added = without === null ? 0 : total - without;
    return smallest * after.tolerates < Math.abs(added) ? [{ change, added }] : [];
  }).sort((a, b) => Math.abs(b.added) - Math.abs(a.added));
  return { before, after, isWorseThanAllowed, because, together: total - before.total - because.reduce((sum, { added }) => sum + added, 0) };
}

function worstFirst(a: BudgetMove, b: BudgetMove): number {
  const lost = ({ before, after }: BudgetMove) => ratioOf(after) - ratioOf(before);
  return Number(b.isWorseThanAllowed) - Number(a.isWorseThanAllowed) || lost(b) - lost(a);
}

/** Of what is tolerated; a budget that is not there has none. */
const ratioOf = (budget: Budget | null) => (budget === null ? 0 : budget.total === null ? Infinity : budget.total / budget.tolerates);
