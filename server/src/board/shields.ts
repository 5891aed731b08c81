/** Shields: what lies under them, what they are made of, their longest opening. */
import type { Length } from '../units/quantity';
import { declared, type Declaration } from './declarations';
import { given, wordIn } from './given';
import { distinctMembers } from './members';
import type { Loop, Net, Pair, Shield } from './model';
import { propertiesOf, reportContradiction } from './properties';
import { wantedSubject } from './references';
import { gap, missing } from './resolution';

interface ShieldContext {
  readonly nets: ReadonlyMap<string, Net>;
  readonly pairs: ReadonlyMap<string, Pair>;
  readonly loops: readonly Loop[];
}

export function resolveShields(declarations: readonly Declaration[], { nets, pairs, loops }: ShieldContext): readonly Shield[] {
  const loopsByName = new Map(loops.map((loop) => [loop.name, loop]));
  return declarations.flatMap((declaration) => resolveShield(declaration, (name) => nets.get(name) ?? pairs.get(name) ?? loopsByName.get(name)) ?? []);
}

function resolveShield(declaration: Declaration, subjectNamed: (name: string) => Net | Pair | Loop | undefined): Shield | null {
  const { scope, statement, nameValue, names } = declaration;
  const properties = propertiesOf(scope, statement.block);
  const covers = distinctMembers(scope, properties.all('covers'), {
    role: 'subject', wanted: wantedSubject,
    resolve: (name, value) => {
      const subject = subjectNamed(name);
      // A loop that is declared and could not be read.
      if (subject === undefined) gap(scope, value.span, `loop ${name} under ${scope.owner.called}`);
      return subject;
    },
  });
  const [sheet, slot, grounded, floating] = ['sheet', 'slot', 'grounded', 'floating'].map((keyword) => properties.one(keyword));
  const thickness = sheet && given<Length>(scope, sheet, 'thickness', { what: `thickness of ${scope.owner.called}` });
  const material = sheet && wordIn(sheet, 'material');
  const opening = slot && given<Length>(scope, slot, 'slot', { what: `slot of ${scope.owner.called}` });
  if (nameValue === null) return null;
  const lacking = { span: statement.span, before: nameValue.span };
  if (slot === null) missing(scope, { ...lacking, what: `slot of ${scope.owner.called}`, fits: 'its longest opening, such as `slot 6 mm`' });
  if (grounded === null && floating === null) missing(scope, { ...lacking, what: `grounding of ${scope.owner.called}`, fits: '`grounded` or `floating`' });
  if (grounded !== null && floating !== null) reportContradiction(scope, grounded, floating);
  if (names.length === 0) return null;
  return {
    ...declared(declaration, nameValue.name),
    covers: covers.map(({ value, place }) => ({ subject: value, place })),
    sheet: material !== null && thickness !== null ? { material, thickness } : null,
    slot: opening,
    grounded: (grounded === null) === (floating === null) ? null : grounded !== null,
  };
}
