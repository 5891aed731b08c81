/** What single characters are to the language; the lexer and the quantity reader share it. */

/** Tabs, no-break and thin spaces count as white space, and so does every other space that text is pasted with. */
export function isSpace(code: number): boolean {
  if (code < 0x80) return code === 0x20 || code === 0x09 || code === 0x0b || code === 0x0c;
  return code === 0xa0 || code === 0x1680 || (0x2000 <= code && code <= 0x200a) || code === 0x202f || code === 0x205f || code === 0x3000 || code === 0xfeff;
}

/** A lone carriage return ends a line too: every editor shows it so, and counts its lines so. */
export function isNewline(code: number): boolean {
  return code === 0x0a || code === 0x0d;
}

export function isPunctuation(code: number): boolean {
  return code === 0x7b || code === 0x7d || code === 0x28 || code === 0x29 || code === 0x2c || code === 0x3b;
}

export const quote = 0x22;

export function isWordCharacter(code: number): boolean {
  return !isSpace(code) && !isNewline(code) && !isPunctuation(code) && code !== quote;
}

export function isDigit(code: number): boolean {
  return 0x30 <= code && code <= 0x39;
}

export const plus = 0x2b;
/** ASCII, or U+2212, the minus sign of typeset text: one to us. */
export function isMinus(code: number): boolean {
  return code === 0x2d || code === 0x2212;
}

/** Dashes that are typed or pasted for a minus and are none. */
export function isDash(code: number): boolean {
  return (0x2010 <= code && code <= 0x2015) || code === 0xfe58 || code === 0xfe63 || code === 0xff0d;
}

export function isTimesSign(word: string): boolean {
  return word === 'x' || word === 'X' || word === '\u00d7' || word === '*';
}

/** Typographic quotation marks, opening or closing, single or double. */
export function isTypographicQuote(code: number): boolean {
  return (0x2018 <= code && code <= 0x201f) || code === 0xab || code === 0xbb || code === 0x2039 || code === 0x203a;
}
