/**
 * A place in the tokens of a text, and the only state of a parse. It passes over comments by itself;
 * newlines are tokens, since a statement ends with its line. A reader of characters may leave it in the
 * middle of a word: `22mm×9mm`.
 */
import { lineEnd } from './scan';
import type { Span, Token, TokenKind } from './tree';

export class TokenCursor {
  /** What was read last, newlines apart: where something missing is marked. */
  last: Span = { start: 0, end: 0 };
  private index = 0;
  private from = 0;
  private line: Span = { start: 0, end: -1 };

  constructor(readonly text: string, readonly tokens: readonly Token[]) {
    this.passComments();
  }

  get kind(): TokenKind | 'end' {
    return this.tokens[this.index]?.kind ?? 'end';
  }

  get start(): number {
    const token = this.tokens[this.index];
    return token === undefined ? this.text.length : Math.max(token.start, this.from);
  }

  get end(): number {
    return this.tokens[this.index]?.end ?? this.text.length;
  }

  get span(): Span {
    return { start: this.start, end: this.end };
  }

  get tokenIndex(): number {
    return this.index;
  }

  /** The token as written; empty at the end of the text. */
  get word(): string {
    return this.text.slice(this.start, this.end);
  }

  isWord(word: string): boolean {
    return this.kind === 'word' && this.end - this.start === word.length && this.text.startsWith(word, this.start);
  }

  isMark(mark: '{' | '}' | '(' | ')' | ',' | ';'): boolean {
    return this.kind === 'punctuation' && this.text[this.start] === mark;
  }

  /** Line end, `;`, `}` or the end of the text: here a statement may end. */
  get atEnd(): boolean {
    return this.kind === 'newline' || this.kind === 'end' || this.isMark(';') || this.isMark('}');
  }

  /** The current token is the first of its line. */
  get atLineStart(): boolean {
    return this.index === 0 || (this.tokens[this.index - 1]!.kind === 'newline' && this.from <= (this.tokens[this.index]?.start ?? 0));
  }

  next(): Span {
    const span = this.span;
    if (this.kind !== 'newline' && this.kind !== 'end') this.last = span;
    this.index += 1;
    this.passComments();
    return span;
  }

  /** Goes on after `offset`, to which something else has read from `start`. */
  readTo(start: number, offset: number): void {
    this.last = { start, end: offset };
    while (this.index < this.tokens.length && this.tokens[this.index]!.end <= offset) this.index += 1;
    this.from = offset;
    this.passComments();
  }

  passNewlines(): void {
    while (this.kind === 'newline') this.next();
  }

  /** Where the current line ends. Kept, since a line of a megabyte may hold many quantities. */
  get lineEnd(): number {
    if (this.start < this.line.start || this.line.end < this.start) this.line = { start: this.start, end: lineEnd(this.text, this.start) };
    return this.line.end;
  }

  /** A cursor at the next token that is not a newline, to look at only; this one stays where it is. */
  beyondNewlines(): TokenCursor {
    if (this.kind !== 'newline') return this;
    const ahead = this.copy();
    ahead.passNewlines();
    return ahead;
  }

  copy(): TokenCursor {
    const copy = new TokenCursor(this.text, this.tokens);
    copy.last = this.last;
    copy.index = this.index;
    copy.from = this.from;
    return copy;
  }

  private passComments(): void {
    while (this.tokens[this.index]?.kind === 'comment') this.index += 1;
  }
}
