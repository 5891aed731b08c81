import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { budgetOf, evaluated, microstrip } from './board';
import { projectOf } from './project';

const receiver = 'net V { source 100 ohm; load 10 kohm; tolerates 1 V peak }\n';
const beside = (net: string) => `run r on TOP for 30 mm { trace ${net} 0.2 mm; gap 0.3 mm; trace V 0.15 mm }\n`;

const lacks = (text: string, name = 'V') => budgetOf(evaluated(microstrip + receiver + text), name).unaccounted.map(({ what }) => what);

describe('what a budget says it lacks', () => {
  it('is nothing for a source with an edge', () => {
    assert.deepEqual(lacks(`net A { swing 3 V; rise 1 ns; source 50 ohm; load 50 ohm }\n${beside('A')}`), []);
  });

  it('says why a run has no numbers', () => {
    const bare = 'stackup { core 1 mm er 4.4; copper TOP 35 um }\n';
    const text = `${bare}${receiver}net A { swing 3 V; rise 1 ns; source 50 ohm; load 50 ohm }\n${beside('A')}`;
    const evaluation = evaluated(text);
    assert.deepEqual(evaluation.runs[0].refusal, { reason: 'no-reference' });
    assert.deepEqual(budgetOf(evaluation, 'V').unaccounted.map(({ what }) => what), ['run r is not counted: neither a plane nor a `return` carries its current back']);
  });

  it('says what could not be read, and computes the rest', () => {
    const text = `${microstrip}${receiver}net A { swing 3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet B { swing 3; rise 1 ns; source 50 ohm; load 50 ohm }
      run r on TOP for 30 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm; gap 0.3 mm; trace B 0.2 mm }`;
    const budget = budgetOf(evaluate(projectOf(text), createSolveCache()), 'V');
    assert.equal(budget.verdict, 'unknown');
    assert.ok(budget.unaccounted.some(({ what }) => /could not be read$/.test(what)), JSON.stringify(budget.unaccounted));
    assert.deepEqual(budget.contributions.filter(({ channel }) => channel === 'coupled').map(({ from }) => from), ['A']);
  });

  it('says of a source without rise that its rise is not counted', () => {
    const project = projectOf(`${microstrip}${receiver}net A { swing 3 V; source 50 ohm; load 50 ohm }\n${beside('A')}`);
    const budget = budgetOf(evaluate(project, createSolveCache()), 'V');
    assert.ok(budget.unaccounted.some(({ what }) => what === 'the `rise` of A in run r is not counted: it states none'), JSON.stringify(budget.unaccounted));
  });
});
