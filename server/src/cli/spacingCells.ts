/** The words of a table of distances, alike in every format that is for people. */
import type { Budget } from '../budget/results';
import type { SpacingRow } from '../spacing/spacing';
import type { Found } from '../spacing/solveDistance';
import { inText } from '../units/inText';
import type { SpacingTable } from './spacing';

export function spacingHead({ gaps, lengths }: SpacingTable): readonly string[] {
  return ['from', 'to', 'widths', 'tolerated', 'room', ...gaps.map((gap) => `longest at gap ${inText(gap, 'length')}`), ...lengths.map((length) => `gap for ${inText(length, 'length')}`)];
}

export function spacingCells({ from, to, widths, budget, room, longest, smallest }: SpacingRow): readonly string[] {
  return [namesInText(from), namesInText(to), widths.map((width) => inText(width, 'length')).join(' / '), tolerated(budget), room === 0 ? 'none' : inText(room, 'voltage'), ...longest.map(foundInText), ...smallest.map(foundInText)];
}

/** Rows of one layer stand together, in the order of the stackups. */
export function byLayer({ rows }: SpacingTable): readonly { readonly layer: string; readonly rows: readonly SpacingRow[] }[] {
  const layers = new Map<SpacingRow['layer'], SpacingRow[]>();
  for (const row of rows) layers.set(row.layer, [...(layers.get(row.layer) ?? []), row]);
  return [...layers].map(([layer, its]) => ({ layer: layer.name, rows: its }));
}

const tolerated = ({ tolerates, measure }: Budget) => `${inText(tolerates, 'voltage')} ${measure}`;

/** Lengths as they were found: rounding them once more could round them to the wrong side. */
function foundInText(found: Found): string {
  if (found.kind !== 'found') return found.kind === 'unknown' ? '?' : found.kind;
  return `${Number((found.value * 1e3).toPrecision(9))} mm`;
}

/** A few of those that are alike. */
function namesInText(names: readonly string[]): string {
  const rest = names.length - 3;
  return `${names.slice(0, 3).join(', ')}${0 < rest ? ` and ${rest} more` : ''}`;
}
