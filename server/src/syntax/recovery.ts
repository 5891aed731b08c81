/** What is done with text that begins nothing: it is reported, passed over, and kept as unread. */
import type { TokenCursor } from './cursor';
import { keywordsOf, listed, shapeOf, someOf } from './fits';
import type { BlockKind } from './grammar';
import { quoted } from './mistakes';
import { isDeclarationAt, type Parser } from './parser';
import { beginsQuantity } from './reading';
import type { Statement } from './tree';
import { closest } from './words';

/** A word that begins no statement of this block. */
export function reportUnknownStatement({ cursor, mistakes }: Parser, kind: BlockKind): void {
  const span = cursor.span;
  const found = cursor.word;
  const meant = cursor.kind === 'word' ? closest(found, keywordsOf(kind)) : null;
  const place = kind === 'row' || kind === 'stackup' ? `row of a ${kind === 'row' ? 'run' : kind}` : `statement of ${kind === 'ambient' ? 'an' : 'a'} ${kind}`;
  if (meant !== null) mistakes.report('syntax', span, `${quoted(found)}? ${meant}`, [{ title: `Write ${meant}`, span, newText: meant }]);
  else mistakes.report('syntax', span, `${quoted(found)} begins no ${place}; fits: ${someOf(keywordsOf(kind))}`);
}

/** Stray text outside of declarations, up to the next line that begins with one: one error a stretch. */
export function passStrayText(parser: Parser, after: Statement | undefined): void {
  const { cursor, mistakes, unread } = parser;
  const span = cursor.span;
  const found = cursor.word;
  const meant = cursor.kind === 'word' ? closest(found, keywordsOf('file')) : null;
  // What follows a statement that stood outside its block is the rest of that block, and no second mistake.
  const remains = after?.broken === true && (found === '}' || 0 < blocksHolding(found).length);
  if (!remains && meant !== null) mistakes.report('syntax', span, `${quoted(found)}? ${meant}`, [{ title: `Write ${meant}`, span, newText: meant }]);
  else if (!remains) mistakes.report('syntax', span, strayMessage(found));
  do cursor.next();
  while (cursor.kind !== 'end' && !isDeclarationAt(cursor));
  unread.push({ start: span.start, end: cursor.last.end });
}

function strayMessage(found: string): string {
  if (found === '}') return 'this `}` closes nothing';
  if (found === 'quietrun') return '`quietrun` and the version stand before everything else, once';
  const kinds = blocksHolding(found).map((kind) => (kind === 'row' ? 'run' : kind));
  return `${quoted(found)} begins no declaration; ${0 < kinds.length ? `it belongs in the block of a ${listed([...new Set(kinds)])}` : `fits: ${someOf(keywordsOf('file'))}`}`;
}

/** Kinds of block in which the word begins a statement. */
export function blocksHolding(word: string): readonly BlockKind[] {
  return (['board', 'stackup', 'net', 'pair', 'run', 'row', 'loop', 'return', 'link', 'shield', 'ambient'] as const).filter((kind) => shapeOf(kind, word) !== undefined);
}

/** To where the statement ends, blocks that do not belong to it included. */
export function passOver(parser: Parser): void {
  const { cursor, unread } = parser;
  const start = cursor.start;
  let depth = 0;
  while (cursor.kind !== 'end') {
    if (depth === 0 ? cursor.atEnd && !continues(cursor) : isDeclarationAt(cursor)) break;
    const closes = cursor.isMark('}');
    depth += cursor.isMark('{') ? 1 : closes ? -1 : 0;
    cursor.next();
    if (closes && depth === 0) break;
  }
  if (start < cursor.last.end) unread.push({ start, end: cursor.last.end });
}

/** A line that ends with a comma goes on where the next begins with a value. */
function continues(cursor: TokenCursor): boolean {
  if (cursor.kind !== 'newline' || cursor.text[cursor.last.end - 1] !== ',') return false;
  const ahead = cursor.beyondNewlines();
  return ahead.isMark('(') || beginsQuantity(ahead, ['resistance', 'capacitance']);
}

/** To the block of a declaration or, where it has none, to the end of the head. */
export function passHead({ cursor, unread }: Parser): void {
  const start = cursor.start;
  while (!cursor.atEnd && !cursor.isMark('{')) cursor.next();
  if (start < cursor.last.end) unread.push({ start, end: cursor.last.end });
}
