/**
 * A gap for every mistake in the text that no property has claimed as its own: a row that is not a row,
 * a property of which the word is misspelt. Without them a budget could pass because a line is missing.
 */
import type { Statement } from '../syntax/tree';
import type { ProjectFile } from './closure';
import { fileScope, type Declarations } from './declarations';
import { headOf } from './layers';
import { gap, type Resolution, type Scope } from './resolution';
import { statementAt, strayIn } from './unreadable';

export function addTextGaps(files: readonly ProjectFile[], declarations: Declarations, resolution: Resolution): void {
  const claimed = new Map<Statement, { readonly start: number; readonly end: number }[]>();
  for (const { owner, place } of resolution.gaps) {
    if (owner.statement === null || owner.path !== place.path) continue;
    const spans = claimed.get(owner.statement);
    if (spans === undefined) claimed.set(owner.statement, [place.span]);
    else spans.push(place.span);
  }
  for (const { scope, statement } of Object.values(declarations).flat()) {
    if (!isSpoilt(scope, statement)) continue;
    const spans = claimed.get(statement) ?? [];
    const isClaimed = (part: Statement) => spans.some(({ start, end }) => start <= part.span.end && part.span.start <= end);
    addWithin(scope, statement, isClaimed);
  }
  for (const file of files) addStray(file, resolution);
}

function addWithin(scope: Scope, statement: Statement, isClaimed: (part: Statement) => boolean): void {
  const { block } = statement;
  const head = headOf(statement);
  if (0 < scope.unreadable.stretchesIn(head).length || (statement.broken && block === null)) gap(scope, statement.keywordSpan, `the first line of ${scope.owner.called}`);
  if (block === null) return;
  for (const part of block.statements) {
    if (part.block !== null) addWithin(scope, part, isClaimed);
    else if (isSpoilt(scope, part) && !isClaimed(part)) gap(scope, part.span, `\`${part.keyword}\` of ${scope.owner.called}`);
  }
  for (const span of strayIn(scope.unreadable, block)) gap(scope, span, `a line of ${scope.owner.called}`);
}

function addStray(file: ProjectFile, resolution: Resolution): void {
  const scope = fileScope(file, resolution);
  const { statements, text } = file.tree;
  for (const span of scope.unreadable.stretchesIn({ start: 0, end: text.length + 1 })) {
    const statement = statementAt(statements, span.start);
    if (statement === null) gap(scope, span, `a line of ${scope.owner.called}`);
    else if (statement.keyword === 'use') gap(scope, span, `a \`use\` of ${scope.owner.called}`);
  }
}

function isSpoilt(scope: Scope, statement: Statement): boolean {
  return statement.broken || 0 < scope.unreadable.stretchesIn(statement.span).length || (statement.block?.statements.some((part) => isSpoilt(scope, part)) ?? false);
}
