import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { inOldLines } from '../../../server/src/physics/lines/across';
import { balancedPairs } from '../../../server/src/physics/lines/balancedPairs';
import { bridgedLines } from '../../../server/src/physics/lines/bridgingCurrents';
import { combinedWaveform, laterPart } from '../../../server/src/physics/lines/combine';
import { lineResponse, prepareLines } from '../../../server/src/physics/lines/lineResponse';
import type { Across, CoupledLines, LineResponse, Waveform } from '../../../server/src/physics/lines/lines';
import { lumpedRun } from '../../../server/src/physics/lines/lumpedRun';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { prepareTransfer, type Drive, type Place } from '../../../server/src/physics/lines/transfer';
import { magnitudeOf } from '../../../server/src/physics/lines/reading';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { farads, hertz, ohms, seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair, ramp, rowOfLines } from './build';

const between = (first: number, second: number, resistance: number, capacitance = 0): Across => ({ first, second, resistance: ohms(resistance), capacitance: farads(capacitance) });
const two = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 });
const lead = { impedance: 70, delay: 0.4e-9 };

/** A pair with a receiver's resistor across, beside an aggressor. */
function pairBesideAggressor(minusLoad: number, minusLead: typeof lead | null = lead): CoupledLines {
  return {
    ...lines({
      ...rowOfLines(3, 0.2), length: 0.15,
      left: [end(20), end(55), end(55)],
      right: [end(1e3, 3e-12), end(1e4, 2e-12, lead), end(minusLoad, 2e-12, minusLead)],
    }),
    rightAcross: [between(1, 2, 100, 2e-12)],
  };
}

function largestDifference(one: Waveform, other: Waveform): number {
  return one.times.reduce((largest, time, at) => Math.max(largest, Math.abs(one.values[at] - valueAt(other, seconds(time)))), 0);
}

function checkWithin(one: LineResponse, other: LineResponse, allowed: number): void {
  for (const place of ['left', 'right', 'leftTermination', 'rightTermination'] as const) {
    one[place].forEach((waveform, line) => {
      const off = largestDifference(waveform, other[place][line]);
      assert.ok(off <= allowed, `${place} of line ${line}: off by ${off}`);
    });
  }
}

describe('a resistor and a capacitor across two lines', () => {
  it('in opposition, equal lines are one line with half of the resistor and twice the capacitor at its end', () => {
    const bridged: CoupledLines = { ...lines({ ...two, length: 0.1, left: [end(40), end(40)], right: [end(1e3, 1e-12), end(1e3, 1e-12)] }), rightAcross: [between(1, 0, 100, 2e-12)] };
    const odd = lines({
      inductance: [[two.inductance[0][0] - two.inductance[0][1]]], capacitance: [[two.capacitance[0][0] - two.capacitance[0][1]]],
      length: 0.1, left: [end(40)], right: [end(1 / (1 / 1e3 + 1 / 50), 5e-12)],
    });
    const window = seconds(1e-8);
    const [plus, minus] = [lineResponse(bridged, ramp(0, 'left', 1, 1e-9), window), lineResponse(bridged, ramp(1, 'left', -1, 1e-9), window)];
    const alone = lineResponse(odd, ramp(0, 'left', 1, 1e-9), window);
    const first = combinedWaveform([{ waveform: plus.right[0], factor: 1 }, { waveform: minus.right[0], factor: 1 }]);
    assert.ok(largestDifference(first, alone.right[0]) < 3e-4);
  });

  it('resistive and balanced: the exact lattice, and reciprocal', () => {
    const bridged: CoupledLines = { ...lines({ ...two, length: 0.1, left: [end(40), end(40)], right: [end(1e3), end(1e3)] }), rightAcross: [between(0, 1, 100)] };
    const one = lineResponse(bridged, ramp(0, 'left', 1, 1e-9), seconds(1e-8));
    assert.equal(one.method, 'lattice');
    assert.ok(one.errorBar[1] < 1e-10);
    const other = lineResponse(bridged, ramp(1, 'left', 1, 1e-9), seconds(1e-8));
    assert.ok(largestDifference(one.right[1], other.right[0]) < 1e-12 && largestDifference(one.right[0], other.right[1]) < 1e-12);
  });

  it('settles where the direct current says: resistors only', () => {
    const bridged: CoupledLines = { ...lines({ ...two, length: 0.1, left: [end(40), end(25)], right: [end(1e3), end(300)] }), rightAcross: [between(0, 1, 100)] };
    const { right, errorBar } = lineResponse(bridged, ramp(0, 'left', 1, 1e-9), seconds(6e-8));
    // Nodes: (1/40 + 1/1000 + 1/100) a - b/100 = 1/40, (1/25 + 1/300 + 1/100) b - a/100 = 0.
    const [g, h] = [1 / 40 + 1 / 1e3 + 1 / 100, 1 / 25 + 1 / 300 + 1 / 100];
    const a = h / 40 / (g * h - 1e-4);
    near(valueAt(right[0], seconds(6e-8)), a, 1e-5);
    near(valueAt(right[1], seconds(6e-8)), a / 100 / h, 1e-4);
    assert.ok(errorBar[1] < 2e-3);
  });

  it('by its currents, and in difference and mean: the same answer for a balanced pair', () => {
    const bridged = pairBesideAggressor(1e4);
    assert.notEqual(balancedPairs(bridged), null);
    const window = seconds(2e-8);
    for (const source of [ramp(0, 'left', 1, 1e-9), ramp(1, 'left', 1, 1e-9), ramp(2, 'left', 1, 2e-10)]) {
      const exact = lineResponse(bridged, source, window);
      const currents = bridgedLines(bridged, (one) => prepareLines(one)).response(source, window);
      checkWithin(exact, currents, 4e-3);
      exact.right.forEach((waveform, line) => assert.ok(largestDifference(waveform, currents.right[line]) <= 3 * currents.errorBar[line] + 1e-4, `line ${line}`));
    }
  });

  it('slow edges as well, whose echoes are over long before', () => {
    const bridged = pairBesideAggressor(1e4);
    for (const duration of [1e-6, 1e-3]) {
      const window = seconds(duration + 3e-8);
      const exact = lineResponse(bridged, ramp(0, 'left', 1, duration), window);
      const currents = bridgedLines(bridged, (one) => prepareLines(one)).response(ramp(0, 'left', 1, duration), window);
      for (const line of [1, 2]) {
        const peak = Math.abs(peakOf(exact.right[line]).value);
        near(peakOf(currents.right[line]).value, peakOf(exact.right[line]).value, 5e-3);
        // Both say how far off they may be: most of it is the reflection that the currents follow on their grid.
        const bar = exact.errorBar[line]! + currents.errorBar[line]!;
        assert.ok(largestDifference(exact.right[line], currents.right[line]) <= bar, `line ${line}`);
        assert.ok(bar < 0.05 * peak, `${bar / peak}`);
      }
    }
  });

  it('open ends as well', () => {
    const bridged: CoupledLines = { ...lines({ ...two, length: 0.1, left: [end(40), end(40)], right: [end(Infinity, 1e-12), end(Infinity, 1e-12)] }), rightAcross: [between(0, 1, 100)] };
    const window = seconds(1e-8);
    checkWithin(lineResponse(bridged, ramp(0, 'left', 1, 1e-9), window), bridgedLines(bridged, (one) => prepareLines(one)).response(ramp(0, 'left', 1, 1e-9), window), 4e-3);
  });

  it('changes nothing where the two lines move alike', () => {
    const plain = lines({ ...two, length: 0.1, left: [end(40), end(40)], right: [end(1e3), end(1e3)] });
    const bridged: CoupledLines = { ...plain, leftAcross: [between(0, 1, 5)], rightAcross: [between(0, 1, 100)] };
    const together = (coupled: CoupledLines) => combinedWaveform([0, 1].map((line) => ({ waveform: lineResponse(coupled, ramp(line, 'left', 1, 1e-9), seconds(1e-8)).right[0], factor: 1 })));
    assert.ok(largestDifference(together(plain), together(bridged)) < 1e-9);
  });

  // The transfer is computed in quite another way: harmonics of the steady state that repeated edges settle in.
  for (const [name, coupled, allowed] of [['balanced', pairBesideAggressor(1e4), 3e-4], ['unequal loads and leads', pairBesideAggressor(150, null), 2e-3]] as const) {
    it(`${name}: edges in time have the harmonics of the transfer`, () => {
      const period = 1e-7;
      const edge = lineResponse(coupled, ramp(0, 'left', 1, 1e-9), seconds(1.5 * period));
      const driven: readonly Drive[] = [{ line: 0, end: 'left', kind: 'voltage', amplitude: 1 }];
      const prepared = prepareTransfer(coupled);
      for (const place of ['left', 'right', 'rightTermination'] as const satisfies readonly Place[]) {
        for (const line of [1, 2]) {
          const waveform = edge[place][line];
          const steady = laterPart(combinedWaveform([
            { waveform, factor: 1 }, { waveform, factor: -1, shift: seconds(period / 2) }, { waveform, factor: 1, shift: seconds(-period) }, { waveform, factor: -1, shift: seconds(-period / 2) },
          ]), seconds(0));
          let [largest, off] = [0, 0];
          for (let n = 1; n < 60; n += 2) {
            const x = (Math.PI * n * 1e-9) / period;
            const expected = ((2 / (Math.PI * n)) * Math.sin(x)) / x * magnitudeOf([{ line, place, factor: 1 }], prepared.at(driven, hertz(n / period)));
            largest = Math.max(largest, expected);
            off = Math.max(off, Math.abs(harmonicOf(steady, period, n) - expected));
          }
          assert.ok(off < allowed * largest, `${place} of line ${line}: off by ${off / largest}`);
        }
      }
    });
  }

  it('a slow node: the circuit with what is across, in either kind of unknowns', () => {
    const slow: CoupledLines = { ...lines({ ...rowOfLines(3, 0.2), length: 0.05, left: [end(10), end(1e6), end(1e6)], right: [end(1e4), end(1e6, 1e-11), end(1e6, 1e-11)] }), rightAcross: [between(1, 2, 3e5, 4e-12)] };
    const source = ramp(0, 'left', 1, 1e-8);
    // Once the ringing is over, which each of the two damps in steps of its own.
    const from = seconds(4e-7);
    const direct = lumpedRun(slow, source, from);
    const balanced = balancedPairs(slow)!;
    const other = inOldLines(slow, balanced, balanced.ramps(source).map((one) => lumpedRun(balanced.lines, one, from)));
    for (const line of [1, 2]) near(peakOf(direct.right[line]).value, peakOf(other.right[line]).value, 1e-4);
    assert.ok(largestDifference(direct.right[2], other.right[2]) < 1e-3 * Math.abs(peakOf(direct.right[2]).value));
  });

  it('lines of which nothing is across are answered to the last bit as before', () => {
    const plain = lines({ ...two, length: 0.1, left: [end(40), end(25)], right: [end(1e3, 2e-12), end(300)] });
    const [one, other] = [plain, { ...plain, leftAcross: [], rightAcross: [] }].map((coupled) => lineResponse(coupled, ramp(0, 'left', 1, 1e-9), seconds(1e-8)));
    assert.deepEqual(one, other);
  });
});

/** Magnitude of the one-sided harmonic n of a piecewise-linear period that starts and ends alike. */
function harmonicOf({ times, values }: Waveform, period: number, n: number): number {
  const omega = (2 * Math.PI * n) / period;
  let [real, imaginary] = [0, 0];
  for (let i = 0; i + 1 < times.length && times[i] < period; i += 1) {
    const until = Math.min(times[i + 1], period);
    const slope = (values[i + 1] - values[i]) / (times[i + 1] - times[i]);
    real += slope * (Math.cos(omega * until) - Math.cos(omega * times[i]));
    imaginary -= slope * (Math.sin(omega * until) - Math.sin(omega * times[i]));
  }
  return (2 * Math.hypot(real, imaginary)) / (omega ** 2 * period);
}
