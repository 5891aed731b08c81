/** Offsets of a text to lines and characters, UTF-16, counted from 0. A lone CR does not end a line. */
import type { Span } from '../syntax/tree';

export interface Position {
  readonly line: number;
  readonly character: number;
}

export interface Lines {
  readonly at: (offset: number) => Position;
  /** Without its line end. */
  readonly line: (index: number) => string;
  readonly range: (span: Span) => { readonly start: Position; readonly end: Position };
}

export function linesOf(text: string): Lines {
  const starts = [0];
  for (let at = text.indexOf('\n'); 0 <= at; at = text.indexOf('\n', at + 1)) starts.push(at + 1);
  const at = (offset: number): Position => {
    const inside = Math.min(Math.max(offset, 0), text.length);
    let low = 0;
    let high = starts.length;
    while (1 < high - low) {
      const middle = (low + high) >> 1;
      if (starts[middle] <= inside) low = middle;
      else high = middle;
    }
    return { line: low, character: inside - starts[low] };
  };
  return {
    at,
    // No search for its end: a line may be a megabyte long, and is asked for once a finding.
    line: (index) => {
      const start = starts[index] ?? text.length;
      const next = starts[index + 1];
      if (next === undefined) return text.slice(start);
      return text.slice(start, start < next - 1 && text[next - 2] === '\r' ? next - 2 : next - 1);
    },
    range: ({ start, end }) => {
      const first = at(start);
      const last = at(end);
      // Never empty: where nothing is left to point at, the end of the line stands for it.
      return first.line === last.line && first.character === last.character ? { start: first, end: { line: last.line, character: last.character + 1 } } : { start: first, end: last };
    },
  };
}
