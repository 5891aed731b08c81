/**
 * The tokens of a text. Together with the gaps between them, which hold only white space (and a
 * byte-order mark at the start), they cover every character. Linear, and without any context: a word is a
 * word whether a name or a quantity is due there; the quantity reader goes back to the characters.
 */
import { isNewline, isPunctuation, isSpace, isWordCharacter, quote } from './characters';
import { lineEnd } from './scan';
import type { Token } from './tree';

export function tokensOf(text: string): Token[] {
  const tokens: Token[] = [];
  let at = 0;
  while (at < text.length) {
    const code = text.charCodeAt(at);
    if (isSpace(code)) {
      at += 1;
      continue;
    }
    const token = tokenAt(text, at, code);
    tokens.push(token);
    at = token.end;
  }
  return tokens;
}

function tokenAt(text: string, start: number, code: number): Token {
  if (isNewline(code)) return { kind: 'newline', start, end: code === 0x0d && text.charCodeAt(start + 1) === 0x0a ? start + 2 : start + 1 };
  if (isPunctuation(code)) return { kind: 'punctuation', start, end: start + 1 };
  // Reached only where a word could begin: within a word, `#` is a character like any other.
  if (code === 0x23) return { kind: 'comment', start, end: lineEnd(text, start) };
  if (code === quote) return { kind: 'string', start, end: stringEnd(text, start) };
  let end = start + 1;
  while (end < text.length && isWordCharacter(text.charCodeAt(end))) end += 1;
  return { kind: 'word', start, end };
}

/** A string that is not closed runs to the end of its line. */
function stringEnd(text: string, start: number): number {
  let at = start + 1;
  while (at < text.length && !isNewline(text.charCodeAt(at))) {
    if (text.charCodeAt(at) !== quote) at += 1;
    else if (text.charCodeAt(at + 1) === quote) at += 2;
    else return at + 1;
  }
  return at;
}
