/** A text of a file in Markdown: shown as it is written, whatever it holds. */
export function markdownWord(text: string): string {
  return text.replace(/[\u0000-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/g, '\ufffd').replace(/[\\`*_[\]<>|#~&!@]/g, '\\$&');
}
