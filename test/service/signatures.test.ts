/** Signature help: the values of a statement in their order, and which of them is due. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { beginsValues, signaturesAt } from '../../server/src/service/signatures';
import { Session } from '../../server/src/service/session';
import { formOf } from '../../server/src/syntax/forms';
import { statementShapes } from '../../server/src/syntax/statements';
import { atCursor } from './cursor';

/** Each open form with what is due in `«…»`. */
function shows(title: string, text: string, ...expected: readonly string[]): void {
  atCursor(title, { 'a.quiet': text }, ({ session, path, offset }) => assert.deepEqual(signaturesAt(session, path, offset).map(({ label, parameters, active }) => {
    const { start, end } = parameters[active]!;
    return `${label.slice(0, start)}«${label.slice(start, end)}»${label.slice(end)}`;
  }), expected));
}

const inNet = (text: string) => `net A {\n  ${text}\n  once\n}\n`;
const inRun = (text: string) => `run r on TOP for 3 mm {\n  ${text}\n}\n`;

describe('signature help', () => {
  shows('of the first value', inNet('swing <|>'), 'swing «VOLTAGE» [to VOLTAGE]');
  shows('while it is being written', inNet('swing 3.<|>3 V'), 'swing «VOLTAGE» [to VOLTAGE]');
  shows('behind its number', inNet('swing 3.3<|>'), 'swing «VOLTAGE» [to VOLTAGE]');
  shows('at its unit', inNet('swing 3.3 m<|>V'), 'swing «VOLTAGE» [to VOLTAGE]');
  shows('of what may follow', inNet('swing 0 V <|>'), 'swing VOLTAGE [«to VOLTAGE»]');
  shows('behind the word that leads to it', inNet('swing 0 V to <|>'), 'swing VOLTAGE [«to VOLTAGE»]');
  shows('none where nothing more is due', inNet('swing 0 V to 5 V <|>'));
  shows('none at the word itself', inNet('swi<|>ng 5 V'));
  shows('none between statements', inNet('<|>'));
  shows('none in a comment', inNet('swing 5 V # sw<|>ing'));
  shows('of each way in which it can go on', inNet('tolerates <|>'), 'tolerates «VOLTAGE» peak|rms', 'tolerates «none»');
  shows('of the way that was chosen', inNet('tolerates 2 mV <|>'), 'tolerates VOLTAGE «peak|rms»');
  shows('of either order', inNet('source <|>'), 'source «RESISTANCE» [, CAPACITANCE]', 'source «CAPACITANCE» [, RESISTANCE]');
  shows('of either order, behind a number', inNet('source 5<|>'), 'source «RESISTANCE» [, CAPACITANCE]', 'source «CAPACITANCE» [, RESISTANCE]');
  shows('of the order that was chosen', inNet('source 5 pF, <|>'), 'source CAPACITANCE [, «RESISTANCE»]');
  shows('before the comma', inNet('source 5 ohm <|>'), 'source RESISTANCE [, «CAPACITANCE»]');
  shows('of two ways to go on with an optional part', inNet('current 1 A <|>'), 'current CURRENT [«rise TIME»]', 'current CURRENT [«rms|peak» at FREQUENCY [to FREQUENCY]]');
  shows('of a word that nothing follows', inNet('both <|>'), 'both «ways»');
  shows('of several words before a value', 'board b { emits <|> }', 'emits «at most FIELD» at LENGTH from FREQUENCY to FREQUENCY');
  shows('further on', 'board b { emits at most 40 dBuV/m at 3 m from <|> }', 'emits at most FIELD at LENGTH «from FREQUENCY» to FREQUENCY');
  shows('of a row, its net', inRun('trace <|>'), 'trace «NET» LENGTH [reversed] [after LENGTH] [spaced LENGTH]');
  shows('of a row, its net in quotes', inRun('trace "RX<|> IN" 3 mm'), 'trace «NET» LENGTH [reversed] [after LENGTH] [spaced LENGTH]');
  shows('of a row, its width', inRun('trace A <|>'), 'trace NET «LENGTH» [reversed] [after LENGTH] [spaced LENGTH]');
  shows('of a row, what may follow', inRun('trace A 1 mm <|>'), 'trace NET LENGTH [«reversed»] [after LENGTH] [spaced LENGTH]');
  shows('of a row, what is left', inRun('trace A 1 mm reversed <|>'), 'trace NET LENGTH [reversed] [«after LENGTH»] [spaced LENGTH]');
  shows('of a row, by its word', inRun('trace A 1 mm reversed spaced <|>'), 'trace NET LENGTH [reversed] [after LENGTH] [«spaced LENGTH»]');
  shows('of a return of a row', inRun('return GND <|>'), 'return NAME «LENGTH»');
  shows('of a declaration', 'net <|>', 'net «NAME» [is FAMILY] [{ … }]');
  shows('of the head of a run', 'run r <|> { }', 'run NAME [«on LAYER»] for LENGTH { … }');
  shows('of the head of a run, further on', 'run r for 3 mm on <|> { }', 'run NAME [«on LAYER»] for LENGTH { … }');
  shows('of a path', 'loop l { path (1 mm, 1 mm) <|> }', 'path «(X, Y[, Z])» …');
  shows('of a rule', 'waive <|>', 'waive «RULE» on NAME because "TEXT"');
  shows('of a statement beside others', 'net A { swing 5 V; rise <|>; once }', 'rise «TIME»');
  shows('in a block that is not closed, below broken lines', 'net A {\n  swing three\n  rise 40\n  tolerates <|>', 'tolerates «VOLTAGE» peak|rms', 'tolerates «none»');

  it('says which units fit, with an example as large as such a value is', () => {
    const session = new Session();
    session.setText('a.quiet', 'net A { tolerates ');
    const [{ parameters, about }] = signaturesAt(session, 'a.quiet', 18) as [ReturnType<typeof signaturesAt>[number]];
    assert.equal(parameters[0]!.about, '**tolerates**: a voltage such as `2 mV`, in V, mV or uV');
    assert.equal(parameters[1]!.about, '`peak`: From zero to the largest magnitude.  \n`rms`: The root of the mean square, over the receiver’s `band`.');
    assert.match(about, /^How much noise/);
  });

  it('is there for every statement of the language, behind its word and one space', () => {
    for (const [kind, shapes] of Object.entries(statementShapes)) {
      for (const shape of shapes) {
        const head = kind === 'file' ? '' : kind === 'row' ? 'run r for 1 mm { on TOP { ' : kind === 'run' ? 'run r for 1 mm { ' : kind === 'stackup' ? 'stackup { ' : `${kind} x { `;
        const text = `${head}${shape.keyword} `;
        const session = new Session();
        session.setText('a.quiet', text);
        const found = signaturesAt(session, 'a.quiet', text.length);
        assert.equal(0 < found.length, 0 < shape.parts.length, text);
        assert.equal(beginsValues(session, 'a.quiet', text.length), 0 < shape.parts.length, text);
        if (found.length === 1) assert.equal(found[0]!.label, formOf(shape), text);
      }
    }
  });

  it('does not come unasked behind any other space', () => {
    for (const text of ['net ', 'net A ', 'net A { ', 'net A { swing  ', 'net A { swing 3 ', 'net A { swing 3 V ', 'net net ', '# net ', 'use "net ', 'run r on ', 'run r on TOP for 3 mm { trace trace ', ' ', '']) {
      const session = new Session();
      session.setText('a.quiet', text);
      assert.equal(beginsValues(session, 'a.quiet', text.length), text === 'net ', JSON.stringify(text));
    }
  });
});
