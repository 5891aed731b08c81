/**
 * The reading of one statement: what has been read, and how certain it still is what is due.
 *
 * Recovery. A value that is written wrongly is reported and passed over, and the statement goes on: where
 * everything stands is known. Where a part is missing or something stands that does not fit, the
 * statement is `lost`: that is reported once, whatever still fits is read without a word, and the rest
 * is passed over. So one mistake in a statement is one error.
 */
import type { Dimension } from '../units/dimension';
import type { TokenCursor } from './cursor';
import type { BlockKind, Part, QuantityPart, StatementShape } from './grammar';
import { codeOf } from './letterCodes';
import { Mistakes, quoted } from './mistakes';
import { beginsNumber } from './numbers';
import type { Value } from './tree';

export interface StatementReading {
  readonly cursor: TokenCursor;
  /** Where mistakes are reported; nowhere once the statement is lost. */
  mistakes: Mistakes;
  readonly shape: StatementShape;
  /** The block that the statement stands in. */
  readonly within: BlockKind;
  readonly values: Value[];
  /** Something that the statement needs could not be read. */
  broken: boolean;
  /** It is no longer certain which part is due; said once. */
  lost: boolean;
  /** Optional parts that were looked for at `fitsAt` and are not there. */
  fits: Part[];
  fitsAt: number;
  readonly expectations: Expectations | null;
}

/** What would fit at the end of the text, collected while it is read: so completion cannot disagree with the parser. */
export interface Expectations {
  readonly parts: { readonly part: Part; readonly shape: StatementShape }[];
  /** A number stands at the end, without a unit. */
  readonly units: { readonly part: QuantityPart; readonly shape: StatementShape }[];
  /** The innermost block that is open at the end. */
  block: BlockKind | null;
}

/** Notes that the part would fit, where the text ends and it is certain what is due. */
export function expect(reading: StatementReading, part: Part): void {
  if (reading.expectations !== null && reading.cursor.kind === 'end' && !reading.lost) reading.expectations.parts.push({ part, shape: reading.shape });
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

/** Reports that it is no longer clear what is due, marked at the word before. */
export function fail(reading: StatementReading, rule: 'syntax' | 'missing-value', message: string, span = reading.cursor.last): void {
  reading.mistakes.report(rule, span, message);
  lose(reading);
}

/** From here on the statement is read without a word: what is found now may only follow from what was reported. */
export function lose(reading: StatementReading): void {
  reading.mistakes = new Mistakes();
  reading.lost = true;
  reading.broken = true;
}

/** `run on TOP for …`: the next word is the name, whatever it looks like, so the name that is missing shows only at what follows. */
export function nameTakenFor(reading: StatementReading, words: readonly string[]): boolean {
  const before = reading.values.at(-1);
  if (before?.kind !== 'name' || before.quoted || !words.includes(before.name)) return false;
  fail(reading, 'missing-value', `a name is missing before ${quoted(before.name)}, which was read as the name`, before.span);
  return true;
}

/** Notes that an optional part would have fitted here, for the message about what stands instead. */
export function decline(reading: StatementReading, part: Part): void {
  if (reading.fitsAt !== reading.cursor.start) reading.fits = [];
  reading.fitsAt = reading.cursor.start;
  reading.fits.push(part);
  expect(reading, part);
}

/** What was read last, as it is named in "is missing after". */
export function lastText(cursor: TokenCursor): string {
  return cursor.text.slice(cursor.last.start, cursor.last.end);
}

/** Whether a number or a letter code of one of these dimensions stands at the cursor. */
export function beginsQuantity(cursor: TokenCursor, dimensions: readonly Dimension[]): boolean {
  return cursor.kind === 'word' && (beginsNumber(cursor.text, cursor.start) || codeOf(cursor.text, cursor.start, cursor.lineEnd, dimensions) !== null);
}
