/**
 * What of a file could not be read, and what must therefore be left unsaid.
 *
 * A name on a line with a mistake counts as declared and as used: the line may have meant to declare or
 * to use it, and saying "no net A" beside a broken `net A` would be a second finding for one mistake.
 * While a head is broken nothing is said of unknown names at all.
 */
import { namesInRange } from '../syntax/names';
import type { Block, SourceTree, Span, Statement, TextError, TokenKind } from '../syntax/tree';

export interface Unreadable {
  readonly words: ReadonlySet<string>;
  /** A declaration's head, or text between declarations, could not be read: what it declares is not known. */
  readonly heads: boolean;
  /** The same of a row of a stackup. */
  readonly layers: boolean;
  /** Errors that begin inside the span, in the order of the text. */
  errorsIn(span: Span): readonly TextError[];
  /** The same, and what the parser passed over besides. */
  stretchesIn(span: Span): readonly Span[];
  /** Names on the lines, inside the span, that could not be read. */
  wordsIn(span: Span): readonly string[];
}

export function unreadableOf(tree: SourceTree): Unreadable {
  const errors = [...tree.errors].sort((a, b) => a.span.start - b.span.start);
  const stretches = merged([...tree.unread, ...errors.map(({ span }) => span)]);
  const words = wordsOnLines(tree, stretches);
  const isStray = (offset: number) => statementAt(tree.statements, offset) === null;
  return {
    words: new Set(words.map(({ name }) => name)),
    heads: errors.some((error) => hidesHead(error, statementAt(tree.statements, error.span.start))) || tree.unread.some(({ start }) => isStray(start)) || tree.statements.some(isHeadless),
    layers: stretches.some(({ start }) => statementAt(tree.statements, start)?.keyword === 'stackup') || tree.statements.some(({ keyword, block }) => keyword === 'stackup' && block?.statements.some(({ broken }) => broken)),
    errorsIn: (span) => within(errors, span, (error) => error.span.start),
    stretchesIn: (span) => within(stretches, span, ({ start }) => start),
    wordsIn: (span) => within(words, span, ({ start }) => start).map(({ name }) => name),
  };
}

/** Text of a block that stands between its statements and could not be read: a row may be missing there. */
export function strayIn(unreadable: Unreadable, block: Block): readonly Span[] {
  return unreadable.stretchesIn(block.span).filter(({ start }) => statementAt(block.statements, start) === null);
}

/** The statement of a list, in the order of the text, that the offset lies in. */
export function statementAt(statements: readonly Statement[], offset: number): Statement | null {
  let low = 0;
  let high = statements.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (statements[middle].span.end <= offset) low = middle + 1;
    else high = middle;
  }
  const found = statements[low];
  return found !== undefined && found.span.start <= offset ? found : null;
}

/** A declaration of which the name is missing; a stackup may go without. */
function isHeadless({ keyword, values }: Statement): boolean {
  return !['use', 'waive', 'stackup'].includes(keyword) && !values.some(({ role }) => role === 'name');
}

function hidesHead(error: TextError, statement: Statement | null): boolean {
  if (statement === null) return error.rule !== 'bad-value';
  if (statement.keyword === 'waive') return false;
  const block = statement.block;
  if (block !== null && block.span.start < error.span.start && error.span.start < block.span.end) return false;
  // A head with a wrong unit still says whose head it is.
  return error.rule === 'syntax' || error.rule === 'missing-value';
}

/** In the order of the text, those that overlap made one. */
function merged(spans: readonly Span[]): readonly Span[] {
  const stretches: { start: number; end: number }[] = [];
  for (const { start, end } of [...spans].sort((a, b) => a.start - b.start)) {
    const last = stretches.at(-1);
    if (last !== undefined && (start < last.end || start === last.start)) last.end = Math.max(last.end, end);
    else stretches.push({ start, end });
  }
  return stretches;
}

interface UnreadableWord {
  readonly name: string;
  readonly start: number;
}

/** Every word and string on a line that one of the stretches touches. These are in the order of the text. */
function wordsOnLines(tree: SourceTree, stretches: readonly Span[]): UnreadableWord[] {
  const words: UnreadableWord[] = [];
  let next = 0;
  let reach = -1;
  for (let first = 0, last = 0; first < tree.tokens.length && (next < stretches.length || tree.tokens[first].start < reach); first = last + 1) {
    last = first;
    while (last + 1 < tree.tokens.length && tree.tokens[last].kind !== 'newline') last += 1;
    const end = tree.tokens[last].end;
    for (; next < stretches.length && stretches[next].start < end; next += 1) reach = Math.max(reach, stretches[next].end);
    if (reach <= tree.tokens[first].start) continue;
    for (let index = first; index <= last; index += 1) {
      const { kind, start, end: stop } = tree.tokens[index];
      for (const name of namesOf(kind, tree.text.slice(start, stop))) words.push({ name, start });
    }
  }
  return words;
}

function namesOf(kind: TokenKind, written: string): readonly string[] {
  if (kind === 'string') return [written.replace(/^"|"$/g, '').replaceAll('""', '"')];
  if (kind !== 'word') return [];
  const range = written.includes('..') ? namesInRange(written) : '';
  return typeof range === 'string' ? [written] : range;
}

/** Those that begin inside the span, of a list in the order of the text. */
function within<Item>(items: readonly Item[], { start, end }: Span, startOf: (item: Item) => number): readonly Item[] {
  return items.slice(firstFrom(items, start, startOf), firstFrom(items, end, startOf));
}

function firstFrom<Item>(items: readonly Item[], offset: number, startOf: (item: Item) => number): number {
  let low = 0;
  let high = items.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (startOf(items[middle]) < offset) low = middle + 1;
    else high = middle;
  }
  return low;
}
