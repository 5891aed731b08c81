/** What stands before each piece of a line where no column says otherwise: one space, or none beside the marks that take none. */
import type { Line } from './lines';

/** One for each piece but the first. */
export function plainGaps(text: string, { pieces }: Line): readonly string[] {
  return pieces.slice(1).map(({ start, kind }, index) => {
    const before = pieces[index]!;
    const mark = kind === 'punctuation' ? text[start]! : '';
    const markBefore = before.kind === 'punctuation' ? text[before.start]! : '';
    return mark === ';' || mark === ',' || mark === ')' || markBefore === '(' ? '' : ' ';
  });
}

/** In code points, as a person counts the characters of a column. */
export function widthOf(text: string): number {
  let width = 0;
  for (const _ of text) width += 1;
  return width;
}
