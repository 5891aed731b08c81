/**
 * Markdown of names and texts that users wrote: shown as written, whatever characters they hold. Hovers are shown
 * without trust and without HTML; that no name becomes a link, a picture or a table of its own is made sure here.
 */

/**
 * A backslash stands before what has a meaning to Markdown where it stands, and before nothing else: a client that shows the source of
 * a hover shows `HYDRO_A` and `past-sense` as they are.
 */
export function escaped(text: string): string {
  return text.replace(unseen, '\ufffd').replace(always, '\\$&').replace(emphasis, '\\_').replace(address, '$1\\$2').replace(atStart, '$1\\$2');
}

/** Wherever they stand; `$(` begins an icon, `&` an entity, `|` a cell, `@` ends the first half of an address. */
const always = /[\\`*[\]{}()<>&|~!$@]/g;
/** Between letters an underscore is one (CommonMark 6.2). */
const emphasis = /(?<![\p{L}\p{N}_])_|_(?![\p{L}\p{N}_])/gu;
/** What becomes a link without being marked as one: `http://`, `www.`. */
const address = /(\w)(:\/|(?<=\bwww)\.)/gi;
/** What begins a heading, a list, a quotation or a rule; the text may come to stand at the beginning of a line. */
const atStart = /^(\s*\d*)([#+\-=.)])/;

/** Control characters, and those that turn the direction of what follows. */
const unseen = /[\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069]/g;

/** Lines stay lines. */
export function escapedLines(text: string): string {
  return text.split(/\r?\n/).map(escaped).join('  \n');
}

/** Cells are Markdown already. */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;
  return [line(head), line(head.map(() => '---')), ...rows.map(line)].join('\n');
}

/** Parts that are there, a blank line between. */
export function paragraphs(...parts: readonly (string | null | false)[]): string {
  return parts.filter((part): part is string => typeof part === 'string' && part !== '').join('\n\n');
}

/** A share as a bar that reads without colour: eight blocks are all of it. */
export function bar(share: number): string {
  const filled = Math.round(8 * Math.min(1, Math.max(0, share)));
  return `${'█'.repeat(filled)}${'░'.repeat(8 - filled)}`;
}

export function percent(share: number): string {
  const value = 100 * share;
  if (value === 0) return '0 %';
  if (value < 1) return '< 1 %';
  return `${value < 10 ? Number(value.toPrecision(2)) : value < 1000 ? Math.round(value) : Number(value.toPrecision(3))} %`;
}
