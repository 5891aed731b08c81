/** What a declaration lists one by one: nets that a loop carries, planes over which it lies, things under a shield. */
import type { NameValue, Statement } from '../syntax/tree';
import { nameIn } from './given';
import type { Place } from './model';
import { referTo, shown, type Wanted } from './references';
import { gap, placeIn, report, type Scope } from './resolution';

export interface Member<Value> {
  readonly value: Value;
  readonly statement: Statement;
  readonly place: Place;
}

interface MemberReading<Value> {
  readonly role: string;
  readonly wanted: Wanted;
  readonly resolve: (name: string, value: NameValue) => Value | null | undefined;
}

/** Each member once: a net that is listed twice would be counted twice. */
export function distinctMembers<Value>(scope: Scope, statements: readonly Statement[], { role, wanted, resolve }: MemberReading<Value>): readonly Member<Value>[] {
  const seen = new Map<string, Place>();
  return statements.flatMap((statement) => {
    const value = nameIn(statement, role);
    const names = value === null ? null : referTo(scope, value, wanted);
    if (value === null || names === null) return [];
    const place = placeIn(scope, value.span);
    const twice = names.filter((name) => seen.has(name));
    if (0 < twice.length) {
      report(scope, 'duplicate-name', value.span, `${twice.slice(0, 4).map(shown).join(', ')} ${twice.length === 1 ? 'stands' : 'stand'} twice after ${statement.keyword} in ${scope.owner.called}`, { related: [{ place: seen.get(twice[0])!, message: 'first here' }] });
      gap(scope, value.span, `how often ${scope.owner.called} ${statement.keyword} ${shown(twice[0])}`);
    }
    return names.filter((name) => !seen.has(name)).flatMap((name) => {
      seen.set(name, place);
      const member = resolve(name, value);
      return member == null ? [] : [{ value: member, statement, place }];
    });
  });
}
