/** What the finding itself knows: a misspelt name, a unit in the wrong case, a property that is missing. */
import type { Evaluation } from '../budget/results';
import { findingsOf } from '../rules/index';
import type { Finding } from '../rules/rule';
import { isRuleName, isWaivable } from '../rules/ruleNames';
import type { Fix, FixContext } from './fix';

export function corrections({ rule, at, key, fault }: Finding, context: FixContext): readonly Fix[] {
  const before = textFindings(context.evaluation);
  const mends = (fault.corrections ?? []).slice(0, mostOffered).flatMap(({ title, place: { path, span }, newText }): Fix[] => {
    const edits = [{ path, span, newText }];
    const after = textFindings(context.evaluateWith(edits));
    const helps = after.length < before.length && countOf(after, key) < countOf(before, key);
    return helps ? [{ title, rule, at, edits, preferred: false }] : [];
  });
  // Of several readings the tool does not guess one.
  return mends.length === 1 ? [{ ...mends[0]!, preferred: true }] : mends;
}

/** A menu, not a dictionary; and each is read and computed before it is offered. */
const mostOffered = 5;

/** What can be read better may well turn out to be over its budget: only the text itself counts here. */
function textFindings(evaluation: Evaluation): readonly Finding[] {
  return findingsOf(evaluation).filter(({ rule }) => isRuleName(rule) && !isWaivable(rule));
}

function countOf(findings: readonly Finding[], wanted: string): number {
  return findings.filter(({ key }) => key === wanted).length;
}
