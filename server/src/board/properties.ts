/** The statements of a block by their first word. One that may stand once and stands twice is reported; the first holds. */
import { statementShapes } from '../syntax/statements';
import type { Block, Statement } from '../syntax/tree';
import { gap, placeIn, report, type Scope } from './resolution';

export interface Properties {
  /** The one statement of this kind. */
  one(keyword: string): Statement | null;
  all(keyword: string): readonly Statement[];
}

export function propertiesOf(scope: Scope, block: Block | null): Properties {
  const byKeyword = new Map<string, Statement[]>();
  for (const statement of block?.statements ?? []) {
    const before = byKeyword.get(statement.keyword);
    if (before === undefined) byKeyword.set(statement.keyword, [statement]);
    else if (mayRepeat(block!, statement.keyword)) before.push(statement);
    else reportTwice(scope, before[0], statement, statement.keyword);
  }
  return { one: (keyword) => byKeyword.get(keyword)?.[0] ?? null, all: (keyword) => byKeyword.get(keyword) ?? [] };
}

/** The second of two statements that say the same thing: it is not followed, and what was meant is not known. */
export function reportTwice(scope: Scope, first: Statement, second: Statement, what: string): void {
  report(scope, 'duplicate-name', second.keywordSpan, `${what} is stated twice in ${scope.owner.called}`, { related: [{ place: placeIn(scope, first.span), message: 'it is stated here first' }] });
  gap(scope, second.span, `which \`${what}\` of ${scope.owner.called} holds`);
}

/** Two statements of which one excludes the other. */
export function reportContradiction(scope: Scope, first: Statement, second: Statement): void {
  const [earlier, later] = first.span.start <= second.span.start ? [first, second] : [second, first];
  report(scope, 'duplicate-name', later.keywordSpan, `${later.keyword} contradicts ${earlier.keyword} in ${scope.owner.called}`, { related: [{ place: placeIn(scope, earlier.span), message: `${earlier.keyword} is stated here` }] });
  gap(scope, later.span, `whether ${scope.owner.called} is ${earlier.keyword} or ${later.keyword}`);
}

function mayRepeat(block: Block, keyword: string): boolean {
  return statementShapes[block.kind].find((shape) => shape.keyword === keyword)?.repeats ?? true;
}
