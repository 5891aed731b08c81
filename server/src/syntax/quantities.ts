/**
 * Quantities: a number, its unit and perhaps a tolerance, read from the characters, since `0.2 mm` is two
 * words, `0.2mm±10%` one, and `3V3` is a name elsewhere. A quantity never crosses a line end, and a
 * value is made only of what is written as the language writes it.
 */
import type { Dimension } from '../units/dimension';
import { inPowerOfTen, type Unit, type WrittenNumber } from '../units/spelling';
import { codeOf } from './letterCodes';
import { quoted, type Mistakes } from './mistakes';
import { readNumber, type NumberReading } from './numbers';
import { readTolerance, toleranceAfter } from './tolerances';
import type { QuantityValue, Span } from './tree';
import { fittingUnit, unitAfter } from './unitReader';

export interface QuantityRequest {
  readonly role: string;
  /** Usually one; two where a resistance or a capacitance may stand. */
  readonly dimensions: readonly Dimension[];
  readonly toleranced: boolean;
  /** A thickness of copper, which may be stated as a weight. */
  readonly copper: boolean;
  /** Words that go on with the statement: after a number they are not taken for its unit. */
  readonly follows: ReadonlySet<string>;
}

/** Characters from `start` to the line's end at most. */
export interface Stretch {
  readonly text: string;
  readonly start: number;
  readonly limit: number;
}

export interface QuantityReading {
  /** `value` NaN where it could not be read, which is reported. */
  readonly value: QuantityValue;
  readonly end: number;
}

/** Null where no number begins at `start`. */
export function readQuantity({ text, start, limit }: Stretch, request: QuantityRequest, mistakes: Mistakes): QuantityReading | null {
  const code = codeOf(text, start, limit, request.dimensions);
  if (code !== null) return toleranced(text, limit, request, mistakes, { ...code, numberSpan: { start, end: code.end }, unitSpan: { start: code.end, end: code.end }, unit: null, spelling: '' });
  const number = readNumber(text, start, limit);
  if (number === null) return null;
  if (number.flaw !== null) reportFlaw(text, number, mistakes);
  const plain = request.dimensions.includes('number');
  const unitSpan = unitAfter(text, number.end, limit, request);
  const numberSpan = { start, end: number.end };
  const spelling = text.slice(unitSpan.start, unitSpan.end);
  const unit = plain ? null : fittingUnit(text, numberSpan, unitSpan, request, mistakes);
  if (plain && spelling !== '') mistakes.report('unit', unitSpan, `${quoted(spelling)} does not belong here: this is a plain number, without a unit`, [{ title: 'Remove the unit', span: { start: number.end, end: unitSpan.end }, newText: '' }]);
  const dimension = unit?.dimension ?? request.dimensions[0]!;
  const value = number.number === null || (plain ? spelling !== '' : unit === null) ? NaN : plain ? inPowerOfTen(number.number, 0) : unit!.inSi(number.number);
  return toleranced(text, limit, request, mistakes, { dimension, value, number: number.number, numberSpan, unitSpan, unit, spelling, end: unitSpan.end });
}

interface Bare {
  readonly dimension: Dimension;
  readonly value: number;
  readonly number: WrittenNumber | null;
  readonly numberSpan: Span;
  readonly unitSpan: Span;
  readonly unit: Unit | null;
  readonly spelling: string;
  readonly end: number;
}

function toleranced(text: string, limit: number, request: QuantityRequest, mistakes: Mistakes, bare: Bare): QuantityReading {
  const { role } = request;
  const { dimension, numberSpan, unitSpan } = bare;
  const read = Number.isNaN(bare.value) ? NaN : withinReach(bare, mistakes);
  const mark = toleranceAfter(text, bare.end, limit);
  const tolerance = mark === null ? null : readTolerance(text, mark, limit, { ...request, dimension, value: read, unit: bare.unit }, mistakes);
  const end = tolerance?.end ?? bare.end;
  // A band that cannot be read leaves the value unreadable too: a budget must not pass for want of its corners.
  const value = tolerance !== null && tolerance.half === null ? NaN : read;
  return { value: { kind: 'quantity', role, dimension, value, tolerance: tolerance?.half ?? null, unit: bare.spelling, numberSpan, unitSpan, span: { start: numberSpan.start, end } }, end };
}

/** Numbers over- and underflow silently; a length of 1e-400 m must not turn into zero. */
function withinReach(bare: Bare, mistakes: Mistakes): number {
  const vanished = bare.value === 0 && /[1-9]/.test(bare.number?.digits ?? '') && bare.unit?.dimension !== 'temperature';
  if (Number.isFinite(bare.value) && !vanished) return bare.value;
  mistakes.report('bad-value', { start: bare.numberSpan.start, end: bare.end }, `this number is too ${vanished ? 'small' : 'large'} to compute with`);
  return NaN;
}

function reportFlaw(text: string, { start, end, flaw }: NumberReading, mistakes: Mistakes): void {
  const span = { start, end };
  mistakes.report('syntax', span, `${quoted(text.slice(start, end))}: ${flaw!.message}`, flaw!.meant.map((number) => ({ title: `Write ${number}`, span, newText: number })));
}
