/**
 * The gap and the length that would just do, for hints: with it every receiver of the run that the gap
 * concerns is within its budget, less the headroom. Found once for the numbers of the run and what else
 * there is in those budgets, and kept as long as the run's solution is, wherever the text moves it.
 */
import type { Run } from '../board/model';
import type { Budget, Evaluation } from '../budget/results';
import { solutionOf } from '../budget/runs/solvedRun';
import { gapsBetween } from '../rules/gapsBetween';
import type { Length } from '../units/quantity';
import type { GapPlace } from './changedRun';
import type { FixContext } from './fix';
import { gapAdjustable } from './gapAdjustable';
import { lengthAdjustable } from './shortenRun';
import { solve, withinBudget, type Adjustable } from './solve';

export interface Sufficient {
  readonly value: Length;
  /** As the file would say it: `0.92 mm`. */
  readonly written: string;
  /** False where no value in reach does: `value` is then the best in reach. */
  readonly enough: boolean;
  /** True where what comes from elsewhere is too much already, whatever is done here. */
  readonly missedElsewhere: boolean;
  /** True where even the largest length or the smallest gap in reach is enough: how much further it could go was not asked. */
  readonly atReach: boolean;
  readonly receivers: readonly string[];
  /** Evaluations that it took: the work done. */
  readonly evaluations: number;
}

/** `gapIndex` counts the gaps of a run, row by row. Null where no receiver's budget depends on that gap, or none can be computed. */
export function sufficientGap(context: FixContext, run: Run, gapIndex: number): Sufficient | null {
  const place = placeOf(run, gapIndex);
  const adjustable = place === null ? null : gapAdjustable(context, run, place);
  if (place === null || adjustable === null) return null;
  return once(context, adjustable, `gap ${gapIndex}`, receiversAcross(context.evaluation, run, place));
}

/** Null where no receiver's budget depends on the run, or none can be computed. */
export function sufficientLength(context: FixContext, run: Run): Sufficient | null {
  const adjustable = lengthAdjustable(context, run);
  return adjustable === null ? null : once(context, adjustable, 'length', receiversAcross(context.evaluation, run, null));
}

const known = new WeakMap<object, Map<string, Sufficient | null>>();

/** Of one run, over an afternoon of edits elsewhere; the one kept longest goes first. */
const mostKept = 64;

function once(context: FixContext, adjustable: Adjustable, what: string, budgets: readonly Budget[]): Sufficient | null {
  if (budgets.length === 0) return null;
  const solution = solutionOf(adjustable.run);
  const answers = (solution && known.get(solution)) ?? new Map<string, Sufficient | null>();
  if (solution !== undefined) known.set(solution, answers);
  const key = keyOf(context, adjustable, what, budgets);
  const answer = answers.get(key);
  if (answer !== undefined) return answer;
  const found = solved(context, adjustable, budgets);
  answers.set(key, found);
  if (mostKept < answers.size) answers.delete(answers.keys().next().value as string);
  return found;
}

/** What the search reads beyond the run itself: how the value is written and bounded, and all that the budgets hold from elsewhere. */
function keyOf({ project }: FixContext, { run, given, written, smallest, largest }: Adjustable, what: string, budgets: readonly Budget[]): string {
  const parts: (string | number | null)[] = [what, written.inUnit(given.value), written.inFile(given.value), written.grid, smallest, largest, project.board.headroom?.value ?? 0];
  for (const { subject, kind, measure, tolerates, combine, contributions } of budgets) {
    parts.push(subject.name, kind, measure, tolerates, combine);
    for (const { coupling, channel, from, group, value } of contributions) if (coupling?.run !== run) parts.push(channel, from, group, value);
    // A group is a name of the run's nets that its numbers do not hold, and their swings scale them.
    for (const { coupling, from, group } of contributions) if (coupling?.run === run) parts.push(from, group, coupling.aggressor.swing?.value ?? 0);
  }
  return JSON.stringify(parts);
}

function solved(context: FixContext, adjustable: Adjustable, budgets: readonly Budget[]): Sufficient | null {
  const result = solve(context, [adjustable], withinBudget(context, budgets));
  if (result === null) return null;
  const [value] = result.values;
  const { written, outward, smallest, largest } = adjustable;
  const atReach = result.enough && (outward === 'up' ? value! - smallest : largest - value!) < 1.5 * written.grid;
  return { value: value!, written: written.inUnit(value!), enough: result.enough, missedElsewhere: !result.enough && result.evaluations === 0, atReach, receivers: budgets.map(({ subject }) => subject.name), evaluations: result.evaluations };
}

/** Complete budgets to which something couples across this gap, or anywhere in the run. */
export function receiversAcross({ budgets }: Evaluation, run: Run, place: GapPlace | null): readonly Budget[] {
  return budgets.filter(({ complete, contributions }) => complete && contributions.some(({ coupling }) => {
    if (coupling === null || coupling.run !== run) return false;
    const between = place === null ? null : gapsBetween(run, coupling.aggressor, coupling.victim);
    return place === null || (between !== null && between.row === place.row && between.gaps.includes(place.gap));
  }));
}

/** Null where the run has no such gap. */
export function placeOf({ rows }: Run, gapIndex: number): GapPlace | null {
  let first = 0;
  for (const [row, { gaps }] of rows.entries()) {
    if (gapIndex < first + gaps.length) return { row, gap: gapIndex - first };
    first += gaps.length;
  }
  return null;
}
