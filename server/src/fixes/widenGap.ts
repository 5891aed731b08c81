/**
 * Widens gaps between a receiver and what disturbs it, to what would just do: the one beside the receiver,
 * the one beside the aggressor, or, where one alone is not enough, all that the noise comes across.
 */
import type { Contribution } from '../budget/results';
import { gapBelowClearance, type GapBelowClearance } from '../rules/gapBelowClearance';
import type { BudgetFault } from '../rules/budgetFault';
import { gapsBetween } from '../rules/gapsBetween';
import type { Finding } from '../rules/rule';
import { bringsNearer } from './bringsNearer';
import { isSame } from './changedRun';
import type { Fix, FixContext, Proposal } from './fix';
import { gapAdjustable, gapInText, lengthEdit } from './gapAdjustable';
import { judgedByFinding } from './judged';
import { matters, partGone, solve, withinBudget, type Adjustable, type Goal, type Solved } from './solve';

export function widenedGaps({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  const crossed = largest === null ? [] : crossedGaps(context, largest);
  const proposals = crossed.flatMap((target) => solvedFor(context, [target], withinBudget(context, [budget])));
  if (0 < proposals.length) return [least(proposals)];
  const everywhere = distinct(budget.contributions.filter(({ value }) => matters * budget.tolerates < value).flatMap((contribution) => crossedGaps(context, contribution).slice(0, 1)));
  const together = everywhere.length < 2 ? [] : solvedFor(context, everywhere, withinBudget(context, [budget]));
  if (0 < together.length) return together;
  // What is left comes from elsewhere: as far as this gap is worth widening.
  return largest === null || crossed.length === 0 ? [] : solvedFor(context, [crossed[0]!], partGone(context, budget, largest));
}

/** A gap that the fabricator cannot make becomes the smallest that he can. */
export function widenedToClearance(finding: Finding, context: FixContext): readonly Fix[] {
  if (finding.rule !== gapBelowClearance.name) return [];
  const { run, row, gap, clearance } = finding.fault as GapBelowClearance;
  const adjustable = gapAdjustable(context, run, { row, gap });
  if (adjustable === null) return [];
  const value = adjustable.written.rounded(clearance, 'up');
  if (bringsNearer(context.project, run, adjustable.apply(run, value))) return [];
  const title = `Widen ${gapInText(run, { row, gap })} to ${adjustable.written.inFile(value)}, which the fabricator can make`;
  const fix = judgedByFinding(finding, context, title, [lengthEdit(adjustable, value)]);
  return fix === null ? [] : [{ ...fix, preferred: true }];
}

interface Target {
  readonly adjustable: Adjustable;
  readonly words: string;
}

/** Beside the receiver, and beside the aggressor where that is another gap. */
function crossedGaps(context: FixContext, { coupling }: Contribution): readonly Target[] {
  if (coupling === null) return [];
  const { run, aggressor, victim } = coupling;
  const between = gapsBetween(run, aggressor, victim);
  if (between === null) return [];
  const ends = [...new Set([between.gaps[0]!, between.gaps.at(-1)!])].map((gap) => ({ row: between.row, gap }));
  return distinct(ends.flatMap((place) => {
    const adjustable = gapAdjustable(context, run, place);
    return adjustable === null ? [] : [{ adjustable, words: gapInText(run, place) }];
  }));
}

function solvedFor(context: FixContext, targets: readonly Target[], goal: Goal): readonly Proposal[] {
  // Where the first step goes the wrong way, no number need be looked for.
  const nearer = targets.some(({ adjustable: { run, given, written, apply } }) => bringsNearer(context.project, run, apply(run, written.rounded(given.value + written.grid, 'up'))));
  if (nearer) return [];
  const [first, ...others] = targets.map(({ adjustable }) => adjustable);
  const solved = first === undefined ? null : solve(context, [first, ...others], goal);
  if (solved === null || !solved.enough || solved.changes.some(({ before, after }) => bringsNearer(context.project, before, after))) return [];
  return [proposal(targets, solved)];
}

function proposal(targets: readonly Target[], { values }: Solved): Proposal {
  const widths = targets.map(({ adjustable: { written } }, index) => written.inFile(values[index]!));
  const runs = new Set(targets.map(({ adjustable }) => adjustable.run)).size;
  const words = targets.length === 1 ? `Widen ${targets[0]!.words} to ${widths[0]}` : `Widen ${targets.length} gaps${1 < runs ? ` in ${runs} runs` : ''} to ${widths.slice(0, -1).join(', ')} and ${widths.at(-1)}`;
  const moves = targets.reduce((sum, { adjustable }, index) => sum + values[index]! - adjustable.given.value, 0);
  return { words, edits: targets.map(({ adjustable }, index) => lengthEdit(adjustable, values[index]!)), moves };
}

function distinct(targets: readonly Target[]): readonly Target[] {
  return targets.filter(({ adjustable }, index) => targets.findIndex((other) => isSame(other.adjustable.given.place, adjustable.given.place)) === index);
}

function least(proposals: readonly Proposal[]): Proposal {
  return proposals.reduce((best, other) => (other.moves < best.moves ? other : best));
}
