/** Radio fields that a board has to live in. */
import type { FieldStrength, Ratio } from '../units/quantity';
import { declared, type Declaration } from './declarations';
import { given, quantityIn } from './given';
import type { Ambient } from './model';
import { propertiesOf } from './properties';
import { frequencyRange } from './ranges';
import { missing } from './resolution';

export function resolveAmbients(declarations: readonly Declaration[]): readonly Ambient[] {
  return declarations.flatMap((declaration) => resolveAmbient(declaration) ?? []);
}

function resolveAmbient(declaration: Declaration): Ambient | null {
  const { scope, statement, nameValue, names } = declaration;
  const property = propertiesOf(scope, statement.block).one('field');
  if (property === null) {
    if (nameValue !== null) missing(scope, { span: statement.span, before: nameValue.span, what: `field of ${scope.owner.called}`, fits: 'such as `field 10 V/m from 80 MHz to 1 GHz`' });
    return null;
  }
  const field = given<FieldStrength>(scope, property, 'field', { what: `field of ${scope.owner.called}`, sign: 'not-below-zero' });
  const range = frequencyRange(scope, property, { from: 'from', to: 'to', what: scope.owner.called });
  const isModulated = quantityIn(property, 'modulated') !== null;
  const modulated = given<Ratio>(scope, property, 'modulated', { what: `modulation of ${scope.owner.called}`, sign: 'not-below-zero', atMost: { value: 1, inWords: '100 %' } });
  if (nameValue === null || names.length === 0 || field === null || range === null || range.to === null || (isModulated && modulated === null)) return null;
  return { ...declared(declaration, nameValue.name), field, from: range.from, to: range.to, modulated };
}
