/** Quick fixes at a place, over a session of two files. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { fixesAt } from '../../server/src/service/fixesAt';
import { editedText } from '../../server/src/service/editedText';
import { Session } from '../../server/src/service/session';

const parts = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND1 18 um }
net SENSE { source 200 ohm; load 10 kohm, 8 pF; tolerates 20 mV peak }
`;
const board = `use "parts.quiet"
net CLOCK { swing 3.3 V; rise 3 ns; source 33 ohm; load 1 Mohm, 5 pF }
run beside on TOP for 30 mm {
  trace CLOCK 0.15 mm
  gap   0.30 mm  # as placed
  trace SENSE 0.15 mm
}
`;

function opened(): Session {
  const session = new Session();
  session.setText('parts.quiet', parts);
  session.setText('board.quiet', board);
  return session;
}

function at(text: string, part: string) {
  const start = text.indexOf(part);
  return { start, end: start + part.length };
}

describe('fixes at a place', () => {
  it('stand at the gap that the noise crosses', () => {
    const session = opened();
    const fixes = fixesAt(session, 'board.quiet', at(board, '0.30 mm'));
    const widen = fixes.find(({ title }) => title.startsWith('Widen the gap to '));
    assert.ok(widen?.preferred, fixes.map(({ title }) => title).join('\n'));
    assert.equal(fixes.filter(({ preferred }) => preferred).length, 1);
    session.setText('board.quiet', editedText(board, widen.edits));
    assert.deepEqual(session.findings('board.quiet').filter(({ severity }) => severity === 'error'), []);
    assert.deepEqual(session.findings('parts.quiet').filter(({ severity }) => severity === 'error'), []);
  });

  it('stand at the receiver in the file that declares it, and edit the file of the run', () => {
    const fixes = fixesAt(opened(), 'parts.quiet', at(parts, 'SENSE'));
    const widen = fixes.find(({ title }) => title.startsWith('Widen the gap to '));
    assert.deepEqual(widen?.edits.map(({ path }) => path), ['board.quiet']);
    assert.equal(widen?.rule, 'over-budget');
  });

  it('are those of a caret without width, too', () => {
    const { start } = at(board, '0.30 mm');
    assert.ok(0 < fixesAt(opened(), 'board.quiet', { start: start + 2, end: start + 2 }).length);
  });

  it('are none where nothing is wrong', () => {
    assert.deepEqual(fixesAt(opened(), 'board.quiet', at(board, 'CLOCK')), []);
    assert.deepEqual(fixesAt(opened(), 'nowhere.quiet', { start: 0, end: 5 }), []);
  });

  it('leave the session as it was', () => {
    const session = opened();
    const before = session.analyse('board.quiet');
    fixesAt(session, 'board.quiet', at(board, '0.30 mm'));
    assert.equal(session.analyse('board.quiet'), before);
  });
});
