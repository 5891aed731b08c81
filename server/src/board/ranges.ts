/** From one frequency to another: read together, since one upside down is neither. */
import type { Frequency } from '../units/quantity';
import type { Statement } from '../syntax/tree';
import { given, quantityIn, spanOf } from './given';
import type { Given } from './model';
import { gap, placeIn, report, type Scope } from './resolution';

export interface FrequencyRange {
  readonly from: Given<Frequency>;
  /** Null where one frequency was written. */
  readonly to: Given<Frequency> | null;
}

interface RangeRoles {
  readonly from: string;
  readonly to: string;
  /** `band of RX_IN` */
  readonly what: string;
  /** A band may begin at 0 Hz. */
  readonly fromZero?: boolean;
  /** A band of no width passes nothing. */
  readonly wide?: boolean;
}

export function frequencyRange(scope: Scope, statement: Statement, { from, to, what, fromZero = false, wide = false }: RangeRoles): FrequencyRange | null {
  const isRange = quantityIn(statement, to) !== null;
  const lower = given<Frequency>(scope, statement, from, { what: isRange ? `lower frequency of ${what}` : `frequency of ${what}`, sign: fromZero ? 'not-below-zero' : 'above-zero' });
  const upper = given<Frequency>(scope, statement, to, { what: `upper frequency of ${what}` });
  if (lower === null || (isRange && upper === null)) return null;
  if (upper !== null && (upper.value < lower.value || (wide && upper.value === lower.value))) {
    const span = { start: lower.place.span.start, end: upper.place.span.end };
    const text = scope.file.tree.text;
    const swapped = `${text.slice(...ends(upper.place.span))} to ${text.slice(...ends(lower.place.span))}`;
    const isPlain = quantityIn(statement, from)!.span.end === spanOf(quantityIn(statement, from)!).end;
    const corrections = upper.value < lower.value && isPlain ? [{ title: `Change to ${swapped}`, place: placeIn(scope, span), newText: swapped }] : [];
    report(scope, 'bad-value', span, upper.value < lower.value ? `${what} is upside down: its lower frequency stands first` : `${what} has no width`, { corrections });
    gap(scope, span, what);
    return null;
  }
  return { from: lower, to: upper };
}

const ends = ({ start, end }: { readonly start: number; readonly end: number }): [number, number] => [start, end];
