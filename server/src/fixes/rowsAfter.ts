/**
 * New rows after the row of a run in which a value stands: on lines of their own, below its comment and
 * in its columns, where it has a line of its own; else behind it on the same line.
 */
import type { Place } from '../board/model';
import type { Edit } from './fix';

export function rowsAfter(text: string, { path, span }: Place, rows: readonly (readonly [keyword: string, values: string])[]): Edit {
  const end = statementEnd(text, span.end);
  const lineStart = text.lastIndexOf('\n', span.start - 1) + 1;
  const lineEnd = lineBreak(text, span.end);
  const [, indent, keyword, padding] = /^(\s*)(\S+)(\s+)/u.exec(text.slice(lineStart, span.start)) ?? [];
  const alone = /^\s*\S+\s+$/u.test(text.slice(lineStart, span.start)) && /^\s*(?:#.*)?$/su.test(text.slice(end, lineEnd));
  if (!alone) return { path, span: { start: end, end }, newText: rows.map(([word, values]) => `; ${word} ${values}`).join('') };
  const column = keyword!.length + padding!.length;
  const newline = text.startsWith('\r\n', lineEnd) ? '\r\n' : '\n';
  const lines = rows.map(([word, values]) => `${newline}${indent}${word.padEnd(column - 1)} ${values}`);
  return { path, span: { start: lineEnd, end: lineEnd }, newText: lines.join('') };
}

/** Behind the last character of the statement, a tolerance included. */
function statementEnd(text: string, from: number): number {
  let at = from;
  while (at < text.length && !';}\r\n'.includes(text[at]!) && !(text[at] === '#' && /\s/u.test(text[at - 1]!))) at += 1;
  return from + text.slice(from, at).trimEnd().length;
}

function lineBreak(text: string, from: number): number {
  const found = /\r?\n|$/u.exec(text.slice(from));
  return from + (found?.index ?? 0);
}
