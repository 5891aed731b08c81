/**
 * The syntax tree of one file: what was written, where, and no meaning.
 *
 * The tree is lossless by construction: it never holds text of its own but spans of `text`, and
 * `tokens` with the gaps between them cover every character. It is error-tolerant: whatever could
 * be read stands in `statements`, whatever could not is an entry in `errors`, and a statement of
 * which a part is missing is `broken` and keeps the parts that it has.
 *
 * A file and a block are both a list of statements. `net A { swing 3 V }` is a statement `net` whose
 * block holds a statement `swing`; its values carry the roles that `grammar.ts` gives them.
 */
import type { Dimension } from '../units/dimension';
import type { BlockKind, Role } from './grammar';

/** Offsets in UTF-16 code units, end exclusive. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

export type TokenKind = 'word' | 'string' | 'punctuation' | 'comment' | 'newline';

export interface Token extends Span {
  readonly kind: TokenKind;
}

export interface SourceTree {
  readonly text: string;
  readonly tokens: readonly Token[];
  /** The language's version where the file states one. */
  readonly version: { readonly value: number; readonly span: Span } | null;
  readonly statements: readonly Statement[];
  readonly errors: readonly TextError[];
  /** Stretches that were passed over, in the order of the text: names in them count as declared and used. */
  readonly unread: readonly Span[];
}

export interface Statement {
  /** The declaration or property word: `net`, `swing`, `gap`, `emits`, … */
  readonly keyword: string;
  readonly keywordSpan: Span;
  /** From the first word to the last character of the value or block. */
  readonly span: Span;
  /** In the order in which they were written. */
  readonly values: readonly Value[];
  readonly block: Block | null;
  /** Lines of `##` directly above, joined by line feeds; null where there are none. */
  readonly documentation: string | null;
  /** Something that this statement needs could not be read; the rest is kept. */
  readonly broken: boolean;
}

export interface Block {
  readonly kind: BlockKind;
  /** Between and including the braces. */
  readonly span: Span;
  readonly statements: readonly Statement[];
  /** The closing brace was there. */
  readonly closed: boolean;
}

export type Value = NameValue | QuantityValue | WordValue | StringValue | PointValue;

interface ValueBase {
  /** What the value is in its statement: `swing`, `to`, `layer`, … */
  readonly role: Role;
  readonly span: Span;
}

export interface NameValue extends ValueBase {
  readonly kind: 'name';
  /** Unquoted. Of a range, the text as written; `range` lists what it stands for. */
  readonly name: string;
  readonly quoted: boolean;
  /** `D[0..2]` stands for D0, D1, D2; null where one name was written. */
  readonly range: readonly string[] | null;
}

export interface QuantityValue extends ValueBase {
  readonly kind: 'quantity';
  readonly dimension: Dimension;
  /** In the SI unit of `dimension`; NaN where the number or its unit could not be read. */
  readonly value: number;
  /** Half the width of the band, in the unit of `value`; null where none is written. */
  readonly tolerance: number | null;
  /** The unit as written, `''` for a plain number or a letter code such as `4R7`. */
  readonly unit: string;
  readonly numberSpan: Span;
  readonly unitSpan: Span;
}

/** A word that the grammar fixes: `worst`, `peak`, `reversed`, a material. */
export interface WordValue extends ValueBase {
  readonly kind: 'word';
  readonly word: string;
}

export interface StringValue extends ValueBase {
  readonly kind: 'string';
  readonly text: string;
}

export interface PointValue extends ValueBase {
  readonly kind: 'point';
  readonly x: QuantityValue;
  readonly y: QuantityValue;
  readonly z: QuantityValue | null;
}

export type TextRule = 'syntax' | 'unit' | 'missing-value' | 'bad-value';

export interface TextError {
  readonly rule: TextRule;
  readonly span: Span;
  /** What was found, what fits. */
  readonly message: string;
  /** Replacements that would mend it, best first. */
  readonly corrections: readonly Correction[];
}

export interface Correction {
  readonly title: string;
  readonly span: Span;
  readonly newText: string;
}
