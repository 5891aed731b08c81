/** What an edit costs: counted, since times flicker. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { createSolveCache, type SolveCache } from '../../server/src/budget/solveCache';
import { evaluated, microstrip } from './board';

const runs = 300;

/** A thousand lines: every run has gaps of its own. */
function largeBoard(change: (line: string, index: number) => string = (line) => line): string {
  const nets = Array.from({ length: 20 }, (_, i) => `net S${i} { swing 3.3 V; rise 2 ns; source 33 ohm; load 10 kohm }\nnet R${i} { source 50 ohm; load 50 ohm; tolerates 0.5 V peak }`);
  const rows = Array.from({ length: runs }, (_, i) => change(`run r${i} on TOP for 20 mm {\n  trace S${i % 20} 0.2 mm\n  gap ${(0.2 + 0.001 * i).toFixed(3)} mm\n  trace R${(i * 7) % 20} 0.15 mm\n}`, i));
  return [microstrip, ...nets, ...rows].join('\n');
}

function workOf(text: string, cache: SolveCache) {
  return evaluated(text, cache).work;
}

describe('the work of an evaluation', () => {
  it('is a section and its lines for each run at first, and nothing the second time', () => {
    const cache = createSolveCache();
    assert.deepEqual(workOf(largeBoard(), cache), { sectionsSolved: runs, linesSolved: runs, circuitsSolved: 0, inductancesSolved: 0 });
    assert.deepEqual(workOf(largeBoard(), cache), { sectionsSolved: 0, linesSolved: 0, circuitsSolved: 0, inductancesSolved: 0 });
    // One gap: that section, that line.
    const oneGap = largeBoard((line, i) => (i === 150 ? line.replace(/gap .* mm/, 'gap 0.777 mm') : line));
    assert.deepEqual(workOf(oneGap, cache), { sectionsSolved: 1, linesSolved: 1, circuitsSolved: 0, inductancesSolved: 0 });
    // One length: the section stays.
    const oneLength = largeBoard((line, i) => (i === 150 ? line.replace('for 20 mm', 'for 21 mm') : line));
    assert.deepEqual(workOf(oneLength, cache), { sectionsSolved: 0, linesSolved: 1, circuitsSolved: 0, inductancesSolved: 0 });
    // What moves nothing in the copper costs nothing: names, limits, swings, comments.
    const limit = largeBoard().replaceAll('tolerates 0.5 V peak', 'tolerates 0.4 V peak').replace('swing 3.3 V', 'swing 5 V');
    assert.deepEqual(workOf(limit, cache), { sectionsSolved: 0, linesSolved: 0, circuitsSolved: 0, inductancesSolved: 0 });
    // One driver's edge: the lines of its runs.
    assert.deepEqual(workOf(largeBoard().replace('rise 2 ns', 'rise 3 ns'), cache), { sectionsSolved: 0, linesSolved: runs / 20, circuitsSolved: 0, inductancesSolved: 0 });
  });

  it('of one loop among sixty is its own inductance, its mutual ones and the circuits of its receiver', () => {
    const [carrying, sensing] = [30, 30];
    const board = (width: (index: number) => number) => [
      ...Array.from({ length: carrying }, (_, i) => `net A${i} { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 kohm }\nloop out${i} { carries A${i}; rectangle 8 mm by 4 mm at (${12 * i + 0.01 * i * i} mm, 0 mm); wire 0.4 mm }`),
      ...Array.from({ length: sensing }, (_, i) => `net V${i} { source 1 kohm; load 1 Mohm; tolerates 1 V peak }\nloop in${i} { senses V${i}; rectangle ${width(i)} mm by ${3 + 0.0137 * i} mm at (${12 * i + 0.013 * i * i + 0.37} mm, 10 mm); wire 0.4 mm }`),
    ].join('\n');
    const cache = createSolveCache();
    const first = workOf(board(() => 8), cache);
    assert.equal(first.circuitsSolved, carrying * sensing);
    assert.equal(first.inductancesSolved, carrying + sensing + carrying * sensing);
    assert.deepEqual(workOf(board(() => 8), cache), { sectionsSolved: 0, linesSolved: 0, circuitsSolved: 0, inductancesSolved: 0 });
    assert.deepEqual(workOf(board((i) => (i === 7 ? 7.5 : 8)), cache), { sectionsSolved: 0, linesSolved: 0, circuitsSolved: carrying, inductancesSolved: 1 + carrying });
  });

  it('is shared by runs that are alike', () => {
    const cache = createSolveCache();
    assert.deepEqual(workOf(largeBoard((line) => line.replace(/gap .* mm/, 'gap 0.3 mm')), cache), { sectionsSolved: 1, linesSolved: 1, circuitsSolved: 0, inductancesSolved: 0 });
  });

  it('forgets what was not asked for longest, within a bound', () => {
    const cache = createSolveCache({ sections: 10, lines: 10, circuits: 10, inductances: 10, runs: 0 });
    const gap = (value: number) => `${microstrip}net A { swing 1 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet V { source 50 ohm; load 50 ohm; tolerates 1 V peak }\nrun r on TOP for 9 mm { trace A 0.2 mm; gap ${value} mm; trace V 0.2 mm }`;
    for (let i = 0; i < 10; i += 1) workOf(gap(0.2 + i / 10), cache);
    assert.equal(workOf(gap(0.2), cache).sectionsSolved, 0);
    assert.equal(workOf(gap(1.5), cache).sectionsSolved, 1);
    // 0.3 mm was the one unused for longest; 0.2 mm had just been asked for.
    assert.equal(workOf(gap(0.2), cache).sectionsSolved, 0);
    assert.equal(workOf(gap(0.3), cache).sectionsSolved, 1);
  });
});
