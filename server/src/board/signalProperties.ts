/**
 * What the statements of a `net`, `pair` or `family` say, each property by itself.
 *
 * A property that is not stated is absent; one that is stated and could not be read is there as null, so
 * that a family's value does not take its place unnoticed.
 */
import { volts, type Capacitance, type Current, type CurrentNoiseDensity, type Decibels, type Frequency, type Length, type Ratio, type Resistance, type Time, type Voltage, type VoltageNoiseDensity } from '../units/quantity';
import type { Block, Statement } from '../syntax/tree';
import { given, nameIn, quantityIn, valuesSpan, wordIn, type Allowed } from './given';
import type { End, Signal, SignalCurrent } from './model';
import { propertiesOf, reportContradiction, reportTwice, type Properties } from './properties';
import { frequencyRange } from './ranges';
import { placeIn, type Scope } from './resolution';

type Stated = Pick<Signal, 'swing' | 'rise' | 'fall' | 'source' | 'load' | 'sine' | 'current' | 'repeats' | 'once' | 'bothWays' | 'switchesWith' | 'working' | 'toleratesPeak' | 'toleratesRms' | 'band' | 'noise' | 'contact' | 'samples' | 'length'>;
export type SignalProperties = Partial<Stated>;
type Range = Exclude<Signal['sine'], null>;

export function signalProperties(scope: Scope, block: Block | null, properties: Properties = propertiesOf(scope, block)): SignalProperties {
  const stated: { -readonly [Key in keyof SignalProperties]: SignalProperties[Key] } = {};
  for (const [keyword, read] of readers) {
    const statement = properties.one(keyword);
    if (statement !== null) Object.assign(stated, read(scope, statement));
  }
  const [once, repeats] = [properties.one('once'), properties.one('repeats')];
  if (once !== null && repeats !== null) reportContradiction(scope, once, repeats);
  Object.assign(stated, tolerances(scope, properties.all('tolerates')));
  return stated;
}

/** A member's own properties over those of its family. */
export function inherited(own: SignalProperties, family: SignalProperties): SignalProperties {
  const merged = { ...family, ...own };
  // An edge that repeats in one and happens once in the other: the nearer statement holds.
  if (own.repeats != null) merged.once = false;
  else if (own.once === true) merged.repeats = null;
  return merged;
}

export const nothingStated: Stated = { swing: null, rise: null, fall: null, source: null, load: null, sine: null, current: null, repeats: null, once: false, bothWays: false, switchesWith: null, working: null, toleratesPeak: null, toleratesRms: null, band: null, noise: null, contact: null, samples: null, length: null };

const of = (scope: Scope, property: string, rest: Omit<Allowed, 'what'> = {}): Allowed => ({ what: `${property} of ${scope.owner.called}`, ...rest });

const readers: readonly (readonly [string, (scope: Scope, statement: Statement) => SignalProperties])[] = [
  ['swing', (scope, statement) => ({ swing: swing(scope, statement) })],
  ['rise', (scope, statement) => ({ rise: given<Time>(scope, statement, 'rise', of(scope, 'rise')) })],
  ['fall', (scope, statement) => ({ fall: given<Time>(scope, statement, 'fall', of(scope, 'fall')) })],
  ['source', (scope, statement) => ({ source: end(scope, statement) })],
  ['load', (scope, statement) => ({ load: end(scope, statement) })],
  ['sine', (scope, statement) => ({ sine: sine(scope, statement) })],
  ['current', (scope, statement) => ({ current: signalCurrent(scope, statement) })],
  ['repeats', (scope, statement) => ({ repeats: repeats(scope, statement) })],
  ['once', () => ({ once: true })],
  ['both', () => ({ bothWays: true })],
  ['switches', (scope, statement) => ({ switchesWith: group(scope, statement) })],
  ['working', (scope, statement) => ({ working: working(scope, statement) })],
  ['band', (scope, statement) => ({ band: band(scope, statement) })],
  ['noise', (scope, statement) => ({ noise: noise(scope, statement) })],
  ['contact', (scope, statement) => ({ contact: contact(scope, statement) })],
  ['samples', (scope, statement) => ({ samples: samples(scope, statement) })],
  ['length', (scope, statement) => ({ length: given<Length>(scope, statement, 'length', of(scope, 'length')) })],
];

function swing(scope: Scope, statement: Statement): Signal['swing'] {
  const first = given<Voltage>(scope, statement, 'swing', of(scope, 'swing', { sign: 'any' }));
  const isRange = quantityIn(statement, 'to') !== null;
  const second = given<Voltage>(scope, statement, 'to', of(scope, 'swing', { sign: 'any' }));
  if (first === null || (isRange && second === null)) return null;
  const levels = second === null ? [0, first.value] : [first.value, second.value];
  const [low, high] = [Math.min(...levels), Math.max(...levels)];
  const place = { path: first.place.path, span: { start: first.place.span.start, end: (second ?? first).place.span.end } };
  return { low: volts(low), high: volts(high), value: volts(high - low), tolerance: first.tolerance + (second?.tolerance ?? 0), place };
}

/** A resistance, a capacitance, or both in parallel. */
export function end(scope: Scope, statement: Statement): End | null {
  const what = statement.keyword;
  const resistance = given<Resistance>(scope, statement, 'resistance', of(scope, `${what} resistance`, { sign: 'not-below-zero' }));
  const capacitance = given<Capacitance>(scope, statement, 'capacitance', of(scope, `${what} capacitance`, { sign: 'not-below-zero' }));
  // Half an end is no end: what is left of it would be taken for the whole.
  if ((resistance === null) !== (quantityIn(statement, 'resistance') === null)) return null;
  if ((capacitance === null) !== (quantityIn(statement, 'capacitance') === null)) return null;
  return resistance === null && capacitance === null ? null : { resistance, capacitance, place: placeIn(scope, valuesSpan(statement)) };
}

function sine(scope: Scope, statement: Statement): Range | null {
  const amplitude = given<Voltage>(scope, statement, 'sine', of(scope, 'sine', { sign: 'not-below-zero' }));
  const range = frequencyRange(scope, statement, { from: 'frequency', to: 'upper', what: `the sine of ${scope.owner.called}` });
  const measure = rmsOrPeak(statement);
  return amplitude && range && measure && { amplitude, measure, ...range, place: placeIn(scope, statement.span) };
}

/** A current that a net or a loop states: a ramp, or a sine. */
export function signalCurrent(scope: Scope, statement: Statement): SignalCurrent | null {
  const amplitude = given<Current>(scope, statement, 'current', of(scope, 'current', { sign: 'not-below-zero' }));
  const place = placeIn(scope, statement.span);
  if (quantityIn(statement, 'frequency') !== null) {
    const range = frequencyRange(scope, statement, { from: 'frequency', to: 'upper', what: `the current of ${scope.owner.called}` });
    const measure = rmsOrPeak(statement);
    return amplitude && range && measure && { form: 'sine', amplitude, measure, ...range, place };
  }
  const rise = given<Time>(scope, statement, 'rise', of(scope, 'rise of the current'));
  if (amplitude === null || (rise === null && quantityIn(statement, 'rise') !== null)) return null;
  return { form: 'ramp', amplitude, rise, place };
}

function repeats(scope: Scope, statement: Statement): Signal['repeats'] {
  const frequency = given<Frequency>(scope, statement, 'repeats', of(scope, 'repetition'));
  const duty = given<Ratio>(scope, statement, 'duty', of(scope, 'duty', { below: { value: 1, inWords: '100 %' } }));
  if (frequency === null || (duty === null && quantityIn(statement, 'duty') !== null)) return null;
  return { frequency, duty, place: placeIn(scope, statement.span) };
}

/** The sign of a working voltage says nothing about its danger. */
function working(scope: Scope, statement: Statement): Signal['working'] {
  const voltage = given<Voltage>(scope, statement, 'working', of(scope, 'working voltage', { sign: 'any' }));
  const measure = wordIn(statement, 'measure') as 'dc' | 'rms' | 'peak' | null;
  return voltage && measure && { voltage: { ...voltage, value: volts(Math.abs(voltage.value)) }, measure, place: placeIn(scope, statement.span) };
}

/** Peak and rms are two promises; `none` takes away those of the family, and leaves those stated beside it. */
function tolerances(scope: Scope, statements: readonly Statement[]): SignalProperties {
  const stated = new Map<string, Statement>();
  let properties: SignalProperties = {};
  for (const statement of statements) {
    const measure = wordIn(statement, 'none') ?? rmsOrPeak(statement);
    const first = measure === null ? undefined : stated.get(measure);
    if (measure === null) continue;
    if (first !== undefined) {
      reportTwice(scope, first, statement, measure === 'none' ? 'tolerates none' : `tolerates … ${measure}`);
      continue;
    }
    stated.set(measure, statement);
    if (measure === 'none') properties = { toleratesPeak: null, toleratesRms: null, ...properties };
    else properties = { ...properties, [measure === 'rms' ? 'toleratesRms' : 'toleratesPeak']: given<Voltage>(scope, statement, 'tolerates', of(scope, 'tolerance')) };
  }
  return properties;
}

function band(scope: Scope, statement: Statement): Signal['band'] {
  const range = frequencyRange(scope, statement, { from: 'from', to: 'to', what: `the band of ${scope.owner.called}`, fromZero: true, wide: true });
  return range === null || range.to === null ? null : { from: range.from, to: range.to, place: placeIn(scope, statement.span) };
}

function noise(scope: Scope, statement: Statement): Signal['noise'] {
  const voltage = given<VoltageNoiseDensity>(scope, statement, 'voltage', of(scope, 'noise', { sign: 'not-below-zero' }));
  const current = given<CurrentNoiseDensity>(scope, statement, 'current', of(scope, 'noise current', { sign: 'not-below-zero' }));
  const corner = given<Frequency>(scope, statement, 'corner', of(scope, 'corner of the noise', { sign: 'not-below-zero' }));
  const isWhole = (current !== null) === (quantityIn(statement, 'current') !== null) && (corner !== null) === (quantityIn(statement, 'corner') !== null);
  return voltage === null || !isWhole ? null : { voltage, current, corner, place: placeIn(scope, statement.span) };
}

function contact(scope: Scope, statement: Statement): Signal['contact'] {
  const index = given<Decibels>(scope, statement, 'index', of(scope, 'noise index', { sign: 'any' }));
  const across = given<Voltage>(scope, statement, 'across', of(scope, 'voltage across the resistors', { sign: 'any' }));
  return index && across && { index, across: { ...across, value: volts(Math.abs(across.value)) }, place: placeIn(scope, statement.span) };
}

function samples(scope: Scope, statement: Statement): Signal['samples'] {
  const delay = given<Time>(scope, statement, 'delay', of(scope, 'delay of the sample', { sign: 'not-below-zero' }));
  const name = nameIn(statement, 'group');
  if (name !== null) scope.resolution.sampledGroups.push({ scope, value: name });
  return delay && name && { delay, group: name.name, place: placeIn(scope, statement.span) };
}

function group(scope: Scope, statement: Statement): string | null {
  const value = nameIn(statement, 'group');
  if (value !== null) scope.resolution.names.useOrDeclare('group', value.name, placeIn(scope, value.span));
  return value?.name ?? null;
}

export function rmsOrPeak(statement: Statement): 'rms' | 'peak' | null {
  return wordIn(statement, 'measure') as 'rms' | 'peak' | null;
}

