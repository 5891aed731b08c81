/** The unit of a quantity: which word is one, and whether it fits what is due. */
import { copperWeight, dimensionInWords, fittingUnits, unitSpelt, unitsMeantBy, type Unit } from '../units/spelling';
import { isTimesSign } from './characters';
import { plainly, quoted, type Mistakes } from './mistakes';
import { beginsNumber } from './numbers';
import type { QuantityRequest } from './quantities';
import { endOfUnit, passSpaces } from './scan';
import type { Correction, Span } from './tree';

/** The word after the number, unless that goes on with the statement; empty, at the number's end, where there is none. */
export function unitAfter(text: string, end: number, limit: number, { dimensions, follows }: QuantityRequest): Span {
  const start = passSpaces(text, end, limit);
  const stop = endOfUnit(text, start, limit);
  const word = text.slice(start, stop);
  const none = { start: end, end };
  if (unitSpelt(word) !== undefined) return { start, end: stop };
  // `#` begins a comment where a word could begin, and only there.
  if (word === '' || (end < start && word.startsWith('#'))) return none;
  if (dimensions.includes('number') && end < start && beginsNumber(text, start)) return none;
  if (end < start && (follows.has(word) || isTimesSign(word))) return none;
  const times = /^(.+?)[x\u00d7*]$|^(.+?)[x\u00d7*](?=[\d.])/.exec(word.slice(0, 16));
  const before = times === null ? undefined : (times[1] ?? times[2])!;
  if (before !== undefined && unitSpelt(before) !== undefined) return { start, end: start + before.length };
  if (end === start && isTimesSign(word[0]!) && !dimensions.includes('number')) return none;
  return { start, end: stop };
}

/** Null, and reported, where it does not fit. */
export function fittingUnit(text: string, number: Span, span: Span, request: QuantityRequest, mistakes: Mistakes): Unit | null {
  const spelling = text.slice(span.start, span.end);
  const unit = unitSpelt(spelling);
  const fitting = unit !== undefined && request.dimensions.includes(unit.dimension);
  if (fitting && (spelling !== copperWeight || request.copper)) return unit;
  reportUnit(text, number, span, request, mistakes);
  return null;
}

function reportUnit(text: string, number: Span, span: Span, { dimensions, copper }: QuantityRequest, mistakes: Mistakes): void {
  const spelling = text.slice(span.start, span.end);
  const fits = dimensions.flatMap((dimension) => [...fittingUnits(dimension), ...(copper && dimension === 'length' ? [copperWeight] : [])]);
  const list = `fits: ${fits.join(', ')}`;
  const report = (message: string, corrections: readonly Correction[] = []) => mistakes.report('unit', spelling === '' ? number : span, message, corrections);
  const unit = unitSpelt(spelling);
  if (spelling === '') report(`${plainly(text.slice(number.start, number.end))} what? ${list}`, fits.slice(0, 4).map((each) => appended(text, number, each)));
  else if (unit !== undefined && dimensions.includes(unit.dimension)) report(`${copperWeight} is a weight of copper and fits a thickness of copper only; ${list}`);
  else if (unit !== undefined) report(`${quoted(spelling)} measures ${dimensionInWords(unit.dimension)}; ${list}`);
  else {
    const meant = unitsMeantBy(spelling, dimensions);
    report(`no unit ${quoted(spelling)}; ${0 < meant.length ? `${meant.join(' or ')}?` : list}`, meant.map((each) => ({ title: `Write ${each}`, span, newText: each })));
  }
}

function appended(text: string, number: Span, unit: string): Correction {
  const newText = `${text.slice(number.start, number.end)} ${unit}`;
  return { title: `Write ${newText}`, span: number, newText };
}
