import type { SpacingTable } from './spacing';
import { byLayer, spacingCells, spacingHead } from './spacingCells';

/** For a review or a wiki: a table for each layer, then what it rests on. */
export function spacingMarkdown(table: SpacingTable): string {
  const head = spacingHead(table);
  const line = (cells: readonly string[]) => `| ${cells.map(cell).join(' | ')} |`;
  const blocks = byLayer(table).map(({ layer, rows }) => [`## Layer ${cell(layer)}`, '', line(head), `| ${head.map((_, column) => (column < 3 ? '---' : '--:')).join(' | ')} |`, ...rows.map((row) => line(spacingCells(row)))].join('\n'));
  return `${[`# Spacing of ${cell(table.title)}`, ...blocks, table.notes.map((note) => `- ${cell(note)}`).join('\n')].join('\n\n')}\n`;
}

/** A name is shown as it is written, whatever it holds. */
const cell = (text: string) => text.replace(/[\u0000-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/g, '\ufffd').replace(/[\\`*_[\]<>|#~&!]/g, '\\$&');
