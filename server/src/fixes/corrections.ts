/** What the finding itself knows: a misspelt name, a unit in the wrong case, a property that is missing. */
import type { Finding } from '../rules/rule';
import type { Evaluation } from '../budget/results';
import type { Fix, FixContext } from './fix';

export function corrections({ rule, at, fault }: Finding, context: FixContext): readonly Fix[] {
  const mends = (fault.corrections ?? []).slice(0, mostOffered).flatMap(({ title, place: { path, span }, newText }) => {
    const edits = [{ path, span, newText }];
    return errorCount(context.evaluateWith(edits)) < errorCount(context.evaluation) ? [{ title, rule, at, edits, preferred: false }] : [];
  });
  // Of several readings the tool does not guess one.
  return mends.length === 1 ? [{ ...mends[0]!, preferred: true }] : mends;
}

/** A menu, not a dictionary; and each is read and computed before it is offered. */
const mostOffered = 5;

function errorCount({ project }: Evaluation): number {
  return project.errors.length;
}
