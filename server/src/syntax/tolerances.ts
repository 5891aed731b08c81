/** Tolerances: `± 10 %` of the value, or a quantity of its kind; symmetric and below 100 %. */
import type { Dimension } from '../units/dimension';
import { fittingUnits, inPowerOfTen, unitSpelt, type Unit } from '../units/spelling';
import { quoted, type Mistakes } from './mistakes';
import { readNumber } from './numbers';
import { endOfUnit, passSpaces, plusMinusAt } from './scan';

interface TolerancedValue {
  readonly dimension: Dimension;
  readonly toleranced: boolean;
  readonly value: number;
  readonly unit: Unit | null;
  readonly follows: ReadonlySet<string>;
}

export interface ToleranceReading {
  /** Half the width of the band, SI; null where it could not be read, which is reported. */
  readonly half: number | null;
  readonly end: number;
}

/** Where a plus-minus stands after `from`; null where none does. */
export function toleranceAfter(text: string, from: number, limit: number): number | null {
  const start = passSpaces(text, from, limit);
  return start < limit && 0 < plusMinusAt(text, start) ? start : null;
}

/** `start`: of the plus-minus. */
export function readTolerance(text: string, start: number, limit: number, of: TolerancedValue, mistakes: Mistakes): ToleranceReading {
  const mark = plusMinusAt(text, start);
  const numberStart = passSpaces(text, start + mark, limit);
  const number = readNumber(text, numberStart, limit);
  if (number === null) {
    const word = endOfUnit(text, numberStart, limit);
    const isUnit = unitSpelt(text.slice(numberStart, word)) !== undefined;
    mistakes.report('missing-value', { start, end: start + mark }, 'the tolerance is missing: a percentage such as `10 %`, or a quantity of the same kind');
    return { half: null, end: isUnit ? word : start + mark };
  }
  const unitStart = passSpaces(text, number.end, limit);
  const unitEnd = endOfUnit(text, unitStart, limit);
  const word = text.slice(unitStart, unitEnd);
  const missing = number.end < unitStart && unitSpelt(word) === undefined && (of.follows.has(word) || word.startsWith('#'));
  const spelling = missing ? '' : word;
  const end = spelling === '' ? number.end : unitEnd;
  const span = { start, end };
  const report = (rule: 'syntax' | 'bad-value', message: string): ToleranceReading => {
    mistakes.report(rule, span, message);
    return { half: null, end };
  };
  if (number.flaw !== null) return report('syntax', `${quoted(text.slice(number.start, number.end))}: ${number.flaw.message}`);
  if (!of.toleranced || of.unit?.toleranced === false) return report('syntax', 'this quantity takes no tolerance');
  if (/^[+-]/.test(number.number!.digits)) return report('syntax', 'a tolerance is symmetric and stated without a sign: `± 10 %`');
  const half = spelling === '%' ? Math.abs(of.value) * inPowerOfTen(number.number!, -2) : sameKind(number.number!, spelling, of);
  if (half === null) {
    const fits = ['%', ...fittingUnits(of.dimension).filter((unit) => unitSpelt(unit)!.toleranced)].join(', ');
    const written = { start: number.start, end: number.end };
    const percent = `${text.slice(number.start, number.end)} %`;
    if (spelling === '') mistakes.report('unit', written, `${text.slice(number.start, number.end)} what? fits: ${fits}`, [{ title: `Write ${percent}`, span: written, newText: percent }]);
    else mistakes.report('unit', { start: unitStart, end: unitEnd }, `${quoted(spelling)} does not fit the tolerance; fits: ${fits}`);
    return { half, end };
  }
  const whole = spelling === '%' ? 1 <= inPowerOfTen(number.number!, -2) : Math.abs(of.value) <= half;
  return whole ? report('bad-value', 'a tolerance stays below 100 %') : { half: Number.isNaN(half) ? null : half, end };
}

function sameKind(number: { readonly digits: string; readonly exponent: number }, spelling: string, of: TolerancedValue): number | null {
  if (of.dimension === 'number') return spelling === '' ? inPowerOfTen(number, 0) : null;
  const unit = unitSpelt(spelling);
  return unit !== undefined && unit.dimension === of.dimension && unit.toleranced ? unit.inSi(number) : null;
}
