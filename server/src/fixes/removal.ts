/**
 * Takes a statement out of a file: with its line where it has lines of its own, alone where something
 * stands beside it. A comment beside it stays.
 */
import type { Place } from '../board/model';
import type { Edit } from './fix';

export function removal(text: string, { path, span }: Place): Edit {
  const lineStart = text.lastIndexOf('\n', span.start - 1) + 1;
  const rest = /^[^\S\r\n]*(\r?\n|$)/u.exec(text.slice(span.end));
  const alone = text.slice(lineStart, span.start).trim() === '' && rest !== null;
  if (alone) return { path, span: { start: lineStart, end: span.end + rest[0].length }, newText: '' };
  // Between two others on one line, one of the two semicolons goes with it.
  const semicolon = /^[^\S\r\n]*;[^\S\r\n]*/u.exec(text.slice(span.end));
  if (semicolon !== null) return { path, span: { start: span.start, end: span.end + semicolon[0].length }, newText: '' };
  const before = /[^\S\r\n]*;[^\S\r\n]*$/u.exec(text.slice(lineStart, span.start));
  return { path, span: { start: span.start - (before?.[0].length ?? 0), end: span.end }, newText: '' };
}
