/** What is declared otherwise than before, in the words of the file: `rise 2 ns → 0.8 ns`. */
import type { Statement } from '../syntax/tree';
import { wordsIn, wordsOf, type Declaration } from './declarations';

export interface Change {
  /** `net CLK`. */
  readonly title: string;
  readonly before: Declaration | null;
  readonly after: Declaration | null;
  /** `rise 2 ns → 0.8 ns`, `new`, `gone`; several parted by semicolons. */
  readonly words: string;
}

export function changesBetween(before: ReadonlyMap<string, Declaration>, after: ReadonlyMap<string, Declaration>): readonly Change[] {
  const titles = new Set([...before.keys(), ...after.keys()]);
  return [...titles].flatMap((key) => {
    const [old, now] = [before.get(key) ?? null, after.get(key) ?? null];
    if (old !== null && now !== null && wordsOf(old) === wordsOf(now)) return [];
    return [{ title: (now ?? old)!.title, before: old, after: now, words: old === null ? 'new' : now === null ? 'gone' : difference(old, now) }];
  });
}

/** More are counted. */
const partsShown = 4;

function difference(before: Declaration, after: Declaration): string {
  const [heads, rows] = [[before, after].map(headOf), partsBetween(before, after)];
  const parts = [...(heads[0] === heads[1] ? [] : [`${heads[0] || 'nothing'} → ${heads[1] || 'nothing'}`]), ...rows];
  const rest = parts.length - partsShown;
  return parts.length === 0 ? 'in another order' : `${parts.slice(0, partsShown).join('; ')}${0 < rest ? `; and ${rest} more` : ''}`;
}

/** What stands after the name: `on TOP for 28 mm`. */
function headOf({ tree, statement: { keywordSpan, span, values, block } }: Declaration): string {
  const name = values.find(({ role }) => role === 'name');
  return wordsIn(tree, name?.span.end ?? keywordSpan.end, block?.span.start ?? span.end);
}

/** Rows that only one side has, those of one keyword set against each other in their order. */
function partsBetween(before: Declaration, after: Declaration): readonly string[] {
  const [old, now] = [rowsOf(before), rowsOf(after)].map((rows, side, both) => rows.filter(({ words }, at) => countOf(both[1 - side], words) < countOf(rows.slice(0, at + 1), words)));
  const gone = [...old];
  const parts = now.map(({ keyword, words }) => {
    const at = gone.findIndex((row) => row.keyword === keyword);
    if (at < 0) return `new ${words}`;
    const [was] = gone.splice(at, 1);
    return changed(was.words, words);
  });
  return [...parts, ...gone.map(({ words }) => `no ${words}`)];
}

interface Row {
  readonly keyword: string;
  readonly words: string;
}

const countOf = (rows: readonly Row[], words: string) => rows.filter((row) => row.words === words).length;

function rowsOf({ tree, statement }: Declaration): readonly Row[] {
  const within = ({ block }: Statement): readonly Row[] => (block?.statements ?? []).flatMap((row) => [{ keyword: row.keyword, words: wordsIn(tree, row.span.start, row.block?.span.start ?? row.span.end) }, ...within(row)]);
  return within(statement);
}

/** What both begin with is said once. */
function changed(before: string, after: string): string {
  const [old, now] = [before.split(' '), after.split(' ')];
  let same = 0;
  while (same < old.length - 1 && same < now.length - 1 && old[same] === now[same]) same += 1;
  // A number without its unit is no quantity: what ends alike stays with it.
  return `${before} → ${now.slice(Math.min(same, 1)).join(' ')}`;
}
