/** A text with edits made to it. Spans are those of the text before any of them. */
import type { Edit } from './answers';

export function editedText(text: string, edits: readonly Edit[]): string {
  const ordered = [...edits].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
  const parts: string[] = [];
  let from = 0;
  for (const { span, newText } of ordered) {
    if (span.start < from) throw new Error(`edits overlap at ${span.start}, where one before ends at ${from}`);
    parts.push(text.slice(from, span.start), newText);
    from = span.end;
  }
  return parts.join('') + text.slice(from);
}
