/** What cannot be read makes exactly those budgets incomplete that may lack something for it. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { layers, resolved } from './resolved';

const board = `${layers}family slow { rise 50 ns }
net A is slow { swing 3 V; source 33 ohm }
net B { tolerates 1 V peak; load 1 kohm }
net C { swing 3 V; rise 1 ns }
net D { tolerates 1 V peak; load 1 kohm }
net E { tolerates 1 V peak; load 1 kohm }
net F { tolerates 1 V peak; load 1 kohm }
pair P { plus B; minus F; tolerates 1 V peak }
run ab on TOP for 10 mm { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }
run cd on BOTTOM for 10 mm { trace C 0.2 mm; gap 0.2 mm; trace D 0.2 mm }
loop l on TOP { rectangle 5 mm by 5 mm; carries C }
loop m on TOP { rectangle 5 mm by 5 mm; senses E }
`;

function affected(from: string, to: string): readonly (string | null)[] {
  assert.ok(board.includes(from), from);
  const { gaps, complete } = resolved(board.replace(from, to));
  assert.equal(complete, false);
  return gaps.some(({ affects }) => affects === null) ? [null] : [...new Set(gaps.flatMap(({ affects }) => affects!))].sort();
}

describe('a gap', () => {
  it('is not there where everything can be read', () => assert.deepEqual(resolved(board).gaps, []));

  it('in a net concerns its neighbours, and the pairs of these', () => {
    assert.deepEqual(affected('load 1 kohm }\nnet C', 'load 1 kohms }\nnet C'), ['A', 'B', 'P']);
    assert.deepEqual(affected('source 33 ohm', 'source -33 ohm'), ['A', 'B', 'P']);
    assert.deepEqual(affected('source 33 ohm', 'sorce 33 ohm'), ['A', 'B', 'P']);
  });

  it('in a net that a loop carries concerns all that loops are sensed by', () => assert.deepEqual(affected('net C { swing 3 V', 'net C { swing V'), ['C', 'D', 'E']));

  it('in a family concerns those that are of it', () => assert.deepEqual(affected('rise 50 ns', 'rise 50 nss'), ['A', 'B', 'P']));

  it('in a pair concerns its nets', () => assert.deepEqual(affected('minus F; tolerates 1 V peak', 'minus F; tolerates 1 peak'), ['A', 'B', 'F', 'P']));

  it('in a run concerns what lies in it, and takes the run away', () => {
    assert.deepEqual(affected('gap 0.2 mm; trace B', 'gap 0 mm; trace B'), ['A', 'B', 'P']);
    assert.deepEqual(affected('gap 0.2 mm; trace B', 'gp 0.2 mm; trace B'), ['A', 'B', 'P']);
    assert.deepEqual(resolved(board.replace('gap 0.2 mm; trace B', 'gap 0 mm; trace B')).runs.map(({ name }) => name), ['cd']);
    assert.deepEqual(affected('on TOP for 10 mm', 'on TPO for 10 mm'), ['A', 'B', 'P']);
  });

  it('in a loop concerns all that loops are sensed by', () => assert.deepEqual(affected('rectangle 5 mm by 5 mm; carries', 'rectangle 5 by 5 mm; carries'), ['C', 'E']));

  it('in a stackup concerns what lies between the planes around it', () => {
    assert.deepEqual(affected('mask    25 um er 3.4', 'mask    25 um er 0.4'), ['A', 'B', 'P']);
    assert.deepEqual(affected('core    1.1 mm er 4.4', 'core    1.1 mm er'), ['E']);
    const { runs, stackups } = resolved(board.replace('prepreg 0.2 mm er 4.2', 'prepreg 0 mm er 4.2'));
    assert.deepEqual(runs.map(({ name }) => name), ['cd']);
    assert.equal(stackups[0].rows.length, 7);
  });

  it('between declarations, in a head or in a `use` concerns every budget', () => {
    assert.deepEqual(affected('net E', 'nt E'), [null]);
    assert.deepEqual(affected('net E {', 'net {'), [null]);
    assert.deepEqual(affected('family slow', 'use "gone.quiet"\nfamily slow'), [null]);
  });

  it('says what could not be read', () => {
    const what = (from: string, to: string) => resolved(board.replace(from, to)).gaps.map((gap) => gap.what);
    assert.deepEqual(what('gap 0.2 mm; trace B', 'gap 0 mm; trace B'), ['the gap between A and B in run ab']);
    assert.deepEqual(what('source 33 ohm', 'source -33 ohm'), ['the source resistance of net A']);
    assert.deepEqual(what('source 33 ohm', 'sorce 33 ohm'), ['a line of net A']);
    assert.deepEqual(what('trace B 0.2', 'trace X 0.2'), ['`X` in run ab']);
  });
});
