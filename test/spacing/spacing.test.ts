/** Distances for layout: each is seen to do by the whole way from text, and the next worse one not to. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { Session } from '../../server/src/service/session';
import type { Spacing, SpacingOptions } from '../../server/src/spacing/spacing';
import { longestRun, smallestGap } from '../../server/src/spacing/solveDistance';
import { metres } from '../../server/src/units/quantity';
import { evaluated } from '../support/evaluated';

const board = `board b { headroom 3 dB; clearance 0.15 mm }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um; core 1 mm er 4.4; copper BOTTOM 35 um }
net CLK { swing 3.3 V; rise 3 ns; source 40 ohm; load 1 Mohm, 5 pF }
net STEP { swing 5 V; rise 40 ns; source 22 ohm; load 10 kohm }
net TWIN { swing 5 V; rise 40 ns; source 22 ohm; load 10 kohm }
net SENSE { source 200 ohm; load 1 Mohm, 8 pF; tolerates 5 mV peak }
net LOGIC { source 50 ohm; load 10 kohm; tolerates 2 V peak }
`;
const options: SpacingOptions = { gaps: [metres(0.3e-3)], lengths: [metres(20e-3)], width: metres(0.2e-3), placed: false, only: { layer: 'TOP', from: null, to: null } };

function spacingOf(text: string, wanted: Partial<SpacingOptions> = {}): Spacing {
  const session = new Session();
  session.setText('b.quiet', text);
  const steps = session.spacing('b.quiet', { ...options, ...wanted });
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
  }
}

/** Of both directions, the total of the receiver in a board with this run in it, V. */
function totalWith(from: string, to: string, gap: number, length: number): number {
  return Math.max(...['', ' reversed'].map((reversed) => {
    const text = `${board}run seen on TOP for ${length * 1e3} mm { trace ${from} 0.2 mm; gap ${gap * 1e3} mm; trace ${to} 0.2 mm${reversed} }\n`;
    const { evaluation } = evaluated(new Map([['board.quiet', text]]));
    return evaluation.budgets.find(({ subject }) => subject.name === to)!.total!;
  }));
}

describe('spacing', () => {
  const { rows } = spacingOf(board);
  const rowOf = (from: string, to: string) => rows.find((row) => row.from.includes(from) && row.to.includes(to))!;
  const allowed = 5e-3 / 10 ** (3 / 20);

  for (const from of ['CLK', 'STEP']) {
    it(`finds the longest run of ${from} beside SENSE: it does, and one a hundredth longer does not`, () => {
      const [found] = rowOf(from, 'SENSE').longest;
      assert.equal(found.kind, 'found');
      const { value } = found as { value: number };
      assert.ok(totalWith(from, 'SENSE', 0.3e-3, value) <= allowed);
      assert.ok(allowed < totalWith(from, 'SENSE', 0.3e-3, value * 1.02));
    });

    it(`finds the smallest gap of ${from} to SENSE: it does, and two hundredths of a millimetre less do not`, () => {
      const [found] = rowOf(from, 'SENSE').smallest;
      assert.equal(found.kind, 'found');
      const { value } = found as { value: number };
      assert.ok(totalWith(from, 'SENSE', value, 20e-3) <= allowed);
      assert.ok(allowed < totalWith(from, 'SENSE', value - 0.02e-3, 20e-3));
    });
  }

  it('says any where every length and every gap will do', () => {
    assert.deepEqual([rowOf('STEP', 'LOGIC').longest[0].kind, rowOf('STEP', 'LOGIC').smallest[0].kind], ['any', 'any']);
  });

  it('says none where nothing is left for the source', () => {
    const { rows: [row] } = spacingOf(board.replace('tolerates 5 mV', 'tolerates 1 uV'), { only: { layer: 'TOP', from: 'CLK', to: 'SENSE' } });
    assert.deepEqual([row.room, row.longest[0].kind, row.smallest[0].kind], [0, 'none', 'none']);
  });

  it('puts nets that are alike in one row', () => {
    assert.deepEqual(rowOf('STEP', 'SENSE').from, ['STEP', 'TWIN']);
    assert.equal(rows.filter(({ to }) => to.includes('SENSE')).length, 2);
  });

  it('takes off what runs make where that is wanted', () => {
    const placed = `${board}run r on TOP for 10 mm { trace CLK 0.2 mm; gap 0.8 mm; trace SENSE 0.2 mm }\n`;
    const only = { layer: 'TOP', from: 'STEP', to: 'SENSE' };
    const [alone, beside] = [false, true].map((each) => spacingOf(placed, { placed: each, only }).rows[0]);
    assert.ok(0 < beside.room && beside.room < 0.9 * alone.room, String(beside.room / alone.room));
    assert.ok((beside.longest[0] as { value: number }).value < (alone.longest[0] as { value: number }).value);
  });

  it('gives no distance to a net on which insulation depends', () => {
    const { rows: its, leftOut } = spacingOf(board.replace('net STEP { swing 5 V', 'net STEP { working 230 V rms; swing 5 V'));
    assert.deepEqual(leftOut, [{ names: ['STEP'], why: 'insulation' }]);
    assert.ok(its.every(({ from, to }) => !from.includes('STEP') && !to.includes('STEP')));
  });

  it('gives none to a budget that is incomplete', () => {
    const { leftOut } = spacingOf(board.replace('load 1 Mohm, 8 pF', 'load 1, 8 pF'));
    assert.deepEqual(leftOut, [{ names: ['SENSE'], why: 'incomplete' }]);
  });

  it('never promises a run longer than a net is', () => {
    const { rows: [row] } = spacingOf(board.replace('net LOGIC { ', 'net LOGIC { length 30 mm; '), { only: { layer: 'TOP', from: 'CLK', to: 'LOGIC' } });
    assert.equal(row.longest[0].kind, 'any');
  });
});

describe('distances of a noise that is known', () => {
  const both = (excess: (distance: number) => number) => ({ near: excess, sure: excess });

  it('are rounded to the safe side', () => {
    assert.deepEqual(longestRun(both((length) => Math.log(length / 0.012345)), 1, true), { kind: 'found', value: 0.0123 });
    assert.deepEqual(longestRun(both((length) => Math.log(length / 0.0567)), 1, false), { kind: 'found', value: 0.0565 });
    assert.deepEqual(smallestGap(both((gap) => -2 * Math.log(gap / 0.000423)), 1e-4), { kind: 'found', value: 0.00043 });
  });

  it('do not pass over a resonance on the way', () => {
    const resonant = (length: number) => (0.02 < length && length < 0.03 ? 1 : Math.log(length / 0.2));
    const found = longestRun(both(resonant), 1, false);
    assert.ok(found.kind === 'found' && 0.0195 <= found.value && found.value <= 0.02, JSON.stringify(found));
  });

  it('end where the nets do, and where nothing does', () => {
    assert.deepEqual(longestRun(both(() => -1), 0.03, true), { kind: 'any' });
    assert.deepEqual(longestRun(both(() => 1), 0.03, true), { kind: 'none' });
    assert.deepEqual(longestRun(both(() => NaN), 0.03, true), { kind: 'unknown' });
    assert.deepEqual(smallestGap(both(() => -1), 1e-4), { kind: 'any' });
    assert.deepEqual(smallestGap(both(() => 1), 1e-4), { kind: 'none' });
    assert.deepEqual(smallestGap(both(() => NaN), 1e-4), { kind: 'unknown' });
  });
});
