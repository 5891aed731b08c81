/** The paths after `use`, each with the file that it leads to: only where that file is known, and so lies inside the workspace folder. */
import { usePath } from '../board/usePath';
import type { SourceTree, Span } from '../syntax/tree';
import type { Session } from './session';

export interface Link {
  /** The path, between its quotes. */
  readonly span: Span;
  readonly target: string;
  /** What is in that file: `1 stackup, 4 nets`. */
  readonly tooltip: string;
}

export function links(session: Session, path: string): readonly Link[] {
  return (session.tree(path)?.statements ?? []).filter(({ keyword }) => keyword === 'use').flatMap(({ values }) => values.flatMap((value): Link[] => {
    if (value.kind !== 'string') return [];
    const joined = usePath(path, value.text);
    const used = 'path' in joined ? session.tree(joined.path) : undefined;
    if (!('path' in joined) || used === undefined) return [];
    return [{ span: { start: value.span.start + 1, end: value.span.end - 1 }, target: joined.path, tooltip: contentsOf(used) }];
  }));
}

function contentsOf({ statements }: SourceTree): string {
  const counts = new Map<string, number>();
  for (const { keyword } of statements) if (keyword !== 'use' && keyword !== 'waive') counts.set(keyword, (counts.get(keyword) ?? 0) + 1);
  const parts = [...counts].map(([keyword, count]) => `${count} ${count === 1 ? keyword : pluralOf(keyword)}`);
  return parts.length === 0 ? 'Nothing is declared there.' : parts.join(', ');
}

const pluralOf = (keyword: string) => (keyword === 'family' ? 'families' : `${keyword}s`);
