/**
 * What a line is set from: its words, marks and strings, and of a quantity the number, the unit and the tolerance each by itself,
 * however closely they were written.
 */
import { readNumber } from '../numbers';
import { passSpaces, plusMinusAt } from '../scan';
import type { QuantityValue, SourceTree, Span, Statement, Token } from '../tree';

export interface Piece extends Span {
  readonly kind: Token['kind'];
}

/** Newlines among them; together with white space they cover the text, as the tokens do. */
export function piecesOf({ text, tokens, statements }: SourceTree): readonly Piece[] {
  const cuts = quantitiesIn(statements).flatMap((quantity) => cutsOf(text, quantity));
  let next = 0;
  return tokens.flatMap(({ kind, start, end }) => {
    const pieces: Piece[] = [];
    let from = start;
    for (; next < cuts.length && cuts[next]! < end; next += 1) {
      const cut = cuts[next]!;
      if (cut <= from) continue;
      pieces.push({ kind, start: from, end: cut });
      from = cut;
    }
    pieces.push({ kind, start: from, end });
    return pieces;
  });
}

/** In the order of the text. */
function quantitiesIn(statements: readonly Statement[]): readonly QuantityValue[] {
  return statements.flatMap(({ values, block }) => [
    ...values.flatMap((value) => (value.kind === 'quantity' ? [value] : value.kind === 'point' ? [value.x, value.y, ...(value.z === null ? [] : [value.z])] : [])),
    ...(block === null ? [] : quantitiesIn(block.statements)),
  ]);
}

/** Where its parts end, ascending. One that could not be read stays as it is. */
function cutsOf(text: string, { value, numberSpan, unitSpan, span }: QuantityValue): readonly number[] {
  if (Number.isNaN(value)) return [];
  const bare = Math.max(numberSpan.end, unitSpan.end);
  if (span.end <= bare) return [numberSpan.end, bare];
  const mark = passSpaces(text, bare, span.end);
  const number = mark + plusMinusAt(text, mark);
  const unit = readNumber(text, passSpaces(text, number, span.end), span.end)?.end ?? span.end;
  return [numberSpan.end, bare, mark, number, unit, span.end];
}
