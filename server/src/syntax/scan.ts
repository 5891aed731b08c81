/** Steps over a kind of character: what the readers of words, numbers and units share. */
import { isDigit, isMinus, isNewline, isSpace, isWordCharacter, plus } from './characters';

/** Offset of the line's end, the newline itself excluded. */
export function lineEnd(text: string, from: number): number {
  let end = from;
  while (end < text.length && !isNewline(text.charCodeAt(end))) end += 1;
  return end;
}

export function passSpaces(text: string, from: number, limit: number): number {
  let at = from;
  while (at < limit && isSpace(text.charCodeAt(at))) at += 1;
  return at;
}

export function passDigits(text: string, from: number, limit: number): number {
  let at = from;
  while (at < limit && isDigit(text.charCodeAt(at))) at += 1;
  return at;
}

export function endOfUnit(text: string, start: number, limit: number): number {
  let at = start;
  while (at < limit && isWordCharacter(text.charCodeAt(at)) && plusMinusAt(text, at) === 0) at += 1;
  return at;
}

/** Length of a plus-minus that stands at this place: `±`, `+-` or `+/-`; 0 where there is none. */
export function plusMinusAt(text: string, at: number): number {
  const code = text.charCodeAt(at);
  if (code === 0xb1) return 1;
  if (code !== plus) return 0;
  if (isMinus(text.charCodeAt(at + 1))) return 2;
  return text[at + 1] === '/' && isMinus(text.charCodeAt(at + 2)) ? 3 : 0;
}
