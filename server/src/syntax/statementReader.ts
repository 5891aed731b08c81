/** Reads one statement, up to its block or its end, by interpreting its shape. */
import { unitSpelt } from '../units/spelling';
import { isTimesSign } from './characters';
import { dimensionsOf, firstWords, fixedWords, inWords, shapeOf } from './fits';
import type { Part, QuantityPart } from './grammar';
import { quoted } from './mistakes';
import { beginsNumber } from './numbers';
import { readComma, readPoint } from './points';
import { begins, decline, expect, fail, lastText, nameTakenFor, type StatementReading } from './reading';
import { tooMuch } from './statementEnd';
import { readCount, readNameOf, readQuantityOf, readRuleName, readStringOf, readWord } from './values';
import { closest } from './words';

export function readParts(reading: StatementReading, parts: readonly Part[]): void {
  for (const part of parts) readPart(reading, part);
}

function readPart(reading: StatementReading, part: Part): void {
  const { cursor } = reading;
  if (!mayBeLeftOut.has(part.is)) expect(reading, part);
  switch (part.is) {
    case 'keyword': return readKeyword(reading, part.word);
    case 'word': return readWord(reading, part);
    case 'quantity': {
      const value = readQuantityOf(reading, part.role, [part]);
      if (value !== null) reading.values.push(value);
      return;
    }
    case 'count': return readCount(reading, part.role);
    case 'name': return readNameOf(reading, part);
    case 'string': return readStringOf(reading, part.role);
    case 'rule-name': return readRuleName(reading, part.role);
    case 'point': {
      const value = readPoint(reading, part.role);
      if (value !== null) reading.values.push(value);
      return;
    }
    case 'comma': return readComma(reading);
    case 'optional-comma': if (cursor.isMark(',')) readComma(reading);
      return;
    case 'optional': return readOptional(reading, part);
    case 'choice': return readChoice(reading, part);
    case 'suffixes': return readSuffixes(reading, part);
    case 'repeat': return readRepeat(reading, part.parts);
  }
}

/** These say themselves what would have fitted, once it is known that it is not there. */
const mayBeLeftOut: ReadonlySet<Part['is']> = new Set(['optional', 'suffixes', 'optional-comma', 'repeat']);

function readKeyword(reading: StatementReading, word: string): void {
  const { cursor, mistakes } = reading;
  if (cursor.isWord(word)) {
    cursor.next();
    return;
  }
  const found = cursor.kind === 'word' ? cursor.word : '';
  if (word === 'by' && found !== '' && isTimesSign(found[0]!) && (found.length === 1 || beginsNumber(found, 1))) {
    const span = { start: cursor.start, end: cursor.start + 1 };
    cursor.readTo(span.start, span.end);
    mistakes.report('syntax', span, `${quoted(found[0]!)}: two lengths are joined by \`by\``, [{ title: 'Write by', span, newText: ' by '.slice(isSpaced(cursor.text, span.start - 1) ? 1 : 0, isSpaced(cursor.text, span.end) ? 3 : 4) }]);
    reading.broken = true;
    return;
  }
  if (closest(found, [word]) !== null && !fixedWords.has(found)) {
    const span = cursor.next();
    mistakes.report('syntax', span, `${quoted(found)}? \`${word}\` belongs here`, [{ title: `Write ${word}`, span, newText: word }]);
    reading.broken = true;
    return;
  }
  if (nameTakenFor(reading, [word])) return;
  fail(reading, 'syntax', cursor.atEnd || cursor.isMark('{') ? `\`${word}\` is missing after ${quoted(lastText(cursor))}` : `\`${word}\` is missing between ${quoted(lastText(cursor))} and ${quoted(cursor.word)}`);
}

function readOptional(reading: StatementReading, part: Part & { readonly is: 'optional' }): void {
  const [first, second] = part.parts;
  const { cursor } = reading;
  const commaLeftOut = first!.is === 'comma' && second !== undefined && begins(reading, second);
  const quantityDue = first!.is === 'quantity' && cursor.kind === 'word' && unitSpelt(cursor.word) !== undefined;
  if (begins(reading, first!) || commaLeftOut || quantityDue) readParts(reading, part.parts);
  else decline(reading, part);
}

function readChoice(reading: StatementReading, part: Part & { readonly is: 'choice' }): void {
  const { cursor } = reading;
  const byWord = part.of.find(([first]) => cursor.kind === 'word' && firstWords(first!).includes(cursor.word));
  if (byWord !== undefined) return readParts(reading, byWord);
  const withQuantity = part.of.filter(([first]) => first!.is === 'quantity');
  if (withQuantity.length === 0) {
    fail(reading, 'missing-value', `${quoted(lastText(cursor))} is followed by ${inWords(part)}`);
    return;
  }
  const firsts = withQuantity.map(([first]) => first as QuantityPart);
  const value = readQuantityOf(reading, firsts.length === 1 ? firsts[0]!.role : reading.shape.keyword, firsts);
  const chosen = withQuantity.find(([first]) => (first as QuantityPart).dimension === (value?.dimension ?? dimensionsOf(withQuantity)[0]))!;
  if (value !== null) reading.values.push({ ...value, role: (chosen[0] as QuantityPart).role });
  if (value !== null || firsts.length === 1) readParts(reading, chosen.slice(1));
}

function readRepeat(reading: StatementReading, parts: readonly Part[]): void {
  const { cursor } = reading;
  // No comma before the first: it parts two.
  readParts(reading, parts.filter((part) => part.is !== 'optional-comma'));
  const separated = parts.some((part) => part.is === 'optional-comma');
  const subject = parts.find((part) => part.is !== 'optional-comma')!;
  while (!reading.lost && (begins(reading, subject) || (separated && cursor.isMark(',')))) {
    const before = cursor.start;
    readParts(reading, parts);
    if (cursor.start === before) return;
  }
  decline(reading, subject);
}

/** Words after a value that stand in any order, each at most once: `reversed`, `after 12 mm`. */
function readSuffixes(reading: StatementReading, part: Part & { readonly is: 'suffixes' }): void {
  const { cursor } = reading;
  const seen = new Set<readonly Part[]>();
  for (;;) {
    const suffix = part.of.find(([first]) => begins(reading, first!));
    if (suffix === undefined) {
      for (const each of part.of) if (!seen.has(each)) decline(reading, each[0]!);
      if (!resume(reading, part, seen)) break;
      continue;
    }
    if (seen.has(suffix)) {
      reading.mistakes.report('syntax', cursor.span, `${quoted(cursor.word)} stands here twice`);
      reading.broken = true;
      const { values } = reading;
      // The first one counts; the second is read so that what follows it is.
      const before = values.length;
      readParts(reading, suffix);
      values.length = before;
      continue;
    }
    seen.add(suffix);
    readParts(reading, suffix);
  }
  const needed = part.of.find(([first]) => part.needs !== null && firstWords(first!).includes(part.needs));
  if (needed === undefined || seen.has(needed) || nameTakenFor(reading, firstWords(part))) return;
  fail(reading, 'missing-value', `${needed[1]!.is === 'quantity' ? needed[1]!.role : 'something'} is missing: ${needed.map(inWords).join(' and ')}`);
}

/** Something stands between two suffixes: it is reported, and reading goes on at the next one of this line. */
function resume(reading: StatementReading, part: Part & { readonly is: 'suffixes' }, seen: ReadonlySet<readonly Part[]>): boolean {
  const { cursor, within } = reading;
  if (cursor.atEnd || cursor.isMark('{') || (cursor.kind === 'word' && shapeOf(within, cursor.word) !== undefined)) return false;
  const wanted = new Set(part.of.filter((each) => !seen.has(each)).flatMap(([first]) => firstWords(first!)));
  const ahead = cursor.copy();
  while (!ahead.atEnd && !ahead.isMark('{') && !(ahead.kind === 'word' && wanted.has(ahead.word))) ahead.next();
  if (ahead.atEnd || ahead.isMark('{')) return false;
  tooMuch(reading);
  while (cursor.start < ahead.start) cursor.next();
  return true;
}

function isSpaced(text: string, at: number): boolean {
  return /\s/.test(text[at] ?? '');
}
