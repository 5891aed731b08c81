/** The numbers in grey: each `«…»` stands where its hint does. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { hints } from '../../server/src/service/hints';
import { Session } from '../../server/src/service/session';

const board = `board b { clearance 0.12 mm }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 1 ns; source 50 ohm; load 50 ohm }
net B { source 50 ohm; load 50 ohm; tolerates 10 mV peak }
net C { source 50 ohm; load 50 ohm; tolerates 2 V peak }
net Q { source 50 ohm; load 50 ohm }
`;

/** The lines of the run with their hints. */
function shown(text: string, path = 'board.quiet', span = { start: 0, end: text.length }): string {
  const session = new Session();
  session.setText(path, text);
  let from = 0;
  let result = '';
  for (const { offset, parts } of hints(session, path, span)) {
    result += `${text.slice(from, offset)}«${parts.map((part) => part.text).join('')}»`;
    from = offset;
  }
  return (result + text.slice(from)).slice(text.indexOf('run '));
}

const run = `run r on TOP for 10 mm {
  trace A 0.2 mm
  gap 0.2 mm
  trace B 0.2 mm
}
`;

describe('inlay hints', () => {
  it('say what a receiver gets there, the gap and the length that would just do', () => {
    // B-01 of the reference lines, with its edge a quarter slower: the far end's 9.73 mV, times 0.8.
    const said = shown(board + run);
    assert.match(said, /^run r on TOP for 10 mm«≤ 12.8 mm» \{\n {2}trace A 0\.2 mm\n {2}gap 0\.2 mm«≥ 0\.1\d mm»\n {2}trace B 0\.2 mm«≈ 7\.78 mV · 78 %»\n\}\n$/);
  });

  it('say no length where none in reach is too long, and of the gap that it is the clearance', () => {
    const text = board + run.replace('trace B', 'trace C');
    assert.match(shown(text), /^run r on TOP for 10 mm \{\n {2}trace A 0\.2 mm\n {2}gap 0\.2 mm«≥ 0\.12 mm»\n {2}trace C 0\.2 mm«≈ 7\.78 mV · < 1 %»\n\}\n$/);
    const session = new Session();
    session.setText('b', text);
    const gap = hints(session, 'b', { start: 0, end: text.length }).find(({ kind }) => kind === 'gap')!;
    assert.equal(gap.tooltip, 'Even 0.12 mm, the least clearance, would do for C, with the headroom wanted.');
  });

  it('move with the numbers: a wider gap is quieter', () => {
    const share = (gap: string) => Number(/· ([\d.]+) %/.exec(shown(board + run.replace('0.2 mm\n  trace B', `${gap} mm\n  trace B`)))![1]);
    assert.ok(share('0.6') < share('0.3') && share('0.3') < 78);
  });

  it('stand in CRLF and behind two-unit characters where they belong', () => {
    const text = `# 5 µs 🔌\n${board}${run}`.replaceAll('\n', '\r\n');
    assert.equal(shown(text).replaceAll('\r\n', '\n'), shown(board + run));
  });

  it('are silent where nothing is computed', () => {
    const quiet = 'run r on TOP for 10 mm { trace Q 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\n';
    assert.equal(shown(board + quiet), quiet);
    const halfWritten = 'run r on TOP for 10 mm { trace A 0.2 mm; gap ; trace B 0.2 mm }\n';
    assert.equal(shown(board + halfWritten), halfWritten);
  });

  it('are those of the lines asked for', () => {
    const text = board + run;
    const line = text.indexOf('  gap');
    assert.match(shown(text, 'board.quiet', { start: line, end: line + 12 }), /^run r on TOP for 10 mm \{\n {2}trace A 0\.2 mm\n {2}gap 0\.2 mm«≥ 0\.1\d mm»\n {2}trace B 0\.2 mm\n\}\n$/);
  });

  it('point to the names of the source and of the receiver, which an editor follows to what declares them', () => {
    const session = new Session();
    session.setText('b', board + run);
    const noise = hints(session, 'b', { start: 0, end: 1000 }).find(({ kind }) => kind === 'noise')!;
    assert.deepEqual(noise.parts.map(({ target }) => session.text('b')!.slice(target!.span.start, target!.span.end)), ['A', 'B']);
    assert.match(noise.tooltip, /mV from A/);
  });

  it('say once what a range has, at its worst', () => {
    const nets = `${board}net D[0..3] { source 50 ohm; load 50 ohm; tolerates 0.1 V peak }\n`;
    const said = shown(`${nets}run r on TOP for 10 mm { trace A 0.2 mm; gap 0.2 mm; trace D[0..3] 0.2 mm spaced 0.2 mm }\n`);
    assert.equal(said.match(/≈/g)!.length, 1);
    assert.match(said, /trace D\[0\.\.3\] 0\.2 mm spaced 0\.2 mm(«≥ [\d.]+ mm»)?«≈/);
  });

  it('say that no gap and no length is enough', () => {
    const said = shown(board.replace('tolerates 10 mV', 'tolerates 1 nV') + run);
    assert.match(said, /10 mm«no length is enough»[^]*0\.2 mm«no gap is enough»/);
  });

  it('say alike of two boards once, and of a used file what each board makes of it', () => {
    const session = new Session();
    session.setText('run.quiet', run);
    session.setText('one.quiet', `use "run.quiet"\n${board}`);
    session.setText('two.quiet', `use "run.quiet"\n${board}`);
    const noises = () => hints(session, 'run.quiet', { start: 0, end: run.length }).filter(({ kind }) => kind === 'noise');
    assert.equal(noises().length, 1);
    session.setText('two.quiet', `use "run.quiet"\n${board.replace('10 mV', '20 mV')}`);
    assert.equal(noises().length, 2);
  });
});
