/** What stands after the last part that fits. */
import { firstWords, inWords, listed } from './fits';
import { quoted } from './mistakes';
import { lose, type StatementReading } from './statementReader';
import { closest } from './words';

/** Reports the token at the cursor, where no part of the statement begins with it; says what would have fitted. */
export function tooMuch(reading: StatementReading): void {
  const { cursor, mistakes, shape } = reading;
  if (reading.lost) return;
  const fitting = reading.fitsAt === cursor.start ? reading.fits : [];
  const found = cursor.kind === 'word' ? cursor.word : '';
  const meant = closest(found, fitting.flatMap(firstWords));
  const span = cursor.span;
  const before = reading.values.at(-1);
  if (meant !== null) {
    mistakes.report('syntax', span, `${quoted(found)}? ${meant}`, [{ title: `Write ${meant}`, span, newText: meant }]);
    reading.lost = true;
    reading.broken = true;
  } else if (cursor.isMark('{')) {
    lose(reading, 'syntax', `\`${shape.keyword}\` has no block`, span);
  } else if (before?.kind === 'name' && !before.quoted && fitting.flatMap(firstWords).includes(before.name)) {
    lose(reading, 'syntax', `a name is missing before ${quoted(before.name)}, which was read as the name`, before.span);
  } else {
    const fits = [...new Set(fitting.map(inWords))];
    const rest = 0 < fits.length ? `; fits: ${listed(fits)}` : `: \`${shape.keyword}\` is complete before it`;
    lose(reading, 'syntax', `${quoted(cursor.word)} does not fit here${rest}`, span);
  }
}
