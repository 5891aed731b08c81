/**
 * A length in the unit that its file uses: a fix for `12 mil` speaks mils, and rounds to what a person
 * would draw on that grid.
 */
import type { Place } from '../board/model';
import { metres, type Length } from '../units/quantity';
import { unitSpelt } from '../units/spelling';
import type { Edit } from './fix';

export interface WrittenLength {
  /** The step to round to, m. */
  readonly grid: number;
  /** Outward: up where more distance is wanted, down where less length is. */
  rounded(value: number, outward: 'up' | 'down'): Length;
  /** `0.92 mm`, with the decimals and the space of the original. */
  inFile(value: Length): string;
  /** `4 mm`: for another value of the same unit, without decimals that it does not need. */
  inUnit(value: Length): string;
}

/** Steps no coarser than half a mil for a cross-section, and ten times that for the length of a run. */
const steps = { section: 0.0127e-3, run: 0.127e-3 } as const;

export function writtenLength(written: string, kind: keyof typeof steps): WrittenLength | null {
  const [, number, rest] = /^([+-]?[\d.]+(?:[eE][+-]?\d+)?)(\s*\D.*)$/su.exec(written) ?? [];
  const unit = rest === undefined ? undefined : unitSpelt(rest.trim());
  if (number === undefined || unit?.dimension !== 'length') return null;
  const size = unit.inSi({ digits: '1', exponent: 0 });
  const { step, decimals } = roundStep(steps[kind] / size);
  const shown = Math.max(decimals, 0);
  const least = Math.min(decimalsOf(number), shown);
  return {
    grid: step * size,
    rounded: (value, outward) => {
      // A value that is on the grid but for its last bits stays where it is.
      const count = value / size / step;
      const whole = outward === 'up' ? Math.ceil(count - 1e-6) : Math.floor(count + 1e-6);
      // As the file will be read, to the last bit: what a search has solved is then found again.
      return metres(unit.inSi({ digits: (whole * step).toFixed(shown), exponent: 0 }));
    },
    inFile: (value) => `${plain(value / size, shown, least)}${rest}`,
    inUnit: (value) => `${plain(value / size, shown, 0)}${rest}`,
  };
}

export function replacement({ path, span }: Place, newText: string): Edit {
  return { path, span, newText };
}

/** The largest of 1, 2, 5 times a power of ten that is not over the limit. */
function roundStep(limit: number): { step: number; decimals: number } {
  const power = Math.floor(Math.log10(limit) + 1e-9);
  const digit = [5, 2, 1].find((candidate) => candidate * 10 ** power <= limit * (1 + 1e-9)) ?? 1;
  return { step: Number(`${digit}e${power}`), decimals: -power };
}

function plain(value: number, most: number, least: number): string {
  const text = value.toFixed(most);
  const [whole, decimals = ''] = text.split('.');
  const kept = decimals.replace(/0+$/, '').padEnd(least, '0');
  return kept === '' ? whole! : `${whole}.${kept}`;
}

function decimalsOf(number: string): number {
  return number.split(/[eE]/)[0]!.split('.')[1]?.length ?? 0;
}
