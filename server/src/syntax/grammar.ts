/**
 * The grammar of language version 1 as data: which statements a block may hold and what follows
 * each word. The parser interprets it; completion, signature help, keyword hovers and the messages
 * that say what fits read the same table, so that none of them can disagree with the parser.
 *
 * Roles name a value within its statement; the resolver in `board/` asks for values by role.
 */
import type { Dimension } from '../units/dimension';

export type BlockKind =
  | 'file' | 'board' | 'stackup' | 'net' | 'pair' | 'run' | 'row' | 'loop' | 'return' | 'link' | 'shield' | 'ambient';

export type NameKind =
  | 'copper' | 'plane' | 'family' | 'net' | 'pair' | 'loop' | 'group' | 'run' | 'return' | 'link' | 'shield' | 'ambient'
  | 'board' | 'stackup'
  | 'any' // the subject of a waiver, what a shield covers or a return refers to
  | 'free'; // a guard's or a row return's name, which needs no declaration

export type Role = string;

export type Part =
  | { readonly is: 'quantity'; readonly role: Role; readonly dimension: Dimension; readonly toleranced: boolean; /** A thickness of copper, where `oz` fits too. */ readonly copper: boolean; /** As large as such a value usually is: `2 mV` is tolerated, not `3.3 V`. */ readonly example: string }
  | { readonly is: 'count'; readonly role: Role }
  /** `declares` or refers to; `many`: a range `D[0..7]` may stand here. */
  | { readonly is: 'name'; readonly role: Role; readonly of: NameKind; readonly declares: boolean; readonly many: boolean }
  | { readonly is: 'string'; readonly role: Role }
  | { readonly is: 'point'; readonly role: Role }
  | { readonly is: 'rule-name'; readonly role: Role }
  /** A fixed word that stands for itself and yields no value: `to`, `at`, `most`. */
  | { readonly is: 'keyword'; readonly word: string }
  /** One word of several, which becomes a value: `worst` or `rss`. */
  | { readonly is: 'word'; readonly role: Role; readonly words: readonly string[] }
  | { readonly is: 'comma' }
  | { readonly is: 'optional-comma' }
  | { readonly is: 'optional'; readonly parts: readonly Part[] }
  | { readonly is: 'choice'; readonly of: readonly (readonly Part[])[] }
  /** Any order, each at most once: what follows the value of a trace. `needs`: the first word of the one that may not be left out. */
  | { readonly is: 'suffixes'; readonly of: readonly (readonly Part[])[]; readonly needs: string | null }
  /** One or more. */
  | { readonly is: 'repeat'; readonly parts: readonly Part[] };

export type QuantityPart = Part & { readonly is: 'quantity' };

export interface StatementShape {
  readonly keyword: string;
  readonly parts: readonly Part[];
  readonly block?: { readonly kind: BlockKind; readonly required: 'always' | 'unless-is' };
  /** May stand more than once in its block. */
  readonly repeats: boolean;
  /** One sentence for hovers, completion and the reference. */
  readonly about: string;
}
