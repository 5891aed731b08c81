/**
 * What fits at a point of a text, for completion: the text up to there is read as ever, and what the parser
 * would have taken at its end is what fits. Nothing fits within a comment or a string.
 */
import type { BlockKind, Part, QuantityPart, StatementShape } from './grammar';
import { readNumber } from './numbers';
import { readText } from './parse';
import type { Expectations } from './reading';
import { endOfUnit } from './scan';
import type { SourceTree, Span, Token } from './tree';

export interface Expected {
  /** The block of which a statement may begin here; null within a statement. */
  readonly block: BlockKind | null;
  readonly parts: readonly { readonly part: Part; readonly shape: StatementShape }[];
  /** Units of these are due: a number stands before. */
  readonly units: readonly { readonly part: QuantityPart; readonly shape: StatementShape }[];
  /** The word under the cursor, which is replaced; empty where there is none. */
  readonly span: Span;
}

export function expectedAt(tree: SourceTree, offset: number): Expected | null {
  const { text, tokens } = tree;
  const under = tokens.find((token) => token.start < offset && offset <= token.end && token.kind !== 'newline' && token.kind !== 'punctuation');
  if (under !== undefined && under.kind !== 'word' && !isBehindString(text, under, offset)) return null;
  const span = under?.kind === 'word' ? { start: under.start, end: under.end } : { start: offset, end: offset };
  // A declaration begins afresh: what stands before it changes nothing.
  const from = tree.statements.findLast((statement) => statement.span.start < span.start)?.span.start ?? 0;
  const before = text.slice(from, span.start);
  const expectations: Expectations = { parts: [], units: [], block: null };
  const { tokens: read } = readText(before, expectations);
  const number = under?.kind === 'word' ? readNumber(text, span.start, span.end) : null;
  if (number !== null && offset < number.end) return null;
  if (number !== null) return unitsAfterNumber(text, number.end, span, expectations);
  const { parts, units } = expectations;
  const begins = parts.length === 0 && units.length === 0 && beginsStatement(before, read.at(-1));
  return { block: begins ? expectations.block : null, parts: 0 < units.length ? [] : parts, units, span };
}

/** Directly behind a string something may follow; at the end of one that is not closed, nothing. */
function isBehindString(text: string, token: Token, offset: number): boolean {
  return token.kind === 'string' && offset === token.end && token.start + 1 < token.end && text[token.end - 1] === '"';
}

/** `40n|`: a number stands under the cursor, and the unit that may follow it is replaced. */
function unitsAfterNumber(text: string, numberEnd: number, word: Span, { parts }: Expectations): Expected | null {
  const units = parts.flatMap(({ part, shape }) => quantitiesOf(part).map((quantity) => ({ part: quantity, shape })));
  const end = endOfUnit(text, numberEnd, word.end);
  return units.length === 0 ? null : { block: null, parts: [], units, span: { start: numberEnd, end } };
}

function quantitiesOf(part: Part): readonly QuantityPart[] {
  if (part.is === 'quantity') return part.dimension === 'number' ? [] : [part];
  if (part.is === 'choice') return part.of.flatMap(([first]) => quantitiesOf(first!));
  return part.is === 'optional' ? quantitiesOf(part.parts[0]!.is === 'comma' ? part.parts[1]! : part.parts[0]!) : [];
}

function beginsStatement(text: string, last: Token | undefined): boolean {
  return last === undefined || last.kind === 'newline' || (last.kind === 'punctuation' && ';{}'.includes(text[last.start]!));
}
