/**
 * What the façade answers, as plain data: offsets in UTF-16 code units, Markdown in strings, no type of
 * any protocol. `lsp/` and `cli/` turn these into what their side speaks.
 */
import type { Place } from '../board/model';
import type { Span } from '../syntax/tree';

export type { Edit, Fix } from '../fixes/fix';

export interface HoverAnswer {
  readonly span: Span;
  readonly markdown: string;
}

export type HintKind = 'noise' | 'gap' | 'length' | 'size';

export interface Hint {
  readonly kind: HintKind;
  /** The hint stands directly after this offset. */
  readonly offset: number;
  readonly parts: readonly { readonly text: string; readonly target: Place | null }[];
  readonly tooltip: string;
}

export type CompletionKind = 'keyword' | 'declaration' | 'name' | 'layer' | 'family' | 'unit' | 'rule' | 'word';

export interface Completion {
  readonly label: string;
  readonly kind: CompletionKind;
  readonly detail: string;
  readonly documentation: string;
  /** What it replaces: the word under the cursor. */
  readonly span: Span;
  readonly newText: string;
  /** `newText` holds `$1`, `${2:…}` places. */
  readonly snippet: boolean;
  /** Lower comes first. */
  readonly rank: number;
}

export interface SymbolEntry {
  readonly name: string;
  readonly kind: string;
  readonly detail: string;
  readonly span: Span;
  readonly nameSpan: Span;
  readonly children: readonly SymbolEntry[];
}

/** Lines count from 0, the last of them included. */
export interface Fold {
  readonly startLine: number;
  readonly endLine: number;
  readonly kind: 'block' | 'comment' | 'imports';
}

export interface SemanticToken {
  /** Within one line. */
  readonly span: Span;
  readonly type: 'net' | 'layer' | 'family' | 'group' | 'part' | 'quantity' | 'unit';
  readonly declaration: boolean;
  /** A net or pair that gets more noise than it tolerates. */
  readonly overBudget: boolean;
}
