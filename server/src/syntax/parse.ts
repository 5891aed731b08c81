/**
 * Reads a text into its tree. Never throws, takes time linear in the text, and makes of one mistake at
 * most two errors: one where it is, and one where it leads astray.
 *
 * Statements are separated before they are understood: a statement ends with its line, a block with its
 * brace, and a line that begins with a declaration word closes every block that is still open, so that
 * a forgotten brace costs one declaration and not the rest of the file.
 */
import { TokenCursor } from './cursor';
import { documentationAbove } from './documentation';
import { shapeOf } from './fits';
import type { BlockKind, StatementShape } from './grammar';
import { tokensOf } from './lexer';
import { Mistakes, quoted } from './mistakes';
import { isDeclarationAt, passSeparators, type Parser } from './parser';
import type { Expectations, StatementReading } from './reading';
import { blocksHolding, passHead, passOver, passStrayText, reportUnknownStatement } from './recovery';
import { readParts } from './statementReader';
import { tooMuch } from './statementEnd';
import type { Block, SourceTree, Statement } from './tree';

export const languageVersion = 1;

export function parse(text: string): SourceTree {
  return readText(text, null);
}

/** As `parse`, and collects what would fit at the end of the text. */
export function readText(text: string, expectations: Expectations | null): SourceTree {
  const tokens = tokensOf(text);
  const parser: Parser = { cursor: new TokenCursor(text, tokens), mistakes: new Mistakes(), unread: [], open: ['file'], unclosedAt: -1, expectations };
  const { cursor, mistakes, unread } = parser;
  passSeparators(cursor);
  const version = readVersion(parser);
  const statements: Statement[] = [];
  for (;;) {
    passSeparators(cursor);
    if (cursor.kind === 'end') break;
    const shape = cursor.kind === 'word' ? shapeOf('file', cursor.word) : undefined;
    if (shape === undefined) passStrayText(parser, statements.at(-1));
    else statements.push(readStatement(parser, shape));
  }
  if (expectations !== null) expectations.block ??= 'file';
  return { text, tokens, version, statements, errors: mistakes.all, unread };
}

function readVersion(parser: Parser): SourceTree['version'] {
  const { cursor, mistakes } = parser;
  if (!cursor.isWord('quietrun')) return null;
  const keyword = cursor.next();
  if (cursor.kind !== 'word' || !/^\d+$/.test(cursor.word)) {
    mistakes.report('missing-value', keyword, `the version of the language is missing: \`quietrun ${languageVersion}\``);
    passOver(parser);
    return null;
  }
  const value = Number(cursor.word);
  const span = cursor.next();
  if (value !== languageVersion) mistakes.report('syntax', span, `this file is written in version ${quoted(String(value)).slice(1, -1)} of the language; version ${languageVersion} is read here`);
  if (!cursor.atEnd) {
    mistakes.report('syntax', cursor.span, `${quoted(cursor.word)} does not fit here: \`quietrun ${value}\` is complete before it`);
    passOver(parser);
  }
  return { value, span };
}

function readStatement(parser: Parser, shape: StatementShape): Statement {
  const { cursor, mistakes, expectations } = parser;
  const documented = parser.open.length === 1 || parser.open.at(-1) === 'stackup';
  const documentation = documented && cursor.atLineStart ? documentationAbove(cursor.text, cursor.tokens, cursor.tokenIndex) : null;
  const keywordSpan = cursor.next();
  const reading: StatementReading = { cursor, mistakes, shape, within: parser.open.at(-1)!, values: [], broken: false, lost: false, fits: [], fitsAt: -1, expectations };
  readParts(reading, shape.parts);
  const block = shape.block === undefined ? null : readBlockOf(parser, reading, shape.block);
  if (shape.block === undefined && !cursor.atEnd && !nextStatementBegins(parser, reading)) {
    tooMuch(reading);
    passOver(parser);
  }
  return { keyword: shape.keyword, keywordSpan, span: { start: keywordSpan.start, end: cursor.last.end }, values: reading.values, block, documentation, broken: reading.broken };
}

/** Only the separator is missing: the statement is complete, and the next word begins another of this block. */
function nextStatementBegins({ cursor, mistakes }: Parser, { lost, within }: StatementReading): boolean {
  if (cursor.kind !== 'word' || shapeOf(within, cursor.word) === undefined) return false;
  const { start } = cursor;
  if (!lost) mistakes.report('syntax', cursor.span, `a line end or \`;\` is missing before ${quoted(cursor.word)}`, [{ title: 'Insert ;', span: { start: cursor.last.end, end: start }, newText: '; ' }]);
  return true;
}

/** The block of a declaration whose head has been read. Where only its `{` is missing, it is read all the same. */
function readBlockOf(parser: Parser, reading: StatementReading, { kind, required }: NonNullable<StatementShape['block']>): Block | null {
  const { cursor, mistakes } = parser;
  const brace = (): Block => {
    if (!reading.lost) mistakes.report('syntax', cursor.last, `\`{\` is missing after ${quoted(cursor.text.slice(cursor.last.start, cursor.last.end))}`);
    reading.broken = true;
    passSeparators(cursor);
    return readBlock(parser, kind, reading, true);
  };
  if (!cursor.atEnd && !cursor.isMark('{')) {
    if (cursor.kind === 'word' && shapeOf(kind, cursor.word) !== undefined) return brace();
    if (nextStatementBegins(parser, reading)) {
      reading.broken ||= !inherits(reading, required);
      return null;
    }
    tooMuch(reading);
    passHead(parser);
  }
  if (cursor.isMark('{')) return readBlock(parser, kind, reading, false);
  if (cursor.kind === 'newline' || cursor.isMark(';')) {
    if (cursor.kind === 'newline' && cursor.beyondNewlines().isMark('{')) {
      cursor.passNewlines();
      return readBlock(parser, kind, reading, false);
    }
    const ahead = cursor.copy();
    passSeparators(ahead);
    if (ahead.kind === 'word' && shapeOf(kind, ahead.word) !== undefined && !isDeclarationAt(ahead)) return brace();
  }
  if (!inherits(reading, required)) {
    if (!reading.lost) mistakes.report('syntax', cursor.last, `${label(reading)} lacks its block \`{ … }\`${required === 'unless-is' ? ', or `is` and a family' : ''}`);
    reading.broken = true;
  }
  return null;
}

/** After `is FAMILY` no block is due. */
function inherits({ values }: StatementReading, required: 'always' | 'unless-is'): boolean {
  return required === 'unless-is' && values.some((value) => value.role === 'family');
}

function label({ shape, values }: StatementReading): string {
  const name = values.find((value) => value.kind === 'name');
  return name?.kind === 'name' ? `${shape.keyword} ${quoted(name.name)}` : `this ${shape.keyword}`;
}

/** `bare`: the opening brace was left out, so that a closing one is not insisted on either. */
function readBlock(parser: Parser, kind: BlockKind, of: StatementReading, bare: boolean): Block {
  const { cursor, mistakes } = parser;
  const start = cursor.start;
  if (!bare) cursor.next();
  const statements: Statement[] = [];
  parser.open.push(kind);
  let closed = false;
  let foreign = false;
  for (;;) {
    passSeparators(cursor);
    if (cursor.isMark('}')) {
      cursor.next();
      closed = true;
      break;
    }
    if (cursor.kind === 'end' || endsOpenBlock(parser, kind)) {
      if (cursor.kind === 'end' && parser.expectations !== null) parser.expectations.block ??= kind;
      if (!bare && parser.unclosedAt !== cursor.tokenIndex) {
        mistakes.report('syntax', cursor.last, `\`}\` is missing: ${label(of)} is not closed`);
        parser.unclosedAt = cursor.tokenIndex;
      }
      break;
    }
    const shape = cursor.kind === 'word' ? shapeOf(kind, cursor.word) : undefined;
    if (shape !== undefined) {
      statements.push(readStatement(parser, shape));
      continue;
    }
    // Several statements of another kind of block are one mistake: its head was misread.
    const isForeign = cursor.kind === 'word' && 0 < blocksHolding(cursor.word).length;
    if (!(foreign && isForeign)) reportUnknownStatement(parser, kind);
    foreign ||= isForeign;
    passOver(parser);
  }
  parser.open.pop();
  return { kind, span: { start, end: Math.max(start, cursor.last.end) }, statements, closed };
}

/** At the start of a line: a declaration, or a statement that only the block around this one holds. */
function endsOpenBlock({ cursor, open }: Parser, kind: BlockKind): boolean {
  if (isDeclarationAt(cursor)) return true;
  const around = open.at(-2)!;
  return cursor.atLineStart && cursor.kind === 'word' && around !== 'file' && shapeOf(kind, cursor.word) === undefined && shapeOf(around, cursor.word) !== undefined;
}
