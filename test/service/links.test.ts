/** Links from the path of a `use` to its file. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { links } from '../../server/src/service/links';
import { Session } from '../../server/src/service/session';

function found(text: string, files: Readonly<Record<string, string>>): readonly string[] {
  const session = new Session();
  session.setText('a/board.quiet', text);
  for (const [path, content] of Object.entries(files)) session.setText(path, content);
  return links(session, 'a/board.quiet').map(({ span, target, tooltip }) => `${text.slice(span.start, span.end)} > ${target}: ${tooltip}`);
}

describe('links', () => {
  it('lead to each used file, and say what is in it', () => {
    const files = { 'a/parts.quiet': 'family f { once }\nfamily g { once }\nnet A is f\nuse "more.quiet"\n', 'common/layers.quiet': 'stackup { copper TOP 35 um }\n', 'a/empty.quiet': '# nothing\n' };
    assert.deepEqual(found('use "parts.quiet"\r\nuse "../common/layers.quiet" # µ 🔌\r\nuse "empty.quiet"', files), [
      'parts.quiet > a/parts.quiet: 2 families, 1 net', '../common/layers.quiet > common/layers.quiet: 1 stackup', 'empty.quiet > a/empty.quiet: Nothing is declared there.',
    ]);
  });
  it('lead nowhere that is no known file', () => {
    assert.deepEqual(found('use "nobody.quiet"\nuse ""\nuse "/a/board.quiet"\nuse "a\\b.quiet"\nuse parts\nuse "https://example.org/x.quiet"\nnet A { once }\n', { 'parts.quiet': '' }), []);
  });
});
