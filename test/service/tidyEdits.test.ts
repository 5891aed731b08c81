/** A fix leaves a formatted board formatted, and does what it did. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { editedText } from '../../server/src/service/editedText';
import { fixesAt } from '../../server/src/service/fixesAt';
import { Session } from '../../server/src/service/session';
import { tidyEdits } from '../../server/src/service/tidyEdits';
import { isNewline, isSpace } from '../../server/src/syntax/characters';
import { formatted } from '../../server/src/syntax/format/formatEdits';
import { parse } from '../../server/src/syntax/parse';
import { treeText } from '../syntax/treeText';
import { validText } from '../syntax/validText';

const path = 'board.quiet';
const run = 'run r on TOP for 5 mm {\n  trace A 0.2 mm  # 5 µs 🔌\n  gap   0.3 mm\n  trace B 0.2 mm\n}\n';
const withoutSpaces = (of: string) => [...of].filter((character) => !isSpace(character.charCodeAt(0)) && !isNewline(character.charCodeAt(0))).join('');

function tidied(text: string, edits: readonly { readonly at: number; readonly length: number; readonly newText: string }[]): string {
  const own = edits.map(({ at, length, newText }) => ({ path, span: { start: at, end: at + length }, newText }));
  return editedText(text, tidyEdits(own, () => parse(text)));
}

describe('edits of a fix', () => {
  for (const ends of ['\n', '\r\n']) {
    const text = run.replaceAll('\n', ends);
    const inserted = [{ at: text.indexOf('  trace B'), length: 0, newText: `  guard AGND 0.25 mm${ends}  gap 0.3 mm${ends}` }];

    it(`put a row into its columns, and the others into theirs${ends === '\n' ? '' : ', CRLF'}`, () => {
      assert.equal(tidied(text, inserted), 'run r on TOP for 5 mm {\n  trace A    0.2 mm  # 5 µs 🔌\n  gap   0.3 mm\n  guard AGND 0.25 mm\n  gap   0.3 mm\n  trace B    0.2 mm\n}\n'.replaceAll('\n', ends));
    });

    it(`leave lines that were not formatted as they are, and set those that they add${ends === '\n' ? '' : ', CRLF'}`, () => {
      const untidy = text.replace('gap   ', 'gap  ');
      const edits = [{ ...inserted[0]!, at: untidy.indexOf('  trace B') }];
      assert.equal(tidied(untidy, edits), 'run r on TOP for 5 mm {\n  trace A 0.2 mm  # 5 µs 🔌\n  gap  0.3 mm\n  guard AGND 0.25 mm\n  gap   0.3 mm\n  trace B 0.2 mm\n}\n'.replaceAll('\n', ends));
    });

    it(`take a row out of its columns, and do not touch what is far from them${ends === '\n' ? '' : ', CRLF'}`, () => {
      const two = `${text}net X {${ends}swing  3 V${ends}}${ends}${text.replace('A 0.2', 'LONG 0.2').replace('B 0.2', 'B    0.2')}`;
      const gone = two.indexOf('  trace LONG');
      assert.equal(tidied(two, [{ at: gone, length: two.indexOf(ends, gone) + ends.length - gone, newText: '' }]), `${text}net X {${ends}swing  3 V${ends}}${ends}run r on TOP for 5 mm {${ends}  gap   0.3 mm${ends}  trace B 0.2 mm${ends}}${ends}`);
    });
  }

  it('of several files, one of which is not known, each stand in their own', () => {
    const edits = [{ path: 'none.quiet', span: { start: 0, end: 0 }, newText: ' x' }, { path, span: { start: 0, end: 0 }, newText: 'net  B is F\n' }];
    assert.deepEqual(tidyEdits(edits, (of) => (of === path ? parse('net A is F\n') : undefined)), [edits[0], { ...edits[1], newText: 'net B is F\n' }]);
  });

  it('say what they said, whatever they are', () => {
    const edit = fc.record({ at: fc.nat(), length: fc.nat(12), newText: fc.constantFrom('', ' ', '\n', '  gap 3 mm\n', 'net  X { once }', '}', '# so', '0.25mm', 'LONGER_NAME') });
    fc.assert(fc.property(validText({ oddNames: true, separators: ['\n', '; ', '  # behind\n'] }), fc.array(edit, { maxLength: 4 }), (valid, wanted) => {
      const text = formatted(valid);
      let from = 0;
      const edits = wanted.map(({ at, length, newText }) => ({ start: at % (text.length + 1), length, newText })).sort((a, b) => a.start - b.start).flatMap(({ start, length, newText }) => {
        if (start < from) return [];
        from = Math.min(text.length, start + length);
        return [{ path, span: { start, end: from++ }, newText }];
      });
      const plain = editedText(text, edits);
      const after = editedText(text, tidyEdits(edits, () => parse(text)));
      assert.equal(withoutSpaces(after), withoutSpaces(plain));
      assert.equal(treeText(parse(after)), treeText(parse(plain)));
    }), { seed: 11, numRuns: Number(process.env['DOCUMENTS'] ?? 500) });
  });
});

describe('quick fixes of a formatted board', () => {
  it('leave it formatted', () => {
    const board = formatted(`stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND1 18 um }
net CLK { swing 3.3 V; rise 3 ns; source 33 ohm; load 1 Mohm, 5 pF }
net SENSE { source 200 ohm; load 10 kohm, 8 pF; tolerates 2 mV peak }
run beside on TOP for 30 mm {
trace CLK 0.15 mm
gap 0.30 mm # as placed
trace SENSE 0.15 mm
}
`);
    const session = new Session();
    session.setText(path, board);
    const fixes = fixesAt(session, path, { start: 0, end: board.length });
    assert.ok(fixes.some(({ title }) => title.startsWith('Add a guard ')), fixes.map(({ title }) => title).join('\n'));
    for (const { title, edits } of fixes) {
      const after = editedText(board, edits);
      assert.equal(after, formatted(after), title);
    }
  });
});
