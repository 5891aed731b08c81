/** The lines of a text as the formatter sees them: what stands on each, how deep it lies, and whether it is whole by itself. */
import type { BlockKind } from '../grammar';
import type { SourceTree, Span, Statement } from '../tree';
import { depthAlong } from './depth';
import { piecesOf, type Piece } from './pieces';

export interface Line extends Span {
  /** Without the comment. */
  readonly pieces: readonly Piece[];
  readonly comment: Piece | null;
  /** How many times it is indented. */
  readonly level: number;
  /** It has an error, and is left as it is. */
  readonly kept: boolean;
  /** Statements stand on it, and nothing of it began before or goes on after it. */
  readonly whole: boolean;
  /** The one statement without a block that it holds; null where it holds anything else. */
  readonly row: Row | null;
}

export interface Row {
  readonly statement: Statement;
  /** The kind of block that it stands in. */
  readonly within: BlockKind;
}

export function linesOf(tree: SourceTree): readonly Line[] {
  const { text } = tree;
  const levels = depthAlong(tree);
  const starting = rowsByStart(tree.statements);
  const isKept = overlapping(unreadable(tree));
  return stretches(tree).map(({ start, end, pieces: all }): Line => {
    const comment = all.at(-1)?.kind === 'comment' ? all.at(-1)! : null;
    const pieces = comment === null ? all : all.slice(0, -1);
    const { first, least, last } = levels(all[0]?.start ?? end, pieces.at(-1)?.end ?? end);
    const kept = isKept({ start, end });
    const row = pieces.length === 0 ? undefined : starting.get(pieces[0]!.start);
    const block = row?.statement.block ?? null;
    const begins = row !== undefined || isVersion(tree, pieces);
    const whole = begins && first === least && first === last && (block === null || block.span.start < end);
    return { start, end, pieces, comment, level: first, kept, whole, row: whole && row !== undefined && block === null && isAlone(text, pieces, row.statement) ? row : null };
  });
}

interface Stretch extends Span {
  readonly pieces: readonly Piece[];
}

/** A byte-order mark at the start belongs to no line. */
function stretches(tree: SourceTree): readonly Stretch[] {
  const { text } = tree;
  const found: Stretch[] = [];
  let pieces: Piece[] = [];
  let start = text.charCodeAt(0) === 0xfeff ? 1 : 0;
  for (const piece of piecesOf(tree)) {
    if (piece.kind !== 'newline') {
      pieces.push(piece);
      continue;
    }
    found.push({ start, end: piece.start, pieces });
    start = piece.end;
    pieces = [];
  }
  found.push({ start, end: text.length, pieces });
  return found;
}

/** `quietrun 1`, which is no statement of the tree. */
function isVersion({ version }: SourceTree, pieces: readonly Piece[]): boolean {
  return version !== null && pieces[1]?.start === version.span.start;
}

/** Only `;` may follow it. */
function isAlone(text: string, pieces: readonly Piece[], { span }: Statement): boolean {
  return pieces.every(({ start }) => start < span.end || text[start] === ';');
}

function rowsByStart(statements: readonly Statement[], within: BlockKind = 'file', found = new Map<number, Row>()): ReadonlyMap<number, Row> {
  for (const statement of statements) {
    found.set(statement.span.start, { statement, within });
    if (statement.block !== null) rowsByStart(statement.block.statements, statement.block.kind, found);
  }
  return found;
}

/** What is meant by them is not known for certain. Sorted by where they begin; two of them may overlap. */
function unreadable({ errors, unread }: SourceTree): readonly Span[] {
  return [...errors.map(({ span }) => span), ...unread].sort((a, b) => a.start - b.start);
}

/** To be asked about lines in the order of the text. An empty span lies on the line that it touches. */
function overlapping(spans: readonly Span[]): (line: Span) => boolean {
  let next = 0;
  let reached = -1;
  return ({ start, end }) => {
    for (; next < spans.length && spans[next]!.start <= end; next += 1) reached = Math.max(reached, spans[next]!.end);
    return start <= reached;
  };
}
