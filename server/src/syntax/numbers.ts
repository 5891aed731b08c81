/**
 * Numbers, character by character. What is pasted in from elsewhere (decimal commas, thousands
 * separators, dashes for minus) is recognised, so that it can be reported once and as a whole, but it
 * never becomes a value.
 */
import type { WrittenNumber } from '../units/spelling';
import { isDash, isDigit, isMinus, isSpace, plus } from './characters';
import { passDigits, passSpaces } from './scan';

export interface NumberReading {
  readonly start: number;
  readonly end: number;
  /** Null where it is not written as the language writes numbers. */
  readonly number: WrittenNumber | null;
  /** What is wrong with it, with what could have been meant; null where nothing is. */
  readonly flaw: { readonly message: string; readonly meant: readonly string[] } | null;
}

/** Null where no number begins at `start`. */
export function readNumber(text: string, start: number, limit: number): NumberReading | null {
  const sign = readSign(text, start, limit);
  const mantissaEnd = endOfMantissa(text, sign.end, limit);
  if (mantissaEnd === sign.end) return null;
  const separatorsEnd = endOfSeparators(text, sign.end, mantissaEnd, limit);
  const danglingPoint = separatorsEnd < limit && text[separatorsEnd] === '.';
  const exponent = readExponent(text, danglingPoint ? separatorsEnd + 1 : separatorsEnd, limit);
  const written = text.slice(sign.end, separatorsEnd);
  const end = exponent.end;
  if (separatorsEnd !== mantissaEnd) {
    const meant = meantBySeparators(written).map((number) => sign.asWritten + number + text.slice(separatorsEnd, end));
    return { start, end, number: null, flaw: { message: 'numbers have a decimal point and no separators', meant } };
  }
  const digits = sign.asWritten + written;
  if (danglingPoint) return { start, end, number: null, flaw: { message: 'a decimal point stands between digits', meant: [digits + text.slice(separatorsEnd + 1, end)] } };
  if (sign.flaw !== null) return { start, end, number: null, flaw: { message: sign.flaw, meant: [digits + text.slice(separatorsEnd, end)] } };
  return { start, end, number: { digits, exponent: exponent.value }, flaw: null };
}

/** Whether a quantity could be meant by what stands here: cheap, for looking ahead. */
export function beginsNumber(text: string, at: number): boolean {
  const code = text.charCodeAt(at);
  if (isDigit(code)) return true;
  const next = text.charCodeAt(at + 1);
  if (code === 0x2e) return isDigit(next);
  return isSign(code) && (isDigit(next) || next === 0x2e || (isSpace(next) && isDigit(text.charCodeAt(at + 2))));
}

interface Sign {
  readonly end: number;
  readonly asWritten: '' | '-' | '+';
  readonly flaw: string | null;
}

function isSign(code: number): boolean {
  return code === plus || isMinus(code) || isDash(code);
}

function readSign(text: string, start: number, limit: number): Sign {
  const code = text.charCodeAt(start);
  if (!(start < limit && isSign(code))) return { end: start, asWritten: '', flaw: null };
  const asWritten = code === plus ? '+' : '-';
  if (isDash(code)) return { end: passSpaces(text, start + 1, limit), asWritten, flaw: 'a dash is no minus sign' };
  const end = passSpaces(text, start + 1, limit);
  return { end, asWritten, flaw: end === start + 1 ? null : 'a sign stands directly before its number' };
}

function endOfMantissa(text: string, from: number, limit: number): number {
  const whole = passDigits(text, from, limit);
  if (text.charCodeAt(whole) !== 0x2e || limit <= whole) return whole;
  const fraction = passDigits(text, whole + 1, limit);
  return fraction === whole + 1 ? whole : fraction;
}

/** Beyond `1,000.5`, `10'000`, `1 000` or `1_000`; `end` where there are no separators. */
function endOfSeparators(text: string, start: number, end: number, limit: number): number {
  let last = end;
  for (;;) {
    const code = text.charCodeAt(last);
    const next = last + 1 < limit ? text.charCodeAt(last + 1) : NaN;
    if (last < limit && (code === 0x2c || code === 0x27 || code === 0x2019 || code === 0x5f || code === 0x2e) && isDigit(next)) last = passDigits(text, last + 1, limit);
    else if (last < limit && isSpace(code) && groupOfThree(text, start, last, limit)) last += 4;
    else return last;
  }
}

/** After white space only whole groups count: `1 000 ohm`, but not what is merely two numbers. */
function groupOfThree(text: string, start: number, space: number, limit: number): boolean {
  const end = space + 4;
  return space - start < 400 && end <= limit && passDigits(text, space + 1, limit) === end;
}

function readExponent(text: string, from: number, limit: number): { readonly end: number; readonly value: number } {
  const code = text.charCodeAt(from);
  if (limit <= from || (code !== 0x65 && code !== 0x45)) return { end: from, value: 0 };
  const signCode = text.charCodeAt(from + 1);
  const negative = isMinus(signCode);
  const digits = negative || signCode === plus ? from + 2 : from + 1;
  const end = passDigits(text, digits, limit);
  if (end <= digits) return { end: from, value: 0 };
  return { end, value: (negative ? -1 : 1) * Number(text.slice(digits, end)) };
}

/** `0,2` is 0.2; `1,000` may be either; `1,000.5` and `1 000` are thousands. */
function meantBySeparators(written: string): readonly string[] {
  const joined = written.replace(/[^\d.]/g, '');
  const decimal = /^\d+,\d+$/.test(written) ? [written.replace(',', '.')] : /^\d{1,3}(\.\d{3})+,\d+$/.test(written) ? [written.replaceAll('.', '').replace(',', '.')] : [];
  const thousands = /^[1-9]\d{0,2}(\D\d{3})+(\.\d+)?$/.test(written) && /^\d+(\.\d+)?$/.test(joined) ? [joined] : [];
  return [...decimal, ...thousands];
}
