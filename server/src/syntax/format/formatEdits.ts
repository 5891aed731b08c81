/**
 * Formatting: white space is changed and nothing else. No line is joined or split, no `;`, spelling, string or comment touched, and a
 * line with an error stays as it is. Each edit replaces the white space at one place, so that what is in order already
 * is not touched at all.
 */
import { parse } from '../parse';
import type { SourceTree, Span } from '../tree';
import { indentOf, setLines, type SetLine } from './columns';
import { linesOf, type Line } from './lines';

export interface SpaceEdit {
  readonly span: Span;
  /** White space, and a newline at the end of the text only. */
  readonly newText: string;
}

/** In the order of the text. */
export function formatEdits(tree: SourceTree): readonly SpaceEdit[] {
  return editsOf(tree, linesOf(tree));
}

/** `of`: the lines of the tree, or some of them: what is left out stays and parts nothing. */
export function editsOf(tree: SourceTree, of: readonly Line[]): readonly SpaceEdit[] {
  const { text } = tree;
  const edits = setLines(text, of).flatMap((each) => (each.line.kept || partsNewline(text, each.line) ? [] : wantedSpaces(each, each.line.end === text.length ? missingNewline(tree) : '')));
  return edits.filter(({ span, newText }) => text.slice(span.start, span.end) !== newText);
}

export function formatted(text: string): string {
  const parts: string[] = [];
  let from = 0;
  for (const { span, newText } of formatEdits(parse(text))) {
    parts.push(text.slice(from, span.start), newText);
    from = span.end;
  }
  return parts.join('') + text.slice(from);
}

function wantedSpaces({ line, gaps, commentGap }: SetLine, lineEnd: string): readonly SpaceEdit[] {
  const all = line.comment === null ? line.pieces : [...line.pieces, line.comment];
  const wanted = [indentOf(line), ...gaps, commentGap];
  let from = line.start;
  const edits = all.map(({ start, end }, index): SpaceEdit => {
    const span = { start: from, end: start };
    from = end;
    return { span, newText: wanted[index]! };
  });
  return [...edits, { span: { start: from, end: line.end }, newText: lineEnd }];
}

/** What the last line lacks of a newline, like those of the rest of the text. */
function missingNewline({ text, tokens }: SourceTree): string {
  const last = tokens.at(-1);
  if (last === undefined || last.kind === 'newline') return '';
  const first = tokens.find(({ kind }) => kind === 'newline');
  return first === undefined ? '\n' : text.slice(first.start, first.end);
}

/** Without the white space on it, the carriage return before and the line feed behind would become one line end. */
function partsNewline(text: string, { start, end, pieces, comment }: Line): boolean {
  return pieces.length === 0 && comment === null && text[start - 1] === '\r' && text[end] === '\n';
}
