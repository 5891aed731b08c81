/** Formatting of a file, of some of its lines, and of what was just typed: white space only, and only where it differs. */
import { formatEdits, type SpaceEdit } from '../syntax/format/formatEdits';
import { editsAfterBrace, editsAfterNewline, within } from '../syntax/format/whileTyping';
import { lineEnd } from '../syntax/scan';
import type { SourceTree, Span } from '../syntax/tree';
import type { Session } from './session';

export function formatting(session: Session, path: string): readonly SpaceEdit[] {
  return edits(session, path, formatEdits);
}

/** All lines that the range touches, set as they would be with the whole file. */
export function rangeFormatting(session: Session, path: string, range: Span): readonly SpaceEdit[] {
  return edits(session, path, (tree) => within(formatEdits(tree), wholeLines(tree.text, range)));
}

/** What brings formatting about while it is typed. */
export const formatsAfter = ['}', '\n'] as const;

/** `offset`: where the cursor is after it. */
export function typedFormatting(session: Session, path: string, { offset, typed }: { readonly offset: number; readonly typed: string }): readonly SpaceEdit[] {
  return edits(session, path, (tree) => (typed === '}' ? editsAfterBrace(tree, offset) : editsAfterNewline(tree, offset)));
}

function edits(session: Session, path: string, of: (tree: SourceTree) => readonly SpaceEdit[]): readonly SpaceEdit[] {
  const tree = session.tree(path);
  return tree === undefined ? [] : of(tree);
}

/** A selection that ends where a line begins does not touch that line. */
function wholeLines(text: string, { start, end }: Span): Span {
  const last = start < end && isLineStart(text, end) ? end - 1 : end;
  let from = start;
  while (!isLineStart(text, from)) from -= 1;
  return { start: from, end: lineEnd(text, last) };
}

function isLineStart(text: string, at: number): boolean {
  return at <= 0 || text[at - 1] === '\n' || (text[at - 1] === '\r' && text[at] !== '\n');
}
