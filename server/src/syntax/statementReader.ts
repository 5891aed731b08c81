/**
 * Reads one statement, up to its block or its end, by interpreting its shape.
 *
 * Recovery. A value that is written wrongly is reported and passed over, and the statement goes on: where
 * everything stands is known. Where a part is missing or something stands that does not fit, the
 * statement is `lost`: that is reported once, whatever still fits is read without a word, and the rest
 * is passed over. So one mistake in a statement is one error.
 */
import type { Dimension } from '../units/dimension';
import { isTimesSign, isTypographicQuote } from './characters';
import type { TokenCursor } from './cursor';
import { dimensionsOf, firstWords, fixedWords, inWords, nameInWords, quantityInWords } from './fits';
import type { Part, StatementShape } from './grammar';
import { codeOf } from './letterCodes';
import { quoted, type Mistakes } from './mistakes';
import { readName, readString, readTypographicString } from './names';
import { beginsNumber } from './numbers';
import { readQuantity } from './quantities';
import { readSuffixes } from './suffixes';
import type { PointValue, QuantityValue, Value } from './tree';
import { closest } from './words';
import { unitSpelt } from '../units/spelling';

export interface StatementReading {
  readonly cursor: TokenCursor;
  readonly mistakes: Mistakes;
  readonly shape: StatementShape;
  readonly values: Value[];
  /** Something that the statement needs could not be read. */
  broken: boolean;
  /** It is no longer certain which part is due; said once. */
  lost: boolean;
  /** Optional parts that were looked for at `fitsAt` and are not there. */
  fits: Part[];
  fitsAt: number;
}

export function readParts(reading: StatementReading, parts: readonly Part[]): void {
  for (const part of parts) readPart(reading, part);
}

/** Whether the text at the cursor begins this part. */
export function begins(reading: StatementReading, part: Part): boolean {
  const { cursor } = reading;
  switch (part.is) {
    case 'keyword': return cursor.isWord(part.word);
    case 'word': return cursor.kind === 'word' && part.words.includes(cursor.word);
    case 'comma': return cursor.isMark(',');
    case 'quantity': return beginsQuantity(cursor, [part.dimension]);
    case 'count': return cursor.kind === 'word' && /^\d+$/.test(cursor.word.slice(0, 16));
    case 'name': return cursor.kind === 'word' || cursor.kind === 'string';
    case 'point': return cursor.isMark('(');
    case 'optional': return begins(reading, part.parts[0]!);
    case 'choice': return part.of.some((parts) => begins(reading, parts[0]!));
    default: return false;
  }
}

/** Reports once per statement that it is no longer clear what is due, marked at the word before. */
export function lose(reading: StatementReading, rule: 'syntax' | 'missing-value', message: string, span = reading.cursor.last): void {
  if (!reading.lost) reading.mistakes.report(rule, span, message);
  reading.lost = true;
  reading.broken = true;
}

/** `run on TOP for …`: the next word is the name, whatever it looks like, so the name that is missing shows only at what follows. */
export function nameTakenFor(reading: StatementReading, words: readonly string[]): boolean {
  const before = reading.values.at(-1);
  if (before?.kind !== 'name' || before.quoted || !words.includes(before.name)) return false;
  lose(reading, 'missing-value', `a name is missing before ${quoted(before.name)}, which was read as the name`, before.span);
  return true;
}

/** Notes that an optional part would have fitted here, for the message about what stands instead. */
export function decline(reading: StatementReading, part: Part): void {
  if (reading.fitsAt !== reading.cursor.start) reading.fits = [];
  reading.fitsAt = reading.cursor.start;
  reading.fits.push(part);
}

function readPart(reading: StatementReading, part: Part): void {
  const { cursor } = reading;
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
    if (!reading.lost) mistakes.report('syntax', span, `${quoted(found)}? \`${word}\` belongs here`, [{ title: `Write ${word}`, span, newText: word }]);
    reading.broken = true;
    return;
  }
  if (nameTakenFor(reading, [word])) return;
  lose(reading, 'syntax', cursor.atEnd || cursor.isMark('{') ? `\`${word}\` is missing after ${quoted(lastText(cursor))}` : `\`${word}\` is missing between ${quoted(lastText(cursor))} and ${quoted(cursor.word)}`);
}

function isSpaced(text: string, at: number): boolean {
  return /\s/.test(text[at] ?? '');
}

/** What was read last, as it is named in "is missing after". */
function lastText(cursor: TokenCursor): string {
  return cursor.text.slice(cursor.last.start, cursor.last.end);
}

function readWord(reading: StatementReading, part: Part & { readonly is: 'word' }): void {
  const { cursor, mistakes } = reading;
  const found = cursor.kind === 'word' ? cursor.word : null;
  if (found !== null && part.words.includes(found)) {
    reading.values.push({ kind: 'word', role: part.role, span: cursor.next(), word: found });
    return;
  }
  const meant = found === null || fixedWords.has(found) ? null : closest(found, part.words);
  const isLastWord = found !== null && !fixedWords.has(found) && !beginsNumber(found, 0);
  if (meant === null && !isLastWord) {
    lose(reading, 'missing-value', `${quoted(lastText(cursor))} is followed by ${inWords(part)}`);
    return;
  }
  const span = cursor.next();
  const offered = meant === null ? part.words : [meant];
  if (!reading.lost) mistakes.report('syntax', span, meant === null ? `${quoted(found!)} does not fit here; fits: ${part.words.join(', ')}` : `${quoted(found!)}? ${meant}`, offered.map((word) => ({ title: `Write ${word}`, span, newText: word })));
  reading.broken = true;
}

type QuantityPart = Part & { readonly is: 'quantity' };

/** Reads a quantity of one of the dimensions of `parts`; null where there is none, which is reported. */
export function readQuantityOf(reading: StatementReading, role: string, parts: readonly QuantityPart[]): QuantityValue | null {
  const { cursor, mistakes } = reading;
  const dimensions = parts.map((part) => part.dimension);
  const request = { role, dimensions, toleranced: parts[0]!.toleranced, copper: parts[0]!.copper, follows: fixedWords };
  const read = cursor.kind === 'word' ? readQuantity({ text: cursor.text, start: cursor.start, limit: cursor.lineEnd }, request, mistakes) : null;
  if (read !== null) {
    cursor.readTo(cursor.start, read.end);
    if (Number.isNaN(read.value.value)) reading.broken = true;
    return read.value;
  }
  missingQuantity(reading, role, dimensions);
  return null;
}

function missingQuantity(reading: StatementReading, role: string, dimensions: readonly Dimension[]): void {
  const { cursor } = reading;
  const fits = quantityInWords(dimensions);
  const found = cursor.kind === 'word' ? cursor.word : '';
  if (found !== '' && unitSpelt(found) !== undefined) {
    const name = reading.values.at(-1);
    const span = cursor.next();
    // `trace 0.2 mm`: the number was taken for the name, as the next word always is.
    if (name?.kind === 'name' && !name.quoted && beginsNumber(name.name, 0)) lose(reading, 'missing-value', `a name is missing before ${quoted(`${name.name} ${found}`)}`, { start: name.span.start, end: span.end });
    else lose(reading, 'missing-value', `a number is missing before ${quoted(found)}`, span);
    return;
  }
  if (found !== '' && !fixedWords.has(found)) {
    const span = cursor.next();
    lose(reading, 'syntax', `${quoted(found)} does not fit here; fits: ${fits}`, span);
    return;
  }
  const before = reading.values.at(-1);
  const named = before?.kind === 'name' && before.span.end === cursor.last.end;
  if (named) lose(reading, 'missing-value', `${role} of ${quoted(before.name)} is missing: ${fits}`);
  else lose(reading, 'missing-value', `${quoted(lastText(cursor))} lacks its value: ${fits}`);
}

function beginsQuantity(cursor: TokenCursor, dimensions: readonly Dimension[]): boolean {
  return cursor.kind === 'word' && (beginsNumber(cursor.text, cursor.start) || codeOf(cursor.text, cursor.start, cursor.lineEnd, dimensions) !== null);
}

function readCount(reading: StatementReading, role: string): void {
  const { cursor, mistakes } = reading;
  const digits = cursor.word;
  const span = cursor.next();
  const value = Number(digits);
  const readable = 0 < value && value <= Number.MAX_SAFE_INTEGER;
  if (!readable) mistakes.report('bad-value', span, value === 0 ? 'a count begins at 1' : 'this count is too large');
  if (!readable) reading.broken = true;
  reading.values.push({ kind: 'quantity', role, dimension: 'number', value: readable ? value : NaN, tolerance: null, unit: '', numberSpan: span, unitSpan: { start: span.end, end: span.end }, span });
}

function readNameOf(reading: StatementReading, part: Part & { readonly is: 'name' }): void {
  const { cursor, mistakes, shape } = reading;
  if (cursor.kind !== 'word' && cursor.kind !== 'string') {
    const fits = part.declares ? `the name of this ${shape.keyword}` : nameInWords(part.of);
    lose(reading, 'missing-value', `${fits} is missing after ${quoted(lastText(cursor))}`);
    return;
  }
  const name = readName(cursor, mistakes, part);
  if (name === null) reading.broken = true;
  else reading.values.push(name);
}

function readStringOf(reading: StatementReading, role: string): void {
  const { cursor, mistakes } = reading;
  if (cursor.kind === 'string') {
    const string = readString(cursor, mistakes);
    if (string === null) reading.broken = true;
    else reading.values.push({ kind: 'string', role, ...string });
  } else if (cursor.kind === 'word' && isTypographicQuote(cursor.text.charCodeAt(cursor.start))) {
    readTypographicString(cursor, mistakes);
    // What follows a quote of the wrong kind may be read as a string by mistake: nothing more is said of this line.
    reading.lost = true;
    reading.broken = true;
  } else if (cursor.kind === 'word') {
    const word = cursor.word;
    const span = cursor.next();
    lose(reading, 'syntax', `${quoted(word)} does not fit here; a text in quotes does: "${word.slice(0, 40).replaceAll('"', '""')}"`, span);
  } else {
    lose(reading, 'missing-value', `the ${role} is missing after ${quoted(lastText(cursor))}: a text in quotes`);
  }
}

function readRuleName(reading: StatementReading, role: string): void {
  const { cursor } = reading;
  const follows = cursor.isWord('on') || cursor.isWord('because');
  if (cursor.kind === 'word' && !follows) reading.values.push({ kind: 'word', role, word: cursor.word, span: cursor.next() });
  else lose(reading, 'missing-value', 'the name of a rule is missing: `waive over-budget …`');
}

function readComma(reading: StatementReading): void {
  const { cursor } = reading;
  if (!cursor.isMark(',')) {
    lose(reading, 'syntax', `a comma is missing between ${quoted(lastText(cursor))} and ${quoted(cursor.word)}`);
    return;
  }
  cursor.next();
  // A comma continues the statement, but one that was left over must not swallow the next line.
  const ahead = cursor.beyondNewlines();
  const continues = ahead.isMark('(') || (ahead.kind === 'word' && (beginsNumber(ahead.text, ahead.start) || codeOf(ahead.text, ahead.start, ahead.lineEnd, ['resistance', 'capacitance']) !== null));
  if (continues) cursor.passNewlines();
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
    lose(reading, 'missing-value', `${quoted(lastText(cursor))} is followed by ${inWords(part)}`);
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
  while (begins(reading, subject) || (separated && cursor.isMark(','))) {
    const before = cursor.start;
    readParts(reading, parts);
    if (cursor.start === before) return;
  }
  decline(reading, subject);
}

/** `(x, y)` or `(x, y, z)`; line ends within are white space. */
function readPoint(reading: StatementReading, role: string): PointValue | null {
  const { cursor } = reading;
  if (!cursor.isMark('(') && !beginsQuantity(cursor, ['length'])) {
    lose(reading, 'missing-value', `a point is missing after ${quoted(lastText(cursor))}: two lengths, as in \`(10 mm, 4 mm)\``);
    return null;
  }
  const start = cursor.start;
  if (cursor.isMark('(')) cursor.next();
  else lose(reading, 'syntax', `\`(\` is missing before ${quoted(cursor.word)}`, cursor.span);
  const coordinates: (QuantityValue | null)[] = [];
  for (let count = 0; count < 3; count += 1) {
    passNewlinesWithin(cursor);
    if (count === 2 && !cursor.isMark(',')) break;
    if (0 < count) readPointComma(reading);
    passNewlinesWithin(cursor);
    coordinates.push(readQuantityOf(reading, 'xyz'[count]!, [{ is: 'quantity', role: 'xyz'[count]!, dimension: 'length', toleranced: true, copper: false }]));
  }
  passNewlinesWithin(cursor);
  if (cursor.isMark(')')) cursor.next();
  else lose(reading, 'syntax', `\`)\` is missing after ${quoted(lastText(cursor))}`);
  const [x, y, z] = coordinates;
  return x && y && z !== null ? { kind: 'point', role, span: { start, end: cursor.last.end }, x, y, z: z ?? null } : null;
}

function readPointComma(reading: StatementReading): void {
  const { cursor } = reading;
  if (cursor.isMark(',')) cursor.next();
  else if (beginsQuantity(cursor, ['length'])) lose(reading, 'syntax', `a comma is missing between ${quoted(lastText(cursor))} and ${quoted(cursor.word)}`);
}

/** Only as far as the point goes on: after a parenthesis that was left out the next line is a statement. */
function passNewlinesWithin(cursor: TokenCursor): void {
  const ahead = cursor.beyondNewlines();
  if (ahead.isMark(')') || ahead.isMark(',') || beginsQuantity(ahead, ['length'])) cursor.passNewlines();
}
