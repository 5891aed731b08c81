/** The state of a parse beyond one statement, and where declarations begin. */
import type { TokenCursor } from './cursor';
import { shapeOf } from './fits';
import type { BlockKind } from './grammar';
import type { Mistakes } from './mistakes';
import type { Expectations } from './reading';
import type { Span } from './tree';

export interface Parser {
  readonly cursor: TokenCursor;
  readonly mistakes: Mistakes;
  readonly unread: Span[];
  /** Kinds of the blocks around the cursor, outermost first. */
  readonly open: BlockKind[];
  /** Index of the token at which open blocks were last found to lack their brace: said once for all of them. */
  unclosedAt: number;
  readonly expectations: Expectations | null;
}

export function passSeparators(cursor: TokenCursor): void {
  while (cursor.kind === 'newline' || cursor.isMark(';')) cursor.next();
}

/** `return` and `waive` begin a statement of a block as well: what follows tells them apart. */
export function isDeclarationAt(cursor: TokenCursor): boolean {
  if (!cursor.atLineStart || cursor.kind !== 'word') return false;
  const word = cursor.word;
  if (shapeOf('file', word) === undefined) return false;
  if (word !== 'return' && word !== 'waive') return true;
  const ahead = cursor.copy();
  ahead.next();
  if (ahead.atEnd || (ahead.kind !== 'word' && ahead.kind !== 'string')) return false;
  ahead.next();
  return word === 'return' ? ahead.beyondNewlines().isMark('{') : ahead.isWord('on');
}
