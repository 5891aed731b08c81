/**
 * Waives a finding, below the declaration of its subject: the reason is a word to be overwritten, and
 * the text is valid as it stands.
 */
import type { Declared, Place, Project } from '../board/model';
import type { Finding, Subject } from '../rules/rule';
import { isRuleName, isWaivable } from '../rules/ruleNames';
import { writtenName } from '../syntax/writtenName';
import type { Edit, Fix, FixContext } from './fix';
import { judgedByFinding } from './judged';

export function waived(finding: Finding, context: FixContext): readonly Fix[] {
  const { rule, subject } = finding;
  if (subject === null || !isRuleName(rule) || !isWaivable(rule) || finding.waived !== null) return [];
  const declaration = declarationOf(subject, context.project);
  if (declaration === null) return [];
  const statement = `waive ${rule} on ${writtenName(subject.name)} because "reason"`;
  const edit = below(context.text(declaration.path), declaration, statement);
  const fix = judgedByFinding(finding, context, `Waive ${rule} on ${subject.name}, with a reason`, [edit]);
  return fix === null ? [] : [fix];
}

function declarationOf({ kind, name }: Subject, project: Project): Place | null {
  const named = (list: readonly Declared[]) => list.find((declared) => declared.name === name)?.whole ?? null;
  const place = (() => {
    switch (kind) {
      case 'net': return project.nets.get(name)?.whole ?? null;
      case 'pair': return project.pairs.get(name)?.whole ?? null;
      case 'family': return project.families.get(name)?.whole ?? null;
      case 'run': return named(project.runs);
      case 'loop': return named(project.loops);
      case 'return': return named(project.returns);
      case 'link': return named(project.links);
      case 'shield': return named(project.shields);
      case 'ambient': return named(project.ambients);
      case 'board': return null;
    }
  })();
  return place !== null && project.files.includes(place.path) ? place : null;
}

function below(text: string, { path, span }: Place, statement: string): Edit {
  const newline = text.includes('\r\n') ? '\r\n' : '\n';
  const [rest] = /^[^\S\r\n]*(?:#[^\r\n]*)?(?=\r?\n|$)/u.exec(text.slice(span.end)) ?? [null];
  const at = span.end + (rest?.length ?? 0);
  return { path, span: { start: at, end: at }, newText: `${newline}${statement}${rest === null ? newline : ''}` };
}
