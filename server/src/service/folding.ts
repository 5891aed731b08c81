/** What can be folded away: blocks, comments of several lines, and the files that are used. */
import type { SourceTree, Statement } from '../syntax/tree';
import type { Fold } from './answers';
import type { Session } from './session';

export function folds(session: Session, path: string): readonly Fold[] {
  const tree = session.tree(path);
  if (tree === undefined) return [];
  const lineOf = lines(tree.text);
  const blocks = tree.statements.flatMap((statement) => blockFolds(statement, lineOf));
  const uses = tree.statements.filter(({ keyword }) => keyword === 'use').map(({ span }) => lineOf(span.start));
  return [...blocks, ...stretches(ownLineComments(tree, lineOf), 'comment'), ...stretches(uses, 'imports')].sort((a, b) => a.startLine - b.startLine);
}

/** The line of the closing brace stays in view. */
function blockFolds({ block }: Statement, lineOf: (offset: number) => number): readonly Fold[] {
  if (block === null) return [];
  const startLine = lineOf(block.span.start);
  const endLine = lineOf(block.span.end) - (block.closed ? 1 : 0);
  const inner = block.statements.flatMap((statement) => blockFolds(statement, lineOf));
  return startLine < endLine ? [{ startLine, endLine, kind: 'block' }, ...inner] : inner;
}

/** Comments that have a line for themselves. */
function ownLineComments({ text, tokens }: SourceTree, lineOf: (offset: number) => number): readonly number[] {
  return tokens.filter(({ kind, start }) => kind === 'comment' && text.slice(text.lastIndexOf('\n', start - 1) + 1, start).trim() === '').map(({ start }) => lineOf(start));
}

/** Lines that follow one another, two or more. */
function stretches(linesOf: readonly number[], kind: Fold['kind']): readonly Fold[] {
  const found: { startLine: number; endLine: number }[] = [];
  for (const line of linesOf) {
    const last = found.at(-1);
    if (last !== undefined && line === last.endLine + 1) last.endLine = line;
    else found.push({ startLine: line, endLine: line });
  }
  return found.filter(({ startLine, endLine }) => startLine < endLine).map((each) => ({ ...each, kind }));
}

/** Line, from 0, of an offset. */
function lines(text: string): (offset: number) => number {
  const starts = [0];
  for (let at = text.indexOf('\n'); at !== -1; at = text.indexOf('\n', at + 1)) starts.push(at + 1);
  return (offset) => {
    let [low, high] = [0, starts.length - 1];
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (starts[middle] <= offset) low = middle;
      else high = middle - 1;
    }
    return low;
  };
}
