/** What must hold of any board, whatever the numbers: exact, or to the rounding of sums in another order. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { near } from '../support/near';
import { seeded } from '../support/seeded';
import { budgetOf, couplingOf, evaluated, microstrip } from './board';

const nets = `
net A { swing 3.3 V; rise 1 ns; fall 0.7 ns; source 20 ohm; load 1 kohm, 8 pF }
net B { swing 5 V; rise 4 ns; source 33 ohm; load 10 kohm, 20 pF }
net V { source 100 ohm; load 10 kohm, 10 pF; tolerates 50 mV peak }
`;
const run = (rows: string, layer = 'TOP', length = '30 mm') => `run r on ${layer} for ${length} { ${rows} }\n`;
const three = 'trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm; gap 0.4 mm; trace B 0.25 mm';

describe('identities of a budget', () => {
  it('do not depend on the order of declarations', () => {
    const parts = [microstrip, ...nets.trim().split('\n'), run(three), run(three.replace('0.3 mm', '0.5 mm')).replace('run r', 'run s'), 'board b { headroom 3 dB }'];
    const reference = budgetOf(evaluated(parts.join('\n')), 'V');
    const random = seeded(11);
    for (let round = 0; round < 4; round += 1) {
      const shuffled = parts.map((part) => ({ part, at: random() })).sort((a, b) => a.at - b.at).map(({ part }) => part);
      const budget = budgetOf(evaluated(shuffled.join('\n')), 'V');
      assert.deepEqual([budget.total, budget.marginDb, budget.verdict], [reference.total, reference.marginDb, reference.verdict]);
      assert.deepEqual(budget.contributions.map(({ from, where, value }) => [from, where, value]), reference.contributions.map(({ from, where, value }) => [from, where, value]));
    }
  });

  it('are the same for a row read from right to left', () => {
    const mirrored = 'trace B 0.25 mm; gap 0.4 mm; trace V 0.15 mm; gap 0.3 mm; trace A 0.2 mm';
    const [plain, turned] = [three, mirrored].map((rows) => budgetOf(evaluated(microstrip + nets + run(rows)), 'V'));
    near(turned.total!, plain.total!, 1e-6);
  });

  it('are the same on the underside of a symmetrical board, and solved once', () => {
    const board = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane G1 18 um; core 1 mm er 4.4; plane G2 18 um; prepreg 0.2 mm er 4.2; copper BOTTOM 35 um }\n';
    const cache = createSolveCache();
    const top = evaluated(board + nets + run(three), cache);
    const bottom = evaluated(board + nets + run(three, 'BOTTOM'), cache);
    assert.equal(bottom.work.sectionsSolved, 0);
    assert.equal(budgetOf(bottom, 'V').total, budgetOf(top, 'V').total);
  });

  it('double with the swing', () => {
    const doubled = nets.replace('3.3 V', '6.6 V');
    const [once, twice] = [nets, doubled].map((text) => couplingOf(evaluated(microstrip + text + run(three)), 'A', 'V'));
    assert.equal(twice.atReceiver, 2 * once.atReceiver);
    assert.equal(twice.nearEnd, 2 * once.nearEnd);
  });

  it('take the faster of two edges, as the mirror image of its own rise', () => {
    const fall = couplingOf(evaluated(microstrip + nets + run(three)), 'A', 'V');
    const rise = couplingOf(evaluated(microstrip + nets.replace('rise 1 ns; fall 0.7 ns', 'rise 0.7 ns') + run(three)), 'A', 'V');
    assert.equal(fall.edge, 'fall');
    assert.equal(rise.edge, 'rise');
    assert.equal(fall.atReceiver, -rise.atReceiver);
  });

  it('are at least as large added as magnitudes as added as squares', () => {
    const two = microstrip + nets + run(three);
    const worst = budgetOf(evaluated(two), 'V');
    const rss = budgetOf(evaluated(`${two}board b { combine rss }`), 'V');
    const values = worst.contributions.map(({ value }) => value);
    near(worst.total!, values.reduce((sum, value) => sum + value, 0), 1e-14);
    near(rss.total!, Math.hypot(...values), 1e-14);
    assert.ok(rss.total! < worst.total!);
  });

  it('add the members of a group before they are squared', () => {
    const grouped = nets.replaceAll('swing', 'switches with G; swing');
    const budget = budgetOf(evaluated(`${microstrip}${grouped}${run(three)}board b { combine rss }`), 'V');
    const of = (name: string | null) => budget.contributions.find(({ from }) => from === name)!.value;
    near(budget.total!, Math.hypot(of('A') + of('B'), of(null)), 1e-14);
    assert.equal(budget.contributions.find(({ from }) => from === 'A')!.group, 'G');
  });

  it('swap near and far for a receiver that is laid the other way', () => {
    const alike = 'net A { swing 3.3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet V { source 50 ohm; load 50 ohm; tolerates 1 V peak }\n';
    const rows = 'trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm';
    const along = couplingOf(evaluated(microstrip + alike + run(rows)), 'A', 'V');
    const against = couplingOf(evaluated(microstrip + alike + run(`${rows} reversed`)), 'A', 'V');
    near(against.nearEnd, along.nearEnd, 1e-12);
    near(against.farEnd, along.farEnd, 1e-12);
    assert.deepEqual([along.atReceiver, against.atReceiver], [along.farEnd, against.nearEnd]);
    const both = couplingOf(evaluated(microstrip + alike + run(`${rows.replace('trace A 0.2 mm', 'trace A 0.2 mm reversed')} reversed`)), 'A', 'V');
    near(both.atReceiver, along.atReceiver, 1e-9);
  });

  it('are, for a net that is driven both ways, the worst of each direction', () => {
    const rows = 'trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm';
    const at = (text: string, row: string) => Math.abs(couplingOf(evaluated(microstrip + text + run(row)), 'A', 'V').atReceiver);
    const along = at(nets, rows);
    const against = at(nets, rows.replace('trace A 0.2 mm', 'trace A 0.2 mm reversed'));
    const either = at(nets.replace('net A {', 'net A { both ways;'), rows);
    assert.equal(either, Math.max(along, against));
  });

  it('add what a receiver gets in each of its runs', () => {
    const rows = 'trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm';
    const one = run(rows, 'TOP', '20 mm');
    const other = run(rows.replace('0.3 mm', '0.5 mm'), 'TOP', '12 mm').replace('run r', 'run s');
    const coupled = (text: string) => budgetOf(evaluated(microstrip + nets + text), 'V').contributions.filter(({ channel }) => channel === 'coupled').map(({ value }) => value);
    const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);
    near(sum(coupled(one + other)), sum(coupled(one)) + sum(coupled(other)), 1e-14);
    // One source in two runs is one source: its parts add before any square.
    const rss = budgetOf(evaluated(`${microstrip}${nets}${one}${other}board b { combine rss }`), 'V');
    near(rss.total!, Math.hypot(sum(coupled(one + other)), rss.contributions.find(({ channel }) => channel === 'thermal')!.value), 1e-14);
  });

  it('never grow with a wider gap to an unguarded neighbour', () => {
    const random = seeded(23);
    const between = (low: number, high: number) => low * (high / low) ** random();
    for (let board = 0; board < 12; board += 1) {
      const width = between(0.1, 0.5).toFixed(3);
      const height = between(0.1, 0.4).toFixed(3);
      const ends = `net A { swing 5 V; rise ${between(0.5, 200).toFixed(2)} ns; source ${between(5, 100).toFixed(1)} ohm; load 100 kohm, ${between(2, 50).toFixed(1)} pF }
        net V { source ${between(5, 2000).toFixed(1)} ohm; load 1 Mohm, ${between(2, 50).toFixed(1)} pF; tolerates 1 V peak }`;
      let before = Infinity;
      for (const gap of [0.15, 0.25, 0.4, 0.7, 1.2, 2]) {
        const text = `stackup { copper TOP 35 um; prepreg ${height} mm er 4.2; plane GND 18 um }\n${ends}\nrun r on TOP for ${between(20, 20.001).toFixed(1)} mm { trace A ${width} mm; gap ${gap} mm; trace V ${width} mm }`;
        const now = Math.abs(couplingOf(evaluated(text), 'A', 'V').atReceiver);
        assert.ok(now < before, `${text}\n${now} at ${gap} mm, ${before} before`);
        before = now;
      }
    }
  });
});
