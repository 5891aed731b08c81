/** Colour for a terminal. It only repeats what the words say: without it nothing is lost. */
export interface Paint {
  readonly error: (text: string) => string;
  readonly warning: (text: string) => string;
  readonly information: (text: string) => string;
  readonly faint: (text: string) => string;
  readonly strong: (text: string) => string;
}

export function paintFor(coloured: boolean): Paint {
  const code = (start: number, end: number) => (text: string) => (coloured ? `\u001b[${start}m${text}\u001b[${end}m` : text);
  return { error: code(31, 39), warning: code(33, 39), information: code(36, 39), faint: code(2, 22), strong: code(1, 22) };
}
