/**
 * What every budget has to be, whatever the board: a number that is finite and not negative, the same in any order of declarations,
 * and no larger where physics says so. `BOARDS=10000` tries that many; a few hundred otherwise.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import type { Evaluation } from '../../server/src/budget/results';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { resolveProject } from '../../server/src/board/project';
import { findingsOf } from '../../server/src/rules/index';
import { parse } from '../../server/src/syntax/parse';
import { everyKindOfBoard, shuffled } from '../support/everyKindOfBoard';
import { seeded } from '../support/generatedBoard';

const boards = Number(process.env['BOARDS'] ?? 250);
const cache = createSolveCache();

function evaluated(text: string): Evaluation {
  const project = resolveProject('board.quiet', { read: () => ({ tree: parse(text) }) });
  assert.deepEqual(project.errors.map(({ message }) => message), [], text);
  return evaluate(project, cache);
}

const totals = ({ budgets }: Evaluation) => new Map(budgets.map(({ subject, kind, measure, total, unaccounted }) => [`${subject.name} ${kind} ${measure}`, { total, lacks: unaccounted.map(({ what }) => what).sort() }]));

describe('boards of every kind', () => {
  it('have totals that are numbers, are never negative, and never less than their largest part', () => {
    for (let seed = 1; seed <= boards; seed += 1) {
      const text = everyKindOfBoard(seed).join('\n');
      const evaluation = evaluated(text);
      for (const { subject, total, errorBar, contributions, marginDb } of evaluation.budgets) {
        const said = `seed ${seed}, ${subject.name}`;
        if (total !== null) assert.ok(Number.isFinite(total) && 0 <= total, `${said}: ${total}`);
        if (errorBar !== null) assert.ok(Number.isFinite(errorBar) && 0 <= errorBar, `${said}: ± ${errorBar}`);
        if (marginDb !== null) assert.ok(Number.isFinite(marginDb), said);
        for (const { value, errorBar: own, unfiltered } of contributions) {
          assert.ok(Number.isFinite(value) && 0 <= value && 0 <= own, `${said}: ${value} ± ${own}`);
          assert.ok(value <= total! * (1 + 1e-9), `${said}: ${value} of ${total}`);
          if (unfiltered !== null) assert.ok(0 <= unfiltered, said);
        }
      }
      for (const { message } of findingsOf(evaluation)) assert.doesNotMatch(message, /NaN|undefined|Infinity|null/, `seed ${seed}`);
    }
  });

  it('say the same in any order of their declarations', () => {
    for (let seed = 1; seed <= boards / 5; seed += 1) {
      const declarations = everyKindOfBoard(seed);
      assert.deepEqual(totals(evaluated(shuffled(declarations, seeded(seed + 77)).join('\n'))), totals(evaluated(declarations.join('\n'))), `seed ${seed}`);
    }
  });
});

describe('what physics says is no more', () => {
  it('a wider gap beside an unguarded neighbour', () => {
    const random = seeded(3);
    for (let n = 0; n < boards / 10; n += 1) {
      const ends = random.pick(['source 50 ohm; load 50 ohm', 'source 10 ohm; load 1 Mohm, 10 pF', 'source 1 kohm; load 10 kohm']);
      const rise = random.pick(['1 ns', '20 ns', '500 ns']);
      let before = Infinity;
      for (const gap of [0.15, 0.3, 0.6, 1.2, 2.4]) {
        const { budgets } = evaluated(`stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\nnet A { ${ends}; swing 5 V; rise ${rise} }\nnet V { ${ends}; tolerates 1 V peak }\nrun r on TOP for 30 mm { trace A 0.2 mm; gap ${gap} mm; trace V 0.2 mm }`);
        const { total, errorBar } = budgets[0]!;
        assert.ok(total! - errorBar! <= before, `${ends}, ${rise}, ${gap} mm: ${total} after ${before}`);
        before = total! + errorBar!;
      }
    }
  });

  it('a smaller loop beside another', () => {
    let before = Infinity;
    for (const height of [9, 6, 4, 2, 1]) {
      const { budgets } = evaluated(`net A { source 5 ohm; load 50 ohm; swing 5 V; rise 20 ns }\nnet V { source 1 kohm; load 1 Mohm; tolerates 1 V peak }\nloop out { carries A; rectangle 20 mm by 10 mm; wire 0.5 mm }\nloop in { senses V; rectangle 20 mm by ${height} mm at (0 mm, 12 mm); wire 0.3 mm }`);
      assert.ok(budgets[0]!.total! < before);
      before = budgets[0]!.total!;
    }
  });
});
