import type { Comparison } from '../compare/compare';
import { addedInText, causesOf, marginsOf, nameOf, totalsOf, verdictOf } from '../service/comparison/comparisonCells';
import type { Title } from '../service/comparison/comparisonMarkdown';
import type { Paint } from './paint';
import { printable, printableWord } from './printable';

/** For a terminal: what changed, then each budget that moved, with what moved it. */
export function comparisonText({ changes, moved, unmoved }: Comparison, { before, after }: Title, paint: Paint): string {
  const width = (of: (move: Comparison['moved'][number]) => string) => Math.max(0, ...moved.map((move) => [...of(move)].length));
  const widths = [nameOf, totalsOf, marginsOf].map(width);
  const budgets = moved.flatMap((move) => {
    const cells = [nameOf, totalsOf, marginsOf].map((of, at) => printableWord(of(move)).padEnd(widths[at]));
    const verdict = verdictOf(move);
    return [`  ${[...cells, move.isWorseThanAllowed ? paint.error(verdict) : verdict].join('  ').trimEnd()}`, ...causesOf(move).map(({ added, words }) => paint.faint(`    ${addedInText(added).padStart(10)}  ${printable(words)}`))];
  });
  const blocks = [
    paint.strong(`${printableWord(before)} → ${printableWord(after)}`),
    changes.length === 0 ? 'Nothing that is declared has changed.' : [`${changes.length === 1 ? 'One declaration has' : `${changes.length} declarations have`} changed:`, ...changes.map(({ title, words }) => `  ${printable(title)}: ${printable(words)}`)].join('\n'),
    moved.length === 0 ? 'No margin has moved.' : ['Margins that moved, the worst first:', ...budgets].join('\n'),
    ...(unmoved === 0 || moved.length === 0 ? [] : [`${unmoved === 1 ? 'One other has' : `${unmoved} others have`} not moved.`]),
  ];
  return `${blocks.join('\n\n')}\n`;
}
