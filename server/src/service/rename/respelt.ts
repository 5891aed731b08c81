/** A name or a range of the text with its names given anew; null where the new ones are no range. */
import { looksLikeRange, namesInRange } from '../../syntax/names';
import { writtenName } from '../../syntax/writtenName';

export function respelt(written: string, by: ReadonlyMap<string, string>): string | null {
  const old = written.startsWith('"') ? written.slice(1, -1).replaceAll('""', '"') : written;
  if (written.startsWith('"') || !looksLikeRange(written)) {
    const name = by.get(old) ?? old;
    // Quotes that nothing asks for are somebody's habit.
    return written.startsWith('"') && writtenName(old) === old ? `"${name.replaceAll('"', '""')}"` : writtenName(name);
  }
  const names = namesInRange(written);
  return typeof names === 'string' ? null : rangeOf(names.map((name) => by.get(name) ?? name), written.includes('[['));
}

/** `D[0..2]` of D0, D1 and D2: the shortest of the ways to part the first name into what stays, a number, and what stays. */
function rangeOf(names: readonly string[], doubled: boolean): string | null {
  const first = names[0]!;
  const last = names.at(-1)!;
  for (const { index, 0: digits } of [...first.matchAll(/\d+/g)].reverse()) {
    for (let cut = 0; cut < digits.length; cut += 1) {
      const [prefix, suffix] = [first.slice(0, index + cut), first.slice(index + digits.length)];
      if (!last.startsWith(prefix) || !last.endsWith(suffix)) continue;
      const end = last.slice(prefix.length, last.length - suffix.length);
      for (const range of candidates({ prefix, suffix, from: digits.slice(cut), to: end }, doubled)) {
        const spelt = namesInRange(range);
        if (typeof spelt !== 'string' && spelt.length === names.length && spelt.every((name, at) => name === names[at])) return range;
      }
    }
  }
  return null;
}

/** D[0] may have been written as `D[[0..7]]`, and is then written so again. */
function candidates({ prefix, suffix, from, to }: { readonly prefix: string; readonly suffix: string; readonly from: string; readonly to: string }, doubled: boolean): readonly string[] {
  const plain = `${prefix}[${from}..${to}]${suffix}`;
  const bracketed = prefix.endsWith('[') && suffix.startsWith(']') ? [`${prefix}[${from}..${to}]${suffix}`] : [];
  return doubled ? [...bracketed, plain] : [plain, ...bracketed];
}
