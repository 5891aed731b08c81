/**
 * A quantity as the model holds it: read by its role in a statement, checked for what it can be at all.
 * What could not be read, or cannot be, becomes null and a gap; what was not written becomes null alone.
 */
import { quoted } from '../syntax/mistakes';
import type { NameValue, PointValue, QuantityValue, Span, Statement, StringValue, Value, WordValue } from '../syntax/tree';
import { magnitudes, sectionMagnitude, type Magnitude } from './magnitudes';
import type { Given } from './model';
import { gap, placeIn, report, type Scope } from './resolution';

export interface Allowed {
  /** `width of A in run alley`: begins a message and goes on after "the". */
  readonly what: string;
  /** above-zero unless said otherwise. */
  readonly sign?: 'above-zero' | 'not-below-zero' | 'any';
  readonly atLeast?: { readonly value: number; readonly inWords: string };
  readonly atMost?: { readonly value: number; readonly inWords: string };
  readonly below?: { readonly value: number; readonly inWords: string };
  readonly magnitude?: Magnitude;
}

export function given<Q extends number>(scope: Scope, statement: Statement, role: string, allowed: Allowed): Given<Q> | null {
  const quantity = quantityIn(statement, role);
  return quantity === null ? null : givenOf<Q>(scope, quantity, allowed);
}

export function givenOf<Q extends number>(scope: Scope, quantity: QuantityValue, allowed: Allowed): Given<Q> | null {
  const span = spanOf(quantity);
  const fault = Number.isNaN(quantity.value) ? null : faultOf(quantity, allowed);
  if (fault !== null) report(scope, 'bad-value', span, `${allowed.what} cannot be ${quoted(scope.file.tree.text.slice(span.start, span.end)).replaceAll('`', '')}: ${fault}`);
  if (fault !== null || Number.isNaN(quantity.value)) {
    gap(scope, span, `the ${allowed.what}`);
    return null;
  }
  return { value: quantity.value as Q, tolerance: quantity.tolerance ?? 0, place: placeIn(scope, span) };
}

/** A width, gap or thickness of a cross-section. */
export const inSection = (what: string): Allowed => ({ what, magnitude: sectionMagnitude });

/** The number and its unit, without a tolerance. */
export function spanOf({ numberSpan, unitSpan }: QuantityValue): Span {
  return { start: numberSpan.start, end: Math.max(numberSpan.end, unitSpan.end) };
}

export const quantityIn = (statement: Statement, role: string) => valueIn(statement, role, 'quantity') as QuantityValue | null;
export const nameIn = (statement: Statement, role: string) => valueIn(statement, role, 'name') as NameValue | null;
export const pointIn = (statement: Statement, role: string) => valueIn(statement, role, 'point') as PointValue | null;
export const stringIn = (statement: Statement, role: string) => valueIn(statement, role, 'string') as StringValue | null;
export const wordIn = (statement: Statement, role: string) => (valueIn(statement, role, 'word') as WordValue | null)?.word ?? null;

/** From the first value to the last, or the keyword where there is none. */
export function valuesSpan({ values, keywordSpan }: Statement): Span {
  return values.length === 0 ? keywordSpan : { start: values[0].span.start, end: values[values.length - 1].span.end };
}

function valueIn(statement: Statement, role: string, kind: Value['kind']): Value | null {
  return statement.values.find((value) => value.role === role && value.kind === kind) ?? null;
}

function faultOf({ value, dimension }: QuantityValue, { sign = 'above-zero', atLeast, atMost, below, magnitude = magnitudes[dimension] }: Allowed): string | null {
  if (sign === 'above-zero' && value <= 0) return 'it has to be more than zero';
  if (sign === 'not-below-zero' && value < 0) return 'it cannot be below zero';
  if (atLeast !== undefined && value < atLeast.value) return `it has to be at least ${atLeast.inWords}`;
  if (atMost !== undefined && atMost.value < value) return `it has to be at most ${atMost.inWords}`;
  if (below !== undefined && below.value <= value) return `it has to be below ${below.inWords}`;
  const size = Math.abs(value);
  if (magnitude.most < size || (value !== 0 && size < magnitude.least)) return `${magnitude.inWords} are understood`;
  return null;
}
