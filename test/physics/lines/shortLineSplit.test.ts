/** The split into electric and magnetic coupling, as on a short line. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { lumpedRun } from '../../../server/src/physics/lines/lumpedRun';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { shortLineSplit } from '../../../server/src/physics/lines/shortLineSplit';
import { couplingShares } from '../../../server/src/physics/lines/shares';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, ramp, rowOfLines } from './build';

describe('the split of a peak', () => {
  it('is that of Paul’s short line where all ends are resistors', () => {
    const run = lines({ ...rowOfLines(2), length: 0.02, left: [end(50), end(40)], right: [end(60), end(70)] });
    const edge = ramp(0, 'left', 1, 50e-9);
    const [split, paul] = [shortLineSplit(run, edge, 1, seconds(52e-9)), couplingShares(run, edge, 1)];
    for (const place of ['near', 'far'] as const) for (const kind of ['capacitive', 'inductive'] as const) near(split[place][kind], paul[place][kind], 1e-2, `${place} ${kind}`);
  });

  it('adds up to the peak of the circuit, and follows a current that turns late', () => {
    // A driver of 10 ohm into 1 nF: the current stops after the edge ends, and its flux goes as it came.
    const run = lines({ ...rowOfLines(2), length: 0.026, left: [end(10), end(200)], right: [end(1e4, 1e-9), end(1e6, 8e-12)] });
    const edge = ramp(0, 'left', 12, 37.5e-9);
    const peak = peakOf(lumpedRun(run, edge, seconds(0)).right[1]);
    const { far: { capacitive, inductive } } = shortLineSplit(run, edge, 1, seconds(60e-9));
    assert.ok(37.5e-9 < peak.time && 0 < inductive && 0 < capacitive);
    near(capacitive + inductive, peak.value, 0.03);
    // Paul's formula for steady slopes has the current still rising.
    assert.ok(couplingShares(run, edge, 1).far.inductive < 0);
  });

  it('is nothing of a field that does not couple', () => {
    const run = lines({ ...rowOfLines(2), length: 0.02, left: [end(50), end(40)], right: [end(60), end(70)] });
    const alone = { ...run, inductance: run.inductance.map((value, at) => (at === 0 || at === 3 ? value : 0)) };
    const { near: shares } = shortLineSplit(alone, ramp(0, 'left', 1, 5e-9), 1, seconds(6e-9));
    assert.equal(shares.inductive, 0);
    assert.ok(0 < shares.capacitive);
  });
});
