/** Bounds over tolerances: against every corner of the box, tried one by one, and what each kind of quantity does. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import type { Evaluation } from '../../server/src/budget/results';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { overTolerances } from '../../server/src/budget/tolerances/overTolerances';
import { tolerancedQuantities } from '../../server/src/budget/tolerances/tolerances';
import { variedProject } from '../../server/src/budget/tolerances/variedProject';
import { near } from '../support/near';
import { seeded } from '../support/generatedBoard';
import { budgetOf, microstrip } from './board';
import { projectOf } from './project';

const cache = createSolveCache();

function bounded(text: string): Evaluation {
  const project = projectOf(text);
  assert.deepEqual(project.errors.map(({ message }) => message), []);
  const steps = overTolerances(project, evaluate(project, cache), cache);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** Over every choice of these shifts for all quantities. */
function everywhere(text: string, name: string, levels: readonly (1 | 0 | -1)[]): readonly [number, number] {
  const project = projectOf(text);
  const quantities = tolerancedQuantities(project);
  let [low, high] = [Infinity, -Infinity];
  for (let point = 0; point < levels.length ** quantities.length; point += 1) {
    const shifts = quantities.map(({ key }, at) => [key, levels[Math.floor(point / levels.length ** at) % levels.length]!] as const);
    const moved = new Map(shifts.flatMap(([key, shift]) => (shift === 0 ? [] : [[key, shift] as const])));
    const { total } = budgetOf(evaluate(variedProject(project, moved), cache), name);
    low = Math.min(low, total!);
    high = Math.max(high, total!);
  }
  return [low, high];
}

function everyCorner(text: string, name: string): readonly [number, number] {
  return everywhere(text, name, [1, -1]);
}

/** No corner is outside; where one is not met, an effect turns inside the box, and what is drawn counts as well. */
function checkCorners(text: string): void {
  const { bounds, total } = budgetOf(bounded(text), 'V');
  assert.ok(bounds![0] <= total! && total! <= bounds![1], text);
  const corners = everyCorner(text, 'V');
  const isMet = ([low, high]: readonly [number, number]) => Math.abs(bounds![0] / low - 1) < 1e-9 && Math.abs(bounds![1] / high - 1) < 1e-9;
  assert.ok(isMet(corners) || isMet(everywhere(text, 'V', [1, 0, -1])), `${bounds} beside ${corners}\n${text}`);
}

/** A thousand of either kind by BOARDS=1000; so many stay quick. */
const boards = Number(process.env['BOARDS'] ?? 12);

const nets = 'net A { swing 3 V ± 5 %; rise 2 ns; source 30 ohm ± 10 %; load 1 Mohm, 5 pF }\nnet V { source 100 ohm; load 10 kohm, 8 pF; tolerates 100 mV peak }\n';
const run = (gap: string, width = '0.2 mm') => `run r on TOP for 30 mm { trace A ${width}; gap ${gap}; trace V 0.15 mm }\n`;

describe('bounds over tolerances', () => {
  it('are the worst and the best of all corners, on seeded boards', () => {
    const random = seeded(11);
    for (let n = 0; n < boards; n += 1) {
      const text = `stackup { copper TOP 35 um; prepreg 0.2 mm ± ${random.pick(['5 %', '10 %', '20 um'])} er 4.2 ± 0.2; plane GND 18 um }\n${nets}${run(`${random.pick(['0.25', '0.5', '1.0'])} mm ± ${random.pick(['8 %', '30 um'])}`, random.pick(['0.2 mm', '0.2 mm ± 15 um']))}`;
      checkCorners(text);
    }
  });

  it('are so for loops, returns, links and fields as well', () => {
    const random = seeded(12);
    const toleranced = (value: number, unit: string) => `${Number((value * (0.5 + random.next())).toPrecision(3))} ${unit} ± ${random.pick(['3 %', '8 %', '15 %'])}`;
    for (let n = 0; n < boards; n += 1) {
      const ways = [
        `loop out { carries A; rectangle ${toleranced(12, 'mm')} by 8 mm; wire 0.3 mm }\nloop in { senses V; rectangle 10 mm by 4 mm at (20 mm, 0 mm); wire 0.3 mm }`,
        `return ground { strip ${toleranced(20, 'mm')} by 1 mm on TOP; carries A; refers V }`,
        `link body { between A and V; capacitance ${toleranced(0.1, 'pF')} }`,
        `ambient radio { field ${toleranced(3, 'V/m')} from 80 MHz to 1 GHz }\nloop around { senses V; rectangle 10 mm by 3 mm; wire 0.3 mm }`,
      ].filter(() => random.next() < 0.6);
      const text = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing ${toleranced(3, 'V')}; rise ${toleranced(5, 'ns')}; source 30 ohm; load ${toleranced(200, 'ohm')}, 5 pF }
net V { source ${toleranced(100, 'ohm')}; load 10 kohm, 8 pF; tolerates 100 mV peak }
${ways.join('\n')}
`;
      checkCorners(text);
    }
  });

  it('hold also where the effect of a quantity turns inside its band', () => {
    // A source matched to its line is the quietest of the three.
    const text = `${microstrip}${nets.replace('source 30 ohm ± 10 %', 'source 60 ohm ± 50 %')}${run('0.3 mm')}`;
    const { bounds } = budgetOf(bounded(text), 'V');
    const [low, high] = everyCorner(text, 'V');
    assert.ok(bounds![0] <= low && high <= bounds![1]);
  });

  it('say which quantity matters most', () => {
    const text = `stackup { copper TOP 35 um; prepreg 0.2 mm ± 10 % er 4.2 ± 1 %; plane GND 18 um }\n${nets}${run('0.3 mm')}`;
    const { movedBy, total } = budgetOf(bounded(text), 'V');
    assert.equal(movedBy[0].what, 'thickness of prepreg');
    near(movedBy[0].share, 0.1, 1e-12);
    assert.ok(0.05 * total! < movedBy[0].moves && movedBy.at(-1)!.moves < movedBy[0].moves);
  });

  it('take what a wider trace gains from its gaps, and keep its centre', () => {
    const project = projectOf(`${microstrip}${nets}${run('0.30 mm', '0.2 mm ± 20 um')}`);
    const [{ key }] = tolerancedQuantities(project).filter(({ what }) => what.startsWith('width'));
    const [{ rows: [{ conductors, gaps }] }] = variedProject(project, new Map([[key, 1]])).runs;
    near(conductors[0].width.value, 0.22e-3, 1e-12);
    near(gaps[0].value, 0.29e-3, 1e-12);
  });

  it('move one row of the stackup for all runs, and a family’s value for all its nets', () => {
    const text = `stackup { copper TOP 35 um; prepreg 0.2 mm ± 10 % er 4.2; plane GND 18 um }\nfamily pin { swing 3 V; rise 2 ns; source 30 ohm ± 10 %; load 1 Mohm, 5 pF }\nnet A is pin\nnet B is pin\nnet V { source 100 ohm; load 10 kohm; tolerates 1 V peak }\n${run('0.3 mm')}run s on TOP for 20 mm { trace B 0.2 mm; gap 0.3 mm; trace V 0.15 mm }\n`;
    const project = projectOf(text);
    assert.deepEqual(tolerancedQuantities(project).map(({ what }) => what), ['thickness of prepreg', 'resistance of the source of family pin']);
    const { contributions } = budgetOf(bounded(text), 'V');
    for (const { bounds, value } of contributions.filter(({ channel }) => channel === 'coupled')) assert.ok(bounds![0] < value && value < bounds![1]);
  });

  it('make a budget low that is over at a corner, whatever the headroom', () => {
    const text = `${microstrip}${nets}${run('0.3 mm ± 30 %')}`;
    const { total, bounds } = budgetOf(bounded(text), 'V');
    const between = ((total! + bounds![1]) / 2) * 1e3;
    const low = budgetOf(bounded(text.replace('tolerates 100 mV', `tolerates ${between} mV`)), 'V');
    assert.equal(low.verdict, 'low');
    assert.equal(budgetOf(bounded(text.replace('tolerates 100 mV', `tolerates ${bounds![1] * 1.01} V`)), 'V').verdict, 'pass');
  });

  it('are the total itself where nothing has a tolerance', () => {
    const { bounds, total, movedBy } = budgetOf(bounded(`${microstrip}net A { swing 3 V; rise 2 ns; source 30 ohm }\nnet V { source 100 ohm; load 10 kohm; tolerates 1 V peak }\n${run('0.3 mm')}`), 'V');
    assert.deepEqual([bounds, movedBy], [[total, total], []]);
  });
});
