/** Links: measured coupling between two nets. */
import type { Capacitance, Inductance } from '../units/quantity';
import { declared, type Declaration } from './declarations';
import { given, nameIn } from './given';
import type { Link, Net } from './model';
import { propertiesOf } from './properties';
import { referTo, shown, wantedNet } from './references';
import { gap, missing, report } from './resolution';

export function resolveLinks(declarations: readonly Declaration[], nets: ReadonlyMap<string, Net>): readonly Link[] {
  return declarations.flatMap((declaration) => resolveLink(declaration, nets) ?? []);
}

function resolveLink(declaration: Declaration, nets: ReadonlyMap<string, Net>): Link | null {
  const { scope, statement, nameValue, names } = declaration;
  const properties = propertiesOf(scope, statement.block);
  const [between, capacitive, inductive] = [properties.one('between'), properties.one('capacitance'), properties.one('mutual')];
  const [from, to] = (['from', 'to'] as const).map((role) => {
    const value = between && nameIn(between, role);
    const name = value && referTo(scope, value, wantedNet)?.[0];
    return name == null ? null : (nets.get(name) ?? null);
  });
  const capacitance = capacitive && given<Capacitance>(scope, capacitive, 'capacitance', { what: `capacitance of ${scope.owner.called}`, sign: 'not-below-zero' });
  const mutual = inductive && given<Inductance>(scope, inductive, 'mutual', { what: `mutual inductance of ${scope.owner.called}`, sign: 'any' });
  if (nameValue === null) return null;
  const lacking = { span: statement.span, before: nameValue.span };
  if (between === null) missing(scope, { ...lacking, what: `between of ${scope.owner.called}`, fits: 'two nets, such as `between A and B`' });
  else if (capacitive === null && inductive === null) missing(scope, { ...lacking, what: `coupling of ${scope.owner.called}`, fits: 'such as `capacitance 0.8 pF` or `mutual 3 nH`' });
  if (from !== null && from === to) {
    report(scope, 'bad-value', between!.span, `${scope.owner.called} couples ${shown(from.name)} with itself`);
    gap(scope, between!.span, `what ${scope.owner.called} couples`);
  }
  const isWhole = (capacitance !== null || capacitive === null) && (mutual !== null || inductive === null) && (capacitance !== null || mutual !== null);
  if (names.length === 0 || from === null || to === null || from === to || !isWhole) return null;
  return { ...declared(declaration, nameValue.name), from, to, capacitance, mutual };
}
