/**
 * Cursor tests: `<|>` marks the point. Each runs in LF and in CRLF, plain and with characters before the
 * point that take two bytes, or two UTF-16 units, where one is seen.
 */
import { it } from 'node:test';
import type { Place } from '../../server/src/board/model';
import { Session } from '../../server/src/service/session';

export interface AtCursor {
  readonly session: Session;
  readonly path: string;
  readonly offset: number;
  /** `path:line text[named]`: where a place is and what stands there, whatever the line ends are. */
  readonly inText: (places: readonly Place[]) => readonly string[];
  /** Counted from 1, of a line of the file counted from 0: that of the text as it was given. */
  readonly lineOf: (path: string, line: number) => number;
}

/** `files`: texts by path, one of them with the mark. */
export function atCursor(title: string, files: Readonly<Record<string, string>>, check: (at: AtCursor) => void): void {
  const before = ['', '# 5 µs, 2 Ω 🔌\n'];
  for (const ends of ['\n', '\r\n']) {
    for (const prefix of before) {
      it(`${title}${ends === '\n' ? '' : ', CRLF'}${prefix === '' ? '' : ', µ Ω 🔌 before'}`, () => {
        const texts = new Map(Object.entries(files).map(([path, text]) => [path, ((text.includes(mark) ? prefix : '') + text).replaceAll('\n', ends)]));
        const [path] = [...texts].find(([, text]) => text.includes(mark))!;
        const offset = texts.get(path)!.indexOf(mark);
        const session = new Session();
        for (const [each, text] of texts) session.setText(each, text.replace(mark, ''));
        const lineOf = (of: string, line: number) => line + 1 - (prefix !== '' && of === path ? 1 : 0);
        const inText = (places: readonly Place[]) => places.map((place) => {
          const text = session.text(place.path)!;
          return `${place.path}:${lineOf(place.path, text.slice(0, place.span.start).split('\n').length - 1)} ${text.slice(place.span.start, place.span.end)}`;
        });
        check({ session, path, offset, inText, lineOf });
      });
    }
  }
}

const mark = '<|>';
