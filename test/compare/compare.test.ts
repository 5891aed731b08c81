/** What a revision did to the margins, against evaluations of the boards themselves. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { changesBetween } from '../../server/src/compare/changes';
import { comparisonOf, type Comparison } from '../../server/src/compare/compare';
import { declarationsOf } from '../../server/src/compare/declarations';
import { parse } from '../../server/src/syntax/parse';
import { evaluated } from '../support/evaluated';

const board = `board b { headroom 3 dB }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
family quick { swing 3.3 V; rise 3 ns; source 40 ohm; load 1 Mohm, 5 pF }
net CLK is quick
net DATA is quick
net SENSE { source 200 ohm; load 1 Mohm, 8 pF; tolerates 20 mV peak }
net CALM { source 200 ohm; load 1 Mohm, 8 pF; tolerates 1 V peak }
run r on TOP for 20 mm {
  trace CLK 0.2 mm
  gap 0.4 mm
  trace SENSE 0.2 mm
}
run s on TOP for 20 mm { trace DATA 0.2 mm; gap 0.8 mm; trace SENSE 0.2 mm }
run t on TOP for 5 mm { trace DATA 0.2 mm; gap 2 mm; trace CALM 0.2 mm }
`;

function compared(before: string | readonly string[], after: string | readonly string[]): Comparison {
  const trees = (texts: string | readonly string[]) => [texts].flat().map((text) => parse(text));
  const steps = comparisonOf(trees(before), trees(after), createSolveCache());
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
  }
}

const totalOf = (text: string, net: string) => evaluated(new Map([['board.quiet', text]])).evaluation.budgets.find(({ subject }) => subject.name === net)!.total!;
const words = ({ changes }: Comparison) => changes.map(({ title, words: said }) => `${title}: ${said}`);

describe('a comparison', () => {
  it('of a board with itself says that nothing moved', () => {
    assert.deepEqual(compared(board, board), { changes: [], moved: [], unmoved: 2 });
  });

  it('does not mind order, white space, comments and files', () => {
    const [head, ...declarations] = board.split(/\n(?=stackup|family|net|run)/);
    const shuffled = declarations.toReversed().join('\n').replace('gap 0.4 mm', 'gap   0.4 mm # as placed');
    assert.deepEqual(compared(board, [head, shuffled]), { changes: [], moved: [], unmoved: 2 });
  });

  it('says what moved, by how much, and because of what: each change set back on its own', () => {
    const after = board.replace('gap 0.4 mm', 'gap 0.3 mm').replace('run s on TOP for 20 mm', 'run s on TOP for 30 mm');
    const comparison = compared(board, after);
    assert.deepEqual(words(comparison), ['run r: gap 0.4 mm → 0.3 mm', 'run s: on TOP for 20 mm → on TOP for 30 mm']);
    assert.equal(comparison.unmoved, 1);
    const [{ before, after: now, because, together }] = comparison.moved;
    assert.equal(before!.total, totalOf(board, 'SENSE'));
    assert.equal(now!.total, totalOf(after, 'SENSE'));
    assert.deepEqual(because.map(({ change }) => change.title).sort(), ['run r', 'run s']);
    for (const { change, added } of because) {
      const setBack = change.title === 'run r' ? after.replace('gap 0.3 mm', 'gap 0.4 mm') : after.replace('for 30 mm', 'for 20 mm');
      assert.ok(Math.abs(added - (totalOf(after, 'SENSE') - totalOf(setBack, 'SENSE'))) < 1e-12);
    }
    // Peaks of two runs add: what the two changes make is the sum of what each makes.
    assert.ok(Math.abs(together!) < 1e-9 * now!.total!);
  });

  it('blames a family for what it does to all of its nets, and says what changes do only together', () => {
    const after = board.replace('rise 3 ns', 'rise 1 ns').replace('gap 0.4 mm', 'gap 0.25 mm');
    const { moved: [{ because, together, isWorseThanAllowed }] } = compared(board, after);
    assert.deepEqual(because.map(({ change: { title } }) => title).sort(), ['family quick', 'run r']);
    assert.ok(isWorseThanAllowed);
    assert.ok(together! < 0, 'each alone on top of the other counts the product twice');
  });

  it('knows a budget that is new, and one that is gone', () => {
    const after = board.replace('net CALM {', 'net OTHER { source 1 kohm; load 1 kohm; tolerates 1 mV peak }\nnet CALM {').replace('tolerates 1 V peak', '');
    const { moved } = compared(board, after);
    assert.deepEqual(moved.map(({ before, after: now }) => [before?.subject.name ?? null, now?.subject.name ?? null]), [[null, 'OTHER'], ['CALM', null]]);
  });

  it('takes a budget that became incomplete for worse', () => {
    const { moved } = compared(board, board.replace('gap 0.4 mm', 'gap 0.4'));
    assert.ok(moved.some(({ after, isWorseThanAllowed }) => after?.subject.name === 'SENSE' && after.verdict === 'unknown' && isWorseThanAllowed));
  });

  it('puts what is over now first', () => {
    const { moved } = compared(board, board.replace('gap 0.4 mm', 'gap 0.1 mm').replace('gap 2 mm', 'gap 0.5 mm'));
    assert.deepEqual(moved.map(({ after }) => after!.subject.name), ['SENSE', 'CALM']);
  });

  it('reads whatever stands in a text', () => {
    for (const text of ['', '{', 'net', 'net A { net A { } }', 'net A { once }\nnet A { once }', '"', 'run r {', '🔌'.repeat(50)]) {
      compared(text, board);
      compared(board, text);
    }
  });
});

describe('changes', () => {
  const between = (before: string, after: string) => changesBetween(declarationsOf([parse(before)]), declarationsOf([parse(after)])).map(({ title, words: said }) => `${title}: ${said}`);

  for (const [before, after, expected] of [
    ['net A { rise 2 ns }', 'net A { rise 0.8 ns }', ['net A: rise 2 ns → 0.8 ns']],
    ['net A { rise 2 ns }', 'net A { rise 2 ns; once }', ['net A: new once']],
    ['net A { rise 2 ns; once }', 'net A { rise 2 ns }', ['net A: no once']],
    ['net A is x', 'net A is y', ['net A: is x → is y']],
    ['net A { once }', 'net B { once }', ['net A: gone', 'net B: new']],
    ['stackup { copper T 35 um; prepreg 0.2 mm er 4.2 }', 'stackup { copper T 35 um; prepreg 0.16 mm er 4.2 }', ['stackup: prepreg 0.2 mm er 4.2 → 0.16 mm er 4.2']],
    ['stackup { copper T 35 um; core 1 mm er 4 }', 'stackup { core 1 mm er 4; copper T 35 um }', ['stackup: in another order']],
    ['net A { swing 3 V; rise 1 ns; fall 1 ns; source 1 ohm; load 1 ohm }', 'net A { swing 4 V; rise 2 ns; fall 2 ns; source 2 ohm; load 2 ohm }', ['net A: swing 3 V → 4 V; rise 1 ns → 2 ns; fall 1 ns → 2 ns; source 1 ohm → 2 ohm; and 1 more']],
  ] as const) {
    it(`says ${expected.join(', ')}`, () => assert.deepEqual(between(before, after), expected));
  }
});
