/** The new names that a person typed, or why they are none. */
import { looksLikeRange, namesInRange } from '../../syntax/names';
import { parse } from '../../syntax/parse';
import { writtenName } from '../../syntax/writtenName';
import type { Refused } from '../rename';
import type { Renaming } from './renaming';

/** Quotes may be typed and need not be; between them, everything is the name. */
export function newNames({ names, shown }: Pick<Renaming, 'names' | 'shown'>, typed: string): { readonly by: ReadonlyMap<string, string> } | Refused {
  const trimmed = typed.trim();
  const quoted = 2 <= trimmed.length && trimmed.startsWith('"') && trimmed.endsWith('"');
  const name = quoted ? trimmed.slice(1, -1).replaceAll('""', '"') : trimmed;
  if (name === '') return { refused: 'A name may not be empty.' };
  if (!quoted && looksLikeRange(name)) return forRange(names, shown, name);
  if (shown !== names[0]) return { refused: `${shown} is ${names.length} names: their new ones are a range too, such as ${name}[0..${names.length - 1}].` };
  return isName(name) ? { by: new Map([[names[0]!, name]]) } : { refused: `${inOneLine(typed)} is no name: it has to stand on one line, without control characters.` };
}

function forRange(names: readonly string[], shown: string, range: string): { readonly by: ReadonlyMap<string, string> } | Refused {
  if (names.length === 1 && shown === names[0]) return { refused: `${range} is a range of names, and ${shown} is one.` };
  const all = namesInRange(range);
  if (typeof all === 'string') return { refused: `${inOneLine(range)}: ${all}.` };
  if (all.length !== names.length) return { refused: `${range} is ${all.length} names, ${shown} is ${names.length}.` };
  if (!isRange(range)) return { refused: `${inOneLine(range)} is no range: it may hold no white space and none of the characters { } ( ) , ; ".` };
  return { by: new Map(names.map((old, at) => [old, all[at]!])) };
}

/** Asked of the parser itself. */
function isName(name: string): boolean {
  return readsAs(writtenName(name), (value) => value.name === name && value.range === null) && !/[\u0000-\u001f\u007f]/.test(name);
}

function isRange(range: string): boolean {
  return readsAs(range, (value) => value.range !== null);
}

function readsAs(written: string, holds: (value: { readonly name: string; readonly range: readonly string[] | null }) => boolean): boolean {
  const { statements, errors } = parse(`net ${written} { }`);
  const [value] = statements[0]?.values ?? [];
  return errors.length === 0 && statements.length === 1 && value?.kind === 'name' && holds(value);
}

function inOneLine(text: string): string {
  const line = text.replace(/[\u0000-\u001f\u007f]+/g, ' ');
  return 60 < line.length ? `${line.slice(0, 59)}…` : line;
}
