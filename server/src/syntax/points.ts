/** Points, and the commas that part values: what may go on beyond a line end. */
import type { TokenCursor } from './cursor';
import { quoted } from './mistakes';
import { beginsQuantity, expect, fail, lastText, type StatementReading } from './reading';
import type { PointValue, QuantityValue } from './tree';
import { readQuantityOf } from './values';

/** `(x, y)` or `(x, y, z)`; line ends within are white space. */
export function readPoint(reading: StatementReading, role: string): PointValue | null {
  const { cursor } = reading;
  if (!cursor.isMark('(') && !beginsQuantity(cursor, ['length'])) {
    fail(reading, 'missing-value', `a point is missing after ${quoted(lastText(cursor))}: two lengths, as in \`(10 mm, 4 mm)\``);
    return null;
  }
  const start = cursor.start;
  if (cursor.isMark('(')) cursor.next();
  else fail(reading, 'syntax', `\`(\` is missing before ${quoted(cursor.word)}`, cursor.span);
  const coordinates: (QuantityValue | null)[] = [];
  for (let count = 0; count < 3; count += 1) {
    passNewlinesWithin(cursor);
    if (count === 2 && !cursor.isMark(',')) break;
    if (0 < count) readPointComma(reading);
    passNewlinesWithin(cursor);
    const part = { is: 'quantity', role: 'xyz'[count]!, dimension: 'length', toleranced: true, copper: false, example: '10 mm' } as const;
    expect(reading, part);
    coordinates.push(readQuantityOf(reading, part.role, [part]));
  }
  passNewlinesWithin(cursor);
  if (cursor.isMark(')')) cursor.next();
  else fail(reading, 'syntax', `\`)\` is missing after ${quoted(lastText(cursor))}`);
  const [x, y, z] = coordinates;
  return x && y && z !== null ? { kind: 'point', role, span: { start, end: cursor.last.end }, x, y, z: z ?? null } : null;
}

function readPointComma(reading: StatementReading): void {
  const { cursor } = reading;
  if (cursor.isMark(',')) cursor.next();
  else if (beginsQuantity(cursor, ['length'])) fail(reading, 'syntax', `a comma is missing between ${quoted(lastText(cursor))} and ${quoted(cursor.word)}`);
}

/** Only as far as the point goes on: after a parenthesis that was left out the next line is a statement. */
function passNewlinesWithin(cursor: TokenCursor): void {
  const ahead = cursor.beyondNewlines();
  if (ahead.kind === 'end' || ahead.isMark(')') || ahead.isMark(',') || beginsQuantity(ahead, ['length'])) cursor.passNewlines();
}

/** A comma continues the statement on the next line. */
export function readComma(reading: StatementReading): void {
  const { cursor } = reading;
  if (!cursor.isMark(',')) {
    fail(reading, 'syntax', `a comma is missing between ${quoted(lastText(cursor))} and ${quoted(cursor.word)}`);
    return;
  }
  cursor.next();
  // A comma continues the statement, but one that was left over must not swallow the next line.
  const ahead = cursor.beyondNewlines();
  const continues = ahead.kind === 'end' || ahead.isMark('(') || beginsQuantity(ahead, ['resistance', 'capacitance']);
  if (continues) cursor.passNewlines();
}
