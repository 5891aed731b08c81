/** From a board's text to its evaluation, through the rooms below `budget` only. */
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import type { Budget, Coupling, Evaluation } from '../../server/src/budget/results';
import { createSolveCache, type SolveCache } from '../../server/src/budget/solveCache';
import { projectOf } from './project';

/** Of a text without errors. */
export function evaluated(text: string, cache: SolveCache = createSolveCache()): Evaluation {
  const project = projectOf(text);
  assert.deepEqual(project.errors.map(({ message }) => message), []);
  return evaluate(project, cache);
}

export function budgetOf(evaluation: Evaluation, name: string, measure: Budget['measure'] = 'peak'): Budget {
  const found = evaluation.budgets.find((budget) => budget.subject.name === name && budget.measure === measure);
  assert.ok(found, `no budget of ${name}`);
  return found;
}

export function couplingOf(evaluation: Evaluation, aggressor: string, victim: string): Coupling {
  const found = evaluation.runs.flatMap(({ couplings }) => couplings).filter((coupling) => coupling.aggressor.name === aggressor && coupling.victim.name === victim);
  assert.equal(found.length, 1, `${found.length} couplings from ${aggressor} to ${victim}`);
  return found[0];
}

/** A-MS of the reference cases: traces of 0.2 mm, 35 µm thick, 0.2 mm over a plane, er 4.2, bare. */
export const microstrip = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
