/** From the point outwards: number, value with its unit, all values, statement, what stands in the block, block, …, file. */
import type { SourceTree, Span, Statement, Value } from '../syntax/tree';
import type { Session } from './session';

/** Each lies within the next; the first is the smallest. */
export function selectionRanges(session: Session, path: string, offset: number): readonly Span[] {
  const tree = session.tree(path);
  if (tree === undefined) return [];
  const outwards = [...around(tree, tree.statements, offset), { start: 0, end: tree.text.length }];
  return outwards.filter((span, index) => index === 0 || isLarger(span, outwards[index - 1])).map(({ start, end }) => ({ start, end }));
}

function around(tree: SourceTree, statements: readonly Statement[], offset: number): readonly Span[] {
  const statement = statements.find(({ span }) => touches(span, offset));
  if (statement === undefined) return [];
  const { values, block, keywordSpan, span } = statement;
  if (block !== null && touches(block.span, offset)) return [...around(tree, block.statements, offset), insideOf(tree, block.span, block.closed), block.span, span];
  const value = values.find((each) => touches(each.span, offset));
  const end = values[values.length - 1]?.span.end ?? keywordSpan.end;
  const beforeBlock = { start: span.start, end };
  if (touches(keywordSpan, offset)) return [keywordSpan, beforeBlock, span];
  const allValues = { start: values[0]?.span.start ?? keywordSpan.start, end };
  return [...(value === undefined ? [] : [...withinValue(value, offset), value.span]), allValues, beforeBlock, span];
}

function withinValue(value: Value, offset: number): readonly Span[] {
  if (value.kind === 'quantity') return [value.numberSpan, value.unitSpan].filter((each) => each.start < each.end && touches(each, offset)).slice(0, 1);
  if (value.kind !== 'point') return [];
  const part = [value.x, value.y, ...(value.z === null ? [] : [value.z])].find((each) => touches(each.span, offset));
  return part === undefined ? [] : [...withinValue(part, offset), part.span];
}

/** Between the braces, without the space beside them. */
function insideOf({ text }: SourceTree, { start, end }: Span, closed: boolean): Span {
  const inside = text.slice(start + 1, closed ? end - 1 : end);
  const from = start + 1 + (inside.length - inside.trimStart().length);
  return { start: from, end: Math.max(from, from + inside.trim().length) };
}

const touches = ({ start, end }: Span, offset: number) => start <= offset && offset <= end;

const isLarger = (span: Span, than: Span) => span.start <= than.start && than.end <= span.end && span.end - span.start > than.end - than.start;
