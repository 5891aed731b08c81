/** What the editor shows of the thing under the cursor. Expected: phrases of the Markdown, in their order. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { hover } from '../../server/src/service/hover';
import { Session } from '../../server/src/service/session';
import { atCursor } from './cursor';

const layers = 'stackup main { copper TOP 35 um\n  ## One sheet, pressed.\n  prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const board = `board orchard { headroom 3 dB }
${layers}## Gate of the valve <b>bold</b>
net VALVE { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm; switches with GATES; tolerates none }
net RX { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
family quick { swing 3.3 V; rise 1 ns }
net D[0..1] is quick
run past on TOP for 38 mm {
  trace VALVE 0.25 mm
  gap   0.30 mm
  trace RX    0.15 mm
}
run guarded on TOP for 38 mm { trace D[0..1] 0.2 mm spaced 0.2 mm; gap 0.3 mm; guard AGND 0.25 mm; gap 0.4 mm; trace RX 0.15 mm }
waive low-margin on RX because "measured"
`;

function check(title: string, [from, to]: readonly [string, string], named: string, ...phrases: readonly (string | RegExp)[]): void {
  assert.ok(board.includes(from), from);
  atCursor(title, { 'board.quiet': board.replace(from, to) }, ({ session, path, offset }) => {
    const answer = hover(session, path, offset);
    assert.ok(answer, 'no hover');
    assert.equal(session.text(path)!.slice(answer.span.start, answer.span.end), named);
    let from = 0;
    for (const phrase of phrases) {
      const rest = answer.markdown.slice(from);
      const at = typeof phrase === 'string' ? rest.indexOf(phrase) : rest.search(phrase);
      assert.ok(0 <= at, `${phrase} is not in, or not in this order:\n${answer.markdown}`);
      from += at;
    }
  });
}

describe('hover', () => {
  check('on a receiver: the number, its causes, the way out', ['net RX', 'net R<|>X'], 'RX',
    /\*\*RX\*\*: \*\*\d+(\.\d+)? mV\*\*/, 'of 2.00 mV tolerated: over by', /headroom\. Widen the gap/, '| channel | from | where | value | share |',
    '| VALVE | run past, switches with GATES |', '█', 'thermal', 'All peaks add.', '**RX**: a receiver, source 200 Ω, load 1.00 MΩ ‖ 8.00 pF');
  check('on a source: what it does to others, its documentation first and as plain text', ['net VALVE', 'net VA<|>LVE'], 'VALVE',
    'Gate of the valve \\<b\\>bold\\</b\\>', '**VALVE**: a source, 24.0 V in 40.0 ns', /It puts \d+(\.\d+)? mV on RX \(\d+ % of what it tolerates\)/);
  check('on a trace: near, far, receiver and shares', ['trace RX    0.15', 'trace R<|>X    0.15'], 'RX',
    /\*\*RX\*\* in run past: 0.15 mm wide, \d+(\.\d+)? Ω, \d+ ps from end to end/, 'Put on it here', '| from → to | at the receiver | near end | far end | capacitive | inductive | peak | acts as |', /VALVE → RX \| \*\*-?\d+(\.\d+)? mV\*\* ± .*lumped/, '**RX**: a receiver');
  check('on a trace’s width', ['0.25 mm\n', '0.2<|>5 mm\n'], '0.25 mm', '**VALVE** in run past: 0.25 mm wide', 'Put by it here', 'VALVE → RX');
  check('on a run', ['run past', 'run p<|>ast'], 'past', '**run past**: 38 mm', 'VALVE → RX', '| line | impedance | delay | C | L |', '| VALVE |', 'C and L are solved to ±');
  check('on its length: what would just do', ['for 38 mm {\n', 'for 3<|>8 mm {\n'], '38 mm', /(would just do|is enough) for RX/, '**run past**');
  check('on a gap: what would just do, and what crosses it', ['0.30 mm', '0.3<|>0 mm'], '0.30 mm', '**0.3 mm** between VALVE and RX', /(would just do|is enough) for RX/, 'VALVE → RX');
  check('on a guard: whether its ties hold', ['guard AGND', 'guard AG<|>ND'], 'AGND', '**guard AGND** in run guarded: 0.25 mm wide', /at its two ends, 38 mm apart; at most \d+(\.\d+)? mm hold/);
  check('on a range: each of its names', ['trace D[0..1]', 'trace D[0<|>..1]'], 'D[0..1]', '**D0** in run guarded', '**D1** in run guarded', '**D0**: a source', '**D1**: a source');
  check('on a layer', ['on TOP for 38 mm {\n', 'on T<|>OP for 38 mm {\n'], 'TOP', '**TOP**: copper of 35 µm', '0.2 mm below it lies plane GND.');
  check('on a family', ['is quick', 'is qu<|>ick'], 'quick', '**family quick**', 'Of this family: D0, D1.');
  check('on a group', ['with GATES', 'with GA<|>TES'], 'GATES', '**GATES**: nets that switch at the same moment', 'VALVE');
  check('on a keyword', ['source 200', 'sou<|>rce 200'], 'source', 'Impedance of the driving end');
  check('on a stackup row: its documentation, then what it is', ['prepreg 0.2', 'pre<|>preg 0.2'], 'prepreg', 'One sheet, pressed.', 'An insulating row');
  check('on a unit', ['rise 40 ns', 'rise 40 n<|>s'], 'ns', '`ns` measures a time');
  check('on a rule: its page', ['waive low-margin', 'waive low-<|>margin'], 'low-margin', '## low-margin', 'Why it matters');

  it('says nothing on a comment, between words and in an unknown file', () => {
    const session = new Session();
    session.setText('board.quiet', `# nothing here\n\n${board}`);
    assert.equal(hover(session, 'board.quiet', 5), null);
    assert.equal(hover(session, 'board.quiet', 15), null);
    assert.equal(hover(session, 'other.quiet', 0), null);
  });

  it('shows names as they are written, never as a link, a picture, a cell or HTML', () => {
    const name = '[x](http://a.b)|<img src=z>`*_![y](c)&lt;';
    const session = new Session();
    const text = `${layers}net A { swing 3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet "${name}" { source 50 ohm; load 50 ohm; tolerates 1 mV peak }\nrun r on TOP for 9 mm { trace A 0.2 mm; gap 0.2 mm; trace "${name}" 0.2 mm }\n`;
    session.setText('b', text);
    for (const point of [text.indexOf('[x]'), text.lastIndexOf('[x]'), text.indexOf('net A') + 4, text.indexOf('run r') + 4, text.indexOf('gap 0.2') + 5]) {
      const { markdown } = hover(session, 'b', point)!;
      assert.ok(markdown.includes('\\[x\\]\\(http'), markdown);
      // With every escaped character taken out, nothing of the name's punctuation is left.
      const left = markdown.replace(/\\[!-/:-@[-`{-~]/g, '').replace(/< [\d.]+ %/g, '');
      assert.ok(!/[[\]<>]|!\[|http:/.test(left), left);
      const columns = markdown.split('\n').filter((line) => line.startsWith('|')).map((line) => line.replace(/\\\|/g, '').split('|').length);
      assert.ok(columns.every((count) => count === 10 || count === 7), `${columns} columns in\n${markdown}`);
    }
  });

  it('says of a file of several boards what each makes of it', () => {
    const session = new Session();
    session.setText('parts.quiet', `${layers}net A { swing 3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet B { source 50 ohm; load 50 ohm; tolerates 1 V peak }\n`);
    for (const [path, gap] of [['one.quiet', '0.2 mm'], ['two.quiet', '0.4 mm']] as const) session.setText(path, `use "parts.quiet"\nrun r on TOP for 9 mm { trace A 0.2 mm; gap ${gap}; trace B 0.2 mm }\n`);
    const { markdown } = hover(session, 'parts.quiet', session.text('parts.quiet')!.indexOf('net B') + 4)!;
    assert.match(markdown, /In one\.quiet:[^]*---[^]*In two\.quiet:/);
  });
});

/** Tests that hovering at the mark, which stands in the second of two texts, says the phrases one after the other. */
function inOrder(text: string) {
  return (title: string, [from, to]: readonly [string, string], ...phrases: readonly (string | RegExp)[]) => {
    assert.ok(text.includes(from), from);
    atCursor(title, { 'board.quiet': text.replace(from, to) }, ({ session, path, offset }) => {
      const answer = hover(session, path, offset);
      assert.ok(answer, 'no hover');
      let at = 0;
      for (const phrase of phrases) {
        const rest = answer.markdown.slice(at);
        const found = typeof phrase === 'string' ? rest.indexOf(phrase) : rest.search(phrase);
        assert.ok(0 <= found, `${phrase} is not in, or not in this order:\n${answer.markdown}`);
        at += found;
      }
    });
  };
}

describe('hover on a way', () => {
  const ways = `${layers}net A { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
net V { source 1 kohm; load 1 Mohm; tolerates 5 mV peak }
## Out and back.
loop out on TOP { carries A; rectangle 20 mm by 9 mm; strip 1 mm; area at most 120 mm2 }
loop in on TOP { senses V; rectangle 10 mm by 3 mm at (24 mm, 0 mm); wire 0.3 mm }
return ground { strip 30 mm by 1.5 mm on TOP; carries A; refers V }
link body { between A and V; capacitance 0.2 pF }
`;
  const checkWay = inOrder(ways);
  checkWay('a loop that carries', ['loop out', 'loop o<|>ut'], '**loop out**: 180 mm², 58 mm around, ', 'nH', 'It carries the current of A (what its circuit draws).', 'Its limits: 120 mm² at most.', /Mutual inductance: -?[\d.]+ [pn]H with in\./, '| A → V | **', 'It rests on');
  checkWay('a loop that senses', ['loop in', 'loop i<|>n'], '**loop in**: 30 mm²', 'It lies in the way of V.', 'A → V');
  checkWay('a shared return', ['return ground', 'return gro<|>und'], '**return ground**: 10.', 'mΩ at dc, ', 'nH', 'It carries A, and is what V measures against.', 'upper bound', 'A → V');
  checkWay('a link', ['link body', 'link bo<|>dy'], '**link body**: 200 fF between the load ends of A and V', 'A → V');
  checkWay('a name that a loop carries', ['carries A; rectangle', 'carries A<|>; rectangle'], '**A**: a source, 24.0 V in 40.0 ns', 'It puts ', ' V on V (');
  checkWay('a name that a loop senses', ['senses V', 'senses V<|>'], '| loop | A | loop out |', '**V**: a receiver');
  checkWay('a name that refers to a return', ['refers V', 'refers V<|>'], '| shared return | A | return ground |', '**V**: a receiver');
  checkWay('a net: all of it, and where', ['net V', 'net V<|>'], '| loop | A | loop out |', '**V**: a receiver');
});

describe('hover on pairs, sines and repeated edges', () => {
  const signals = `${layers}net MAINS { sine 230 V rms at 50 Hz; source 0.5 ohm; load 100 ohm }
net HEATER { swing 24 V; rise 40 ns; fall 60 ns; source 5 ohm; load 100 ohm; repeats 20 kHz }
net MOTOR { current 1.8 A rise 60 ns; load 5 ohm }
net P { source 50 ohm; load 1 kohm }
net M { source 50 ohm; load 1 kohm }
pair AIN { plus P; minus M; across 100 ohm, 2 pF; tolerates 2 mV rms; tolerates 5 mV peak; band 10 Hz to 4 MHz; rejects 60 dB; common tolerates 0.5 V peak }
loop out on TOP { carries HEATER; carries MOTOR; rectangle 20 mm by 9 mm; strip 1 mm }
loop in on TOP { senses AIN; rectangle 10 mm by 3 mm at (24 mm, 0 mm); wire 0.3 mm }
return ground { strip 30 mm by 1.5 mm on TOP; carries HEATER; refers P }
link body { between MAINS and M; capacitance 20 pF }
`;
  const checkSignal = inOrder(signals);
  checkSignal('a pair: its difference by peak and rms, its mean, every way', ['pair AIN', 'pair AI<|>N'], 'of 5.00 mV tolerated of the difference', '| shared return | HEATER | return ground |', '| loop | HEATER | loop out |', '| link | MAINS, sine | link body |', 'of 2.00 mV rms tolerated of the difference', '| shared return | HEATER, repeated edges |', 'of 500 mV tolerated of the mean', '**AIN**: a receiver, plus P, minus M, 100 Ω ‖ 2.00 pF across');
  checkSignal('a net of a pair', ['net P', 'net P<|>'], '**P**: a net of a pair, the plus of AIN, source 50.0 Ω');
  checkSignal('a sine', ['net MAINS', 'net MA<|>INS'], 'a source, a sine of 230 V rms at 50.0 Hz');
  checkSignal('an edge that repeats', ['net HEATER', 'net HEA<|>TER'], '24.0 V in 40.0 ns, falling in 60.0 ns, repeated at 20.0 kHz');
  checkSignal('a current', ['net MOTOR', 'net MOT<|>OR'], '1.80 A in 60.0 ns drawn at its load');
  checkSignal('a loop of two currents', ['loop out', 'loop o<|>ut'], 'It carries the current of HEATER (what its circuit draws), MOTOR (1.80 A in 60.0 ns).');
});

describe('hover on fields', () => {
  const fields = `board b { emits at most 40 dBuV/m at 3 m from 30 MHz to 88 MHz }
net CLOCK { swing 3.3 V; rise 1 ns; source 20 ohm; load 50 ohm; repeats 20 MHz }
net V { source 1 kohm; load 1 Mohm; tolerates 5 mV peak }
loop out { carries CLOCK; rectangle 20 mm by 9 mm; wire 0.3 mm }
loop in { senses V; rectangle 10 mm by 3 mm at (60 mm, 0 mm); wire 0.3 mm }
ambient radio { field 10 V/m from 80 MHz to 1 GHz modulated 80 % }
shield lid { covers V; sheet tin 0.2 mm; slot 6 mm; grounded }
`;
  const checkField = (title: string, [from, to]: readonly [string, string], ...phrases: readonly (string | RegExp)[]) => {
    atCursor(title, { 'board.quiet': fields.replace(from, to) }, ({ session, path, offset }) => {
      const answer = hover(session, path, offset);
      assert.ok(answer, 'no hover');
      for (const phrase of phrases) assert.ok(typeof phrase === 'string' ? answer.markdown.includes(phrase) : phrase.test(answer.markdown), `${phrase} is not in:\n${answer.markdown}`);
    });
  };
  checkField('what a loop emits, with its caution', ['loop out', 'loop o<|>ut'], /\*\*[\d.]+ dBµV\/m\*\* at 60\.0 MHz/, '40.0 dBµV/m', 'cables are not included and often dominate');
  checkField('a shield', ['shield lid', 'shield l<|>id'], /\*\*shield lid\*\*: [\d.]+ dB against a plane wave/, 'its longest opening 6 mm, grounded. Over V.');
  checkField('a field', ['ambient radio', 'ambient rad<|>io'], '**ambient radio**: 10.0 V/m from 80.0 MHz to 1.00 GHz, rms', 'in → V');
});
