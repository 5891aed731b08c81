/**
 * The letter codes of IEC 60062 for resistances and capacitances, where the letter stands for the decimal
 * point and the prefix: 4R7, R47, 4k7, 10k, 2p2; and, in the same manner, 3V3 for a voltage. No `m`
 * is read, which could be milli or a slip for M, and no letter for the tolerance.
 */
import type { Dimension } from '../units/dimension';
import { inPowerOfTen, type WrittenNumber } from '../units/spelling';
import { endOfUnit } from './scan';

export interface CodeReading {
  readonly dimension: Dimension;
  readonly value: number;
  readonly number: WrittenNumber;
  readonly end: number;
}

/** Null where no code of these dimensions stands at `start`. */
export function codeOf(text: string, start: number, limit: number, dimensions: readonly Dimension[]): CodeReading | null {
  if (!dimensions.some((dimension) => letters.has(dimension))) return null;
  const end = endOfUnit(text, start, limit);
  // No resistor is marked with more: the bound keeps a word of a megabyte cheap.
  if (40 < end - start) return null;
  const parts = /^([+\u2212-]?)(\d*)([a-zA-Z\u00b5\u03bc])(\d*)$/.exec(text.slice(start, end));
  if (parts === null) return null;
  const [, sign, whole, letter, fraction] = parts as unknown as readonly [string, string, string, string, string];
  for (const dimension of dimensions) {
    const power = letters.get(dimension)?.[letter];
    if (power === undefined || !isComplete(letter, whole, fraction)) continue;
    const number = { digits: `${sign === '' || sign === '+' ? '' : '-'}${whole === '' ? '0' : whole}.${fraction === '' ? '0' : fraction}`, exponent: 0 };
    return { dimension, value: inPowerOfTen(number, power), number, end };
  }
  return null;
}

/** `4R` is a number and its unit, and so is `3V`; `V3` is neither. */
function isComplete(letter: string, whole: string, fraction: string): boolean {
  return letter === 'V' ? whole !== '' && fraction !== '' : letter === 'R' ? fraction !== '' : whole !== '' || fraction !== '';
}

const letters: ReadonlyMap<Dimension, Readonly<Record<string, number>>> = new Map<Dimension, Readonly<Record<string, number>>>([
  ['resistance', { R: 0, k: 3, K: 3, M: 6, G: 9, T: 12 }],
  ['capacitance', { p: -12, n: -9, u: -6, '\u00b5': -6, '\u03bc': -6 }],
  ['voltage', { V: 0 }],
]);
