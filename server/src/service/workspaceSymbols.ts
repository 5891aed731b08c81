/** Everything that the known files declare, found by what a person remembers of its name: `vpw` finds VALVE_PWM. */
import type { NameValue, SourceTree, Span, Statement } from '../syntax/tree';
import { closeness } from './closeness';
import type { Session } from './session';

export interface WorkspaceSymbol {
  readonly name: string;
  readonly kind: string;
  readonly path: string;
  /** The name. */
  readonly span: Span;
  /** `in stackup flex`, or what kind of thing it is. */
  readonly container: string;
}

/** More than anyone reads; the closest come first. */
const most = 1000;

export function workspaceSymbols(session: Session, query: string): readonly WorkspaceSymbol[] {
  const wanted = query.trim();
  const found = session.paths().flatMap((path) => symbolsIn(session, path).flatMap((symbol) => {
    const rank = Math.max(...symbol.names.map((name) => closeness(wanted, name)));
    return rank === -Infinity ? [] : [{ symbol, rank }];
  }));
  found.sort((a, b) => b.rank - a.rank || byText(a.symbol.name, b.symbol.name) || byText(a.symbol.path, b.symbol.path) || a.symbol.span.start - b.symbol.span.start);
  return found.slice(0, most).map(({ symbol: { names: _, ...symbol } }) => symbol);
}

interface Named extends WorkspaceSymbol {
  /** As written, and what a range stands for. */
  readonly names: readonly string[];
}

const known = new WeakMap<SourceTree, readonly Named[]>();

function symbolsIn(session: Session, path: string): readonly Named[] {
  const tree = session.tree(path);
  if (tree === undefined) return [];
  let symbols = known.get(tree);
  if (symbols === undefined) known.set(tree, (symbols = tree.statements.flatMap((statement) => [...symbolOf(path, statement, 'file'), ...layersOf(path, statement)])));
  return symbols;
}

function layersOf(path: string, { keyword, block, values }: Statement): readonly Named[] {
  if (keyword !== 'stackup' || block === null) return [];
  const stackup = nameOf(values);
  return block.statements.flatMap((row) => symbolOf(path, row, `stackup${stackup === undefined ? '' : ` ${stackup.name}`}`));
}

function symbolOf(path: string, { keyword, values }: Statement, within: string): readonly Named[] {
  const value = nameOf(values);
  if (value === undefined) return [];
  const { name, range, span: { start, end } } = value;
  return [{ name, names: [name, ...(range ?? [])], kind: keyword, path, span: { start, end }, container: within === 'file' ? keyword : `${keyword} of ${within}` }];
}

const nameOf = (values: Statement['values']) => values.find((value): value is NameValue => value.kind === 'name' && value.role === 'name');
const byText = (a: string, b: string) => (a < b ? -1 : b < a ? 1 : 0);
