/** Who disturbs a net and whom it disturbs: what the budgets say, the worst first, with the rows where it happens. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { disturbedBy, disturbs } from '../../server/src/service/disturbances';
import { partiesAt } from '../../server/src/service/disturbances/partiesAt';
import { Session } from '../../server/src/service/session';
import { totalOf } from '../../server/src/budget/totals';
import { everyKindOfBoard } from '../support/everyKindOfBoard';
import { atCursor } from './cursor';

const nets = `net NOISY { swing 5 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF; repeats 1 MHz }
net SLOW { swing 5 V; rise 500 ns; source 33 ohm; load 1 Mohm, 5 pF }
net V { source 100 ohm; load 1 kohm, 10 pF; tolerates 50 mV peak }
net W { source 100 ohm; load 1 kohm, 10 pF; tolerates 1 mV rms; band 1 kHz to 50 MHz }
net P { source 100 ohm; load 1 kohm }
net N { source 100 ohm; load 1 kohm }
pair D { plus P; minus N; tolerates 10 mV peak }
net IDLE { source 1 ohm; load 1 Mohm }
`;
const board = `use "nets.quiet"
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
run bus on TOP for 20 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace V 0.15 mm; gap 0.3 mm; trace SLOW 0.15 mm }
run alley on TOP for 5 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace V 0.15 mm }
run end on TOP for 5 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace W 0.15 mm; gap 0.3 mm; trace P 0.15 mm; gap 0.3 mm; trace N 0.15 mm }
link body { between SLOW and V; capacitance 1 pF }
loop out { carries NOISY; rectangle 9 mm by 9 mm; wire 0.3 mm }
loop in { senses V; rectangle 9 mm by 9 mm at (10 mm, 0 mm); wire 0.3 mm }
return ground { measured 2 mohm; carries SLOW; refers W }
ambient V { field 3 V/m from 1 MHz to 2 MHz }
`;
const files = (text = board) => ({ 'board.quiet': text, 'nets.quiet': nets });

const root = 'board.quiet';
const session = new Session();
for (const [path, text] of Object.entries(files())) session.setText(path, text);
const shown = (path: string, { start, end }: { readonly start: number; readonly end: number }) => session.text(path)!.slice(start, end);
const numbers = (detail: string) => detail.replace(/[\d.]+ [µmn]?V/g, '# V').replace(/[<\d.]+\s?[\d.]* %/g, '# %');

describe('who disturbs a net', () => {
  it('is every source, the worst first, by all its ways, and says where', () => {
    const found = disturbedBy(session, { root, kind: 'net', name: 'V' });
    assert.deepEqual(found.map(({ party, detail }) => `${party.kind} ${party.name}: ${numbers(detail)}`), [
      'net NOISY: # V (# %) on V: # V in run bus, # V in loop out, # V in run alley',
      'net SLOW: # V (# %) on V: # V in link body, # V in run bus',
      'ambient V: # V (# %) on V: # V around in, # V around bus, # V around alley',
    ]);
    assert.deepEqual(found[0]!.rows.map(({ whole, name }) => [whole.path, shown(root, whole.span), shown(root, name.span)]), [
      [root, 'trace NOISY 0.15 mm', 'NOISY'], [root, 'NOISY', 'NOISY'], [root, 'trace NOISY 0.15 mm', 'NOISY'],
    ]);
    assert.deepEqual(found[1]!.rows.map(({ whole }) => shown(root, whole.span)), ['body', 'trace SLOW 0.15 mm']);
    for (const [at, { share }] of found.entries()) assert.ok(at === 0 || share <= found[at - 1]!.share);
  });

  it('is a source of a pair, and says that it is the pair', () => {
    const [found] = disturbedBy(session, { root, kind: 'pair', name: 'D' });
    assert.equal(numbers(found!.detail), '# V (# %) on pair D in run end');
    assert.deepEqual(found!.ownRows.map(({ span }) => shown(root, span)), ['trace P 0.15 mm', 'trace N 0.15 mm']);
  });

  it('is said in rms where that is what is tolerated', () => assert.equal(numbers(disturbedBy(session, { root, kind: 'net', name: 'W' })[0]!.detail), '# V rms (# %) on W in run end'));
});

describe('whom a net disturbs', () => {
  it('is every receiver, the worst first, with the rows of both', () => {
    const found = disturbs(session, { root, kind: 'net', name: 'NOISY' });
    assert.deepEqual(found.map(({ party: { kind, name } }) => `${kind} ${name}`).sort(), ['net V', 'net W', 'pair D']);
    const v = found.find(({ party }) => party.name === 'V')!;
    assert.match(v.detail, /^[\d.]+ mV \(\d+ %\) from NOISY: /);
    assert.deepEqual(v.rows.map(({ whole }) => shown(root, whole.span)), ['trace V 0.15 mm', 'V', 'trace V 0.15 mm']);
    assert.deepEqual(v.ownRows.map(({ span }) => shown(root, span)), ['trace NOISY 0.15 mm', 'NOISY', 'trace NOISY 0.15 mm']);
    for (const [at, { share }] of found.entries()) assert.ok(at === 0 || share <= found[at - 1]!.share);
  });
  it('of a field is who hears it, and of a net of that name is who hears the net', () => {
    const hear = session.analyse(root).evaluation.budgets.filter(({ contributions }) => contributions.some(({ channel }) => channel === 'radiated')).map(({ subject }) => subject.name);
    assert.ok(hear.includes('V'));
    assert.deepEqual(disturbs(session, { root, kind: 'ambient', name: 'V' }).map(({ party }) => party.name).sort(), hear.sort());
    assert.deepEqual(disturbs(session, { root, kind: 'net', name: 'V' }), []);
  });
});

it('says of any board what its budgets say, either way round', () => {
  for (let seed = 1; seed <= 40; seed += 1) {
    const each = new Session();
    each.setText(root, everyKindOfBoard(seed).join('\n'));
    const { evaluation } = each.analyse(root);
    for (const subject of new Set(evaluation.budgets.map((budget) => budget.subject))) {
      const own = evaluation.budgets.filter((budget) => budget.subject === subject);
      for (const { party, share } of disturbedBy(each, { root, kind: subject.kind, name: subject.name })) {
        const worst = Math.max(...own.map((budget) => totalOf(budget.contributions.filter(({ from, channel }) => from === party.name && (channel === 'radiated') === (party.kind === 'ambient')), budget.combine).total / budget.tolerates));
        assert.equal(share, worst, `seed ${seed}`);
        assert.equal(disturbs(each, party).find(({ party: { kind, name } }) => kind === subject.kind && name === subject.name)?.share, share, `seed ${seed}`);
      }
    }
  }
});

describe('it can be asked', () => {
  const asked = (title: string, text: string, ...expected: readonly RegExp[]) => atCursor(title, { 'board.quiet': text, 'nets.quiet': nets }, ({ session: at, path, offset, inText }) => {
    const found = partiesAt(at, path, offset).map((party) => `${party.kind} ${party.name}, ${party.detail}, at ${inText([party.at.whole])[0]} > ${inText([party.at.name])[0]!.replace(/^\S+ /, '')}`);
    assert.equal(found.length, expected.length, found.join('\n'));
    expected.forEach((pattern, index) => assert.match(found[index]!, pattern));
  });
  asked('on a name in a run', board.replace('trace V', 'trace <|>V'), /^net V, [\d.]+ mV of 50\.0 mV · [\d.]+ dB (left|too much), at board\.quiet:3 V > V$/);
  asked('on a keyword of its row', board.replace('trace V', 'tra<|>ce V'), /^net V, .*, at board\.quiet:3 trace V 0\.15 mm > V$/);
  asked('on the width of its row', board.replace('trace V 0.15 mm;', 'trace V 0.15 m<|>m;'), /^net V, .*, at board\.quiet:3 trace V/);
  asked('of a source', board.replace('carries NOISY', 'carries N<|>OISY'), /^net NOISY, disturbs most of all \w+ · \d+ %, and 2 more, at board\.quiet:7 NOISY > NOISY$/);
  asked('of a net of a pair, for the pair', board.replace('trace P', 'trace <|>P'), /^pair D, [\d.]+ µV of 10\.0 mV · [\d.]+ dB left/);
  asked('of a net that does nothing', `${board}link x { between <|>IDLE and V; capacitance 1 pF }\n`, /^net IDLE, disturbs no receiver, and states nothing that it tolerates/);
  asked('of a net that is unknown nowhere', board.replace('trace V', 'trace <|>NOBODY'));
  asked('of a gap nowhere', board.replace('gap 0.3', 'ga<|>p 0.3'));
});
