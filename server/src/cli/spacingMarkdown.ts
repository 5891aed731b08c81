import { markdownWord } from '../service/markdownWord';
import type { SpacingTable } from './spacing';
import { byLayer, spacingCells, spacingHead } from './spacingCells';

/** For a review or a wiki: a table for each layer, then what it rests on. */
export function spacingMarkdown(table: SpacingTable): string {
  const head = spacingHead(table);
  const line = (cells: readonly string[]) => `| ${cells.map(markdownWord).join(' | ')} |`;
  const blocks = byLayer(table).map(({ layer, rows }) => [`## Layer ${markdownWord(layer)}`, '', line(head), `| ${head.map((_, column) => (column < 3 ? '---' : '--:')).join(' | ')} |`, ...rows.map((row) => line(spacingCells(row)))].join('\n'));
  return `${[`# Spacing of ${markdownWord(table.title)}`, ...blocks, table.notes.map((note) => `- ${markdownWord(note)}`).join('\n')].join('\n\n')}\n`;
}
