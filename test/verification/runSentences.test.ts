/** Sentences of the language reference on runs and nets; each expectation is a relation that the sentence itself states. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { checkedBudget, checkedCoupling, checkedRun, checkedText } from '../support/checkedText';
import { near } from '../support/near';

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; copper IN 18 um; core 0.3 mm er 4.2; plane GND1 18 um; core 0.4 mm er 4.2; plane GND2 18 um }\n';
const ends = 'source 40 ohm; load 70 ohm';
const aggressor = (more = '', name = 'A') => `net ${name} { swing 3.3 V; rise 0.3 ns; ${ends}${more} }\n`;
const victim = (more = '') => `net V { source 60 ohm; load 200 ohm; tolerates 1 V peak${more} }\n`;
const pair = 'trace A 0.2 mm; gap 0.2 mm; trace V 0.15 mm';
const run_ = (row = pair, length = '40 mm', name = 'r') => `run ${name} on TOP for ${length} { ${row} }\n`;
const atReceiver = async (text: string): Promise<number> => Math.abs((await checkedCoupling(text)).atReceiver);
const plain = `${stackup}${aggressor()}${victim()}${run_()}`;

describe('conductors of a run', () => {
  it('couple the same with the row read from right to left', async () => {
    const turned = await checkedRun(`${stackup}${aggressor()}${victim()}${run_(pair.split('; ').reverse().join('; '))}`);
    const straight = await checkedRun(plain);
    assert.deepEqual([straight.conductors, turned.conductors], [['A', 'V'], ['V', 'A']]);
    near(turned.inductance![1]![1]!, straight.inductance![0]![0]!, 1e-9);
    near(turned.couplings[0]!.atReceiver, straight.couplings[0]!.atReceiver, 1e-9);
  });

  it('`spaced` with a range is that many equal traces, counted up or down', async () => {
    const nets = 'net D[0..3] {}\n';
    const spaced = await checkedRun(`${stackup}${nets}${run_('trace D[3..0] 0.1 mm spaced 0.12 mm')}`);
    const written = await checkedRun(`${stackup}${nets}${run_('trace D3 0.1 mm; gap 0.12 mm; trace D2 0.1 mm; gap 0.12 mm; trace D1 0.1 mm; gap 0.12 mm; trace D0 0.1 mm')}`);
    assert.deepEqual(spaced.conductors, ['D3', 'D2', 'D1', 'D0']);
    assert.deepEqual([spaced.capacitance, spaced.inductance], [written.capacitance, written.inductance]);
  });

  it('`shift` is of left edges, from the first row, and may be negative', async () => {
    const at = (shift: string) => checkedRun(`${stackup}net A {}\nnet B {}\nrun r for 10 mm { on TOP { trace A 0.2 mm }; on IN { ${shift}trace B 0.1 mm } }`);
    const [none, zero, right, left] = [await at(''), await at('shift 0 mm; '), await at('shift 0.15 mm; '), await at('shift -0.05 mm; ')];
    assert.deepEqual(none.capacitance, zero.capacitance);
    // 0.2 mm over 0.1 mm: shifts about the common centre line, at 0.05 mm, mirror each other.
    near(right.capacitance![0]![1]!, left.capacitance![0]![1]!, 1e-9);
    assert.ok(Math.abs(right.capacitance![0]![1]!) * 1.02 < Math.abs(none.capacitance![0]![1]!));
  });

  it('are listed rows top to bottom, left to right, guards and returns left out', async () => {
    const found = await checkedRun(`${stackup}net A {}\nnet B {}\nnet C {}\nrun r for 10 mm { on TOP { trace B 0.2 mm; gap 0.2 mm; guard X 0.2 mm stitched 1 mm; gap 0.2 mm; trace A 0.2 mm }; on IN { trace C 0.1 mm } }`);
    assert.deepEqual(found.conductors, ['B', 'A', 'C']);
    assert.equal(found.capacitance!.length, 3);
  });

  it('`without` takes a plane away, the next one counts: less capacitance, more inductance', async () => {
    const cut = await checkedRun(`${stackup}${aggressor()}${victim()}${run_(`${pair}; without GND1`)}`);
    const whole = await checkedRun(plain);
    assert.ok(cut.capacitance![0]![0]! * 1.1 < whole.capacitance![0]![0]! && whole.inductance![0]![0]! * 1.1 < cut.inductance![0]![0]!);
  });

  it('with neither plane nor return are an error; with a return they are not', async () => {
    const open = 'stackup { copper TOP 35 um; core 1 mm er 4.2 }\n';
    const { status, file } = await checkedText(`${open}${aggressor()}${victim()}${run_()}`);
    assert.equal(status, 1);
    assert.deepEqual(file.findings.filter(({ severity }) => severity === 'error').map(({ rule, subject }) => [rule, subject]), [['no-return-path', { kind: 'run', name: 'r' }]]);
    assert.deepEqual([file.runs[0]!.capacitance, file.runs[0]!.couplings, file.budgets[0]!.marginDb, file.budgets[0]!.verdict], [null, [], null, 'unknown']);
    assert.notEqual((await checkedRun(`${open}${aggressor()}${victim()}${run_(`return G 1 mm; gap 0.2 mm; ${pair}`)}`)).capacitance, null);
    assert.equal((await checkedText(`${open}${aggressor()}${victim()}${run_(`guard G 1 mm stitched 1 mm; gap 0.2 mm; ${pair}`)}`)).file.findings.some(({ rule }) => rule === 'no-return-path'), false, 'a guard in a run without planes is a return');
  });

  it('a plane between two rows of one run separates them, and outside-model says so', async () => {
    const planes = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane MID 18 um; prepreg 0.2 mm er 4.2; copper BOTTOM 35 um }\n';
    const text = (without: string) => `${planes}${aggressor()}${victim()}run r for 40 mm { on TOP { trace A 0.2 mm; gap 2 mm; trace Z 0.2 mm }; on BOTTOM { trace V 0.2 mm }${without} }\nnet Z {}\n`;
    const { file } = await checkedText(text(''));
    assert.ok(file.findings.some(({ rule, severity }) => rule === 'outside-model' && severity === 'information'));
    const at = file.runs[0]!.conductors.indexOf('V');
    assert.equal(file.runs[0]!.capacitance?.[0]?.[at] ?? 0, 0);
  });
});

describe('where the ends lie', () => {
  it('both `reversed` is the run as it was; one `reversed` swaps which end of the other it sees', async () => {
    const straight = await checkedCoupling(plain);
    const both = await checkedCoupling(`${stackup}${aggressor()}${victim()}${run_('trace A 0.2 mm reversed; gap 0.2 mm; trace V 0.15 mm reversed')}`);
    near(both.atReceiver, straight.atReceiver, 1e-9);
    const one = await checkedCoupling(`${stackup}${aggressor()}${victim()}${run_('trace A 0.2 mm; gap 0.2 mm; trace V 0.15 mm reversed')}`);
    // "Near end = the end beside the aggressor's driver", and "the receiving end is the load end": now that is the near one.
    assert.equal(straight.atReceiver, straight.farEnd);
    assert.equal(one.atReceiver, one.nearEnd);
    // The same line with the victim's ends exchanged.
    const exchanged = await checkedCoupling(`${stackup}${aggressor()}net V { source 200 ohm; load 60 ohm; tolerates 1 V peak }\n${run_()}`);
    near(one.nearEnd, exchanged.nearEnd, 1e-9);
    near(one.farEnd, exchanged.farEnd, 1e-9);
  });

  it('without `after`, what lies outside the run is split equally between its ends', async () => {
    const row = (after: string) => `${stackup}${aggressor()}${victim('; length 100 mm')}${run_(`trace A 0.2 mm; gap 0.2 mm; trace V 0.15 mm${after}`)}`;
    const unsaid = await atReceiver(row(''));
    near(unsaid, await atReceiver(row(' after 30 mm')), 1e-9);
    for (const other of [' after 0 mm', ' after 60 mm']) assert.ok(1e-3 < Math.abs((await atReceiver(row(other))) / unsaid - 1), other);
    near(await atReceiver(plain), await atReceiver(plain.replace('peak }', 'peak; length 40 mm }')), 1e-9, 'a net that is as long as its run');
  });

  it('`both ways` counts the worst direction', async () => {
    const one = await atReceiver(plain);
    const swapped = await atReceiver(`${stackup}${aggressor()}net V { source 200 ohm; load 60 ohm; tolerates 1 V peak }\n${run_('trace A 0.2 mm; gap 0.2 mm; trace V 0.15 mm reversed')}`);
    const both = (await checkedBudget(plain.replace('peak }', 'peak; both ways }'))).total!;
    assert.ok(Math.max(one, swapped) * (1 - 1e-9) <= both, `${both} of ${one} and ${swapped}`);
    const turning = (await checkedBudget(plain.replace('load 70 ohm', 'load 70 ohm; both ways'))).total!;
    assert.ok(one * (1 - 1e-9) <= turning);
  });

  it('assumed ends: a driver without `source` has 10 ohm, without `load` 1 Mohm and 5 pF, and missing-termination says it', async () => {
    for (const [left, said] of [['load 70 ohm', `source 10 ohm; load 70 ohm`], ['source 40 ohm', 'source 40 ohm; load 1 Mohm, 5 pF']] as const) {
      const text = plain.replace(ends, left);
      near(await atReceiver(text), await atReceiver(plain.replace(ends, said)), 1e-9, left);
      assert.deepEqual((await checkedText(text)).file.findings.filter(({ rule }) => rule === 'missing-termination').map(({ subject, severity }) => [subject, severity]), [[{ kind: 'net', name: 'A' }, 'warning']]);
    }
  });

  it('a receiver without `source` is computed with 0 ohm and with 1 Mohm, and the larger counts', async () => {
    const zero = await atReceiver(plain.replace('source 60 ohm', 'source 1 nohm'));
    const open = await atReceiver(plain.replace('source 60 ohm', 'source 1 Mohm'));
    near(await atReceiver(plain.replace('source 60 ohm; ', '')), Math.max(zero, open), 1e-5);
  });

  it('a net that is neither source nor receiver ends in its own characteristic resistance', async () => {
    const row = 'trace A 0.2 mm; gap 0.15 mm; trace N 0.2 mm; gap 0.15 mm; trace V 0.15 mm';
    const text = (net: string) => `${stackup}${aggressor()}${victim()}${net}\n${run_(row)}`;
    const quiet = await checkedRun(text('net N {}'));
    const own = quiet.impedance![quiet.conductors.indexOf('N')]!;
    near(await atReceiver(text('net N {}')), await atReceiver(text(`net N { source ${own} ohm; load ${own} ohm }`)), 1e-6);
  });
});

describe('guards', () => {
  const guarded = (guard: string) => `${stackup}${aggressor()}${victim()}${run_(`trace A 0.2 mm; gap 0.2 mm; guard G 0.2 mm${guard}; gap 0.2 mm; trace V 0.15 mm`)}`;
  const unstitched = async (guard: string) => (await checkedText(guarded(guard))).file.findings.filter(({ rule }) => rule === 'guard-unstitched').length;

  it('are found where their ties are further apart than a twentieth of the wavelength at the knee', async () => {
    // 0.35 / 0.3 ns = 1.17 GHz; a wave of about 1.6e8 m/s is 137 mm long there, its twentieth 6.9 mm.
    assert.deepEqual([await unstitched(' stitched 4 mm'), await unstitched(' stitched 20 mm'), await unstitched('')], [0, 1, 1]);
  });

  it('take most of the coupling away while they are tied', async () => {
    const open = await atReceiver(`${stackup}${aggressor()}${victim()}${run_('trace A 0.2 mm; gap 0.6 mm; trace V 0.15 mm')}`);
    assert.ok((await atReceiver(guarded(' stitched 2 mm'))) < 0.7 * open);
  });
});
