/**
 * Solves for the lengths of a change: by one factor for all of them, rounded outward to what the file's
 * unit can say, and seen to be enough after rounding.
 */
import type { Given, Run } from '../board/model';
import type { Budget } from '../budget/results';
import type { Length } from '../units/quantity';
import type { FixContext } from './fix';
import { search } from './search';
import { excessOf, trial, type Change, type Trial } from './trial';
import type { WrittenLength } from './writtenLength';

export interface Adjustable {
  readonly run: Run;
  /** What it is now, or where a search for it begins. */
  readonly given: Given<Length>;
  readonly written: WrittenLength;
  readonly outward: 'up' | 'down';
  readonly smallest: number;
  readonly largest: number;
  apply(run: Run, value: Length): Run;
}

export interface Solved {
  readonly values: readonly Length[];
  readonly enough: boolean;
  readonly evaluations: number;
  readonly changes: readonly Change[];
}

export interface Goal {
  readonly budgets: readonly Budget[];
  /** Logarithm of what there is over what is wanted. */
  excess(trial: Trial): number;
}

/** Down to what the budgets tolerate, less the headroom. */
export function withinBudget(context: FixContext, budgets: readonly Budget[]): Goal {
  return { budgets, excess: ({ budgets: after }) => excessOf(after, context.project) };
}

/** Null where it cannot be computed. */
export function solve(context: FixContext, adjustables: readonly [Adjustable, ...Adjustable[]], goal: Goal): Solved | null {
  const excessAt = (values: readonly Length[]) => goal.excess(trial(context, changesTo(adjustables, values), goal.budgets));
  const atFactor = (factor: number) => adjustables.map(({ given }) => (given.value * factor) as Length);
  const found = search({
    excess: (factor) => excessAt(atFactor(factor)),
    better: adjustables[0].outward === 'up' ? 'more' : 'less',
    smallest: Math.max(...adjustables.map(({ given, smallest }) => smallest / given.value)),
    largest: Math.min(...adjustables.map(({ given, largest }) => largest / given.value)),
    tolerance: Math.min(...adjustables.map(({ given, written }) => written.grid / given.value / 4), 0.01),
  });
  if (found === null) return null;
  let { evaluations } = found;
  const stepped = (steps: number) => adjustables.map(({ written, outward, smallest, largest }, index) => {
    const value = written.rounded(atFactor(found.factor)[index]!, outward) + (outward === 'up' ? steps : -steps) * written.grid;
    return written.rounded(Math.min(largest, Math.max(smallest, value)), 'up');
  });
  // The root is known to a fraction of a step: the rounded value may be one too few, or one more than needed.
  for (const steps of found.enough ? [-1, 0, 1, 2] : [0]) {
    const values = stepped(steps);
    evaluations += 1;
    const enough = excessAt(values) <= 0;
    if (enough || !found.enough) return { values, enough, evaluations, changes: changesTo(adjustables, values) };
  }
  return null;
}

/** Several changes of one run are made one upon the other. */
function changesTo(adjustables: readonly Adjustable[], values: readonly Length[]): readonly Change[] {
  const after = new Map<Run, Run>();
  adjustables.forEach(({ run, apply }, index) => after.set(run, apply(after.get(run) ?? run, values[index]!)));
  return [...after].map(([before, run]) => ({ before, after: run }));
}
