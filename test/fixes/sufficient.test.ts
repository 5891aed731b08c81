/** What a search for a hint costs: counted, since times flicker. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { createSolveCache, type SolveCache } from '../../server/src/budget/solveCache';
import { sufficientGap, sufficientLength, type Sufficient } from '../../server/src/fixes/sufficient';
import { fixing } from '../support/fixing';

const head = `board b { clearance 0.12 mm }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 1 ns; source 50 ohm; load 50 ohm }
net B { swing 5 V; rise 1 ns; source 50 ohm; load 50 ohm }
net V { source 50 ohm; load 50 ohm; tolerates 40 mV peak }
net W { source 50 ohm; load 50 ohm; tolerates 40 mV peak }
`;
const run = (name: string, [from, gap, to]: readonly [string, number, string]) => `run ${name} on TOP for 20 mm { trace ${from} 0.2 mm; gap ${gap} mm; trace ${to} 0.2 mm }\n`;
const board = head + run('one', ['A', 0.2, 'V']) + run('two', ['B', 0.5, 'V']) + run('three', ['A', 0.3, 'W']);

/** Both values of a run, and how many evaluations were made for them now. */
function searched(text: string, name: string, cache: SolveCache): { readonly gap: Sufficient | null; readonly length: Sufficient | null; readonly evaluations: number } {
  const { context } = fixing(new Map([['board.quiet', text]]), cache);
  let evaluations = 0;
  const counting = { ...context, evaluateProject: (project: typeof context.project) => (evaluations += 1, context.evaluateProject(project)) };
  const found = context.project.runs.find((each) => each.name === name)!;
  return { gap: sufficientGap(counting, found, 0), length: sufficientLength(counting, found), evaluations };
}

describe('the value that would just do', () => {
  it('is searched for once, wherever the text moves its run', () => {
    const cache = createSolveCache();
    const first = searched(board, 'one', cache);
    assert.ok(0 < first.evaluations && first.gap?.enough && first.length?.enough);
    const moved = searched(`# a comment\n\n${board.replace('net W {', '## Listens too.\nnet W {').replace('A 0.2 mm; gap 0.3', 'A 0.21 mm; gap 0.3')}`, 'one', cache);
    assert.deepEqual(moved, { ...first, evaluations: 0 });
  });

  it('is searched for anew when anything that it rests on is another', () => {
    const cache = createSolveCache();
    searched(board, 'one', cache);
    const changes: readonly (readonly [string, string])[] = [
      ['gap 0.2 mm', 'gap 0.25 mm'], ['gap 0.5 mm', 'gap 0.6 mm'], ['tolerates 40 mV', 'tolerates 45 mV'], ['swing 3.3 V', 'swing 3 V'],
      ['clearance 0.12 mm', 'clearance 0.12 mm; headroom 1 dB'], ['clearance 0.12 mm', 'clearance 0.12 mm; combine rss'], ['rise 1 ns', 'rise 2 ns'], ['gap 0.2 mm', 'gap 7.874016 mil'],
    ];
    for (const [before, after] of changes) {
      const text = board.replace(before, after);
      const seen = searched(text, 'one', cache);
      assert.ok(0 < seen.evaluations, after);
      const { gap, length } = searched(text, 'one', createSolveCache());
      assert.deepEqual([seen.gap, seen.length], [gap, length], after);
    }
  });

  it('is out of reach without a search where the rest of the budget alone is too much', () => {
    const over = board.replace('gap 0.5 mm', 'gap 0.15 mm').replace('net B { swing 5 V', 'net B { swing 24 V');
    const cache = createSolveCache();
    const { gap, length, evaluations } = searched(over, 'one', cache);
    assert.equal(evaluations, 0);
    assert.deepEqual([gap?.enough, gap?.written, length?.enough], [false, '10 mm', false]);
    // And so it is: the widest gap leaves the receiver over.
    const { evaluation } = fixing(new Map([['board.quiet', over.replace('gap 0.2 mm', 'gap 10 mm')]]), cache);
    assert.equal(evaluation.budgets.find(({ subject }) => subject.name === 'V')!.verdict, 'over');
  });
});
