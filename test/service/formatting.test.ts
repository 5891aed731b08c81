/** Formatting of a file, of lines of it, and while it is typed. */
import assert from 'node:assert/strict';
import { describe } from 'node:test';
import { editedText } from '../../server/src/service/editedText';
import { formatting, rangeFormatting, typedFormatting } from '../../server/src/service/formatting';
import type { SpaceEdit } from '../../server/src/syntax/format/formatEdits';
import { atCursor, type AtCursor } from './cursor';

const untidy = 'net A {\nswing 3 V\nrise 1 ns\n}\nrun r for 1 mm { without<|>  X }\n  net  B { once }\n';

describe('formatting a file', () => {
  atCursor('sets all of it', { 'a.quiet': untidy }, (at) => {
    assert.equal(after(at, formatting(at.session, at.path)), 'net A {\n  swing 3 V\n  rise  1 ns\n}\nrun r for 1 mm { without X }\nnet B { once }\n');
  });

  atCursor('has nothing to do for a file that is not known, or in order', { 'a.quiet': '# so\n<|>' }, ({ session, path }) => {
    assert.deepEqual(formatting(session, path), []);
    assert.deepEqual(formatting(session, 'none.quiet'), []);
    assert.deepEqual(rangeFormatting(session, 'none.quiet', { start: 0, end: 3 }), []);
    assert.deepEqual(typedFormatting(session, 'none.quiet', { offset: 0, typed: '}' }), []);
  });
});

describe('formatting a range', () => {
  const first = 'net  A { once }';
  atCursor('sets the lines that it touches', { 'a.quiet': `${first}\nnet  B { once }\nnet  C { <|>once }\nnet  D { once }\n` }, (at) => {
    const start = at.session.text(at.path)!.indexOf('B {');
    assert.equal(after(at, rangeFormatting(at.session, at.path, { start, end: at.offset })), `${first}\nnet B { once }\nnet C { once }\nnet  D { once }\n`);
  });

  atCursor('does not touch a line at the beginning of which it ends', { 'a.quiet': `${first}  \nnet  B { once }  \n<|>  net  C { once }\n` }, (at) => {
    const start = at.session.text(at.path)!.indexOf('B {');
    assert.equal(after(at, rangeFormatting(at.session, at.path, { start, end: at.offset })), `${first}  \nnet B { once }\n  net  C { once }\n`);
  });

  atCursor('that is empty is its line, columns and all', { 'a.quiet': 'net A {\nswing 3 V\ntolerates 1 V peak\nrise<|> 1 ns\n}\n' }, (at) => {
    assert.equal(after(at, rangeFormatting(at.session, at.path, { start: at.offset, end: at.offset })), 'net A {\nswing 3 V\ntolerates 1 V peak\n  rise      1 ns\n}\n');
  });
});

describe('formatting after a line was ended', () => {
  const typed = (at: AtCursor) => after(at, typedFormatting(at.session, at.path, { offset: at.offset, typed: '\n' }));

  atCursor('sets that line and its columns, and leaves the one that was begun', { 'a.quiet': 'net  Z is F\n\nrun r on TOP for 5 mm {\n  trace A 0.2 mm\n  gap   0.3 mm\n  trace SENSE 0.2 mm\n  <|>\n}\n' }, (at) => {
    assert.equal(typed(at), 'net  Z is F\n\nrun r on TOP for 5 mm {\n  trace A     0.2 mm\n  gap   0.3 mm\n  trace SENSE 0.2 mm\n  \n}\n');
  });

  atCursor('keeps the columns above and below a line that was begun between them', { 'a.quiet': 'run r on TOP for 5 mm {\n  trace LONG_NAME 0.2 mm\n  gap 0.3 mm\n    <|>\n  trace A         0.2 mm\n}\n' }, (at) => {
    assert.equal(typed(at), 'run r on TOP for 5 mm {\n  trace LONG_NAME 0.2 mm\n  gap   0.3 mm\n    \n  trace A         0.2 mm\n}\n');
  });

  atCursor('sets a line that was split', { 'a.quiet': 'net A {\n  tolerates 1 V peak\n  load  5 ohm;\n<|>rise 1 ns\n}\n' }, (at) => {
    assert.equal(typed(at), 'net A {\n  tolerates 1 V peak\n  load      5 ohm;\n  rise      1 ns\n}\n');
  });

  atCursor('leaves a line that is half done', { 'a.quiet': 'run r on TOP for 5 mm {\n  trace A 0.2 mm\n  gap  0.3\n  <|>\n}\n' }, (at) => assert.equal(typed(at), at.session.text(at.path)!.replaceAll('\r\n', '\n').replace('# 5 µs, 2 Ω 🔌\n', '')));

  atCursor('does nothing on the first line', { 'a.quiet': ' <|> net  A is F' }, ({ session, path, offset }) => {
    if (offset === 1) assert.deepEqual(typedFormatting(session, path, { offset, typed: '\n' }), []);
  });
});

describe('formatting after a closing brace', () => {
  const typed = (at: AtCursor) => after(at, typedFormatting(at.session, at.path, { offset: at.offset, typed: '}' }));

  atCursor('sets what it closes', { 'a.quiet': 'net  Z is F\nrun r for 5 mm {\non TOP {\ntrace A 0.2 mm\ngap 0.3 mm\n}<|>\non  L3 { }\n}\n' }, (at) => {
    assert.equal(typed(at), 'net  Z is F\nrun r for 5 mm {\n  on TOP {\n    trace A 0.2 mm\n    gap   0.3 mm\n  }\non  L3 { }\n}\n');
  });

  atCursor('sets a whole declaration', { 'a.quiet': 'net  Z is F\nnet A {\nswing 3 V\nrise 1 ns\n  }<|>\nnet  Y is F\n' }, (at) => {
    assert.equal(typed(at), 'net  Z is F\nnet A {\n  swing 3 V\n  rise  1 ns\n}\nnet  Y is F\n');
  });

  for (const text of ['net  A { once } # }<|>\n', 'waive syntax on  A because "}<|>"\n', 'net  A { once }\n}<|>\n', '}<|>']) {
    atCursor(`does nothing where it closes nothing: ${JSON.stringify(text)}`, { 'a.quiet': text }, ({ session, path, offset }) => assert.deepEqual(typedFormatting(session, path, { offset, typed: '}' }), []));
  }
});

/** The text with the edits, in LF and without what the cursor tests put before it. */
function after({ session, path }: AtCursor, edits: readonly SpaceEdit[]): string {
  const text = session.text(path)!;
  for (const { newText, span } of edits) assert.equal(`${text.slice(span.start, span.end)}${newText}`.trim(), '');
  return editedText(text, edits.map((edit) => ({ path, ...edit }))).replaceAll('\r\n', '\n').replace('# 5 µs, 2 Ω 🔌\n', '');
}
