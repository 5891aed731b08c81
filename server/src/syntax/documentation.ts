/** Documentation comments: lines that hold only `##` and text, directly above what they document. */
import type { Token } from './tree';

/** Of the statement whose first token this is; null where there is none. */
export function documentationAbove(text: string, tokens: readonly Token[], index: number): string | null {
  const lines: string[] = [];
  // A line of documentation is a comment between two newlines; anything else above ends the search.
  for (let at = index; 2 <= at; at -= 2) {
    const comment = tokens[at - 2]!;
    const above = tokens[at - 3];
    if (tokens[at - 1]!.kind !== 'newline' || comment.kind !== 'comment' || (above !== undefined && above.kind !== 'newline')) break;
    const line = /^##(?:$|\s(.*)$)/su.exec(text.slice(comment.start, comment.end));
    if (line === null) break;
    lines.push((line[1] ?? '').trimEnd());
  }
  return lines.length === 0 ? null : lines.reverse().join('\n');
}
