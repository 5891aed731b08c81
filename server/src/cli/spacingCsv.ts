import type { Found } from '../spacing/solveDistance';
import type { SpacingRow } from '../spacing/spacing';
import type { SpacingTable } from './spacing';

/** For a sheet or a script (RFC 4180): one line for each number, in SI; what it rests on is said by the other formats. */
export function spacingCsv({ rows, gaps, lengths }: SpacingTable): string {
  const head = ['layer', 'from', 'to', 'from width m', 'to width m', 'tolerated V', 'measure', 'room V', 'wanted', 'gap m', 'length m', 'found'];
  const lines = rows.flatMap((row) => [
    ...row.longest.map((found, at) => lineOf(row, 'longest run', { gap: gaps[at], length: found })),
    ...row.smallest.map((found, at) => lineOf(row, 'smallest gap', { gap: found, length: lengths[at] })),
  ]);
  return [head, ...lines].map((cells) => `${cells.map(cell).join(',')}\r\n`).join('');
}

function lineOf({ layer, from, to, widths, budget, room }: SpacingRow, wanted: string, { gap, length }: { readonly gap: number | Found; readonly length: number | Found }): readonly (string | number)[] {
  const found = typeof gap === 'object' ? gap : (length as Found);
  const number = (value: number | Found) => (typeof value === 'number' ? value : value.kind === 'found' ? value.value : '');
  return [layer.name, from.join(' '), to.join(' '), ...widths, budget.tolerates, budget.measure, room, wanted, number(gap), number(length), found.kind === 'found' ? 'yes' : found.kind];
}

/** What begins like a formula would be one to a sheet: a name is text. */
function cell(value: string | number): string {
  if (typeof value === 'number') return String(value);
  const text = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
