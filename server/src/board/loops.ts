/** Loops: closed paths of current, each of one shape. A loop of which the shape or the place cannot be read is not in the model. */
import type { Angle, Area, Inductance, Length } from '../units/quantity';
import type { PointValue, Statement } from '../syntax/tree';
import { declared, type Declaration } from './declarations';
import { given, givenOf, nameIn, pointIn, quantityIn, valuesSpan, wordIn, type Allowed } from './given';
import type { Loop, LoopPoint, LoopShape, Net, Pair, PlaneRow } from './model';
import { propertiesOf, reportTwice, type Properties } from './properties';
import { wantedNet, wantedPlane, wantedSignal } from './references';
import { gap, missing, placeIn, type Scope } from './resolution';
import { copperNamed, headOf, planeCalled, planeNamed, type Located } from './layers';
import { distinctMembers } from './members';
import { signalCurrent } from './signalProperties';
import { isKnownBelow, type Layers } from './stackups';
import { withinOneStackup } from './withinOneStackup';

export interface LoopContext {
  readonly layers: Layers;
  readonly nets: ReadonlyMap<string, Net>;
  readonly pairs: ReadonlyMap<string, Pair>;
}

export function resolveLoops(declarations: readonly Declaration[], context: LoopContext): readonly Loop[] {
  return declarations.flatMap((declaration) => resolveLoop(declaration, context) ?? []);
}

function resolveLoop(declaration: Declaration, context: LoopContext): Loop | null {
  const { scope, statement, nameValue, names } = declaration;
  const { nets, pairs, layers } = context;
  const properties = propertiesOf(scope, statement.block);
  const layerName = nameIn(statement, 'layer');
  const layer = layerName === null ? null : copperNamed(scope, layerName, layers);
  const overs = distinctMembers(scope, properties.all('over'), { role: 'plane', wanted: wantedPlane, resolve: (name, value) => planeCalled(scope, value, layers, name) });
  const shape = oneShape(scope, properties, layers);
  const carries = distinctMembers(scope, properties.all('carries'), { role: 'net', wanted: wantedNet, resolve: (name) => nets.get(name) });
  const senses = distinctMembers(scope, properties.all('senses'), { role: 'net', wanted: wantedSignal, resolve: (name) => nets.get(name) ?? pairs.get(name) });
  const conductor = oneConductor(scope, properties);
  const turns = properties.all('turned').flatMap((turned) => turnOf(scope, turned) ?? []);
  const [area, inductance] = [properties.one('area'), properties.one('inductance')];
  const limits = {
    areaLimit: area && given<Area>(scope, area, 'area', { what: `largest area of ${scope.owner.called}` }),
    inductanceLimit: inductance && given<Inductance>(scope, inductance, 'inductance', { what: `largest inductance of ${scope.owner.called}` }),
  };
  const located: Located<unknown>[] = [...(layer === null ? [] : [layer]), ...overs.map(({ value }) => value), ...(shape?.above ?? [])];
  const isWithinOne = withinOneStackup(scope, located);
  if (shape === null && nameValue !== null && !shapes.some((keyword) => properties.one(keyword) !== null)) {
    missing(scope, { span: statement.span, before: nameValue.span, what: `shape of ${scope.owner.called}`, fits: 'a rectangle, circle, path or trace, such as `rectangle 22 mm by 9 mm`' });
  }
  if (nameValue === null || names.length === 0 || shape === null || !isWithinOne || (layerName !== null && layer === null)) return null;
  if (!hasItsLayer(declaration, shape.shape) || overs.length < properties.all('over').length) return null;
  if (layer !== null && !isKnownBelow(layer.in, layer.row)) {
    gap(scope, layer.span, `the height of ${scope.owner.called}`);
    return null;
  }
  return {
    ...declared(declaration, nameValue.name), layer: layer?.row ?? null, stackup: located[0]?.in.stackup ?? null,
    carries: carries.map(({ value, statement: carried, place }) => ({ net: value, current: quantityIn(carried, 'current') === null ? null : signalCurrent(scope, carried), place })),
    senses: senses.map(({ value, place }) => ({ signal: value, place })),
    shape: shape.shape, conductor, over: overs.map(({ value }) => value.row), turns, ...limits,
  };
}

const shapes = ['rectangle', 'circle', 'path', 'trace'] as const;

interface ReadShape {
  readonly shape: LoopShape;
  readonly above: readonly Located<PlaneRow>[];
}

/** One shape a loop; a second one is the same property, stated twice. */
function oneShape(scope: Scope, properties: Properties, layers: Layers): ReadShape | null {
  const written = shapes.flatMap((keyword) => properties.one(keyword) ?? []).sort((a, b) => a.span.start - b.span.start);
  const [first, ...others] = written;
  if (first === undefined) return null;
  for (const other of others) reportTwice(scope, first, other, 'shape');
  return shapeOf(scope, first, layers);
}

function shapeOf(scope: Scope, statement: Statement, layers: Layers): ReadShape | null {
  const size = (role: string, what: string) => given<Length>(scope, statement, role, { what: `${what} of ${scope.owner.called}` });
  const place = placeIn(scope, statement.span);
  const written = pointIn(statement, 'at');
  const at = written && pointOf(scope, written);
  if (written !== null && at === null) return null;
  switch (statement.keyword) {
    case 'rectangle': {
      const [width, height] = [size('width', 'width'), size('height', 'height')];
      return width && height && { shape: { form: 'rectangle', width, height, at, place }, above: [] };
    }
    case 'circle': {
      const diameter = size('diameter', 'diameter');
      return diameter && { shape: { form: 'circle', diameter, at, place }, above: [] };
    }
    case 'path': return pathOf(scope, statement);
    default: {
      const length = size('length', 'length');
      const name = nameIn(statement, 'plane');
      const above = name && planeNamed(scope, name, layers);
      return length && above && { shape: { form: 'trace', length, above: above.row, at, place }, above: [above] };
    }
  }
}

function pathOf(scope: Scope, statement: Statement): ReadShape | null {
  const written = statement.values.filter((value) => value.kind === 'point');
  const points = written.map((point) => pointOf(scope, point));
  if (written.length < 3) {
    missing(scope, { span: statement.span, before: valuesSpan(statement), what: `corner of ${scope.owner.called}`, fits: 'a path has three at least, such as `(0 mm, 0 mm) (9 mm, 0 mm) (9 mm, 5 mm)`' });
    return null;
  }
  const whole = points.filter((point) => point !== null);
  return whole.length < points.length ? null : { shape: { form: 'path', points: whole, place: placeIn(scope, statement.span) }, above: [] };
}

function pointOf(scope: Scope, { x, y, z }: PointValue): LoopPoint | null {
  const allowed: Allowed = { what: `coordinate of ${scope.owner.called}`, sign: 'any' };
  const [left, right] = [givenOf<Length>(scope, x, allowed), givenOf<Length>(scope, y, allowed)];
  const up = z && givenOf<Length>(scope, z, allowed);
  return left === null || right === null || (z !== null && up === null) ? null : { x: left, y: right, z: up };
}

function oneConductor(scope: Scope, properties: Properties): Loop['conductor'] {
  const [strip, wire] = [properties.one('strip'), properties.one('wire')];
  if (strip !== null && wire !== null) reportTwice(scope, ...(strip.span.start < wire.span.start ? ([strip, wire] as const) : ([wire, strip] as const)), 'conductor');
  const statement = wire === null || (strip !== null && strip.span.start < wire.span.start) ? strip : wire;
  if (statement === null) return null;
  const form = statement.keyword as 'strip' | 'wire';
  const width = given<Length>(scope, statement, form, { what: `${form === 'strip' ? 'width of the strip' : 'diameter of the wire'} of ${scope.owner.called}` });
  return width && { form, width };
}

function turnOf(scope: Scope, statement: Statement): Loop['turns'][number] | null {
  const angle = given<Angle>(scope, statement, 'angle', { what: `turn of ${scope.owner.called}`, sign: 'any' });
  const axis = wordIn(statement, 'axis') as 'x' | 'y' | 'z' | null;
  return angle && axis && { angle, axis };
}

/** `trace` goes out on the loop's own layer, so there has to be one. */
function hasItsLayer({ scope, statement, nameValue }: Declaration, shape: LoopShape): boolean {
  if (shape.form !== 'trace' || nameIn(statement, 'layer') !== null) return true;
  missing(scope, { span: headOf(statement), before: nameValue!.span, what: `layer of ${scope.owner.called}`, fits: 'the layer that its trace lies on, such as `on TOP`' });
  return false;
}

