/** One deleted word gives at most two findings: where it is missing, and whose budgets that takes with it. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { parse } from '../../server/src/syntax/parse';
import { evaluated, rootPath } from '../support/evaluated';

const board = `stackup {
  copper TOP 35 um
  prepreg 0.2 mm er 4.2
  plane GND1 18 um
}
board two-runs { headroom 3 dB; clearance 0.12 mm }
family fast is lvcmos33 { rise 1.5 ns; source 40 ohm; load 1 Mohm, 6 pF }
net CLK is fast { repeats 8 MHz; length 62 mm }
net PWM { swing 12 V; rise 30 ns; source 10 ohm; load 10 kohm, 1.2 nF; switches with PUMP }
net A { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 V peak }
net B { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 V peak }
run one on TOP for 20 mm { trace CLK 0.15 mm; gap 0.3 mm; trace A 0.15 mm after 2 mm }
run two on TOP for 20 mm {
  trace PWM 0.25 mm
  gap 0.35 mm
  guard GND 0.3 mm stitched 5 mm
  gap 0.35 mm
  trace B 0.15 mm reversed
}
`;

/** With a word less the board is another one, and its numbers are others. */
const onNumbers: ReadonlySet<string> = new Set(['over-budget', 'low-margin', 'dominant-coupling', 'outside-model']);

describe('one deleted word', () => {
  it('gives at most two findings', () => {
    const cache = createSolveCache();
    const found = (text: string) => evaluated(new Map([[rootPath, text]]), cache).findings.filter(({ rule }) => !onNumbers.has(rule));
    assert.deepEqual(found(board), []);
    let broken = 0;
    for (const { kind, start, end } of parse(board).tokens) {
      if (kind === 'newline' || kind === 'comment') continue;
      const findings = found(board.slice(0, start) + board.slice(end));
      if (0 < findings.length) broken += 1;
      const words = `without ${board.slice(start, end)} in line ${board.slice(0, start).split('\n').length}:\n${findings.map(({ rule, message }) => `${rule}: ${message}`).join('\n')}`;
      assert.ok(findings.length <= 2, words);
    }
    assert.ok(100 < broken, `${broken} words were missed`);
  });
});
