/** Nets and pairs: their own properties over those of their family, and what only the two together can get wrong. */
import type { Decibels, Voltage } from '../units/quantity';
import type { Statement } from '../syntax/tree';
import { declared, type Declaration } from './declarations';
import type { Families } from './families';
import { given, nameIn } from './given';
import type { Net, Pair } from './model';
import { propertiesOf, reportTwice } from './properties';
import { referTo, reportUnknown, wantedNet } from './references';
import { gap, gapAt, missing, report, reportAt, type Resolution, type Scope } from './resolution';
import { end, inherited, nothingStated, rmsOrPeak, signalProperties, type SignalProperties } from './signalProperties';

export function resolveNets(declarations: readonly Declaration[], families: Families): ReadonlyMap<string, Net> {
  const nets = new Map<string, Net>();
  for (const declaration of declarations) {
    const { scope, statement, names } = declaration;
    const { family, properties } = families.from(scope, statement, 'net');
    const stated = { ...nothingStated, ...checkedTogether(scope, statement, inherited(signalProperties(scope, statement.block), properties)) };
    for (const name of names) nets.set(name, { kind: 'net', ...declared(declaration, name), ...stated, family });
  }
  return nets;
}

export function resolvePairs(declarations: readonly Declaration[], families: Families, nets: ReadonlyMap<string, Net>): ReadonlyMap<string, Pair> {
  const pairs = new Map<string, Pair>();
  for (const declaration of declarations) {
    const { scope, statement, names } = declaration;
    const own = propertiesOf(scope, statement.block);
    const { family, properties } = families.from(scope, statement, 'pair');
    const stated = { ...nothingStated, ...checkedTogether(scope, statement, inherited(signalProperties(scope, statement.block, own), properties)) };
    const [plus, minus] = (['plus', 'minus'] as const).map((side) => netOfPair(declaration, own.one(side), side, nets));
    if (plus !== null && plus === minus) {
      report(scope, 'bad-value', own.one('minus')!.span, `${plus.name} cannot be both nets of ${scope.owner.called}`);
      gap(scope, own.one('minus')!.span, `the nets of ${scope.owner.called}`);
    }
    const [across, rejects] = [own.one('across'), own.one('rejects')];
    for (const name of names) {
      pairs.set(name, {
        kind: 'pair', ...declared(declaration, name), ...stated, family, plus, minus: plus === minus ? null : minus,
        across: across && end(scope, across),
        commonTolerates: commonTolerance(scope, own.all('common')),
        rejects: rejects && given<Decibels>(scope, rejects, 'rejects', { what: `rejection of ${scope.owner.called}`, sign: 'not-below-zero' }),
      });
    }
  }
  return pairs;
}

/** Groups are declared by the nets that switch with them; only now are all known. */
export function checkSampledGroups({ sampledGroups, names }: Resolution): void {
  for (const { scope, value } of sampledGroups) {
    if (names.find('group', value.name) !== undefined) {
      names.useOrDeclare('group', value.name, { path: scope.file.path, span: value.span });
      continue;
    }
    gap(scope, value.span, `the group that ${scope.owner.called} samples after`);
    if (!scope.resolution.blames('group', value.name)) continue;
    reportUnknown(scope, value, { name: value.name, inWords: 'net switches with', meant: scope.resolution.closest(value.name, names.namesOf('group', ['group'])) });
  }
}

function netOfPair({ scope, statement, nameValue }: Declaration, property: Statement | null, side: 'plus' | 'minus', nets: ReadonlyMap<string, Net>): Net | null {
  if (property === null) {
    if (nameValue !== null) missing(scope, { span: statement.span, before: nameValue.span, what: `${side} of ${scope.owner.called}`, fits: `one of its two nets, such as \`${side} ${nameValue.name}_${side === 'plus' ? 'P' : 'N'}\`` });
    return null;
  }
  const value = nameIn(property, 'net');
  const name = value === null ? null : (referTo(scope, value, wantedNet)?.[0] ?? null);
  return name === null ? null : (nets.get(name) ?? null);
}

function commonTolerance(scope: Scope, statements: readonly Statement[]): Pair['commonTolerates'] {
  const [first, ...more] = statements;
  if (first === undefined) return null;
  for (const second of more) reportTwice(scope, first, second, 'common tolerates');
  const voltage = given<Voltage>(scope, first, 'tolerates', { what: `tolerance of the mean of ${scope.owner.called}` });
  const measure = rmsOrPeak(first);
  return voltage && measure && { voltage, measure };
}

/** Properties that cannot stand together, whichever of them a family states. Returns those that can. */
function checkedTogether(scope: Scope, statement: Statement, stated: SignalProperties): SignalProperties {
  const { toleratesRms, band, noise, contact, swing, rise, fall, repeats } = stated;
  const spoilt: { -readonly [Key in keyof SignalProperties]: SignalProperties[Key] } = {};
  if (toleratesRms != null && band === undefined) {
    gapAt(scope, toleratesRms.place, `the band of ${scope.owner.called}`);
    if (scope.unreadable.errorsIn(statement.span).length === 0) reportAt(scope, 'missing-value', toleratesRms.place, 'a tolerance in rms needs the band that it is measured in: such as `band 10 kHz to 4 MHz`');
  }
  const flicker = noise?.corner != null && 0 < noise.corner.value ? 'noise with a corner' : contact != null ? 'contact noise' : null;
  if (flicker !== null && band?.from.value === 0) {
    gapAt(scope, band.from.place, `the band of ${scope.owner.called}`);
    reportAt(scope, 'bad-value', band.from.place, `${flicker} has no end towards 0 Hz: the band has to begin above it`);
    spoilt.band = null;
  }
  // A ramp lasts longer than its part from 10 % to 90 %.
  if (repeats != null && swing != null && rise != null && 1 / repeats.frequency.value < (rise.value + (fall ?? rise).value) / 0.8) {
    gapAt(scope, repeats.frequency.place, `the repetition of ${scope.owner.called}`);
    reportAt(scope, 'bad-value', repeats.frequency.place, 'a cycle is too short for one rise and one fall from 0 to 100 %');
    spoilt.repeats = null;
  }
  return { ...stated, ...spoilt };
}
