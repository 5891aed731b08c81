import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { near } from '../support/near';
import { budgetOf, evaluated, microstrip } from './board';
import { projectOf } from './project';

const nets = 'net A { swing 3.3 V; rise 1 ns; source 20 ohm; load 1 kohm }\nnet V { source 100 ohm; load 10 kohm; tolerates 50 mV peak }\n';
const limits = (text: string) => evaluated(text).limits.map(({ subject, message }) => `${subject.name}: ${message}`);

describe('what is outside a model', () => {
  it('is nothing for a usual run', () => {
    assert.deepEqual(limits(`${microstrip}${nets}run r on TOP for 20 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm }`), []);
  });

  it('a plane between rows: they are computed apart', () => {
    const board = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane G 18 um; prepreg 0.2 mm er 4.2; copper BOTTOM 35 um }\n';
    const text = `${board}${nets}run r for 20 mm { on TOP { trace A 0.2 mm }; on BOTTOM { trace V 0.2 mm } }`;
    assert.match(limits(text)[0], /^r: a plane lies between rows of run r/);
    const { runs } = evaluated(text);
    assert.equal(runs[0].matrices!.order, 2);
    assert.equal(runs[0].matrices!.capacitance[1], 0);
    assert.ok(0 < runs[0].matrices!.capacitance[3]);
    assert.deepEqual([runs[0].couplings.length, runs[0].impedance.length], [0, 2]);
    assert.equal(budgetOf(evaluated(text), 'V').complete, true);
  });

  it('a section wider than a tenth of the wavelength', () => {
    const fast = nets.replace('rise 1 ns', 'rise 20 ps');
    assert.ok(limits(`${microstrip}${fast}run r on TOP for 20 mm { trace A 0.2 mm; gap 2 mm; trace V 0.15 mm }`).some((words) => /a tenth of the wavelength/.test(words)));
  });

  it('lossless echoes that still grow', () => {
    const text = `${microstrip}net A { swing 3.3 V; rise 2 ns; source 1 ohm; load 1 Mohm }\nnet V { source 1 ohm; load 1 Mohm; tolerates 1 V peak }\nrun r on TOP for 300 mm { trace A 0.2 mm; gap 0.5 mm; trace V 0.2 mm }`;
    assert.ok(limits(text).some((words) => /still grows 20 delays/.test(words)), limits(text).join('\n'));
  });

  it('more conductors than are solved at once: each receiver with its eight neighbours on each side', () => {
    const bus = (count: number, receiver: number) => {
      const trace = (i: number) => `trace ${i === receiver ? 'V' : i % 3 === 0 ? 'A' : `Q${i}`} 0.15 mm`;
      const quiet = Array.from({ length: count }, (_, i) => `net Q${i} { source 50 ohm; load 50 ohm }`).filter((line) => new RegExp(`trace ${line.split(' ')[1]} `).test(Array.from({ length: count }, (__, i) => trace(i)).join(' ')));
      return `${microstrip}${nets}${quiet.join('\n')}\nrun r on TOP for 20 mm {\n${Array.from({ length: count }, (_, i) => trace(i)).join('\ngap 0.2 mm\n')}\n}`;
    };
    const cache = createSolveCache();
    const wide = evaluated(bus(20, 10), cache);
    assert.ok(wide.limits.some(({ message }) => /more than 16 conductors/.test(message)));
    const { matrices, traces, couplings } = wide.runs[0];
    assert.deepEqual([matrices!.order, traces.length], [20, 20]);
    // Beyond the neighbourhoods nothing is said; within them the matrices are symmetrical.
    assert.equal(matrices!.capacitance[19], 0);
    for (let i = 0; i < 20; i += 1) for (let j = 0; j < i; j += 1) assert.equal(matrices!.inductance[i * 20 + j], matrices!.inductance[j * 20 + i]);
    // Eight neighbours hold what matters: sixteen conductors solved whole give nearly the same.
    const whole = evaluated(bus(16, 10), cache);
    const strongest = (all: typeof couplings) => Math.max(...all.map(({ atReceiver }) => Math.abs(atReceiver)));
    near(strongest(couplings), strongest(whole.runs[0].couplings), 0.02);
    // The runs of a regular bus are alike: interior neighbourhoods are one section.
    assert.ok(wide.work.sectionsSolved <= 17, `${wide.work.sectionsSolved} sections`);
  });

  it('numbers that no board has are refused or said, never NaN', () => {
    for (const change of [['0.3 mm', '1e-9 mm'], ['0.3 mm', '1e6 mm'], ['1 ns', '1e-30 s'], ['1 ns', '1e9 s'], ['20 mm', '1e-12 mm'], ['20 mm', '1e9 mm'], ['3.3 V', '1e300 V'], ['20 ohm', '1e300 ohm'], ['1 kohm', '1e-300 ohm'], ['0.2 mm er', '1e-200 mm er'], ['35 um', '1e30 m']] as const) {
      const text = `${microstrip}${nets}run r on TOP for 20 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm }`.replace(change[0], change[1]);
      const budget = budgetOf(evaluate(projectOf(text), createSolveCache()), 'V');
      for (const value of [budget.total, budget.errorBar, budget.marginDb, ...budget.contributions.flatMap((each) => [each.value, each.errorBar])]) {
        assert.ok(value === null || Number.isFinite(value), `${change.join(' -> ')}: ${value}`);
      }
      if (budget.contributions.every(({ channel }) => channel !== 'coupled')) assert.equal(budget.complete, false, change.join(' -> '));
    }
  });

  it('two traces of one net: no aggressor to itself, and each a source of its own', () => {
    const text = `${microstrip}${nets.replace('net A {', 'net A { tolerates 1 V peak;')}run r on TOP for 20 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm; gap 0.3 mm; trace A 0.2 mm }`;
    const { runs } = evaluated(text);
    assert.deepEqual(runs[0].couplings.map(({ aggressor, victim }) => `${aggressor.name} ${victim.name}`), ['A V', 'A V']);
    near(runs[0].couplings[0].atReceiver, runs[0].couplings[1].atReceiver, 1e-6);
    assert.equal(budgetOf(evaluated(text), 'A').contributions.filter(({ channel }) => channel === 'coupled').length, 0);
  });
});
