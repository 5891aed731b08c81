import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import { lumpedRun } from '../../../server/src/physics/lines/lumpedRun';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, ramp, referenceCases, rowOfLines } from './build';

const given = new Map(referenceCases('lumped.json').map((one) => [one.id as string, one]));
const from = seconds(0);

/** Capacitors between nodes as a metre of line whose coil is next to nothing. */
const capacitors = (aggressor: number, mutual: number, victim: number) => ({
  inductance: [[1e-17, 0], [0, 1e-17]],
  capacitance: [[aggressor + mutual, -mutual], [-mutual, victim + mutual]],
  length: 1,
});

// Source: reference/lumped.json, closed forms of first-order circuits and a circuit simulator.
describe('lumped run', () => {
  for (const id of ['E-cap-1', 'E-cap-3']) {
    it(`${id}: a capacitor into R and C, driven without impedance`, () => {
      const { inputs_SI: { Cm, Cv, Rv, V, tr }, outputs } = given.get(id)!;
      const response = lumpedRun(lines({ ...capacitors(1e-15, Cm, Cv), left: [end(0), end(Rv)], right: [end(Infinity), end(Infinity)] }), ramp(0, 'left', V, tr), from);
      const peak = peakOf(response.left[1]);
      near(peak.value, outputs.V_peak, 1e-5);
      near(peak.time, outputs.t_peak_s, 1e-3);
      near(peak.width, outputs.width_50pct_s, 1e-3);
    });
  }

  it('E-cap-src-1: the same behind a source resistance', () => {
    const { inputs_SI: { Rs, Ca, Cm, Cv, Rv, V, tr }, outputs } = given.get('E-cap-src-1')!;
    const response = lumpedRun(lines({ ...capacitors(Ca, Cm, Cv), left: [end(Rs), end(Rv)], right: [end(Infinity), end(Infinity)] }), ramp(0, 'left', V, tr), from);
    near(peakOf(response.left[1]).value, outputs.V_peak, 1e-5);
    near(peakOf(response.left[1]).time, outputs.t_peak_s, 1e-2);
  });

  for (const id of ['E-ind-1', 'E-ind-3']) {
    it(`${id}: a current into the mutual of a loop`, () => {
      const { inputs_SI: { M, Lv, R_near, R_far, I, tr }, outputs } = given.get(id)!;
      // A current source as a large voltage behind a large resistance; next to no capacitance.
      const behind = 1e7;
      const coupled = lines({
        inductance: [[Lv, M], [M, Lv]], capacitance: [[1e-21, 0], [0, 1e-21]], length: 1,
        left: [end(behind), end(R_near)], right: [end(0), end(R_far)],
      });
      const response = lumpedRun(coupled, ramp(0, 'left', I * behind, tr), from);
      near(peakOf(response.left[1]).value, outputs.V_near_peak, 1e-5);
      near(peakOf(response.right[1]).value, outputs.V_far_peak, 1e-5);
    });
  }

  it('is what a short line tends to once the echoes of a kink have died', () => {
    // While they live, line and circuit overshoot differently, however slow the edge.
    const coupled = lines({ ...rowOfLines(2), length: 0.02, left: [end(30), end(60)], right: [end(80, 3e-12), end(70, 2e-12)] });
    for (const duration of [8e-9, 80e-9]) {
      const drive = ramp(0, 'left', 1, duration);
      const exact = lineResponse(coupled, drive, seconds(duration + 3e-9));
      const lumped = lumpedRun(coupled, drive, from);
      for (const side of ['left', 'right'] as const) near(valueAt(lumped[side][1], seconds(0.9 * duration)), valueAt(exact[side][1], seconds(0.9 * duration)), 1e-5, side);
    }
  });

  it('follows a node of high impedance long after the window, to its peak', () => {
    // Source: first-order circuit: both nodes charge through 10 kohm; the victim leaks through 1 Mohm.
    const coupled = lines({ ...rowOfLines(2), length: 0.05, left: [end(1e4), end(Infinity)], right: [end(Infinity, 20e-12), end(1e6, 10e-12)] });
    const drive = ramp(0, 'left', 5, 1e-9);
    const window = seconds(1e-9 + 20 * 0.3e-9);
    const inWindow = peakOf(lineResponse(coupled, drive, window).right[1]).value;
    const followed = lumpedRun(coupled, drive, window);
    const peak = peakOf(followed.right[1]);
    assert.ok(5 * inWindow < peak.value, `${inWindow} in the window, ${peak.value} later`);
    const [own, mutual, load] = [0.05 * 99e-12, 0.05 * 9e-12, 10e-12];
    assert.ok(peak.value < (5 * mutual) / (own + load), 'below the divider');
    assert.ok(0.9 * ((5 * mutual) / (own + load)) < peak.value);
    assert.ok(followed.work < 1500, `${followed.work} steps`);
  });

  it('follows a current through shorts, whose time constant is L/R', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.1, left: [end(0.05), end(0.05)], right: [end(0.05), end(0.05)] });
    const drive = ramp(0, 'left', 1, 1e-9);
    const window = seconds(1e-9 + 20 * 0.6e-9);
    const later = lumpedRun(coupled, drive, window);
    // 38 nH against 0.1 ohm: 380 ns, thirty times the window.
    assert.ok(1e-6 < later.window);
    assert.ok(peakOf(later.right[0]).value <= 0.5 * (1 + 1e-6));
  });

  it('does no work where nothing outlasts the window', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.1, left: [end(10), end(50)], right: [end(1e6, 5e-12), end(1e6, 5e-12)] });
    const later = lumpedRun(coupled, ramp(0, 'left', 1, 1e-9), seconds(1e-9 + 20 * 0.6e-9));
    assert.equal(later.work, 0);
    assert.equal(peakOf(later.right[1]).value, 0);
  });

  it('goes no further than it is asked to', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.05, left: [end(1e4), end(Infinity)], right: [end(Infinity), end(1e6)] });
    const later = lumpedRun(coupled, ramp(0, 'left', 1, 1e-9), seconds(5e-9), seconds(50e-9));
    near(later.window, 50e-9, 1e-9);
    assert.equal(lumpedRun(coupled, ramp(0, 'left', 1, 1e-9), seconds(50e-9), seconds(50e-9)).work, 0);
  });
});
