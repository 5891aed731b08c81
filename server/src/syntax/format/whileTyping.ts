/** What is set in order while a text is written: no more than what was just finished and what stands in its columns. */
import type { SourceTree, Span, Statement } from '../tree';
import { groupsOf } from './columns';
import { editsOf, formatEdits, type SpaceEdit } from './formatEdits';
import { linesOf } from './lines';

/** `offset`: on the line that was begun. The line above it and its group are set; one that is still empty, and about to be filled, parts no group. */
export function editsAfterNewline(tree: SourceTree, offset: number): readonly SpaceEdit[] {
  const all = linesOf(tree);
  const at = all.findIndex(({ start, end }) => start <= offset && offset <= end);
  const finished = all[at - 1];
  if (finished === undefined) return [];
  const { pieces, comment } = all[at]!;
  const lines = pieces.length === 0 && comment === null ? all.filter((_, index) => index !== at) : all;
  return editsOf(tree, groupsOf(tree.text, lines).find((group) => group.includes(finished))!);
}

/** `offset`: behind a brace. The declaration that it closes is set; nothing where it closes none. */
export function editsAfterBrace(tree: SourceTree, offset: number): readonly SpaceEdit[] {
  const closed = statementClosedAt(tree.statements, offset);
  if (closed === null) return [];
  const lines = linesOf(tree).filter(({ start, end }) => start <= closed.span.end && closed.span.start <= end);
  return within(formatEdits(tree), { start: lines[0]!.start, end: lines.at(-1)!.end });
}

function statementClosedAt(statements: readonly Statement[], offset: number): Statement | null {
  const around = statements.find(({ span }) => span.start < offset && offset <= span.end);
  if (around === undefined || around.block === null) return null;
  return around.block.closed && around.block.span.end === offset ? around : statementClosedAt(around.block.statements, offset);
}

export function within(edits: readonly SpaceEdit[], { start, end }: Span): readonly SpaceEdit[] {
  return edits.filter(({ span }) => start <= span.start && span.end <= end);
}
