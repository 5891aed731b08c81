/** Declarations to be filled in: legal text once they are, and offered only where a declaration may begin. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { completions } from '../../server/src/service/completions';
import { declarationSnippets } from '../../server/src/service/declarationSnippets';
import { Session } from '../../server/src/service/session';
import { keywordsOf } from '../../server/src/syntax/fits';
import { formatted } from '../../server/src/syntax/format/formatEdits';
import { parse } from '../../server/src/syntax/parse';

describe('snippets', () => {
  it('are there for each declaration', () => {
    for (const keyword of keywordsOf('file')) assert.ok(declarationSnippets.some(({ prefix, body }) => prefix === keyword && body.startsWith(`${keyword} `)), keyword);
  });

  for (const { prefix, body } of declarationSnippets) {
    it(`${prefix} is read without a mistake, and is formatted, once its places are filled`, () => {
      const { errors, statements } = parse(filled(body));
      assert.deepEqual(errors, []);
      assert.equal(statements.length, 1);
      assert.equal(filled(body), formatted(filled(body)));
    });
  }

  const offered = (marked: string) => {
    const session = new Session();
    session.setText('a.quiet', marked.replace('<|>', ''));
    return completions(session, 'a.quiet', marked.indexOf('<|>')).filter(({ snippet }) => snippet).map(({ label, newText }) => ({ label, newText }));
  };
  const all = declarationSnippets.map(({ prefix, body }) => ({ label: prefix, newText: body }));

  it('are offered where a declaration may begin', () => {
    for (const text of ['<|>', 'n<|>', 'net A { once }\n<|>', 'net A { once } <|>\n', '# a comment\nru<|>']) assert.deepEqual(offered(text), all, text);
  });

  it('are offered nowhere else', () => {
    for (const text of ['run r on TOP for 1 mm {\n  <|>\n}', 'run r on TOP for 1 mm {\n  tra<|>\n}', 'run r on TOP for 1 mm { trace <|> }', 'run r for 1 mm { on TOP {\n re<|>\n} }', 'net A {\n  li<|>\n}', 'stackup { <|> }', 'net <|>', '# ne<|>', 'use "ne<|>"', 'net A { swing 3 V <|> }', 'loop l { <|>']) {
      assert.deepEqual(offered(text), [], text);
    }
  });

  it('say what they will be', () => {
    const session = new Session();
    session.setText('a.quiet', '');
    const link = completions(session, 'a.quiet', 0).find(({ label, snippet }) => snippet && label === 'link')!;
    assert.equal(link.documentation, '```quietrun\nlink name { between A and B; capacitance 0.8 pF }\n```');
  });
});

/** Each place with what stands in it; a choice with its first. */
function filled(body: string): string {
  return body.replace(/\$\{\d+:([^}]*)\}/g, '$1').replace(/\$\{\d+\|([^,|]*)[^}]*\|\}/g, '$1').replace(/\$\d+/g, '');
}
