/** The outline of a file: its declarations, with the rows of runs and the layers of stackups below them. */
import type { NameValue, Statement } from '../syntax/tree';
import type { SymbolEntry } from './answers';
import type { Session } from './session';

export function symbols(session: Session, path: string): readonly SymbolEntry[] {
  const tree = session.tree(path);
  if (tree === undefined) return [];
  return tree.statements.filter(({ keyword }) => keyword !== 'use' && keyword !== 'waive').map((statement) => symbolOf(tree.text, statement));
}

function symbolOf(text: string, statement: Statement): SymbolEntry {
  const { keyword, keywordSpan, span, block } = statement;
  const name = nameOf(statement);
  const nameSpan = name?.span ?? keywordSpan;
  const lastValue = statement.values.at(-1)?.span.end ?? nameSpan.end;
  return {
    name: name?.name ?? keyword,
    kind: keyword,
    detail: onOneLine(text.slice(nameSpan.end, Math.max(nameSpan.end, lastValue))),
    span: { start: span.start, end: span.end },
    nameSpan: { start: nameSpan.start, end: nameSpan.end },
    children: (block?.statements ?? []).filter((part) => rowKeywords.has(part.keyword) && (block!.kind === 'run' || block!.kind === 'row' || block!.kind === 'stackup')).map((part) => symbolOf(text, part)),
  };
}

/** What stands in an outline below its declaration: a cross-section reads there as it lies on the board. */
const rowKeywords: ReadonlySet<string> = new Set(['on', 'trace', 'guard', 'return', 'gap', 'mask', 'dielectric', 'core', 'prepreg', 'copper', 'plane']);

function nameOf({ values, keyword }: Statement): NameValue | null {
  const roles = keyword === 'on' ? ['layer'] : ['name', 'net'];
  return values.find((value): value is NameValue => value.kind === 'name' && roles.includes(value.role)) ?? null;
}

/** What follows the name: `on TOP for 38 mm`, `0.25 mm`. */
function onOneLine(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim();
  return 80 < line.length ? `${line.slice(0, 79)}…` : line;
}
