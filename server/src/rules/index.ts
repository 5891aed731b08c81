/**
 * The rules, and what they find in an evaluated project: waivers applied, sorted as every front end
 * shows it. Adding a rule is one line in the list.
 */
import type { Evaluation } from '../budget/results';
import { badValue } from './badValue';
import { dominantCoupling } from './dominantCoupling';
import { duplicateName } from './duplicateName';
import { emissionOverLimit } from './emissionOverLimit';
import { floatingShield } from './floatingShield';
import { gapBelowClearance } from './gapBelowClearance';
import { guardUnstitched } from './guardUnstitched';
import { include } from './include';
import { incompleteBudget } from './incompleteBudget';
import { insulationCaution } from './insulationCaution';
import { loopTooLarge } from './loopTooLarge';
import { lowMargin } from './lowMargin';
import { missingTermination } from './missingTermination';
import { missingValue } from './missingValue';
import { noReturnPath } from './noReturnPath';
import { outsideModel } from './outsideModel';
import { overBudget } from './overBudget';
import type { Fault, Finding, Rule } from './rule';
import { syntax } from './syntax';
import { unit } from './unit';
import { unknownName } from './unknownName';
import { unusedDeclaration } from './unusedDeclaration';
import { unusedWaiver } from './unusedWaiver';
import { waiverOf } from './waivers';

/** In the order of the reference. `unusedWaiver` has to know what the others found, so it stands last. */
export const rules: readonly Rule[] = [
  overBudget,
  lowMargin,
  dominantCoupling,
  incompleteBudget,
  gapBelowClearance,
  insulationCaution,
  loopTooLarge,
  emissionOverLimit,
  noReturnPath,
  guardUnstitched,
  floatingShield,
  missingTermination,
  outsideModel,
  unusedDeclaration,
  badValue,
  syntax,
  unit,
  unknownName,
  duplicateName,
  missingValue,
  include,
  unusedWaiver,
];

export interface FindingOptions {
  readonly rules?: readonly Rule[];
  /** Is told of a fault in a rule itself, besides the finding that reports it. */
  readonly log?: (rule: string, error: unknown) => void;
}

export function findingsOf(evaluation: Evaluation, options: FindingOptions = {}): readonly Finding[] {
  const found: Finding[] = [];
  for (const rule of options.rules ?? rules) {
    // A fault of one rule must not take the findings of the others with it, nor pass for a clean board.
    try {
      const own = [...rule.find(evaluation, found)].map((fault) => findingOf(rule, fault, evaluation));
      // One by one: as arguments of a single call, the findings of a megabyte of stray words overflow the stack.
      for (const finding of own) found.push(finding);
    } catch (error) {
      options.log?.(rule.name, error);
      found.push(uncheckedFinding(rule, error, evaluation));
    }
  }
  return distinct(found).sort(byPlace);
}

function findingOf(rule: Rule, fault: Fault, { project }: Evaluation): Finding {
  const waiver = rule.waivable ? waiverOf({ rule: rule.name, subject: fault.subject }, project.waivers) : null;
  return {
    rule: rule.name,
    severity: rule.severity,
    message: rule.message(fault),
    at: fault.at,
    subject: fault.subject,
    related: fault.related ?? [],
    value: fault.value ?? null,
    limit: fault.limit ?? null,
    unit: fault.unit ?? null,
    waived: waiver?.reason ?? null,
    key: [rule.name, ...(fault.subject === null ? [] : [fault.subject.kind, fault.subject.name]), ...(fault.names ?? [])].map(quotedWhereSpaced).join(' '),
    fault,
  };
}

/** It stands where the file begins to mean something, and fails a check: nobody knows what the rule would have found. */
function uncheckedFinding(rule: Rule, error: unknown, { project }: Evaluation): Finding {
  const [net] = project.nets.values();
  const at = project.board.place ?? project.runs[0]?.place ?? net?.place ?? { path: project.root, span: { start: 0, end: 0 } };
  const words = error instanceof Error ? error.message : String(error);
  return { rule: rule.name, severity: 'error', message: `${rule.name} was not checked, for a fault in Quietrun itself: ${words}`, at, subject: null, related: [], value: null, limit: null, unit: null, waived: null, key: `${rule.name} unchecked`, fault: { at, subject: null } };
}

function quotedWhereSpaced(name: string): string {
  return /^\S+$/.test(name) ? name : JSON.stringify(name);
}

/** A rule can meet one fault in two ways, such as an error that two files lead to; it is said once. */
function distinct(findings: readonly Finding[]): Finding[] {
  const seen = new Map<string, Finding>();
  for (const finding of findings) {
    const { at, rule, message } = finding;
    const identity = JSON.stringify([at.path, at.span.start, at.span.end, rule, message]);
    if (!seen.has(identity)) seen.set(identity, finding);
  }
  return [...seen.values()];
}

function byPlace(a: Finding, b: Finding): number {
  return compare(a.at.path, b.at.path) || a.at.span.start - b.at.span.start || compare(a.rule, b.rule) || compare(a.message, b.message);
}

/** By code unit, so that the order does not depend on anyone's locale. */
function compare(a: string, b: string): number {
  return a < b ? -1 : b < a ? 1 : 0;
}
