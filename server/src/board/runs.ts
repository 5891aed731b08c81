/**
 * Runs: rows of conductors that lie beside each other. A run is whole or it is not in the model, since a
 * cross-section with a conductor or a gap missing is another cross-section.
 */
import type { Length } from '../units/quantity';
import type { Block, NameValue, Statement } from '../syntax/tree';
import { declared, type Declaration } from './declarations';
import { given, nameIn, quantityIn } from './given';
import { copperNamed, headOf, planeCalled, type Located } from './layers';
import { distinctMembers } from './members';
import type { CopperRow, Net, PlaneRow, Run, RunRow } from './model';
import { propertiesOf } from './properties';
import { referTo, shown, wantedCopper, wantedPlane } from './references';
import { gap, missing, placeIn, report, type Scope } from './resolution';
import { rowOfRun } from './runRow';
import { isKnownAround, type Layers } from './stackups';
import { withinOneStackup } from './withinOneStackup';

export interface RunContext {
  readonly layers: Layers;
  readonly nets: ReadonlyMap<string, Net>;
}

export function resolveRuns(declarations: readonly Declaration[], context: RunContext): readonly Run[] {
  return declarations.flatMap((declaration) => resolveRun(declaration, context) ?? []);
}

/** What a block of rows stands on. */
interface WrittenRow {
  readonly layer: NameValue | null;
  readonly block: Block;
  readonly statements: readonly Statement[];
}

function resolveRun(declaration: Declaration, context: RunContext): Run | null {
  const { scope, statement, nameValue, names } = declaration;
  const length = runLength(declaration);
  const written = writtenRows(declaration);
  const rows = written.map((row, index) => resolveRow(scope, row, { ...context, isFirst: index === 0 }));
  const without = planesCutAway(scope, statement.block, context.layers);
  const found = rows.filter((row) => row !== null);
  const isWithinOne = withinOneStackup(scope, [...found, ...without]);
  const contents = found.flatMap(({ content }) => content ?? []);
  // A run without rows says nothing, and nothing is wrong with it.
  const isWhole = 0 < contents.length && contents.length === written.length;
  if (length === null || nameValue === null || names.length === 0 || !isWithinOne || !isWhole) return null;
  const { in: board } = found[0];
  const cutAway = without.map(({ row }) => row.name);
  if (!isKnownAround(board, found.map(({ row }) => row), cutAway)) {
    gap(scope, nameValue.span, `the stackup around ${scope.owner.called}`);
    return null;
  }
  checkLengths(scope, contents, length.value);
  const filled = contents.filter(({ conductors }) => 0 < conductors.length);
  return filled.length === 0 ? null : { ...declared(declaration, nameValue.name), length, stackup: board.stackup, rows: filled, without: cutAway };
}

function runLength({ scope, statement, nameValue }: Declaration) {
  if (quantityIn(statement, 'length') !== null) return given<Length>(scope, statement, 'length', { what: `length of ${scope.owner.called}` });
  if (nameValue !== null) missing(scope, { span: headOf(statement), before: nameValue.span, what: `length of ${scope.owner.called}`, fits: 'such as `for 40 mm`' });
  return null;
}

/** Rows stand in the run itself where its head names a layer, else in `on` blocks of their own. */
function writtenRows({ scope, statement, nameValue }: Declaration): readonly WrittenRow[] {
  const { block } = statement;
  if (block === null) return [];
  const direct = block.statements.filter(({ keyword }) => ['trace', 'guard', 'return', 'gap'].includes(keyword));
  const blocks = block.statements.filter(({ keyword }) => keyword === 'on');
  const layer = nameIn(statement, 'layer');
  if (layer !== null) {
    for (const on of blocks) {
      report(scope, 'syntax', on.keywordSpan, `the head of ${scope.owner.called} names its layer: a row on another layer belongs in a run without \`on\` in its head`, { related: [{ place: placeIn(scope, layer.span), message: 'the layer of all rows' }] });
      gap(scope, on.span, `a row of ${scope.owner.called}`);
      const other = nameIn(on, 'layer');
      if (other !== null) referTo(scope, other, wantedCopper);
    }
    // Its layer is used even if nothing stands on it yet.
    return [{ layer, block, statements: direct }];
  }
  if (0 < direct.length) {
    if (nameValue !== null) missing(scope, { span: headOf(statement), before: nameValue.span, what: `layer of ${scope.owner.called}`, fits: 'such as `on TOP`' });
    else gap(scope, statement.keywordSpan, `the layer of ${scope.owner.called}`);
  }
  const seen = new Map<string, Statement>();
  const rows = blocks.filter((on) => {
    const name = nameIn(on, 'layer');
    const before = name === null ? undefined : seen.get(name.name);
    if (name !== null && before === undefined) seen.set(name.name, on);
    if (before === undefined) return true;
    report(scope, 'duplicate-name', name!.span, `${shown(name!.name)} stands twice in ${scope.owner.called}: each layer has one row`, { related: [{ place: placeIn(scope, before.span), message: 'its first row' }] });
    gap(scope, on.span, `a second row on ${shown(name!.name)} in ${scope.owner.called}`);
    return false;
  });
  const loose: WrittenRow[] = direct.length === 0 ? [] : [{ layer: null, block, statements: direct }];
  return [...loose, ...rows.map((on) => ({ layer: nameIn(on, 'layer'), block: on.block ?? block, statements: on.block?.statements ?? [] }))];
}

interface ResolvedRow extends Located<CopperRow> {
  /** Null where a part of it could not be read. */
  readonly content: RunRow | null;
}

function resolveRow(scope: Scope, { layer, block, statements }: WrittenRow, { layers, nets, isFirst }: RunContext & { readonly isFirst: boolean }): ResolvedRow | null {
  const copper = layer === null ? null : copperNamed(scope, layer, layers);
  const content = rowOfRun(scope, { block, statements, nets, isFirst, layer: copper?.row ?? null });
  return copper && { ...copper, content };
}

/** A net cannot be shorter than the part of it that lies in a run. */
function checkLengths(scope: Scope, rows: readonly RunRow[], length: number): void {
  for (const conductor of rows.flatMap(({ conductors }) => conductors)) {
    if (conductor.kind !== 'trace' || conductor.net.length === null) continue;
    const { net, after, place } = conductor;
    const whole = net.length!;
    // Lengths that are equal as written may differ in the last digit.
    if ((after?.value ?? 0) + length <= whole.value * (1 + 1e-9)) continue;
    report(scope, 'bad-value', place.span, `${shown(net.name)} is shorter in all than its way to the end of ${scope.owner.called}`, { related: [{ place: whole.place, message: `the length of ${shown(net.name)}` }] });
    gap(scope, place.span, `the length of ${shown(net.name)} in ${scope.owner.called}`);
  }
}

function planesCutAway(scope: Scope, block: Block | null, layers: Layers): readonly Located<PlaneRow>[] {
  const members = distinctMembers(scope, propertiesOf(scope, block).all('without'), { role: 'plane', wanted: wantedPlane, resolve: (name, value) => planeCalled(scope, value, layers, name) });
  return members.map(({ value }) => value);
}
