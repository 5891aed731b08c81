/**
 * Text of a file as a terminal may see it: a name may hold anything but a line end, so what would steer
 * the terminal or turn the direction of the line is shown, not sent.
 */
export function printable(text: string): string {
  return text.replace(/[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/g, '\ufffd');
}

/** The same for what has to stay on its line: the name of a file may hold a line end. */
export function printableWord(text: string): string {
  return printable(text).replace(/[\t\n]/g, '\ufffd');
}

/** `1 line`, `2 lines`. */
export function counted(count: number, what: string): string {
  return `${count} ${what}${count === 1 ? '' : 's'}`;
}
