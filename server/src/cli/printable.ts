/**
 * Text of a file as a terminal may see it: a name may hold anything but a line end, so what would steer
 * the terminal or turn the direction of the line is shown, not sent.
 */
export function printable(text: string): string {
  return text.replace(/[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/g, '\ufffd');
}
