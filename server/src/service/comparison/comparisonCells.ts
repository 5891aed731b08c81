/** The words of a comparison, alike in every format. */
import type { Budget } from '../../budget/results';
import type { BudgetMove } from '../../compare/compare';
import { inText } from '../../units/inText';

export function nameOf({ before, after }: BudgetMove): string {
  const budget = (after ?? before)!;
  return `${budget.subject.name}${budget.kind === 'common' ? ' (mean)' : ''}`;
}

export function totalsOf({ before, after }: BudgetMove): string {
  const { measure } = (after ?? before)!;
  const total = (budget: Budget) => (budget.total === null ? '?' : inText(budget.total, 'voltage'));
  const tolerated = before !== null && after !== null && before.tolerates !== after.tolerates ? `${inText(before.tolerates, 'voltage')} → ${inText(after.tolerates, 'voltage')}` : inText((after ?? before)!.tolerates, 'voltage');
  return `${before === null ? 'none' : total(before)} → ${after === null ? 'none' : total(after)} of ${tolerated} ${measure}`;
}

export function marginsOf({ before, after }: BudgetMove): string {
  const margin = (budget: Budget | null) => {
    if (budget === null) return 'none';
    if (budget.verdict === 'unknown') return 'unknown';
    return budget.total === null || budget.total === 0 ? 'no noise' : inText(20 * Math.log10(budget.tolerates / budget.total), 'level');
  };
  return `${margin(before)} → ${margin(after)}`;
}

export function verdictOf({ before, after, isWorseThanAllowed }: BudgetMove): string {
  if (before === null) return after!.verdict === 'over' ? 'new, and over' : 'new';
  if (after === null) return 'gone';
  if (isWorseThanAllowed) return after.verdict === 'over' ? 'now over' : 'now incomplete';
  if (before.verdict === 'over' && after.verdict !== 'over') return after.verdict === 'unknown' ? 'now incomplete' : 'now within';
  return after.verdict === 'over' ? 'still over' : '';
}

/** `+2.90 mV`. */
export function addedInText(added: number): string {
  return `${added < 0 ? '−' : '+'}${inText(Math.abs(added), 'voltage')}`;
}

/** Causes of one budget that are worth a line: a twentieth of the largest, and no more than six. */
export function causesOf({ because, together }: BudgetMove): readonly { readonly added: number; readonly words: string }[] {
  const [most] = because;
  const shown = because.filter(({ added }) => Math.abs(most.added) <= 20 * Math.abs(added)).slice(0, 6);
  const rest = because.slice(shown.length).reduce((sum, { added }) => sum + added, 0) + (together ?? 0);
  const lines = shown.map(({ change, added }) => ({ added, words: `${change.title}: ${change.words}` }));
  return most === undefined || Math.abs(rest) * 20 < Math.abs(most.added) ? lines : [...lines, { added: rest, words: because.length === shown.length ? 'the changes together' : 'smaller ones, and the changes together' }];
}
