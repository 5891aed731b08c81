/** The `board` declaration: what holds for all budgets of a project. */
import type { Decibels, FieldStrength, Length, Temperature } from '../units/quantity';
import type { Statement } from '../syntax/tree';
import type { Declaration } from './declarations';
import { given, wordIn } from './given';
import type { BoardSettings, EmissionLimit } from './model';
import { propertiesOf } from './properties';
import { frequencyRange } from './ranges';
import { placeIn, type Scope } from './resolution';

export function boardSettings(declarations: readonly Declaration[]): BoardSettings {
  let settings: BoardSettings | null = null;
  for (const declaration of declarations) {
    const read = readBoard(declaration);
    if (settings === null && !declaration.repeats) settings = read;
  }
  return settings ?? { name: null, place: null, temperature: null, headroom: null, combine: 'worst', clearance: null, emissionLimits: [] };
}

function readBoard({ scope, statement, nameValue }: Declaration): BoardSettings {
  const properties = propertiesOf(scope, statement.block);
  const temperature = properties.one('temperature');
  const headroom = properties.one('headroom');
  const combine = properties.one('combine');
  const clearance = properties.one('clearance');
  return {
    name: nameValue?.name ?? null,
    place: placeIn(scope, (nameValue ?? statement).span),
    temperature: temperature && given<Temperature>(scope, temperature, 'temperature', { what: 'temperature', sign: 'not-below-zero' }),
    headroom: headroom && given<Decibels>(scope, headroom, 'headroom', { what: 'headroom', sign: 'not-below-zero' }),
    combine: combine !== null && wordIn(combine, 'combine') === 'rss' ? 'rss' : 'worst',
    clearance: clearance && given<Length>(scope, clearance, 'clearance', { what: 'clearance', sign: 'not-below-zero' }),
    emissionLimits: properties.all('emits').flatMap((emits) => emissionLimit(scope, emits) ?? []),
  };
}

function emissionLimit(scope: Scope, statement: Statement): EmissionLimit | null {
  const field = given<FieldStrength>(scope, statement, 'field', { what: 'limit of the field' });
  const distance = given<Length>(scope, statement, 'distance', { what: 'distance of the field' });
  const range = frequencyRange(scope, statement, { from: 'from', to: 'to', what: 'the limit line' });
  if (field === null || distance === null || range === null || range.to === null) return null;
  return { field, distance, from: range.from, to: range.to, place: placeIn(scope, statement.span) };
}
