import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import { budgetOf, couplingOf, evaluated, microstrip } from './board';

const source = 'net A { swing 3.3 V; rise 1 ns; source 20 ohm; load 1 kohm, 8 pF }\n';
const receiver = (tolerates: string, more = '') => `net V { source 100 ohm; load 10 kohm, 10 pF; tolerates ${tolerates}; ${more} }\n`;
const run = 'run r on TOP for 30 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm }\n';

describe('the budget of a receiver', () => {
  it('has a margin of 20 log10 of tolerated over total, and a verdict by it', () => {
    const { total } = budgetOf(evaluated(microstrip + source + receiver('1 V peak') + run), 'V');
    assert.ok(total !== null && 0.01 < total && total < 1);
    const verdictAt = (tolerated: number, headroom = '0 dB') => budgetOf(evaluated(`${microstrip}${source}${receiver(`${tolerated} V peak`)}${run}board b { headroom ${headroom} }`), 'V');
    assert.deepEqual([verdictAt(total * 1.01).verdict, verdictAt(total * 0.99).verdict], ['pass', 'over']);
    assert.deepEqual([verdictAt(total * 1.9, '6 dB').verdict, verdictAt(total * 2.1, '6 dB').verdict], ['low', 'pass']);
    near(verdictAt(total * 2).marginDb!, 20 * Math.log10(2), 1e-9);
    near(verdictAt(total / 2).marginDb!, -20 * Math.log10(2), 1e-9);
  });

  it('lists its contributions largest first, and its own thermal noise among them', () => {
    const { contributions } = budgetOf(evaluated(microstrip + source + receiver('1 V peak') + run), 'V');
    assert.deepEqual(contributions.map(({ channel, from, where }) => [channel, from, where]), [['coupled', 'A', 'r'], ['thermal', null, null]]);
    // 3.29 times sqrt(k T / C) at 25 °C and 10 pF.
    near(contributions[1].value, 3.29 * Math.sqrt((1.380649e-23 * 298.15) / 10e-12), 1e-9);
    const warm = budgetOf(evaluated(`${microstrip}${source}${receiver('1 V peak')}${run}board b { temperature 85 degC }`), 'V').contributions[1];
    near(warm.value, contributions[1].value * Math.sqrt(358.15 / 298.15), 1e-9);
  });

  it('is there, and quiet, for a receiver that lies beside nothing', () => {
    const budget = budgetOf(evaluated(`${microstrip}net V { source 0 ohm; load 50 ohm; tolerates 1 mV peak }`), 'V');
    assert.deepEqual([budget.total, budget.marginDb, budget.verdict, budget.complete], [0, null, 'pass', true]);
  });

  it('counts what its band leaves, and keeps what there was before', () => {
    const wide = couplingOf(evaluated(microstrip + source + receiver('1 V peak') + run), 'A', 'V');
    const banded = evaluated(microstrip + source + receiver('1 V peak', 'band 0 Hz to 4 MHz') + run);
    const coupling = couplingOf(banded, 'A', 'V');
    const contribution = budgetOf(banded, 'V').contributions.find(({ channel }) => channel === 'coupled')!;
    near(coupling.atReceiver, wide.atReceiver, 1e-12);
    assert.equal(contribution.unfiltered, Math.abs(coupling.atReceiver));
    assert.equal(contribution.value, Math.abs(coupling.counted!));
    assert.ok(contribution.value < contribution.unfiltered! / 4);
    const all = budgetOf(evaluated(microstrip + source + receiver('1 V peak', 'band 0 Hz to 1 THz') + run), 'V').contributions[0];
    near(all.value, all.unfiltered!, 1e-2);
  });

  it('has no margin and is never within while something is missing, but can be over', () => {
    const noisy = receiver('1 V peak', 'noise 5 nV/rtHz');
    const unknown = budgetOf(evaluated(microstrip + source + noisy + run), 'V');
    assert.deepEqual([unknown.verdict, unknown.marginDb, unknown.complete], ['unknown', null, false]);
    assert.ok(0 < unknown.total!);
    assert.deepEqual(unknown.unaccounted.map(({ what }) => what), ['the noise of its input is not counted: V has no `band`']);
    assert.equal(budgetOf(evaluated(microstrip + source + receiver('1 mV peak', 'noise 5 nV/rtHz') + run), 'V').verdict, 'over');
  });

  it('stands for each measure, in the order of the text', () => {
    const text = `${microstrip}net Z { tolerates 1 V peak }\n${receiver('1 V peak', 'tolerates 1 mV rms; band 1 kHz to 1 MHz')}net B { tolerates 1 V peak }\nnet P { source 50 ohm }\nnet N { source 50 ohm }\npair D { plus P; minus N; tolerates 1 V peak; common tolerates 1 V peak }`;
    const { budgets } = evaluated(text);
    assert.deepEqual(budgets.map(({ subject, kind, measure }) => `${subject.name} ${kind} ${measure}`), ['Z net peak', 'V net peak', 'V net rms', 'B net peak', 'D pair peak', 'D common peak']);
    assert.equal(budgets[2].combine, 'rss');
    // Two nets of 5 pF: kT/C of each adds in the difference, and half of each is in the mean.
    near(budgets[4].total!, 3.29 * Math.sqrt((2 * 1.380649e-23 * 298.15) / 5e-12), 1e-12);
    near(budgets[5].total!, budgets[4].total! / 2, 1e-12);
  });

  it('carries the section’s error bars', () => {
    const budget = budgetOf(evaluated(microstrip + source + receiver('1 V peak') + run), 'V');
    assert.ok(0 < budget.errorBar! && budget.errorBar! < 0.01 * budget.total!, `${budget.errorBar} of ${budget.total}`);
  });
});
