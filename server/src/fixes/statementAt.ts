/** The innermost statement of a file in which a place lies. */
import { parse } from '../syntax/parse';
import type { Span, Statement } from '../syntax/tree';

export function statementAt(text: string, span: Span): Statement | null {
  return innermost(parse(text).statements, span);
}

function innermost(statements: readonly Statement[], span: Span): Statement | null {
  const around = statements.find((statement) => statement.span.start <= span.start && span.end <= statement.span.end);
  return around === undefined ? null : (innermost(around.block?.statements ?? [], span) ?? around);
}
