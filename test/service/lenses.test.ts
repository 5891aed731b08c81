/** Code lenses: a receiver's total and margin over its declaration, a run's worst receiver over the run. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { budgetLine } from '../../server/src/service/budgetLine';
import { lenses } from '../../server/src/service/lenses';
import { Session } from '../../server/src/service/session';
import { everyKindOfBoard } from '../support/everyKindOfBoard';

const ends = 'source 100 ohm; load 1 kohm, 10 pF';
const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const noisy = 'net NOISY { swing 5 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF; repeats 1 MHz }\n';

function shown(texts: Readonly<Record<string, string>>, path = 'board.quiet', wants: readonly string[] = ['budgets', 'runs']): readonly string[] {
  const session = new Session();
  for (const [each, text] of Object.entries(texts)) session.setText(each, text);
  return lenses(session, path, (kind) => wants.includes(kind)).map(({ place, title, disturbers }) => `${session.text(place.path)!.slice(place.span.start, place.span.end)}: ${title} < ${disturbers.map(({ path: of, span }) => session.text(of)!.slice(span.start, span.end)).join(' ')}`);
}

describe('code lenses', () => {
  const board = (tolerates: string) => `${stackup}${noisy}net V { ${ends}; tolerates ${tolerates} }\nnet W { ${ends}; tolerates 1 V peak }\nrun bus on TOP for 20 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace V 0.15 mm; gap 0.3 mm; trace W 0.15 mm }\n`;

  it('say the total, what is tolerated, and what is left', () => {
    const [v, w, run, ...more] = shown({ 'board.quiet': board('400 mV peak') });
    assert.match(v!, /^V: [\d.]+ mV of 400 mV · [\d.]+ dB left < NOISY$/);
    assert.match(w!, /^W: [\d.]+ mV of 1\.00 V · [\d.]+ dB left < NOISY$/);
    assert.match(run!, /^bus: [\d.]+ mV on V · [\d.]+ %, the worst of 2 < NOISY$/);
    assert.deepEqual(more, []);
  });

  it('say how much too much it is', () => assert.match(shown({ 'board.quiet': board('1 mV peak') })[0]!, /^V: [\d.]+ mV of 1\.00 mV · [\d.]+ dB too much </));
  it('stand for a peak and for an rms each', () => assert.match(shown({ 'board.quiet': board('1 mV peak; tolerates 1 mV rms; band 1 kHz to 50 MHz') })[1]!, /^V: [\d.]+ [mµ]V of 1\.00 mV rms · [\d.]+ dB/));
  it('are of the wanted kinds', () => {
    assert.equal(shown({ 'board.quiet': board('1 mV peak') }, 'board.quiet', ['runs']).length, 1);
    assert.equal(shown({ 'board.quiet': board('1 mV peak') }, 'board.quiet', ['budgets']).length, 2);
    assert.deepEqual(shown({ 'board.quiet': board('1 mV peak') }, 'board.quiet', []), []);
  });
  it('say that something is not counted, and that nothing comes', () => {
    assert.match(shown({ 'board.quiet': board('400 mV peak').replace('rise 5 ns; ', '') })[0]!, /· 1 not counted/);
    assert.match(shown({ 'board.quiet': `net V { ${ends}; tolerates 1 V peak }\n` })[0]!, /^V: .* < $/);
  });
  it('of a range say the worst of it', () => {
    assert.match(shown({ 'board.quiet': `${stackup}${noisy}net D[0..2] { ${ends}; tolerates 100 mV peak }\nrun bus on TOP for 20 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace D[0..2] 0.15 mm spaced 0.3 mm }\n` })[0]!, /^D\[0\.\.2\]: D0: [\d.]+ mV of 100 mV · [\d.]+ dB (left|too much), the worst of 3 < NOISY$/);
  });
  it('of a pair and of its mean', () => {
    const found = shown({ 'board.quiet': `${stackup}${noisy}net P { ${ends} }\nnet N { ${ends} }\npair D { plus P; minus N; tolerates 50 mV peak; common tolerates 0.5 V peak }\nrun bus on TOP for 20 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace P 0.15 mm; gap 0.3 mm; trace N 0.15 mm }\n` }, 'board.quiet', ['budgets']);
    assert.match(found[0]!, /^D: [\d.]+ mV of 50\.0 mV · /);
    assert.match(found[1]!, /^D: [\d.]+ mV of 500 mV as the mean · /);
  });
  it('of a part that two boards use name the board', () => {
    const use = (gap: string) => `use "nets.quiet"\nrun bus on TOP for 20 mm { trace NOISY 0.15 mm; gap ${gap}; trace V 0.15 mm }\n`;
    const nets = { 'nets.quiet': `${stackup}${noisy}net V { ${ends}; tolerates 400 mV peak }\n` };
    assert.deepEqual(shown({ ...nets, 'x/a.quiet': use('0.3 mm').replace('"nets', '"../nets'), 'b.quiet': use('0.6 mm') }, 'nets.quiet').map((title) => title.replace(/[\d.]+ (?=mV of|dB)/g, '# ')), ['V: # mV of 400 mV · # dB left in b.quiet < NOISY', 'V: # mV of 400 mV · # dB left in a.quiet < NOISY']);
    assert.deepEqual(shown({ ...nets, 'a.quiet': use('0.3 mm'), 'b.quiet': use('0.3 mm') }, 'nets.quiet').map((title) => title.replace(/[\d.]+ (?=mV of|dB)/g, '# ')), ['V: # mV of 400 mV · # dB left < NOISY']);
  });

  it('of any board are one line each, with numbers in them', () => {
    for (let seed = 1; seed <= 40; seed += 1) {
      const session = new Session();
      session.setText('board.quiet', everyKindOfBoard(seed).join('\n'));
      const { budgets } = session.analyse('board.quiet').evaluation;
      assert.deepEqual(lenses(session, 'board.quiet', (kind) => kind === 'budgets').map(({ title }) => title).sort(), budgets.map(budgetLine).sort());
      for (const { title } of lenses(session, 'board.quiet', () => true)) assert.doesNotMatch(title, /NaN|undefined|null|Infinity|\n/, `seed ${seed}`);
    }
  });
});
