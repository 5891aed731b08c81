/** A text set in order as a whole, and which of its lines that concerns. */
import { formatEdits } from '../syntax/format/formatEdits';
import { linesOf } from '../syntax/format/lines';
import { parse } from '../syntax/parse';
import { editedText } from './editedText';

export interface FormattedText {
  readonly text: string;
  /** Lines that became others, counted from 1. */
  readonly changed: readonly number[];
  /** Lines with an error, left as they are, counted from 1. */
  readonly kept: readonly number[];
}

export function formattedText(text: string): FormattedText {
  const tree = parse(text);
  const lines = linesOf(tree);
  const edits = formatEdits(tree);
  let next = 0;
  const changed = lines.flatMap(({ end }, index) => {
    const before = next;
    while (next < edits.length && edits[next]!.span.start <= end) next += 1;
    return before < next ? [index + 1] : [];
  });
  const kept = lines.flatMap(({ kept: stays, pieces }, index) => (stays && 0 < pieces.length ? [index + 1] : []));
  return { text: editedText(text, edits.map((edit) => ({ path: '', ...edit }))), changed, kept };
}
