/**
 * Every declaration of a project, entered by name before any is read: a name may be used before it is
 * declared. Of two with one name the first stands, those of the root before those of the files it uses.
 */
import type { NameValue, Statement } from '../syntax/tree';
import type { ProjectFile } from './closure';
import { nameIn } from './given';
import type { Declared, NameRecord, NameSet, Place } from './model';
import { shown } from './references';
import { gap, placeIn, report, type Owner, type OwnerKind, type Resolution, type Scope } from './resolution';

export interface Declaration {
  readonly statement: Statement;
  readonly scope: Scope;
  readonly nameValue: NameValue | null;
  /** The names that this declaration is the first to declare. */
  readonly names: readonly string[];
  /** It repeats a name that is declared elsewhere: what is in it is checked, and not in the model. */
  readonly repeats: boolean;
}

export type Declarations = Readonly<Record<OwnerKind, readonly Declaration[]>>;

export function declarationsOf(files: readonly ProjectFile[], resolution: Resolution): Declarations {
  const declarations: Record<OwnerKind, Declaration[]> = { file: [], board: [], stackup: [], family: [], net: [], pair: [], run: [], loop: [], return: [], link: [], shield: [], ambient: [], waive: [] };
  for (const file of files) {
    for (const statement of file.tree.statements) {
      if (Object.hasOwn(declarations, statement.keyword)) {
        const kind = statement.keyword as OwnerKind;
        declarations[kind].push(declarationOf(file, statement, kind, resolution, declarations));
      }
    }
  }
  return declarations;
}

/** What the model says of anything declared. */
export function declared(declaration: Declaration, name: string): Declared {
  const { scope, statement, nameValue } = declaration;
  return { name, place: placeIn(scope, (nameValue ?? statement).span), whole: placeIn(scope, statement.span), documentation: statement.documentation };
}

/** For what is not part of any declaration. */
export function fileScope(file: ProjectFile, resolution: Resolution): Scope {
  return scopeOf(file, resolution, { kind: 'file', names: [], called: file.path.slice(file.path.lastIndexOf('/') + 1), statement: null, path: file.path });
}

/** Enters names in a set, and reports those that are taken. Returns those that are new. */
export function enterNames(scope: Scope, value: NameValue, set: NameSet, kind: NameRecord['kind']): readonly string[] {
  const place = placeIn(scope, value.span);
  const taken: { name: string; by: Place }[] = [];
  const fresh = (value.range ?? [value.name]).filter((name) => {
    const first = scope.resolution.names.declare(set, kind, name, place);
    if (first !== null) taken.push({ name, by: first });
    return first === null;
  });
  if (0 < taken.length) {
    const list = `${taken.slice(0, 4).map(({ name }) => shown(name)).join(', ')}${4 < taken.length ? ` and ${taken.length - 4} more` : ''}`;
    report(scope, 'duplicate-name', value.span, `${list} ${taken.length === 1 ? 'is' : 'are'} declared twice`, { related: [{ place: taken[0].by, message: `${shown(taken[0].name)} is declared here first` }] });
    gap(scope, value.span, `which declaration of ${list} holds`);
  }
  return fresh;
}

function declarationOf(file: ProjectFile, statement: Statement, kind: OwnerKind, resolution: Resolution, before: Declarations): Declaration {
  const nameValue = nameIn(statement, 'name');
  const all = nameValue === null ? [] : (nameValue.range ?? [nameValue.name]);
  const owner: Owner = { kind, names: all, called: nameValue === null ? `a ${kind}` : `${kind} ${shown(nameValue.name)}`, statement, path: file.path };
  const scope = scopeOf(file, resolution, owner);
  const others = before[kind];
  if (kind === 'waive') return { statement, scope, nameValue, names: [], repeats: false };
  if (kind === 'board' || (kind === 'stackup' && nameValue === null)) {
    const first = others.find((other) => kind === 'board' || other.nameValue === null);
    if (nameValue !== null) resolution.names.declare('board', 'board', nameValue.name, placeIn(scope, nameValue.span));
    if (first === undefined) return { statement, scope, nameValue, names: all, repeats: false };
    const message = kind === 'board' ? 'a project has one board' : 'one stackup may be without a name; a second one needs one';
    const at = (nameValue ?? { span: statement.keywordSpan }).span;
    // A name that could not be read is the mistake, not that there is none.
    if (kind === 'board' || !statement.broken) report(scope, 'duplicate-name', at, message, { related: [{ place: placeIn(first.scope, first.nameValue?.span ?? first.statement.keywordSpan), message: `the first ${kind}` }] });
    gap(scope, at, `which ${kind} holds`);
    return { statement, scope, nameValue, names: [], repeats: true };
  }
  if (nameValue === null) return { statement, scope, nameValue, names: [], repeats: false };
  const set: NameSet = kind === 'net' || kind === 'pair' || kind === 'loop' ? 'signal' : (kind as NameSet);
  const names = enterNames(scope, nameValue, set, kind as NameRecord['kind']);
  return { statement, scope, nameValue, names, repeats: names.length < all.length };
}

function scopeOf(file: ProjectFile, resolution: Resolution, owner: Owner): Scope {
  return { resolution, file, unreadable: resolution.unreadable.get(file.path)!, owner };
}
