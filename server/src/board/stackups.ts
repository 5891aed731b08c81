/**
 * The `stackup` declarations: rows from top to bottom, and what of them cannot be relied on.
 *
 * A row that cannot be read leaves a hole. A hole makes what lies beside it unknown and nothing else: a
 * run is lost only if there is one between the planes that it refers to.
 */
import type { Length } from '../units/quantity';
import type { NameValue, Span, Statement } from '../syntax/tree';
import { type Declaration, enterNames } from './declarations';
import { given, inSection, nameIn, spanOf, quantityIn, valuesSpan, wordIn } from './given';
import type { CopperRow, Given, PlaneRow, Stackup, StackupRow } from './model';
import { shown } from './references';
import { gap, missing, placeIn, report, type Scope } from './resolution';
import { strayIn } from './unreadable';

export interface ResolvedStackup {
  readonly stackup: Stackup;
  /** The rows as written, null where one could not be read. */
  readonly slots: readonly (StackupRow | null)[];
}

export interface Layers {
  readonly all: readonly ResolvedStackup[];
  readonly byName: ReadonlyMap<string, { readonly row: CopperRow | PlaneRow; readonly in: ResolvedStackup }>;
}

/** A row before it is read: its name is entered first, so that a broken height does not unmake a layer. */
interface Slot {
  readonly statement: Statement;
  /** False where the row's name is taken by another. */
  readonly isOwn: boolean;
}

/** Enters the names of all layers. Before any row is read, as `over` may stand before its stackup. */
export function enterLayers(declarations: readonly Declaration[]): ReadonlyMap<Declaration, readonly Slot[]> {
  return new Map(declarations.map((declaration) => [declaration, (declaration.statement.block?.statements ?? []).filter(({ keyword }) => keyword !== 'waive').map((statement) => slotOf(declaration, statement))]));
}

export function resolveStackups(entered: ReadonlyMap<Declaration, readonly Slot[]>): Layers {
  const all: ResolvedStackup[] = [];
  const byName = new Map<string, { row: CopperRow | PlaneRow; in: ResolvedStackup }>();
  for (const [declaration, slots] of entered) {
    const resolved = resolveStackup(declaration, slots);
    // Of a stackup that is there twice only the first is meant; its layers have the names already.
    if (declaration.repeats) continue;
    all.push(resolved);
    for (const row of resolved.stackup.rows) if (row.kind === 'copper' || row.kind === 'plane') byName.set(row.name, { row, in: resolved });
  }
  return { all, byName };
}

/** Whether every row is known from the nearest plane above these layers to the nearest below them. */
export function isKnownAround({ slots }: ResolvedStackup, layers: readonly StackupRow[], without: readonly string[]): boolean {
  const isPlane = (slot: StackupRow | null) => slot?.kind === 'plane' && !without.includes(slot.name);
  const indices = layers.map((layer) => slots.indexOf(layer));
  const top = slots.slice(0, Math.min(...indices)).findLastIndex(isPlane);
  const below = slots.findIndex((slot, index) => Math.max(...indices) < index && isPlane(slot));
  return !slots.slice(Math.max(0, top), below < 0 ? slots.length : below + 1).includes(null);
}

/** Heights in a board count from its underside. */
export function isKnownBelow({ slots }: ResolvedStackup, layer: StackupRow): boolean {
  return !slots.slice(slots.indexOf(layer)).includes(null);
}

function slotOf(declaration: Declaration, statement: Statement): Slot {
  const name = nameIn(statement, 'name');
  if (name === null || (statement.keyword !== 'copper' && statement.keyword !== 'plane')) return { statement, isOwn: true };
  const { scope } = declaration;
  if (declaration.repeats && scope.resolution.names.find('layer', name.name) !== undefined) return { statement, isOwn: false };
  return { statement, isOwn: 0 < enterNames(scope, name, 'layer', statement.keyword).length };
}

function resolveStackup({ scope, statement, nameValue }: Declaration, slots: readonly Slot[]): ResolvedStackup {
  const stray = statement.block === null ? [] : strayIn(scope.unreadable, statement.block);
  const rows: { readonly at: number; readonly row: StackupRow | null; readonly statement: Statement | null }[] = [
    ...slots.map((slot, index) => ({ at: slot.statement.span.start, row: slot.isOwn ? rowOf(scope, slot.statement, maskFits(slots, index)) : null, statement: slot.statement })),
    ...stray.map(({ start }) => ({ at: start, row: null, statement: null })),
  ].sort((a, b) => a.at - b.at);
  const filled = rows.flatMap((current, index) => {
    const previous = rows[index - 1];
    const touching = previous !== undefined && isConductive(previous.statement) && isConductive(current.statement);
    if (touching) reportTouching(scope, previous.statement!, current.statement!);
    return touching ? [null, current.row] : [current.row];
  });
  const place = placeIn(scope, (nameValue ?? { span: statement.keywordSpan }).span);
  return { stackup: { name: nameValue?.name ?? null, place, rows: filled.filter((row) => row !== null) }, slots: filled };
}

function rowOf(scope: Scope, statement: Statement, fits: boolean): StackupRow | null {
  const name = nameIn(statement, 'name');
  const title = name === null ? statement.keyword : shown(name.name);
  const thickness = given<Length>(scope, statement, 'thickness', inSection(`thickness of ${title}`));
  const base = { place: placeIn(scope, statement.span), documentation: statement.documentation };
  if (statement.keyword === 'copper') {
    const undercut = given<Length>(scope, statement, 'undercut', { what: `undercut of ${title}`, sign: 'not-below-zero' });
    if (undercut === null && quantityIn(statement, 'undercut') !== null) return null;
    return thickness && name && { kind: 'copper', name: name.name, thickness, undercut, ...base };
  }
  if (statement.keyword === 'plane') return thickness && name && { kind: 'plane', name: name.name, thickness, ...base };
  const er = permittivity(scope, statement);
  given(scope, statement, 'loss', { what: `loss of ${title}`, sign: 'not-below-zero' });
  if (statement.keyword === 'mask') {
    if (!fits) {
      report(scope, 'bad-value', statement.keywordSpan, 'mask covers the outside of a board: it is the first or the last row');
      gap(scope, statement.span, `a mask inside ${scope.owner.called}`);
      return null;
    }
    return thickness && er && { kind: 'mask', thickness, er, flat: wordIn(statement, 'flat') !== null, ...base };
  }
  return thickness && er && { kind: statement.keyword as 'dielectric' | 'core' | 'prepreg', thickness, er, ...base };
}

function permittivity(scope: Scope, statement: Statement): Given<number> | null {
  if (quantityIn(statement, 'er') === null) {
    const thickness = quantityIn(statement, 'thickness');
    missing(scope, { span: statement.span, before: thickness === null ? valuesSpan(statement) : spanOf(thickness), what: `er of ${statement.keyword}`, fits: 'its relative permittivity, such as `er 4.2`' });
    return null;
  }
  return given<number>(scope, statement, 'er', { what: `er of ${statement.keyword}`, atLeast: { value: 1, inWords: '1, that of vacuum' } });
}

function maskFits(slots: readonly Slot[], index: number): boolean {
  const isMask = ({ statement }: Slot) => statement.keyword === 'mask';
  return slots.slice(0, index).every(isMask) || slots.slice(index + 1).every(isMask);
}

function isConductive(statement: Statement | null): boolean {
  return statement?.keyword === 'copper' || statement?.keyword === 'plane';
}

function reportTouching(scope: Scope, above: Statement, below: Statement): void {
  const before: Span = valuesSpan(above);
  const names = [above, below].map((statement) => title(statement, nameIn(statement, 'name')));
  gap(scope, before, `what lies between ${names[0]} and ${names[1]}`);
  report(scope, 'missing-value', before, `an insulating row belongs between ${names[0]} and ${names[1]}: such as \`prepreg 0.2 mm er 4.2\``);
}

const title = (statement: Statement, name: NameValue | null) => (name === null ? `a ${statement.keyword}` : shown(name.name));
