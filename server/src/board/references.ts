/** Names where they refer to something: found, recorded as used, or reported with the name that was probably meant. */
import { plainly, quoted } from '../syntax/mistakes';
import type { NameValue } from '../syntax/tree';
import { writtenName } from '../syntax/writtenName';
import type { NameRecord, NameSet } from './model';
import { gap, placeIn, report, type Scope } from './resolution';

export interface Wanted {
  readonly set: NameSet;
  readonly kinds: readonly NameRecord['kind'][];
  /** `net`, `plane`, `net or pair`: what fits here. */
  readonly inWords: string;
}

export const wantedNet: Wanted = { set: 'signal', kinds: ['net'], inWords: 'net' };
export const wantedSignal: Wanted = { set: 'signal', kinds: ['net', 'pair'], inWords: 'net or pair' };
export const wantedSubject: Wanted = { set: 'signal', kinds: ['net', 'pair', 'loop'], inWords: 'net, pair or loop' };
export const wantedCopper: Wanted = { set: 'layer', kinds: ['copper'], inWords: 'layer' };
export const wantedPlane: Wanted = { set: 'layer', kinds: ['plane'], inWords: 'plane' };
export const wantedFamily: Wanted = { set: 'family', kinds: ['family'], inWords: 'family' };

/** The names that a value stands for, or null, with a gap, where one of them is nothing that fits. */
export function referTo(scope: Scope, value: NameValue, wanted: Wanted): readonly string[] | null {
  const { names } = scope.resolution;
  const all = value.range ?? [value.name];
  const unfit = all.filter((name) => {
    const record = names.find(wanted.set, name);
    if (record !== undefined) names.use(wanted.set, name, placeIn(scope, value.span));
    return record === undefined || !wanted.kinds.includes(record.kind);
  });
  if (unfit.length === 0) return all;
  gap(scope, value.span, `${quoted(value.name)} in ${scope.owner.called}`);
  reportUnfit(scope, value, unfit, wanted);
  return null;
}

function reportUnfit(scope: Scope, value: NameValue, unfit: readonly string[], wanted: Wanted): void {
  const { names } = scope.resolution;
  const [name] = unfit;
  const record = names.find(wanted.set, name);
  if (record !== undefined) {
    const declared = record.declarations[0];
    const related = declared === undefined ? [] : [{ place: declared, message: `${shown(name)} is declared here` }];
    report(scope, 'unknown-name', value.span, `${shown(name)} is a ${kindInWords[record.kind] ?? record.kind}; a ${wanted.inWords} fits here`, { related });
    return;
  }
  if (!unfit.some((each) => scope.resolution.blames(wanted.set, each))) return;
  if (wanted.set === 'layer' && !scope.resolution.hasStackup) {
    if (scope.resolution.isFirst('no stackup')) report(scope, 'missing-value', value.span, `a stackup is missing: ${shown(name)} is named here, and nothing says which layers there are`);
    return;
  }
  if (1 < unfit.length) {
    report(scope, 'unknown-name', value.span, `no ${wanted.inWords} ${unfit.slice(0, 4).map(shown).join(', ')}${4 < unfit.length ? ` and ${unfit.length - 4} more` : ''}`);
    return;
  }
  const meant = scope.resolution.closest(name, names.namesOf(wanted.set, wanted.kinds));
  reportUnknown(scope, value, { name, inWords: wanted.inWords, meant });
}

/** "no layer TPO; TOP?" */
export function reportUnknown(scope: Scope, value: NameValue, { name, inWords, meant }: { readonly name: string; readonly inWords: string; readonly meant: string | null }): void {
  const corrections = meant === null || value.range !== null ? [] : [{ title: `Change to ${shown(meant)}`, place: placeIn(scope, value.span), newText: writtenName(meant) }];
  report(scope, 'unknown-name', value.span, `no ${inWords} ${shown(name)}${meant === null ? '' : `; ${shown(meant)}?`}`, { corrections });
}

/** A name in a message: as it stands, but short and without what could disturb a terminal. */
export function shown(name: string): string {
  // The usual name is shown as it stands, and this is asked for every value of a board.
  return /^[\w.+\-/#]{1,40}$/.test(name) ? name : plainly(name);
}

const kindInWords: Partial<Record<NameRecord['kind'], string>> = { copper: 'copper layer' };
