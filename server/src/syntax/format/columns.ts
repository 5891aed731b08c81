/**
 * Columns: in a group of lines the first words are padded to the longest, in runs and stackups names are a second column, and
 * trailing comments stand below each other.
 */
import type { BlockKind } from '../grammar';
import type { QuantityValue } from '../tree';
import type { Line } from './lines';
import { plainGaps, widthOf } from './spacing';

/** What stands on a line, from its first piece to its last. */
export interface SetLine {
  readonly line: Line;
  /** Before each piece but the first. */
  readonly gaps: readonly string[];
  /** Before the comment. */
  readonly commentGap: string;
}

const indentWidth = 2;
export const indentOf = ({ level }: Line) => ' '.repeat(level * indentWidth);

export function setLines(text: string, lines: readonly Line[]): readonly SetLine[] {
  return groupsOf(text, lines).flatMap((group) => withComments(text, group, betweenBlocks(text, group).flatMap((rows) => paddedGaps(text, rows))));
}

/** A blank line, a line of comment, a block and a statement over several lines part two groups; a line with an error does not. */
export function groupsOf(text: string, lines: readonly Line[]): readonly (readonly Line[])[] {
  return parted(lines, (before, line) => !isGrouped(text, before) || !isGrouped(text, line));
}

function isGrouped(text: string, { whole, kept, pieces }: Line): boolean {
  return kept ? 0 < pieces.length && !holdsBrace(text, pieces) : whole;
}

/** Declarations that have their block on their own line share the column of their comments, and no other. */
function betweenBlocks(text: string, group: readonly Line[]): readonly (readonly Line[])[] {
  return parted(group, (before, line) => holdsBrace(text, before.pieces) || holdsBrace(text, line.pieces));
}

function holdsBrace(text: string, pieces: Line['pieces']): boolean {
  return pieces.some(({ kind, start }) => kind === 'punctuation' && (text[start] === '{' || text[start] === '}'));
}

function parted(lines: readonly Line[], isParted: (before: Line, line: Line) => boolean): readonly (readonly Line[])[] {
  const groups: Line[][] = [];
  let before: Line | undefined;
  for (const line of lines) {
    if (before === undefined || isParted(before, line)) groups.push([line]);
    else groups.at(-1)!.push(line);
    before = line;
  }
  return groups;
}

function paddedGaps(text: string, lines: readonly Line[]): readonly (readonly string[])[] {
  const cells = lines.map((line) => cellsOf(text, line));
  const first = widest(cells.map((cell) => cell?.first ?? 0));
  const second = widest(cells.map((cell) => cell?.second ?? 0));
  return lines.map((line, index) => {
    const gaps = [...plainGaps(text, line)];
    const cell = cells[index];
    if (cell?.first !== undefined) gaps[0] = ' '.repeat(first - cell.first + 1);
    if (cell?.name !== undefined) gaps[1] = ' '.repeat(second - cell.name + 1);
    return gaps;
  });
}

/** Widths of what stands in the columns of a row. What ends its row needs no column, and makes none wider. */
interface Cells {
  readonly first?: number;
  readonly second?: number;
  /** The second column holds a name, after which the row goes on in a third. */
  readonly name?: number;
}

function cellsOf(text: string, { row, kept, pieces }: Line): Cells | null {
  if (row === null || kept) return null;
  const { keyword, values, span } = row.statement;
  if (span.end <= pieces[0]!.end || severalLeadingWords.has(keyword)) return null;
  const first = widthOf(keyword);
  const [second, third] = values;
  if (!namesInColumn.has(row.within) || second === undefined || third === undefined) return { first };
  if (second.kind === 'name') return { first, second: widthOf(text.slice(second.span.start, second.span.end)), name: widthOf(text.slice(second.span.start, second.span.end)) };
  return second.kind === 'quantity' ? { first, second: widthWithoutTolerance(text, second) } : { first };
}

/** Of these the first word alone does not say what the line is about. */
const severalLeadingWords: ReadonlySet<string> = new Set(['emits', 'common', 'both']);

const namesInColumn: ReadonlySet<BlockKind> = new Set(['run', 'row', 'stackup']);

/** `0.20 mm` of `0.20mm±10%`. */
function widthWithoutTolerance(text: string, { numberSpan, unitSpan }: QuantityValue): number {
  const unit = text.slice(unitSpan.start, unitSpan.end);
  return widthOf(text.slice(numberSpan.start, numberSpan.end)) + (unit === '' ? 0 : 1 + widthOf(unit));
}

function withComments(text: string, group: readonly Line[], gaps: readonly (readonly string[])[]): readonly SetLine[] {
  const widths = group.map((line, index) => widthOf(indentOf(line)) + line.pieces.reduce((sum, { start, end }, at) => sum + widthOf(text.slice(start, end)) + (at === 0 ? 0 : gaps[index]![at - 1]!.length), 0));
  const column = 2 + widest(group.map(({ comment, kept }, index) => (comment === null || kept ? 0 : widths[index]!)));
  return group.map((line, index) => ({ line, gaps: gaps[index]!, commentGap: line.comment === null || line.kept || line.pieces.length === 0 ? '' : ' '.repeat(column - widths[index]!) }));
}

/** A group may have more lines than a call takes arguments. */
function widest(widths: readonly number[]): number {
  return widths.reduce((most, width) => Math.max(most, width), 0);
}
