/**
 * The gap and the length that would just do, for hints: with it every receiver of the run that the gap
 * concerns is within its budget, less the headroom. Found once for an evaluation.
 */
import type { Run } from '../board/model';
import type { Budget, Evaluation } from '../budget/results';
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
  readonly receivers: readonly string[];
  /** Evaluations that it took: the work done. */
  readonly evaluations: number;
}

/** `gapIndex` counts the gaps of a run, row by row. Null where no receiver's budget depends on that gap, or none can be computed. */
export function sufficientGap(context: FixContext, run: Run, gapIndex: number): Sufficient | null {
  return once(context.evaluation, `gap ${gapIndex}`, run, () => {
    const place = placeOf(run, gapIndex);
    const adjustable = place === null ? null : gapAdjustable(context, run, place);
    return place === null || adjustable === null ? null : solved(context, adjustable, receiversAcross(context.evaluation, run, place));
  });
}

/** Null where no receiver's budget depends on the run, or none can be computed. */
export function sufficientLength(context: FixContext, run: Run): Sufficient | null {
  return once(context.evaluation, 'length', run, () => {
    const adjustable = lengthAdjustable(context, run);
    return adjustable === null ? null : solved(context, adjustable, receiversAcross(context.evaluation, run, null));
  });
}

const known = new WeakMap<Evaluation, Map<Run, Map<string, Sufficient | null>>>();

function once(evaluation: Evaluation, key: string, run: Run, find: () => Sufficient | null): Sufficient | null {
  const runs = known.get(evaluation) ?? new Map<Run, Map<string, Sufficient | null>>();
  known.set(evaluation, runs);
  const answers = runs.get(run) ?? new Map<string, Sufficient | null>();
  runs.set(run, answers);
  const answer = answers.get(key);
  if (answer !== undefined) return answer;
  const found = find();
  answers.set(key, found);
  return found;
}

function solved(context: FixContext, adjustable: Adjustable, budgets: readonly Budget[]): Sufficient | null {
  if (budgets.length === 0) return null;
  const result = solve(context, [adjustable], withinBudget(context, budgets));
  if (result === null) return null;
  const [value] = result.values;
  return { value: value!, written: adjustable.written.inUnit(value!), enough: result.enough, receivers: budgets.map(({ subject }) => subject.name), evaluations: result.evaluations };
}

/** Complete budgets to which something couples across this gap, or anywhere in the run. */
function receiversAcross({ budgets }: Evaluation, run: Run, place: GapPlace | null): readonly Budget[] {
  return budgets.filter(({ complete, contributions }) => complete && contributions.some(({ coupling }) => {
    if (coupling === null || coupling.run !== run) return false;
    const between = place === null ? null : gapsBetween(run, coupling.aggressor, coupling.victim);
    return place === null || (between !== null && between.row === place.row && between.gaps.includes(place.gap));
  }));
}

function placeOf({ rows }: Run, gapIndex: number): GapPlace | null {
  let first = 0;
  for (const [row, { gaps }] of rows.entries()) {
    if (gapIndex < first + gaps.length) return { row, gap: gapIndex - first };
    first += gaps.length;
  }
  return null;
}
