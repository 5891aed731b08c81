/** What folds, as the lines that stay in view and how many go. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { folds } from '../../server/src/service/folding';
import { Session } from '../../server/src/service/session';

const text = `# One board
# of two µ Ω 🔌
use "a.quiet"
use "b.quiet"
net A { swing 3 V
  rise 1 ns # not a line of its own
  # one line only
}
net B { once }
run r for 9 mm {
  on TOP {
    trace A 0.2 mm
  }
}
net C {
  once`;

function folded(of: string): readonly string[] {
  const session = new Session();
  session.setText('a', of);
  const lines = of.split(/\r?\n/);
  return folds(session, 'a').map(({ startLine, endLine, kind }) => `${kind}: ${lines[startLine]} … ${endLine - startLine}`);
}

const expected = ['comment: # One board … 1', 'imports: use "a.quiet" … 1', 'block: net A { swing 3 V … 2', 'block: run r for 9 mm { … 3', 'block:   on TOP { … 1', 'block: net C { … 1'];

describe('folding', () => {
  it('keeps the first line and the closing brace in view', () => assert.deepEqual(folded(text), expected));
  it('is the same with CRLF', () => assert.deepEqual(folded(text.replaceAll('\n', '\r\n')), expected));
  it('finds nothing in an unknown file, and in an empty one', () => {
    assert.deepEqual(folds(new Session(), 'none'), []);
    assert.deepEqual(folded(''), []);
  });
});
