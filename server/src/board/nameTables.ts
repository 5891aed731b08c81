/** What each name of a project declares, and where it is referred to. */
import type { NameRecord, NameSet, Place } from './model';

interface GrowingRecord {
  readonly set: NameSet;
  readonly name: string;
  readonly kind: NameRecord['kind'];
  readonly declarations: Place[];
  readonly uses: Place[];
  readonly waivers: Place[];
}

export class NameTables {
  private readonly sets = new Map<NameSet, Map<string, GrowingRecord>>();

  find(set: NameSet, name: string): GrowingRecord | undefined {
    return this.sets.get(set)?.get(name);
  }

  /** Every name of these kinds that is declared. */
  *namesOf(set: NameSet, kinds: readonly NameRecord['kind'][]): Iterable<string> {
    for (const record of this.sets.get(set)?.values() ?? []) if (kinds.includes(record.kind)) yield record.name;
  }

  /** The first declaration of this name in its set, which stands; null where this is the first. `place` is null for what is built in. */
  declare(set: NameSet, kind: NameRecord['kind'], name: string, place: Place | null): Place | null {
    const record = this.find(set, name) ?? this.add({ set, kind, name, declarations: [], uses: [], waivers: [] });
    const first = record.declarations[0] ?? null;
    if (place !== null) record.declarations.push(place);
    return first;
  }

  use(set: NameSet, name: string, place: Place): void {
    this.find(set, name)?.uses.push(place);
  }

  /** Groups, guards and returns of a row are declared by being named. */
  useOrDeclare(set: 'group' | 'conductor', name: string, place: Place): void {
    (this.find(set, name) ?? this.add({ set, kind: set, name, declarations: [], uses: [], waivers: [] })).uses.push(place);
  }

  /** A waiver's subject may be of any kind; false where nothing has this name. */
  waive(name: string, place: Place | null): boolean {
    let found = false;
    for (const [set, records] of this.sets) {
      const record = set === 'group' || set === 'conductor' ? undefined : records.get(name);
      if (record === undefined || (record.kind === 'family' && record.declarations.length === 0)) continue;
      if (place !== null) record.waivers.push(place);
      found = true;
    }
    return found;
  }

  /** Names that a waiver may stand on. */
  *waivable(): Iterable<string> {
    for (const [set, records] of this.sets) if (set !== 'group' && set !== 'conductor') for (const record of records.values()) if (0 < record.declarations.length) yield record.name;
  }

  frozen(isInUnreadable: (name: string) => boolean): ReadonlyMap<NameSet, ReadonlyMap<string, NameRecord>> {
    return new Map([...this.sets].map(([set, records]) => [set, new Map([...records].map(([name, record]) => [name, { ...record, inUnreadable: isInUnreadable(name) }]))]));
  }

  private add(record: GrowingRecord): GrowingRecord {
    let records = this.sets.get(record.set);
    if (records === undefined) this.sets.set(record.set, (records = new Map()));
    records.set(record.name, record);
    return record;
  }
}
