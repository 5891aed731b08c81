/** The groups of lines whose columns an edit at these places may move. */
import type { SourceTree, Span } from '../tree';
import { groupsOf } from './columns';
import { linesOf } from './lines';

export function groupsTouching(tree: SourceTree, spans: readonly Span[]): readonly Span[] {
  const groups = groupsOf(tree.text, linesOf(tree)).map((group) => ({ start: group[0]!.start, end: group.at(-1)!.end }));
  return groups.filter(({ start, end }) => spans.some((span) => span.start <= end && start <= span.end));
}
