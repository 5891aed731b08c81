/** Resolves boards written in tests, and says what was found in a form that reads beside the text. */
import assert from 'node:assert/strict';
import type { Place, Project } from '../../server/src/board/model';
import { resolveProject } from '../../server/src/board/project';
import type { SourceAnswer } from '../../server/src/board/sources';
import { parse } from '../../server/src/syntax/parse';

export type Files = Readonly<Record<string, string | SourceAnswer>>;

export const root = 'board.quiet';

export function resolved(text: string, others: Files = {}): Project {
  const files = new Map<string, string | SourceAnswer>([[root, text], ...Object.entries(others)]);
  return resolveProject(root, {
    read: (path) => {
      const file = files.get(path);
      return file === undefined ? { problem: 'missing' } : typeof file === 'string' ? { tree: parse(file) } : file;
    },
  });
}

/** `rule [underlined]: message`, in the order of the text. */
export function found(text: string, others: Files = {}): readonly string[] {
  const textOf = ({ path, span }: Place) => {
    const file = path === root ? text : others[path];
    return typeof file === 'string' ? file.slice(span.start, span.end) : '';
  };
  const errors = [...resolved(text, others).errors].sort((a, b) => a.place.path.localeCompare(b.place.path) || a.place.span.start - b.place.span.start);
  return errors.map(({ rule, place, message }) => `${rule} [${textOf(place)}]: ${message}`);
}

/** Each mistake in a text gives exactly these findings; none of a board without a mistake. */
export function check(text: string, ...expected: readonly string[]): void {
  assert.deepEqual(found(text), expected);
}

export const layers = `stackup {
  mask    25 um er 3.4
  copper  TOP 35 um
  prepreg 0.2 mm er 4.2
  plane   GND1 18 um
  core    1.1 mm er 4.4
  plane   PWR 18 um
  prepreg 0.2 mm er 4.2
  copper  BOTTOM 35 um
}
`;

export const nets = `net A { swing 3.3 V; rise 2 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm; tolerates 20 mV peak }
`;
