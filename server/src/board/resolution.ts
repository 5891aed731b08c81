/**
 * What is gathered while one project is resolved: its errors, its gaps, its names. It lives for one call
 * of `resolveProject` and is the only thing there that changes.
 *
 * Everything is reported by way of a `Scope`, a declaration in a file, so that a place and the budgets
 * that a gap concerns need not be said again at each report.
 */
import type { NameValue, Span, Statement } from '../syntax/tree';
import { closest } from '../syntax/words';
import type { ProjectFile } from './closure';
import type { BoardError, NameSet, Place } from './model';
import { NameTables } from './nameTables';
import { unreadableOf, type Unreadable } from './unreadable';

export class Resolution {
  readonly errors: BoardError[] = [];
  readonly gaps: PendingGap[] = [];
  readonly names = new NameTables();
  /** After `samples … after`, to be looked up when it is known which groups switch. */
  readonly sampledGroups: { readonly scope: Scope; readonly value: NameValue }[] = [];
  readonly unreadable: ReadonlyMap<string, Unreadable>;
  private readonly reported = new Set<string>();
  private readonly unreadableWords = new Set<string>();
  readonly hasStackup: boolean;
  private saidOnce = new Set<string>();
  private searches = 0;
  private readonly hidesAll: boolean;
  private readonly hidesLayers: boolean;

  /** `isOpen`: a file that the project uses could not be read, so that any name may be declared there. */
  constructor(files: readonly ProjectFile[], isOpen: boolean) {
    this.unreadable = new Map(files.map(({ path, tree }) => [path, unreadableOf(tree)]));
    this.hasStackup = files.some(({ tree }) => tree.statements.some(({ keyword }) => keyword === 'stackup'));
    const all = [...this.unreadable.values()];
    for (const { words } of all) for (const word of words) this.unreadableWords.add(word);
    this.hidesAll = isOpen || all.some(({ heads }) => heads);
    this.hidesLayers = all.some(({ layers }) => layers);
  }

  /** Whether an undeclared name is worth a finding, or may be the echo of a mistake elsewhere. */
  blames(set: NameSet, name: string): boolean {
    return !this.hidesAll && !(this.hidesLayers && set === 'layer') && !this.unreadableWords.has(name);
  }

  /** The same fault of a family is found by each of its nets and reported once. */
  report(error: BoardError): void {
    const key = `${error.place.path}\n${error.place.span.start} ${error.place.span.end} ${error.rule} ${error.message}`;
    if (this.reported.has(key)) return;
    this.reported.add(key);
    this.errors.push(error);
  }

  /** What was probably meant. Each search goes through every name, so only the first unknown names get one. */
  closest(name: string, candidates: Iterable<string>): string | null {
    this.searches += 1;
    return this.searches <= mostSearches ? closest(name, candidates) : null;
  }

  /** Whether this is the first time: for a mistake that shows itself in many places. */
  isFirst(mistake: string): boolean {
    if (this.saidOnce.has(mistake)) return false;
    this.saidOnce.add(mistake);
    return true;
  }

  isInUnreadable(name: string): boolean {
    return this.unreadableWords.has(name);
  }
}

const mostSearches = 100;

export type OwnerKind = 'file' | 'board' | 'stackup' | 'family' | 'net' | 'pair' | 'run' | 'loop' | 'return' | 'link' | 'shield' | 'ambient' | 'waive';

/** The declaration that something is said in. */
export interface Owner {
  readonly kind: OwnerKind;
  readonly names: readonly string[];
  /** `run alley`, for messages. */
  readonly called: string;
  readonly statement: Statement | null;
  readonly path: string;
}

export interface PendingGap {
  readonly owner: Owner;
  readonly what: string;
  readonly place: Place;
}

export interface Scope {
  readonly resolution: Resolution;
  readonly file: ProjectFile;
  readonly unreadable: Unreadable;
  readonly owner: Owner;
}

export function placeIn(scope: Scope, { start, end }: Span): Place {
  return { path: scope.file.path, span: { start, end } };
}

export interface ErrorExtras {
  readonly related?: BoardError['related'];
  readonly corrections?: BoardError['corrections'];
}

export function report(scope: Scope, rule: BoardError['rule'], span: Span, message: string, extras: ErrorExtras = {}): void {
  reportAt(scope, rule, placeIn(scope, span), message, extras);
}

/** `what`: `the width of TX in run alley`, to be followed by "could not be read". */
export function gap(scope: Scope, span: Span, what: string): void {
  gapAt(scope, placeIn(scope, span), what);
}

/** The same where the text stands outside the declaration that it spoils: in its family, perhaps of another file. */
export function reportAt({ resolution }: Scope, rule: BoardError['rule'], place: Place, message: string, { related = [], corrections = [] }: ErrorExtras = {}): void {
  resolution.report({ rule, place, message, related, corrections });
}

export function gapAt({ resolution, owner }: Scope, place: Place, what: string): void {
  resolution.gaps.push({ owner, what, place });
}

/** A value that is required and not written, marked at the word before it. Silent where the text itself is broken, there or on the rest of its line. */
export function missing(scope: Scope, { span, before, what, fits }: { readonly span: Span; readonly before: Span; readonly what: string; readonly fits: string }): void {
  gap(scope, before, `the ${what}`);
  if (!isSpoiltBeside(scope, span)) report(scope, 'missing-value', before, `${what} is missing: ${fits}`);
}

function isSpoiltBeside({ file, unreadable }: Scope, { start, end }: Span): boolean {
  const lineEnd = file.tree.text.indexOf('\n', end);
  return 0 < unreadable.errorsIn({ start, end: lineEnd < 0 ? Infinity : lineEnd }).length;
}
