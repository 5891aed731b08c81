/** Boards that nobody wrote: what must hold of every evaluation. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { generatedBoard } from '../support/generatedBoard';
import { near } from '../support/near';
import { projectOf } from './project';

const boards = 25;

describe('evaluations of generated boards', () => {
  const cache = createSolveCache();
  const evaluations = Array.from({ length: boards }, (_, seed) => ({ seed, evaluation: evaluate(projectOf(generatedBoard(seed)), cache) }));

  it('hold finite numbers, none negative that is a magnitude', () => {
    for (const { seed, evaluation } of evaluations) {
      for (const { total, errorBar, contributions, marginDb } of evaluation.budgets) {
        for (const value of [total ?? 0, errorBar ?? 0, ...contributions.flatMap((each) => [each.value, each.errorBar])]) assert.ok(0 <= value && value < Infinity, `seed ${seed}: ${value}`);
        assert.ok(marginDb === null || Number.isFinite(marginDb), `seed ${seed}`);
      }
      for (const { couplings } of evaluation.runs) {
        for (const { nearEnd, farEnd, atReceiver, peakTime, widthHalf, capacitivePart, inductivePart, ...coupling } of couplings) {
          const waveform = coupling.waveform!;
          for (const value of [nearEnd, farEnd, atReceiver, peakTime, widthHalf, capacitivePart, inductivePart, ...waveform.values, ...waveform.times]) assert.ok(Number.isFinite(value), `seed ${seed}: ${value}`);
          const largest = waveform.values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
          near(largest, Math.abs(atReceiver), 2e-3, `seed ${seed}: the picture's peak`);
        }
      }
    }
  });

  it('have totals that their contributions make up, and verdicts that their margins give', () => {
    for (const { seed, evaluation } of evaluations) {
      for (const budget of evaluation.budgets) {
        if (budget.combine === 'worst' && budget.total !== null) near(budget.total, budget.contributions.reduce((sum, { value }) => sum + value, 0), 1e-12, `seed ${seed}`);
        assert.equal(budget.complete, budget.unaccounted.length === 0);
        if (!budget.complete) assert.ok(budget.verdict === 'unknown' || budget.verdict === 'over');
        if (budget.verdict === 'over') assert.ok(budget.tolerates < budget.total!);
        assert.deepEqual([...budget.contributions].sort((a, b) => b.value - a.value).map(({ value }) => value), budget.contributions.map(({ value }) => value));
      }
    }
  });

  it('are the same evaluated afresh as from what was solved before', () => {
    for (const { seed, evaluation } of evaluations.slice(0, 6)) {
      const again = evaluate(projectOf(generatedBoard(seed)), createSolveCache());
      assert.deepEqual(again.budgets.map(({ total, marginDb }) => [total, marginDb]), evaluation.budgets.map(({ total, marginDb }) => [total, marginDb]), `seed ${seed}`);
    }
  });
});
