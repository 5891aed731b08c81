/**
 * A proposal becomes a fix when the board, read again with its edits, is seen to be better and nowhere
 * worse: then its title says what came of it.
 */
import type { Budget, Evaluation } from '../budget/results';
import { voltageInText, type BudgetFault } from '../rules/budgetFault';
import { findingsOf } from '../rules/index';
import type { Finding } from '../rules/rule';
import type { Edit, Fix, FixContext, Proposal } from './fix';
import { sameBudget } from './trial';

export interface JudgedFix {
  readonly fix: Fix;
  readonly mends: boolean;
  readonly moves: number;
}

/** For a finding on a receiver: null where the receiver is not much better off, or anything is worse. */
export function judgedByBudget(finding: Finding, context: FixContext, { words, edits, moves }: Proposal): JudgedFix | null {
  const { budget } = finding.fault as BudgetFault;
  const evaluation = context.evaluateWith(edits);
  const after = sameBudget(evaluation, budget);
  if (after === null || after.total === null || budget.total === null || isWorse(context, evaluation)) return null;
  const mends = after.verdict === 'pass';
  if (!mends && !(severity[after.verdict] < severity[budget.verdict]) && muchBetter * budget.total < after.total) return null;
  const title = `${words}: ${voltageInText(after.total, after)} of ${voltageInText(after.tolerates, after)}${remainder[after.verdict]}`;
  return { fix: { title, rule: finding.rule, at: finding.at, edits, preferred: false }, mends, moves };
}

/** For any other finding: the fix, where the finding is gone with it and nothing is worse. */
export function judgedByFinding(finding: Finding, context: FixContext, title: string, edits: readonly Edit[]): Fix | null {
  const evaluation = context.evaluateWith(edits);
  const remaining = findingsIn(evaluation);
  const before = findingsIn(context.evaluation);
  const countOf = (findings: readonly Finding[]) => findings.filter(({ key, waived }) => key === finding.key && waived === null).length;
  if (countOf(before) <= countOf(remaining) || isWorse(context, evaluation)) return null;
  return { title, rule: finding.rule, at: finding.at, edits, preferred: false };
}

/** Half of the noise is worth an offer, even where the other half is still too much. */
const muchBetter = 0.5;

const severity = { pass: 0, low: 1, unknown: 2, over: 3 } as const;
const remainder = { pass: '', low: ', still short of the headroom', over: ', still over', unknown: ' so far' } as const;

/** A budget fails that did not, or an error or a warning is there that was not. */
function isWorse({ evaluation: before }: FixContext, after: Evaluation): boolean {
  const fails = (evaluation: Evaluation, budget: Budget) => severity[sameBudget(evaluation, budget)?.verdict ?? 'unknown'];
  if (after.budgets.some((budget) => fails(before, budget) < severity[budget.verdict])) return true;
  const known = new Set(findingsIn(before).map(({ key }) => key));
  return findingsIn(after).some(({ key, severity: weight, rule }) => (weight === 'error' || weight === 'warning') && !onBudgets.has(rule) && !known.has(key));
}

/** Judged above, receiver by receiver. */
const onBudgets: ReadonlySet<string> = new Set(['over-budget', 'low-margin', 'dominant-coupling']);

/** A menu of fixes asks for the findings of one evaluation again and again. */
const found = new WeakMap<Evaluation, readonly Finding[]>();

function findingsIn(evaluation: Evaluation): readonly Finding[] {
  const findings = found.get(evaluation) ?? findingsOf(evaluation);
  found.set(evaluation, findings);
  return findings;
}
