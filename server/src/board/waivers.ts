/** Waivers, at top level and inside declarations, where the declaration is the subject. */
import type { Statement } from '../syntax/tree';
import type { Declaration, Declarations } from './declarations';
import { nameIn, stringIn } from './given';
import type { Waiver } from './model';
import { reportUnknown } from './references';
import { placeIn, report, type Scope } from './resolution';

export function resolveWaivers(declarations: Declarations): readonly Waiver[] {
  return Object.values(declarations).flat().flatMap((declaration) => (declaration.scope.owner.kind === 'waive' ? topLevel(declaration) : within(declaration)));
}

function topLevel({ scope, statement }: Declaration): readonly Waiver[] {
  const subject = nameIn(statement, 'subject');
  if (subject === null) return [];
  const { names } = scope.resolution;
  if (names.waive(subject.name, placeIn(scope, subject.span))) return waiverOf(scope, statement, [subject.name]);
  if (scope.resolution.blames('signal', subject.name)) {
    reportUnknown(scope, subject, { name: subject.name, inWords: 'declaration of', meant: scope.resolution.closest(subject.name, names.waivable()) });
  }
  return [];
}

function within({ scope, statement }: Declaration): readonly Waiver[] {
  const waivers = statement.block?.statements.filter(({ keyword }) => keyword === 'waive') ?? [];
  return waivers.flatMap((waiver) => waiverOf(scope, waiver, scope.owner.names));
}

function waiverOf(scope: Scope, statement: Statement, subjects: readonly string[]): readonly Waiver[] {
  const rule = statement.values.find(({ role }) => role === 'rule');
  const reason = stringIn(statement, 'reason');
  if (rule === undefined || reason === null) return [];
  if (reason.text.trim() === '') {
    report(scope, 'missing-value', reason.span, 'the reason is missing: a waiver says why, such as `"0.9 mV measured on revision B"`');
    return [];
  }
  const name = rule.kind === 'name' ? rule.name : rule.kind === 'word' ? rule.word : rule.kind === 'string' ? rule.text : null;
  return name === null || subjects.length === 0 ? [] : [{ rule: name, rulePlace: placeIn(scope, rule.span), subjects, reason: reason.text, place: placeIn(scope, statement.span) }];
}
