/** What a growing selection takes in, one step after the other. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { selectionRanges } from '../../server/src/service/selectionRanges';
import { Session } from '../../server/src/service/session';
import { atCursor } from './cursor';

function check(title: string, text: string, ...expected: readonly string[]): void {
  atCursor(title, { 'a.quiet': `${text}\n` }, ({ session, path, offset }) => {
    const whole = session.text(path)!;
    const found = selectionRanges(session, path, offset).map(({ start, end }) => whole.slice(start, end));
    assert.equal(found.at(-1), whole);
    assert.deepEqual(found.slice(0, -1), expected);
  });
}

describe('selection', () => {
  check('grows from a number', 'net A { load 1<|>0 kohm, 5 pF }', '10', '10 kohm', '10 kohm, 5 pF', 'load 10 kohm, 5 pF', '{ load 10 kohm, 5 pF }', 'net A { load 10 kohm, 5 pF }');
  check('grows from a unit', 'net A { swing 3 V; load 10 k<|>ohm }', 'kohm', '10 kohm', 'load 10 kohm', 'swing 3 V; load 10 kohm', '{ swing 3 V; load 10 kohm }', 'net A { swing 3 V; load 10 kohm }');
  check('grows from a keyword', 'net A { swi<|>ng 3 V; once }', 'swing', 'swing 3 V', 'swing 3 V; once', '{ swing 3 V; once }', 'net A { swing 3 V; once }');
  check('grows from a name', 'net A<|>B is fast { once }', 'AB', 'AB is fast', 'net AB is fast', 'net AB is fast { once }');
  check('grows from the part of a point', 'loop l on TOP { path (0 mm, 1<|> mm), (2 mm, 2 mm) }', '1', '1 mm', '(0 mm, 1 mm)', '(0 mm, 1 mm), (2 mm, 2 mm)', 'path (0 mm, 1 mm), (2 mm, 2 mm)', '{ path (0 mm, 1 mm), (2 mm, 2 mm) }', 'loop l on TOP { path (0 mm, 1 mm), (2 mm, 2 mm) }');
  check('is all of the file between declarations', 'net A { once }\n<|>\nnet B { once }');

  it('always grows, whatever the text', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom('net', ' ', 'A', '{', '}', '3', 'V', '\n', ';', '(', ')', ',', '"', '#', '🔌', 'run', 'on'), { maxLength: 30 }), fc.nat(60), (words, at) => {
      const session = new Session();
      const text = words.join('');
      session.setText('a', text);
      const found = selectionRanges(session, 'a', Math.min(at, text.length));
      assert.deepEqual(found.at(-1), { start: 0, end: text.length });
      for (let i = 1; i < found.length; i += 1) assert.ok(found[i].start <= found[i - 1].start && found[i - 1].end <= found[i].end && found[i].end - found[i].start > found[i - 1].end - found[i - 1].start);
    }), { numRuns: 300 });
  });
});
