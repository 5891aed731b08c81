/**
 * On boards of every kind of way, a fix that is offered keeps what its title says when the text is read and computed afresh,
 * makes no budget fail that did not, and loses no comment.
 */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { fixesFor } from '../../server/src/fixes/index';
import { voltageInText, type BudgetFault } from '../../server/src/rules/budgetFault';
import { evaluated, rootPath } from '../support/evaluated';
import { everyKindOfBoard } from '../support/everyKindOfBoard';
import { fixing, withEdits } from '../support/fixing';

const boards = 150;
const concerned = /^(Shrink|Lay|Give|Slow) /;
const rank = { pass: 0, low: 1, unknown: 2, over: 3 };

describe('fixes of every way on seeded boards', () => {
  const offered = new Map<string, number>();
  const cache = createSolveCache();
  for (let seed = 1; seed <= boards; seed += 1) {
    // Runs, where there are any, nearly always dominate, and have fixes of their own, tried elsewhere.
    const text = everyKindOfBoard(seed).filter((declaration) => !declaration.startsWith('run ')).map((declaration, at) => `${declaration}  # remark ${at}\n`).join('');
    if (!/^(loop|return|link) /m.test(text)) continue;
    it(`seed ${seed}`, () => {
      const { findings, evaluation, context } = fixing(new Map([[rootPath, text]]), cache);
      for (const finding of findings.filter(({ rule }) => rule === 'over-budget')) {
        for (const { title, edits } of fixesFor(finding, context)) {
          const kind = concerned.exec(title)?.[1];
          if (kind === undefined) continue;
          offered.set(kind, (offered.get(kind) ?? 0) + 1);
          const after = withEdits(new Map([[rootPath, text]]), edits).get(rootPath)!;
          const words = `${title}\n${after}`;
          const now = evaluated(new Map([[rootPath, after]]), createSolveCache());
          assert.deepEqual(now.project.errors, [], words);
          assert.deepEqual(after.match(/# remark \d+/g), text.match(/# remark \d+/g), words);
          const { budget } = finding.fault as BudgetFault;
          const same = now.evaluation.budgets.find(({ subject, kind: what, measure }) => subject.name === budget.subject.name && what === budget.kind && measure === budget.measure)!;
          const [, amount, rest] = /: ([\d.]+ \S+(?: rms)?) of [\d.]+ \S+(?: rms)?(, still over|, still short of the headroom| so far)?$/.exec(title) ?? [];
          assert.equal(amount, voltageInText(same.total!, same), words);
          assert.equal(same.verdict, rest === undefined ? 'pass' : rest === ', still over' ? 'over' : rest === ' so far' ? 'unknown' : 'low', words);
          assert.ok(same.total! < budget.total!, words);
          for (const [at, each] of now.evaluation.budgets.entries()) assert.ok(rank[each.verdict] <= rank[evaluation.budgets[at]!.verdict], words);
        }
      }
    });
  }

  it('were offered of each kind that such boards have', () => {
    for (const kind of ['Shrink', 'Give', 'Slow']) assert.ok(1 < (offered.get(kind) ?? 0), JSON.stringify([...offered]));
  });
});
