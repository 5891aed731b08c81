/** What stands after the last part that fits. */
import { allInWords, firstWords } from './fits';
import { quoted } from './mistakes';
import { fail, lose, nameTakenFor, type StatementReading } from './reading';
import { closest } from './words';

/** Reports the token at the cursor, where no part of the statement begins with it; says what would have fitted. */
export function tooMuch(reading: StatementReading): void {
  const { cursor, mistakes, shape } = reading;
  if (reading.lost) return;
  const fitting = reading.fitsAt === cursor.start ? reading.fits : [];
  const found = cursor.kind === 'word' ? cursor.word : '';
  const meant = closest(found, fitting.flatMap(firstWords));
  const span = cursor.span;
  if (meant !== null) {
    mistakes.report('syntax', span, `${quoted(found)}? ${meant}`, [{ title: `Write ${meant}`, span, newText: meant }]);
    lose(reading);
  } else if (cursor.isMark('{')) {
    fail(reading, 'syntax', `\`${shape.keyword}\` has no block`, span);
  } else if (!nameTakenFor(reading, fitting.flatMap(firstWords))) {
    const rest = 0 < fitting.length ? `; fits: ${allInWords(fitting)}` : `: \`${shape.keyword}\` is complete before it`;
    fail(reading, 'syntax', `${quoted(cursor.word)} does not fit here${rest}`, span);
  }
}
