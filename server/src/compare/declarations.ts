/**
 * A board as its declarations, wherever they stand: the order of the text and the files that it is spread over mean nothing, so two
 * revisions are compared declaration by declaration.
 */
import type { SourceTree, Statement } from '../syntax/tree';

export interface Declaration {
  /** `net CLK`, `stackup`. */
  readonly title: string;
  readonly text: string;
  readonly tree: SourceTree;
  readonly statement: Statement;
}

/** By keyword and name. A name that is declared twice is two. */
export function declarationsOf(trees: readonly SourceTree[]): ReadonlyMap<string, Declaration> {
  const found = new Map<string, Declaration>();
  for (const tree of trees) {
    for (const statement of tree.statements) {
      if (statement.keyword === 'use' || statement.keyword === 'waive') continue;
      const { text } = tree;
      const name = statement.values.find(({ kind, role }) => kind === 'name' && role === 'name');
      const title = name === undefined ? statement.keyword : `${statement.keyword} ${text.slice(name.span.start, name.span.end)}`;
      let key = title;
      for (let count = 2; found.has(key); count += 1) key = `${title} ${count}`;
      found.set(key, { title, text: text.slice(statement.span.start, statement.span.end), tree, statement });
    }
  }
  return found;
}

/** What is written, without the white space and the comments between. */
export function wordsOf({ tree, statement: { span } }: Declaration): string {
  return wordsIn(tree, span.start, span.end);
}

export function wordsIn({ text, tokens }: SourceTree, start: number, end: number): string {
  const words = tokens.filter((token) => start <= token.start && token.end <= end && token.kind !== 'comment' && token.kind !== 'newline').map((token) => text.slice(token.start, token.end));
  return words.join(' ');
}
