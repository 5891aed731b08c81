/** Names: words, quoted words, and ranges of them. */
import { isTypographicQuote } from './characters';
import type { TokenCursor } from './cursor';
import { quoted, type Mistakes } from './mistakes';
import type { NameValue, Span } from './tree';

/** More conductors than any run holds; a larger range is a slip of the finger. */
export const longestRange = 1024;

/**
 * Reads the word or string at the cursor as a name. Null, and reported, where it cannot be one; the
 * cursor is beyond it in any case.
 */
export function readName(cursor: TokenCursor, mistakes: Mistakes, { role, many }: { readonly role: string; readonly many: boolean }): NameValue | null {
  if (cursor.kind === 'string') return quotedName(cursor, mistakes, role);
  if (isTypographicQuote(cursor.text.charCodeAt(cursor.start))) {
    readTypographicString(cursor, mistakes);
    return null;
  }
  const name = cursor.word;
  const span = cursor.next();
  if (!/[\p{L}\p{N}]/u.test(name)) {
    mistakes.report('syntax', span, `${quoted(name)} is no name: a name holds a letter or a digit, or stands in quotes`, [{ title: `Quote it: "${name}"`, span, newText: `"${name}"` }]);
    return null;
  }
  if (!looksLikeRange(name)) return { kind: 'name', role, span, name, quoted: false, range: null };
  const range = namesInRange(name);
  if (typeof range === 'string') {
    mistakes.report(range === tooLong ? 'bad-value' : 'syntax', span, `${quoted(name)}: ${range}`);
    return null;
  }
  if (many) return { kind: 'name', role, span, name, quoted: false, range };
  mistakes.report('syntax', span, `${quoted(name)} is a range; one name belongs here`, range.slice(0, 2).map((each) => ({ title: `One name: ${each}`, span, newText: each })));
  return null;
}

/** The string at the cursor, `""` made one quote; null where it is not closed, which is reported. */
export function readString(cursor: TokenCursor, mistakes: Mistakes): { readonly text: string; readonly span: Span } | null {
  const written = cursor.word;
  const span = cursor.next();
  if (isClosed(written)) return { text: written.slice(1, -1).replaceAll('""', '"'), span };
  mistakes.report('syntax', span, 'the string is not closed on its line: `"` belongs at its end', [{ title: 'Close the string', span: { start: span.end, end: span.end }, newText: '"' }]);
  return null;
}

/** Passes over “text” and reports it once. Text that was pasted in is never a value. */
export function readTypographicString(cursor: TokenCursor, mistakes: Mistakes): void {
  const { text, start } = cursor;
  let end = start + 1;
  while (end < text.length && text[end] !== '\n' && text[end] !== '\r' && text[end] !== '"' && !isTypographicQuote(text.charCodeAt(end))) end += 1;
  const closed = end < text.length && text[end] !== '\n' && text[end] !== '\r';
  const span = { start, end: closed ? end + 1 : end };
  const newText = `"${text.slice(start + 1, end)}"`;
  mistakes.report('syntax', span, 'typographic quotes: strings and quoted names stand in `"`', [{ title: 'Use straight quotes', span, newText }]);
  cursor.readTo(start, span.end);
}

/** Quotes after the first come in pairs, but for the one at the end. */
function isClosed(written: string): boolean {
  let quotes = 0;
  for (let at = written.length - 1; 0 < at && written[at] === '"'; at -= 1) quotes += 1;
  return quotes % 2 === 1;
}

function quotedName(cursor: TokenCursor, mistakes: Mistakes, role: string): NameValue | null {
  const string = readString(cursor, mistakes);
  if (string === null) return null;
  if (string.text === '') {
    mistakes.report('syntax', string.span, 'a name may not be empty');
    return null;
  }
  return { kind: 'name', role, span: string.span, name: string.text, quoted: true, range: null };
}

/** Of the form …[…..…]…: no plain name, whether or not it can be counted. Without a regular expression, as it must stay linear. */
export function looksLikeRange(name: string): boolean {
  const open = name.indexOf('[');
  const dots = open < 0 ? -1 : name.indexOf('..', open);
  return 0 <= dots && name.indexOf(']', dots) !== -1;
}

const tooLong = `a range stands for at most ${longestRange} names`;

/** `D[0..2]` as D0, D1, D2 and `D[[0..2]]` as D[0], D[1], D[2]; a sentence where that cannot be. */
export function namesInRange(name: string): readonly string[] | string {
  const parts = /^([^[\]]*)(\[\[?)(\d+)\.\.(\d+)(\]\]?)([^[\]]*)$/.exec(name);
  if (parts === null || parts[2]!.length !== parts[5]!.length) return 'a range counts from one whole number to another, as in `D[0..7]`, once in a name';
  const [, prefix, brackets, first, last, , suffix] = parts as unknown as readonly [string, string, string, string, string, string, string];
  const from = Number(first);
  const to = Number(last);
  const count = Math.abs(to - from) + 1;
  if (!(count <= longestRange)) return tooLong;
  // D[00..15] means D00, not D0.
  const width = first.startsWith('0') || last.startsWith('0') ? Math.min(first.length, last.length) : 0;
  return Array.from({ length: count }, (_, index) => {
    const number = String(from < to ? from + index : from - index).padStart(width, '0');
    return brackets === '[[' ? `${prefix}[${number}]${suffix}` : `${prefix}${number}${suffix}`;
  });
}
