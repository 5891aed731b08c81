/** Shortens the run that disturbs a receiver most, to the length that would just do. */
import type { Run } from '../board/model';
import type { BudgetFault } from '../rules/budgetFault';
import type { Finding } from '../rules/rule';
import { withLength } from './changedRun';
import type { FixContext, Proposal } from './fix';
import { lengthEdit, textAt } from './gapAdjustable';
import { solve, withinBudget, type Adjustable } from './solve';
import { writtenLength } from './writtenLength';

export function shortenedRun({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  const run = largest?.coupling?.run;
  const adjustable = run === undefined ? null : lengthAdjustable(context, run);
  const solved = adjustable === null ? null : solve(context, [adjustable], withinBudget(context, [budget]));
  if (run === undefined || adjustable === null || solved === null || !solved.enough) return [];
  const [length] = solved.values;
  const words = `Shorten run ${run.name} to ${adjustable.written.inFile(length!)}`;
  return [{ words, edits: [lengthEdit(adjustable, length!)], moves: run.length.value - length! }];
}

/** Shorter than this, two nets lie beside each other anyway. */
const shortestPart = 0.05;

export function lengthAdjustable(context: FixContext, run: Run): Adjustable | null {
  const written = writtenLength(textAt(context, run.length.place), 'run');
  if (written === null) return null;
  return { run, given: run.length, written, outward: 'down', smallest: Math.max(written.grid, shortestPart * run.length.value), largest: 20 * run.length.value, slope: 1, apply: withLength };
}
