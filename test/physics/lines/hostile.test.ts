import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse, prepareLines } from '../../../server/src/physics/lines/lineResponse';
import type { CoupledLines, LineResponse } from '../../../server/src/physics/lines/lines';
import { lumpedRun } from '../../../server/src/physics/lines/lumpedRun';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { seconds } from '../../../server/src/units/quantity';
import { end, lines, ramp, rowOfLines } from './build';

const mostWork = 150_000;

function checkFinite(response: LineResponse, what: string): void {
  for (const place of ['left', 'right', 'leftTermination', 'rightTermination'] as const) {
    for (const { times, values } of response[place]) {
      assert.ok(times.every(Number.isFinite) && values.every(Number.isFinite), `${what}: ${place} holds what is no number`);
      for (let n = 1; n < times.length; n += 1) assert.ok(times[n - 1] < times[n], `${what}: ${place} times do not rise`);
    }
  }
  assert.ok(response.errorBar.every((bar) => Number.isFinite(bar) && 0 <= bar), `${what}: error bar`);
  assert.ok(response.work <= mostWork, `${what}: ${response.work} steps`);
}

describe('ends that are hard to compute', () => {
  const resistances = [0, 1e-12, 1, 50, 1e6, 1e30, Infinity];
  for (const left of resistances) {
    it(`gives numbers with ${left} ohm at the left`, () => {
      for (const right of resistances) {
        for (const capacitance of [0, 1e-18, 5e-12, 1, 1e300]) {
          const coupled = lines({ ...rowOfLines(2), length: 0.05, left: [end(left), end(right)], right: [end(right, capacitance), end(left, capacitance)] });
          const window = seconds(7e-9);
          const drive = ramp(0, 'left', 1, 1e-9);
          const response = lineResponse(coupled, drive, window);
          checkFinite(response, `${left}, ${right}, ${capacitance}`);
          // Passive ends: no voltage outgrows a few times the source's.
          for (const waveform of response.right) assert.ok(Math.abs(peakOf(waveform).value) < 5);
          checkFinite(lumpedRun(coupled, drive, window), `lumped ${left}, ${right}, ${capacitance}`);
        }
      }
    });
  }

  for (const length of [0, 1e-15, 1e-6, 1e3, 1e6]) {
    it(`gives numbers for a length of ${length} m`, () => {
      const coupled = lines({ ...rowOfLines(2), length, left: [end(10), end(50)], right: [end(1e6, 5e-12), end(1e6, 5e-12)] });
      const drive = ramp(0, 'left', 1, 1e-9);
      const window = seconds(1e-9 + 20 * 6e-9 * length);
      checkFinite(lineResponse(coupled, drive, window), 'line');
      checkFinite(lumpedRun(coupled, drive, window), 'lumped');
    });
  }

  for (const duration of [0, 1e-18, 1e-12, 1e-3, 1e6]) {
    it(`gives numbers for an edge of ${duration} s`, () => {
      for (const capacitance of [0, 5e-12]) {
        const coupled = lines({ ...rowOfLines(2), length: 0.05, left: [end(0), end(50)], right: [end(Infinity, capacitance), end(1e6, capacitance)] });
        const window = seconds(duration + 6e-9);
        checkFinite(lineResponse(coupled, ramp(0, 'left', 1, duration), window), `${capacitance}`);
        checkFinite(lumpedRun(coupled, ramp(0, 'left', 1, duration), window), `lumped ${capacitance}`);
      }
    });
  }

  it('couples nothing over no length', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0, left: [end(10), end(50)], right: [end(100), end(1e4, 1e-12)] });
    const response = lineResponse(coupled, ramp(0, 'left', 1, 1e-9), seconds(2e-9));
    assert.ok(Math.abs(peakOf(response.right[1]).value) < 1e-6);
  });

  it('moves nothing when the source is cut off', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.1, left: [end(Infinity), end(50)], right: [end(50), end(50)] });
    assert.equal(peakOf(lineResponse(coupled, ramp(0, 'left', 1, 1e-9), seconds(12e-9)).left[0]).value, 0);
  });

  it('takes leads of any length', () => {
    for (const delay of [0, 1e-20, 1e-13, 1e-9, 1e-6]) {
      const lead = { impedance: 55, delay };
      const coupled = lines({ ...rowOfLines(2), length: 0.05, left: [end(10, 0, lead), end(0, 0, lead)], right: [end(Infinity, 5e-12, lead), end(1e6, 0, lead)] });
      const window = seconds(1e-9 + 20 * (0.3e-9 + 2 * delay));
      checkFinite(lineResponse(coupled, ramp(0, 'left', 1, 1e-9), window), `${delay}`);
      checkFinite(lumpedRun(coupled, ramp(0, 'left', 1, 1e-9), window), `lumped ${delay}`);
    }
  });

  it('refuses what is a mistake of the caller, by name', () => {
    const good = lines({ ...rowOfLines(2), length: 0.05, left: [end(10), end(50)], right: [end(50), end(50)] });
    const bad = (change: Partial<CoupledLines>, message: RegExp) => assert.throws(() => prepareLines({ ...good, ...change }), message);
    bad({ length: NaN as never }, /length NaN/);
    bad({ left: [end(-1), end(50)] }, /-1 ohm/);
    bad({ right: [end(50)] }, /2 left and 1 right/);
    bad({ left: [end(10, 0, { impedance: 0, delay: 1 }), end(50)] }, /lead of 0 ohm/);
    assert.throws(() => lineResponse(good, ramp(5, 'left', 1, 1e-9), seconds(1e-9)), /line 5 of 2/);
    assert.throws(() => lineResponse(good, ramp(0, 'left', NaN, 1e-9), seconds(1e-9)), /NaN V/);
  });
});

describe('edges that last thousands of delays', () => {
  it('agree with the march, where that can still be afforded', () => {
    // 1000 delays: just inside what two lines may march through; one line more and the circuit takes over.
    const ends = { left: [end(10), end(30)], right: [end(1e6, 5e-12), end(1e5, 8e-12)] };
    const duration = 1000 * 0.06e-9;
    const window = seconds(duration + 20 * 0.06e-9);
    const marched = lineResponse(lines({ ...rowOfLines(2), length: 0.01, ...ends }), ramp(0, 'left', 1, duration), window);
    const far = 1e-12;
    const more = lines({
      inductance: [...rowOfLines(2).inductance.map((row) => [...row, ...Array.from({ length: 14 }, () => 0)]), ...Array.from({ length: 14 }, (_, i) => Array.from({ length: 16 }, (__, j) => (j === i + 2 ? 380e-9 : 0)))],
      capacitance: [...rowOfLines(2).capacitance.map((row) => [...row, ...Array.from({ length: 14 }, () => 0)]), ...Array.from({ length: 14 }, (_, i) => Array.from({ length: 16 }, (__, j) => (j === i + 2 ? 99e-12 : 0)))],
      length: 0.01, left: [...ends.left, ...Array.from({ length: 14 }, () => end(50))], right: [...ends.right, ...Array.from({ length: 14 }, () => end(50, far))],
    });
    const followed = lineResponse(more, ramp(0, 'left', 1, duration), window);
    for (const place of ['left', 'right'] as const) {
      const [expected, found] = [peakOf(marched[place][1]).value, peakOf(followed[place][1]).value];
      assert.ok(Math.abs(found / expected - 1) < 1e-3, `${place}: ${found} and ${expected}`);
    }
  });

  it('have the overshoot of their kink and the plateau of the circuit', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.01, left: [end(10), end(50)], right: [end(1e6, 5e-12), end(1e6, 5e-12)] });
    const duration = 1e-5;
    const drive = ramp(0, 'left', 1, duration);
    const response = lineResponse(coupled, drive, seconds(duration + 20 * 0.06e-9));
    const { times, values } = response.right[1];
    // Plateau: 50 ohm against 1 Mohm, Cm over the length, by hand.
    const plateau = (50 * 0.01 * 9e-12) / duration;
    const middle = values[times.findIndex((time) => duration / 2 < time)];
    assert.ok(Math.abs(middle / plateau - 1) < 1e-3, `${middle} and ${plateau}`);
    // What follows the kink depends on the slope alone: a shorter edge, marched through, shows the same.
    const shorter = 600 * 0.06e-9;
    const marched = lineResponse(coupled, ramp(0, 'left', shorter / duration, shorter), seconds(shorter + 20 * 0.06e-9));
    const overshoot = peakOf(marched.right[1]).value;
    assert.ok(plateau < overshoot);
    assert.ok(Math.abs(peakOf(response.right[1]).value / overshoot - 1) < 1e-3);
    assert.ok(Math.abs(Math.min(...values) / Math.min(...marched.right[1].values) - 1) < 1e-2);
  });
});
