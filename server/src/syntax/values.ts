/** Reads the values of a statement: each reports what is wrong with it, and leaves the cursor beyond what it could make out. */
import { unitSpelt } from '../units/spelling';
import { isTypographicQuote } from './characters';
import { fixedWords, inWords, nameInWords, quantityInWords } from './fits';
import type { Part, QuantityPart } from './grammar';
import { plainly, quoted } from './mistakes';
import { readName, readString, readTypographicString } from './names';
import { beginsNumber } from './numbers';
import { readQuantity } from './quantities';
import { fail, lastText, lose, type StatementReading } from './reading';
import type { QuantityValue } from './tree';
import { closest } from './words';

/** Reads a quantity of one of the dimensions of `parts`; null where there is none, which is reported. */
export function readQuantityOf(reading: StatementReading, role: string, parts: readonly QuantityPart[]): QuantityValue | null {
  const { cursor, mistakes } = reading;
  const dimensions = parts.map((part) => part.dimension);
  const request = { role, dimensions, toleranced: parts[0]!.toleranced, copper: parts[0]!.copper, follows: fixedWords };
  const read = cursor.kind === 'word' ? readQuantity({ text: cursor.text, start: cursor.start, limit: cursor.lineEnd }, request, mistakes) : null;
  if (read !== null) {
    cursor.readTo(cursor.start, read.end);
    if (Number.isNaN(read.value.value)) reading.broken = true;
    const lacksUnit = read.value.unit === '' && Number.isNaN(read.value.value) && read.value.dimension !== 'number';
    if (lacksUnit && cursor.kind === 'end') reading.expectations?.units.push(...parts.map((part) => ({ part, shape: reading.shape })));
    return read.value;
  }
  missingQuantity(reading, role, parts);
  return null;
}

function missingQuantity(reading: StatementReading, role: string, parts: readonly QuantityPart[]): void {
  const { cursor } = reading;
  const fits = quantityInWords(parts);
  const found = cursor.kind === 'word' ? cursor.word : '';
  if (found !== '' && unitSpelt(found) !== undefined) {
    const name = reading.values.at(-1);
    const span = cursor.next();
    // `trace 0.2 mm`: the number was taken for the name, as the next word always is.
    if (name?.kind === 'name' && !name.quoted && beginsNumber(name.name, 0)) fail(reading, 'missing-value', `a name is missing before ${quoted(`${name.name} ${found}`)}`, { start: name.span.start, end: span.end });
    else fail(reading, 'missing-value', `a number is missing before ${quoted(found)}`, span);
    return;
  }
  if (found !== '' && !fixedWords.has(found)) {
    const span = cursor.next();
    fail(reading, 'syntax', `${quoted(found)} does not fit here; fits: ${fits}`, span);
    return;
  }
  const before = reading.values.at(-1);
  const named = before?.kind === 'name' && before.span.end === cursor.last.end;
  if (named) fail(reading, 'missing-value', `${role} of ${plainly(before.name)} is missing: ${fits}`);
  else fail(reading, 'missing-value', `${fits} is missing after ${quoted(lastText(cursor))}`);
}

export function readWord(reading: StatementReading, part: Part & { readonly is: 'word' }): void {
  const { cursor, mistakes } = reading;
  const found = cursor.kind === 'word' ? cursor.word : null;
  if (found !== null && part.words.includes(found)) {
    reading.values.push({ kind: 'word', role: part.role, span: cursor.next(), word: found });
    return;
  }
  const meant = found === null || fixedWords.has(found) ? null : closest(found, part.words);
  const isLastWord = found !== null && !fixedWords.has(found) && !beginsNumber(found, 0);
  if (meant === null && !isLastWord) {
    fail(reading, 'missing-value', `${quoted(lastText(cursor))} is followed by ${inWords(part)}`);
    return;
  }
  const span = cursor.next();
  const offered = meant === null ? part.words : [meant];
  mistakes.report('syntax', span, meant === null ? `${quoted(found!)} does not fit here; fits: ${part.words.join(', ')}` : `${quoted(found!)}? ${meant}`, offered.map((word) => ({ title: `Write ${word}`, span, newText: word })));
  reading.broken = true;
}

export function readCount(reading: StatementReading, role: string): void {
  const { cursor, mistakes } = reading;
  const digits = cursor.word;
  const span = cursor.next();
  const value = Number(digits);
  const readable = 0 < value && value <= Number.MAX_SAFE_INTEGER;
  if (!readable) mistakes.report('bad-value', span, value === 0 ? 'a count begins at 1' : 'this count is too large');
  if (!readable) reading.broken = true;
  reading.values.push({ kind: 'quantity', role, dimension: 'number', value: readable ? value : NaN, tolerance: null, unit: '', numberSpan: span, unitSpan: { start: span.end, end: span.end }, span });
}

export function readNameOf(reading: StatementReading, part: Part & { readonly is: 'name' }): void {
  const { cursor, mistakes, shape } = reading;
  if (cursor.kind !== 'word' && cursor.kind !== 'string') {
    const fits = part.declares ? `the name of this ${shape.keyword}` : nameInWords(part.of);
    fail(reading, 'missing-value', `${fits} is missing after ${quoted(lastText(cursor))}`);
    return;
  }
  const name = readName(cursor, mistakes, part);
  if (name === null) reading.broken = true;
  else reading.values.push(name);
}

export function readStringOf(reading: StatementReading, role: string): void {
  const { cursor, mistakes } = reading;
  if (cursor.kind === 'string') {
    const string = readString(cursor, mistakes);
    if (string === null) reading.broken = true;
    else reading.values.push({ kind: 'string', role, ...string });
  } else if (cursor.kind === 'word' && isTypographicQuote(cursor.text.charCodeAt(cursor.start))) {
    readTypographicString(cursor, mistakes);
    // What follows a quote of the wrong kind may be read as a string by mistake: nothing more is said of this statement.
    lose(reading);
  } else if (cursor.kind === 'word') {
    const word = cursor.word;
    const span = cursor.next();
    fail(reading, 'syntax', `${quoted(word)} does not fit here; a text in quotes does: "${word.slice(0, 40).replaceAll('"', '""')}"`, span);
  } else {
    fail(reading, 'missing-value', `the ${role} is missing after ${quoted(lastText(cursor))}: a text in quotes`);
  }
}

export function readRuleName(reading: StatementReading, role: string): void {
  const { cursor } = reading;
  const follows = cursor.isWord('on') || cursor.isWord('because');
  if (cursor.kind === 'word' && !follows) reading.values.push({ kind: 'word', role, word: cursor.word, span: cursor.next() });
  else fail(reading, 'missing-value', 'the name of a rule is missing: `waive over-budget …`');
}
