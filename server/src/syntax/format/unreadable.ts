/** Lines with an error: what is meant by them is not known for certain, so they stay as they are. */
import type { SourceTree, Span, Statement } from '../tree';

/** In the order of the text; two of them may overlap. */
export function unreadable({ errors, unread, statements }: SourceTree): readonly Span[] {
  return [...errors.map(({ span }) => span), ...unread, ...brokenHeads(statements)].sort((a, b) => a.start - b.start);
}

/** Of two mistakes that lead to each other only one is reported; a statement that lacks something is broken all the same. */
function brokenHeads(statements: readonly Statement[]): readonly Span[] {
  return statements.flatMap(({ broken, span, block }) => [
    ...(broken ? [{ start: span.start, end: block === null ? span.end : block.span.start }] : []),
    ...(block === null ? [] : brokenHeads(block.statements)),
  ]);
}
