import type { Comparison } from '../../compare/compare';
import { markdownWord } from '../markdownWord';
import { addedInText, causesOf, marginsOf, nameOf, totalsOf, verdictOf } from './comparisonCells';

export interface Title {
  readonly before: string;
  readonly after: string;
}

/** For the comment on a merge request. */
export function comparisonMarkdown({ changes, moved, unmoved }: Comparison, { before, after }: Title): string {
  const rows = moved.map((move) => {
    const causes = causesOf(move).map(({ added, words }) => `${addedInText(added)} ${markdownWord(words)}`);
    return `| ${[markdownWord(nameOf(move)), totalsOf(move), marginsOf(move), move.isWorseThanAllowed ? `**${verdictOf(move)}**` : verdictOf(move), causes.join('<br>')].join(' | ')} |`;
  });
  const blocks = [
    `### Noise margins: ${markdownWord(before)} → ${markdownWord(after)}`,
    moved.length === 0 ? 'No margin has moved.' : ['| net | total | margin | | because of |', '| --- | --- | --- | --- | --- |', ...rows].join('\n'),
    ...(unmoved === 0 || moved.length === 0 ? [] : [`${unmoved === 1 ? 'One other has' : `${unmoved} others have`} not moved.`]),
    changes.length === 0 ? 'Nothing that is declared has changed.' : ['Changed:', ...changes.map(({ title, words }) => `- ${markdownWord(title)}: ${markdownWord(words)}`)].join('\n'),
  ];
  return `${blocks.join('\n\n')}\n`;
}
