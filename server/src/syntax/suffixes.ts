/** Words after a value that stand in any order, each at most once: `reversed`, `after 12 mm`. */
import { firstWords, inWords } from './fits';
import type { Part } from './grammar';
import { quoted } from './mistakes';
import { begins, decline, lose, nameTakenFor, readParts, type StatementReading } from './statementReader';
import { tooMuch } from './statementEnd';

export function readSuffixes(reading: StatementReading, part: Part & { readonly is: 'suffixes' }): void {
  const { cursor, mistakes } = reading;
  const seen = new Set<readonly Part[]>();
  for (;;) {
    const suffix = part.of.find(([first]) => begins(reading, first!));
    if (suffix === undefined) {
      for (const each of part.of) if (!seen.has(each)) decline(reading, each[0]!);
      if (!resume(reading, part, seen)) break;
      continue;
    }
    if (seen.has(suffix)) {
      mistakes.report('syntax', cursor.span, `${quoted(cursor.word)} stands here twice`);
      reading.broken = true;
      const { values } = reading;
      // The first one counts; the second is read so that what follows it is.
      const before = values.length;
      readParts(reading, suffix);
      values.length = before;
      continue;
    }
    seen.add(suffix);
    readParts(reading, suffix);
  }
  const needed = part.of.find(([first]) => part.needs !== null && firstWords(first!).includes(part.needs));
  if (needed === undefined || seen.has(needed) || nameTakenFor(reading, firstWords(part))) return;
  lose(reading, 'missing-value', `${needed[1]!.is === 'quantity' ? needed[1]!.role : 'something'} is missing: ${needed.map(inWords).join(' and ')}`);
}

/** Something stands between two suffixes: it is reported, and reading goes on at the next one of this line. */
function resume(reading: StatementReading, part: Part & { readonly is: 'suffixes' }, seen: ReadonlySet<readonly Part[]>): boolean {
  const { cursor } = reading;
  if (cursor.atEnd || cursor.isMark('{')) return false;
  const wanted = new Set(part.of.filter((each) => !seen.has(each)).flatMap(([first]) => firstWords(first!)));
  const ahead = cursor.copy();
  while (!ahead.atEnd && !ahead.isMark('{') && !(ahead.kind === 'word' && wanted.has(ahead.word))) ahead.next();
  if (ahead.atEnd || ahead.isMark('{')) return false;
  tooMuch(reading);
  while (cursor.start < ahead.start) cursor.next();
  return true;
}

