/**
 * Solves for the lengths of a change: by one factor for all of them, rounded outward to what the file's
 * unit can say, and seen to be enough after rounding.
 */
import type { Given, Run } from '../board/model';
import type { Budget, Contribution } from '../budget/results';
import { totalOf } from '../budget/totals';
import type { Length } from '../units/quantity';
import type { FixContext } from './fix';
import { search, type SearchResult } from './search';
import { excessOf, partOf, trial, type Change, type Trial } from './trial';
import type { WrittenLength } from './writtenLength';

export interface Adjustable {
  readonly run: Run;
  /** What it is now, or where a search for it begins. */
  readonly given: Given<Length>;
  readonly written: WrittenLength;
  readonly outward: 'up' | 'down';
  readonly smallest: number;
  readonly largest: number;
  /** The power by which the noise falls with it, about. */
  readonly slope: number;
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
  /** It is missed whatever becomes of these runs: there is no need to try. */
  missedWithout?(runs: ReadonlySet<Run>): boolean;
}

/** Down to what the budgets tolerate, less the headroom. */
export function withinBudget(context: FixContext, budgets: readonly Budget[]): Goal {
  // What tolerances add is found for the text as it is, and grows a little with what is changed: judged in the end.
  const corners = budgets.map(({ total, bounds }) => (total === null || total === 0 || bounds === null ? 1 : 1 + cornerGrowth * (bounds[1] / total - 1)));
  return {
    budgets,
    excess: ({ budgets: after }) => excessOf(after, context.project, corners),
    // Magnitudes only add: what comes from elsewhere is the least that a receiver will have.
    missedWithout: (runs) => budgets.some((budget, at) => {
      const elsewhere = budget.contributions.filter(({ coupling }) => coupling === null || !runs.has(coupling.run));
      return 0 < excessOf([{ ...budget, total: totalOf(elsewhere, budget.combine).total }], context.project, [corners[at]!]);
    }),
  };
}

const cornerGrowth = 1.05;

/** A contribution that is a tenth of what is tolerated is worth a thought. */
export const matters = 0.1;

/**
 * What a change of one source's doing is to reach: the budget, where all else leaves room for it; else that what it does
 * here no longer matters.
 */
export function goalFor(context: FixContext, budget: Budget, largest: Contribution, isTouched: (contribution: Contribution) => boolean): Goal {
  const elsewhere = budget.contributions.filter((contribution) => !isTouched(contribution));
  const rest = { ...budget, total: totalOf(elsewhere, budget.combine).total };
  return excessOf([rest], context.project) < 0 ? withinBudget(context, [budget]) : partGone(context, budget, largest);
}

/** Until what one aggressor does here no longer matters. */
export function partGone(context: FixContext, budget: Budget, largest: Contribution): Goal {
  const headroom = 10 ** ((context.project.board.headroom?.value ?? 0) / 20);
  return { budgets: [budget], excess: ({ budgets: [after] }) => Math.log((partOf(after ?? null, largest) * headroom) / (matters * budget.tolerates)) };
}

/** Null where it cannot be computed. */
export function solve(context: FixContext, adjustables: readonly [Adjustable, ...Adjustable[]], goal: Goal): Solved | null {
  const excessAt = (values: readonly Length[]) => goal.excess(trial(context, changesTo(adjustables, values), goal.budgets));
  const atFactor = (factor: number) => adjustables.map(({ given }) => (given.value * factor) as Length);
  const tolerance = Math.min(...adjustables.map(({ given, written }) => written.grid / given.value / 4), 0.01);
  const better = adjustables[0].outward === 'up' ? 'more' : 'less';
  const smallest = Math.max(...adjustables.map((each) => each.smallest / each.given.value));
  const largest = Math.min(...adjustables.map((each) => each.largest / each.given.value));
  if (goal.missedWithout?.(new Set(adjustables.map(({ run }) => run))) === true) {
    const [values] = roundedCandidates(adjustables, { factor: better === 'more' ? largest : smallest, enough: false, evaluations: 0 }, tolerance);
    return { values: values!, enough: false, evaluations: 0, changes: changesTo(adjustables, values!) };
  }
  const found = search({ excess: (factor) => excessAt(atFactor(factor)), better, smallest, largest, tolerance, slope: adjustables[0].slope });
  if (found === null) return null;
  let { evaluations } = found;
  for (const values of roundedCandidates(adjustables, found, tolerance)) {
    evaluations += 1;
    const enough = excessAt(values) <= 0;
    if (enough || !found.enough) return { values, enough, evaluations, changes: changesTo(adjustables, values) };
  }
  return null;
}

/**
 * The root is known to its tolerance: the value rounded outward may be a step too few, and where the step
 * before it is that near, it may be one more than needed.
 */
function roundedCandidates(adjustables: readonly Adjustable[], { factor, enough }: SearchResult, tolerance: number): readonly (readonly Length[])[] {
  const stepped = (steps: number) => adjustables.map(({ given, written, outward, smallest, largest }) => {
    const value = written.rounded(given.value * factor, outward) + (outward === 'up' ? steps : -steps) * written.grid;
    return written.rounded(Math.min(largest, Math.max(smallest, value)), outward === 'up' || value < smallest ? 'up' : 'down');
  });
  if (!enough) return [stepped(0)];
  const mayBeLess = adjustables.every(({ given, written }, index) => Math.abs(stepped(-1)[index]! - given.value * factor) < 2 * tolerance * given.value * factor + 1e-3 * written.grid);
  return [...(mayBeLess ? [stepped(-1)] : []), stepped(0), stepped(1), stepped(2)];
}

/** Several changes of one run are made one upon the other. */
function changesTo(adjustables: readonly Adjustable[], values: readonly Length[]): readonly Change[] {
  const after = new Map<Run, Run>();
  adjustables.forEach(({ run, apply }, index) => after.set(run, apply(after.get(run) ?? run, values[index]!)));
  return [...after].map(([before, run]) => ({ before, after: run }));
}
