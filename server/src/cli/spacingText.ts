import { printable, printableWord } from './printable';
import type { SpacingTable } from './spacing';
import { byLayer, spacingCells, spacingHead } from './spacingCells';

/** For a terminal: a table for each layer, then what it rests on. */
export function spacingText(table: SpacingTable): string {
  const head = spacingHead(table);
  const layers = byLayer(table).map(({ layer, rows }) => ({ layer, lines: rows.map((row) => spacingCells(row).map(printableWord)) }));
  const widths = head.map((title, column) => Math.max(...wordsOf(title).map(lengthOf), ...layers.flatMap(({ lines }) => lines.map((cells) => lengthOf(cells[column])))));
  // Numbers line up at their units, on the right; names on the left.
  const line = (cells: readonly string[]) => `  ${cells.map((cell, column) => (column < names ? cell.padEnd(widths[column] + cell.length - lengthOf(cell)) : ' '.repeat(widths[column] - lengthOf(cell)) + cell)).join('  ')}`.trimEnd();
  const titles = [0, 1].map((at) => line(head.map((title) => wordsOf(title)[at])));
  const blocks = layers.map(({ layer, lines }) => [`layer ${printableWord(layer)}`, ...titles, ...lines.map(line)].join('\n'));
  const empty = blocks.length === 0 ? ['No noisy net and sensitive net to part: nothing swings, or nothing tolerates.'] : [];
  return `${[printableWord(table.title), ...blocks, ...empty, table.notes.map((note) => wrapped(printable(note))).join('\n')].join('\n\n')}\n`;
}

const names = 3;

/** `longest at gap` over `0.12 mm`. */
function wordsOf(title: string): readonly [string, string] {
  const [, words, number] = /^(.*?)\s*(\d.*)$/.exec(title) ?? [];
  return number === undefined ? ['', title] : [words, number];
}

const lengthOf = (text: string) => [...text].length;

const widest = 100;

function wrapped(note: string): string {
  const lines = [''];
  for (const word of note.split(' ')) {
    const last = lines[lines.length - 1];
    if (last !== '' && widest < last.length + 1 + word.length) lines.push(word);
    else lines[lines.length - 1] = last === '' ? word : `${last} ${word}`;
  }
  return lines.join('\n');
}
