/** One row of a run, from left to right: conductors with a gap between neighbours, ranges expanded. */
import type { Length } from '../units/quantity';
import type { Block, NameValue, Statement } from '../syntax/tree';
import { given, inSection, nameIn, quantityIn, valuesSpan } from './given';
import type { CopperRow, Given, Net, RunConductor, RunRow } from './model';
import { propertiesOf } from './properties';
import { referTo, shown, wantedNet } from './references';
import { gap, missing, placeIn, report, type Scope } from './resolution';
import { strayIn } from './unreadable';

interface RowContext {
  readonly block: Block;
  readonly statements: readonly Statement[];
  readonly nets: ReadonlyMap<string, Net>;
  readonly isFirst: boolean;
  readonly layer: CopperRow | null;
}

/** Null where any part of the row could not be read. */
export function rowOfRun(scope: Scope, { block, statements, nets, isFirst, layer }: RowContext): RunRow | null {
  const parts = statements.filter(({ keyword }) => keyword !== 'shift' && keyword !== 'waive');
  const conductors: RunConductor[] = [];
  const gaps: Given<Length>[] = [];
  let isWhole = isAlternating(scope, block, parts);
  for (const [index, part] of parts.entries()) {
    if (part.keyword === 'gap') {
      const size = given<Length>(scope, part, 'gap', inSection(`gap ${between(parts[index - 1], parts[index + 1])}in ${scope.owner.called}`));
      if (size === null) isWhole = false;
      else gaps.push(size);
      continue;
    }
    const found = part.keyword === 'trace' ? traces(scope, part, nets) : single(scope, part);
    if (found === null) isWhole = false;
    else conductors.push(...found.conductors);
    gaps.push(...(found?.gaps ?? []));
  }
  const shift = rowShift(scope, block, isFirst);
  if (layer !== null && !undercutFits(scope, layer, conductors)) isWhole = false;
  if (layer === null || shift === 'unreadable' || !isWhole) return null;
  return { layer, shift, conductors, gaps };
}

/** Conductor, gap, conductor, …: says what belongs where. Silent beside text that could not be read, which may be what is missing. */
function isAlternating(scope: Scope, block: Block, parts: readonly Statement[]): boolean {
  const faults: { readonly before: Statement; readonly message: string }[] = [];
  for (const [index, part] of parts.entries()) {
    const next = parts[index + 1];
    const isGap = part.keyword === 'gap';
    if (index === 0 && isGap) faults.push({ before: part, message: 'a row starts with a conductor: one belongs before this gap' });
    if (next === undefined && isGap && 0 < index) faults.push({ before: part, message: 'a row ends with a conductor: one belongs after this gap' });
    if (next === undefined || isGap !== (next.keyword === 'gap')) continue;
    faults.push({ before: part, message: isGap ? 'a conductor belongs between two gaps' : `a gap belongs between ${called(part)} and ${called(next)}` });
  }
  const isSilent = 0 < strayIn(scope.unreadable, block).length;
  for (const { before, message } of faults) {
    if (isSilent) break;
    gap(scope, valuesSpan(before), `the order of the row in ${scope.owner.called}`);
    report(scope, 'missing-value', valuesSpan(before), message);
  }
  return faults.length === 0 && !isSilent;
}

interface Conductors {
  readonly conductors: readonly RunConductor[];
  readonly gaps: readonly Given<Length>[];
}

function traces(scope: Scope, statement: Statement, nets: ReadonlyMap<string, Net>): Conductors | null {
  const value = nameIn(statement, 'net');
  const title = value === null ? 'a trace' : shown(value.name);
  const names = value === null ? null : referTo(scope, value, wantedNet);
  const width = given<Length>(scope, statement, 'width', inSection(`width of ${title} in ${scope.owner.called}`));
  const spaced = given<Length>(scope, statement, 'spaced', inSection(`spacing of ${title} in ${scope.owner.called}`));
  const after = given<Length>(scope, statement, 'after', { what: `length before ${title} in ${scope.owner.called}`, sign: 'not-below-zero' });
  const isRange = value?.range != null;
  if (isRange && quantityIn(statement, 'spaced') === null) {
    missing(scope, { span: statement.span, before: valuesSpan(statement), what: `spacing of ${title}`, fits: 'such as `spaced 0.12 mm`' });
    return null;
  }
  if (!isRange && spaced !== null && value !== null) {
    report(scope, 'bad-value', spaced.place.span, `${title} is one trace: \`spaced\` is for a range such as \`D[0..7]\``);
    gap(scope, spaced.place.span, `the spacing of ${title} in ${scope.owner.called}`);
    return null;
  }
  const resolved = names?.map((name) => nets.get(name));
  const isWhole = (spaced !== null || !isRange) && (after !== null || quantityIn(statement, 'after') === null);
  if (value === null || width === null || !isWhole || resolved === undefined || resolved.includes(undefined)) return null;
  const reversed = statement.values.some((word) => word.role === 'reversed');
  const places = { place: placeIn(scope, value.span), whole: placeIn(scope, statement.span) };
  const conductors = resolved.map((net) => ({ kind: 'trace' as const, net: net!, width, reversed, after, ...places }));
  return { conductors, gaps: spaced === null ? [] : conductors.slice(1).map(() => spaced) };
}

/** A guard or a return. */
function single(scope: Scope, statement: Statement): Conductors | null {
  const value = nameIn(statement, 'net');
  const title = `${statement.keyword} ${value === null ? '' : shown(value.name)}`.trim();
  if (value !== null) nameConductor(scope, value);
  const width = given<Length>(scope, statement, 'width', inSection(`width of ${title} in ${scope.owner.called}`));
  const stitched = given<Length>(scope, statement, 'stitched', { what: `stitching of ${title} in ${scope.owner.called}` });
  if (value === null || width === null || (stitched === null && quantityIn(statement, 'stitched') !== null)) return null;
  const shared = { name: value.name, width, place: placeIn(scope, value.span), whole: placeIn(scope, statement.span) };
  return { conductors: [statement.keyword === 'guard' ? { kind: 'guard', stitched, ...shared } : { kind: 'return', ...shared }], gaps: [] };
}

/** It needs no declaration; where a net has its name, that net lies here. */
function nameConductor(scope: Scope, { name, span }: NameValue): void {
  const { names } = scope.resolution;
  names.useOrDeclare('conductor', name, placeIn(scope, span));
  if (names.find('signal', name)?.kind === 'net') names.use('signal', name, placeIn(scope, span));
}

function rowShift(scope: Scope, block: Block, isFirst: boolean): Given<Length> | null | 'unreadable' {
  if (block.kind !== 'row') return null;
  const statement = propertiesOf(scope, block).one('shift');
  if (statement === null) return null;
  const shift = given<Length>(scope, statement, 'shift', { what: `shift of a row in ${scope.owner.called}`, sign: 'any' });
  if (shift === null) return 'unreadable';
  if (!isFirst || shift.value === 0) return shift;
  report(scope, 'bad-value', shift.place.span, 'the first row is what the others are shifted from: it cannot be shifted itself');
  gap(scope, shift.place.span, `the shift of the first row in ${scope.owner.called}`);
  return 'unreadable';
}

/** Etching narrows both sides of a trace, and something has to be left of it. */
function undercutFits(scope: Scope, { name, undercut }: CopperRow, conductors: readonly RunConductor[]): boolean {
  if (undercut === null) return true;
  const tooNarrow = conductors.filter(({ width }) => width.value < 2 * undercut.value);
  for (const conductor of tooNarrow) {
    const title = shown(conductor.kind === 'trace' ? conductor.net.name : conductor.name);
    report(scope, 'bad-value', conductor.width.place.span, `the undercut of ${shown(name)} is over half the width of ${title}`, { related: [{ place: undercut.place, message: 'the undercut' }] });
    gap(scope, conductor.width.place.span, `the width of ${title} in ${scope.owner.called}`);
  }
  return tooNarrow.length === 0;
}

function between(before: Statement | undefined, after: Statement | undefined): string {
  const isConductor = (part: Statement | undefined): part is Statement => part !== undefined && part.keyword !== 'gap';
  return isConductor(before) && isConductor(after) ? `between ${called(before)} and ${called(after)} ` : '';
}

function called(statement: Statement): string {
  const value = nameIn(statement, 'net');
  return value === null ? `a ${statement.keyword}` : shown(value.name);
}

