/** Shared returns: pieces of conductor in series, the currents through them, and who measures against their far end. */
import type { Inductance, Length, Resistance } from '../units/quantity';
import type { QuantityValue, Statement } from '../syntax/tree';
import { declared, type Declaration } from './declarations';
import { given, nameIn, quantityIn, valuesSpan } from './given';
import { copperNamed, planeNamed, type Located } from './layers';
import { distinctMembers } from './members';
import type { ReturnPiece, SharedReturn } from './model';
import { propertiesOf } from './properties';
import { wantedNet, wantedSignal } from './references';
import { missing, placeIn, report, type Scope } from './resolution';
import type { LoopContext } from './loops';
import type { Layers } from './stackups';
import { withinOneStackup } from './withinOneStackup';

export function resolveReturns(declarations: readonly Declaration[], context: LoopContext): readonly SharedReturn[] {
  return declarations.flatMap((declaration) => resolveReturn(declaration, context) ?? []);
}

function resolveReturn(declaration: Declaration, { layers, nets, pairs }: LoopContext): SharedReturn | null {
  const { scope, statement, nameValue, names } = declaration;
  const properties = propertiesOf(scope, statement.block);
  const overName = properties.one('over') && nameIn(properties.one('over')!, 'plane');
  const over = overName && planeNamed(scope, overName, layers);
  const strips = properties.all('strip').map((strip) => stripOf(scope, strip, layers));
  const written = [...properties.all('strip'), ...properties.all('via'), ...properties.all('measured')];
  const pieces = [
    ...strips.map((strip) => strip && strip.piece),
    ...properties.all('via').map((via) => viaOf(scope, via, layers)),
    ...properties.all('measured').map((measured) => measuredOf(scope, measured)),
  ].filter((piece) => piece !== null).sort((a, b) => a.place.span.start - b.place.span.start);
  const carries = distinctMembers(scope, properties.all('carries'), { role: 'net', wanted: wantedNet, resolve: (name) => nets.get(name) });
  const refers = distinctMembers(scope, properties.all('refers'), { role: 'net', wanted: wantedSignal, resolve: (name) => nets.get(name) ?? pairs.get(name) });
  const onStrips = strips.flatMap((strip) => strip?.located ?? []);
  const isWithinOne = over === null || withinOneStackup(scope, [over, ...onStrips]);
  if (written.length === 0 && 0 < carries.length + refers.length && nameValue !== null) {
    missing(scope, { span: statement.span, before: nameValue.span, what: `piece of ${scope.owner.called}`, fits: 'such as `strip 30 mm by 1.5 mm on TOP`, `via drill 0.3 mm` or `measured 2 mohm`' });
  }
  const isWhole = pieces.length === written.length && (overName === null || over !== null) && isWithinOne;
  if (nameValue === null || names.length === 0 || !isWhole) return null;
  return { ...declared(declaration, nameValue.name), pieces, over: over?.row ?? null, carries: carries.map(({ value, place }) => ({ net: value, place })), refers: refers.map(({ value, place }) => ({ signal: value, place })) };
}

function stripOf(scope: Scope, statement: Statement, layers: Layers): { readonly piece: ReturnPiece; readonly located: Located<unknown> } | null {
  const length = given<Length>(scope, statement, 'length', { what: `length of a strip of ${scope.owner.called}` });
  const width = given<Length>(scope, statement, 'width', { what: `width of a strip of ${scope.owner.called}` });
  const name = nameIn(statement, 'layer');
  const layer = name && copperNamed(scope, name, layers);
  return length && width && layer && { piece: { form: 'strip', length, width, layer: layer.row, stackup: layer.in.stackup, place: placeIn(scope, statement.span) }, located: layer };
}

function viaOf(scope: Scope, statement: Statement, { all }: Layers): ReturnPiece | null {
  const drill = given<Length>(scope, statement, 'drill', { what: `drill of a via of ${scope.owner.called}` });
  const length = given<Length>(scope, statement, 'length', { what: `length of a via of ${scope.owner.called}` });
  const count = quantityIn(statement, 'count');
  const before = valuesSpan(statement);
  if (quantityIn(statement, 'drill') === null) missing(scope, { span: statement.span, before, what: `drill of the via in ${scope.owner.called}`, fits: 'such as `drill 0.3 mm`' });
  const hasLength = quantityIn(statement, 'length') !== null;
  const isOneBoard = all.length === 1 && !all[0].slots.includes(null);
  if (!hasLength && !isOneBoard) missing(scope, { span: statement.span, before, what: `length of the via in ${scope.owner.called}`, fits: `such as \`length 1.6 mm\`, as ${all.length === 1 ? 'the thickness of the board is not known' : `there ${all.length === 0 ? 'is no stackup' : 'are several stackups'} to take it from`}` });
  const vias = count === null ? 1 : wholeCount(scope, count);
  if (drill === null || (length === null && (hasLength || !isOneBoard)) || vias === null) return null;
  return { form: 'via', count: vias, drill, length, place: placeIn(scope, statement.span) };
}

function wholeCount(scope: Scope, count: QuantityValue): number | null {
  if (Number.isInteger(count.value) && 0 < count.value && count.value <= 1e6) return count.value;
  if (!Number.isNaN(count.value)) report(scope, 'bad-value', count.span, 'vias in parallel are counted from 1 to a million');
  return null;
}

function measuredOf(scope: Scope, statement: Statement): ReturnPiece | null {
  const resistance = given<Resistance>(scope, statement, 'resistance', { what: `resistance of ${scope.owner.called}`, sign: 'not-below-zero' });
  const inductance = given<Inductance>(scope, statement, 'inductance', { what: `inductance of ${scope.owner.called}`, sign: 'not-below-zero' });
  if (resistance === null || (inductance === null && quantityIn(statement, 'inductance') !== null)) return null;
  return { form: 'measured', resistance, inductance, place: placeIn(scope, statement.span) };
}
