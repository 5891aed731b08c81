/**
 * Families: properties that several nets share, built-in ones among them, each with what it `is` applied.
 *
 * Chains of `is` are followed without recursion, since a text may chain as many families as it likes.
 */
import type { Statement } from '../syntax/tree';
import { builtInFamilies, type BuiltInFamily } from './builtInFamilies';
import { declared, type Declaration } from './declarations';
import { nameIn } from './given';
import type { Family, Place } from './model';
import { referTo, shown, wantedFamily } from './references';
import { gap, placeIn, report, type Resolution, type Scope } from './resolution';
import { inherited, signalProperties, type SignalProperties } from './signalProperties';

export interface Families {
  readonly families: ReadonlyMap<string, Family>;
  /** What a net or pair takes from the family that its head names; nothing where that is unknown. */
  from(scope: Scope, statement: Statement, member: 'net' | 'pair'): { readonly family: string | null; readonly properties: SignalProperties };
}

interface Applied {
  readonly properties: SignalProperties;
  /** The built-in family at the end of the chain. */
  readonly standard: BuiltInFamily | null;
}

interface OwnFamily {
  readonly declaration: Declaration;
  readonly is: { readonly name: string; readonly place: Place } | null;
  readonly own: SignalProperties;
}

/** Enters the built-in families that no own one replaces; own ones have been entered before. */
export function enterBuiltInFamilies({ names }: Resolution): void {
  for (const { name } of builtInFamilies) if (names.find('family', name) === undefined) names.declare('family', 'family', name, null);
}

export function resolveFamilies(declarations: readonly Declaration[]): Families {
  const own = new Map<string, OwnFamily>();
  for (const declaration of declarations) {
    const read = readFamily(declaration);
    for (const name of declaration.names) own.set(name, read);
  }
  const applied = new Map<string, Applied>();
  for (const name of own.keys()) followChain(name, own, applied);
  const families = new Map<string, Family>();
  for (const { name } of builtInFamilies) if (!own.has(name)) families.set(name, { name, builtIn: true, is: null, place: nowhere, whole: nowhere, documentation: null });
  for (const [name, { declaration, is }] of own) families.set(name, { ...declared(declaration, name), builtIn: false, is: is?.name ?? null });
  return {
    families,
    from(scope, statement, member) {
      const value = nameIn(statement, 'family');
      const name = value === null ? null : (referTo(scope, value, wantedFamily)?.[0] ?? null);
      if (value === null || name === null) return { family: null, properties: {} };
      const family = applied.get(name) ?? standardFamily(name, placeIn(scope, value.span));
      if (family.standard !== null && family.standard.of !== member) {
        report(scope, 'bad-value', value.span, `${shown(name)} has the levels of a ${family.standard.of}; ${scope.owner.called} is a ${member}`);
        gap(scope, value.span, `the family of ${scope.owner.called}`);
        return { family: name, properties: {} };
      }
      return { family: name, properties: family.properties };
    },
  };
}

function readFamily(declaration: Declaration): OwnFamily {
  const { scope, statement } = declaration;
  const value = nameIn(statement, 'family');
  const name = value === null ? null : (referTo(scope, value, wantedFamily)?.[0] ?? null);
  return { declaration, is: value === null || name === null ? null : { name, place: placeIn(scope, value.span) }, own: signalProperties(scope, statement.block) };
}

/** Applies what each family of a chain `is`, from the far end, and cuts a chain that comes back to itself. */
function followChain(first: string, own: ReadonlyMap<string, OwnFamily>, applied: Map<string, Applied>): void {
  const chain: string[] = [];
  const onChain = new Set<string>();
  let base: Applied = { properties: {}, standard: null };
  for (let next: string | null = first; next !== null && own.has(next); ) {
    const finished = applied.get(next);
    if (finished !== undefined) base = finished;
    if (finished !== undefined) break;
    chain.push(next);
    onChain.add(next);
    const family: OwnFamily = own.get(next)!;
    const { is } = family;
    if (is !== null && onChain.has(is.name)) {
      reportCycle(family, chain.slice(chain.indexOf(is.name)), own);
      break;
    }
    if (is !== null && !own.has(is.name)) base = standardFamily(is.name, is.place);
    next = is?.name ?? null;
  }
  for (const name of chain.reverse()) {
    base = { ...base, properties: inherited(own.get(name)!.own, base.properties) };
    applied.set(name, base);
  }
}

/** What a built-in family states is placed where it is named. */
function standardFamily(name: string, place: Place): Applied {
  const standard = builtInFamilies.find((family) => family.name === name) ?? null;
  return { properties: standard?.properties(place) ?? {}, standard };
}

function reportCycle({ declaration, is }: OwnFamily, round: readonly string[], own: ReadonlyMap<string, OwnFamily>): void {
  const { resolution } = declaration.scope;
  const shownRound = round.length <= 6 ? round : [...round.slice(0, 5), round[round.length - 1]];
  const by = shownRound.length === 1 ? '' : `, by way of ${shownRound.slice(1).map(shown).join(', ')}`;
  const related = round.slice(0, 6).flatMap((name) => { const step = own.get(name)?.is; return step == null || step.place === is!.place ? [] : [{ place: step.place, message: `${shown(name)} is ${shown(step.name)}` }]; });
  resolution.report({ rule: 'bad-value', place: is!.place, message: `family ${shown(round[0])} is itself${by}`, related, corrections: [] });
  resolution.gaps.push({ owner: declaration.scope.owner, what: `what family ${shown(round[0])} is`, place: is!.place });
}

const nowhere: Place = { path: '', span: { start: 0, end: 0 } };
