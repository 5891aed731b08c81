/** A text with edits made in it; edits are given in the offsets of the text as it was, and do not overlap. */
import type { Edit } from './fix';

export function edited(text: string, edits: readonly Edit[]): string {
  const inOrder = [...edits].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
  let result = '';
  let at = 0;
  for (const { span, newText } of inOrder) {
    result += text.slice(at, span.start) + newText;
    at = span.end;
  }
  return result + text.slice(at);
}
