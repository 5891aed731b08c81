import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import fc from 'fast-check';
import { peakInBand, type Band } from '../../../server/src/physics/noise/receiverBand';
import type { Waveform } from '../../../server/src/physics/lines/lines';
import { bandTransfer } from '../../../server/src/physics/noise/bandTransfer';
import { hertz, seconds } from '../../../server/src/units/quantity';

const band = (from: number, to: number): Band => ({ from: hertz(from), to: hertz(to) });
const wave = (...points: readonly (readonly [number, number])[]): Waveform => ({ times: Float64Array.from(points, ([t]) => t), values: Float64Array.from(points, ([, v]) => v) });

/** Second method: small exponential steps with the input taken at the middle of each. */
function steppedPeak({ times, values }: Waveform, { from, to }: Band, steps: number): number {
  const [w1, w2] = [2 * Math.PI * from, 2 * Math.PI * to];
  const h = times[times.length - 1] / steps;
  let [y, q, best, at] = [0, 0, 0, 0];
  for (let index = 0; index < steps; index += 1) {
    const t = (index + 0.5) * h;
    while (times[at + 1] < t) at += 1;
    const u = values[at] + ((values[at + 1] - values[at]) * (t - times[at])) / (times[at + 1] - times[at]);
    const before = y;
    y += (u - y) * -Math.expm1(-w2 * h);
    q += ((before + y) / 2 - q) * -Math.expm1(-w1 * h);
    if (Math.abs(best) < Math.abs(y - q)) best = y - q;
  }
  return best;
}

describe('a receiver’s first-order band', () => {
  it('leaves the step response 1 − exp(−T/τ) of a low pass at the end of a flat pulse', () => {
    const tau = 1 / (2 * Math.PI * 4e6);
    const { peak, time } = peakInBand(wave([0, 0], [1e-15, 1], [100e-9, 1], [100.000001e-9, 0]), band(0, 4e6));
    assert.ok(Math.abs(peak - -Math.expm1(-100e-9 / tau)) < 1e-7);
    assert.ok(Math.abs(time - 100e-9) < 1e-12);
  });

  it('leaves a fast pulse’s area over the time constant, its own decay aside', () => {
    const { peak } = peakInBand(wave([0, 0], [1e-9, 1], [2e-9, 0]), band(0, 100e3));
    assert.ok(Math.abs(peak / (1e-9 * 2 * Math.PI * 100e3) - 1) < 1e-3);
  });

  it('passes a ramp through a high pass as slope over corner', () => {
    const { peak } = peakInBand(wave([0, 0], [1, 1]), band(100, 1e9));
    assert.ok(Math.abs(peak * 2 * Math.PI * 100 - 1) < 1e-6);
  });

  it('changes nothing where the band holds all of it', () => {
    const { peak } = peakInBand(wave([0, 0], [1e-6, 0.25], [3e-6, -0.5], [4e-6, 0]), band(0.01, 1e13));
    assert.ok(Math.abs(peak + 0.5) < 1e-6);
  });

  it('agrees with a fine stepping through random waveforms and bands', () => {
    const value = fc.double({ min: -1, max: 1, noNaN: true });
    const piece = fc.tuple(fc.double({ min: 0.05, max: 1, noNaN: true }), value);
    fc.assert(fc.property(fc.array(piece, { minLength: 2, maxLength: 6 }), fc.double({ min: -2, max: 1, noNaN: true }), fc.double({ min: 0.1, max: 2, noNaN: true }), (pieces, low, decades) => {
      let t = 0;
      const points: [number, number][] = [[0, 0], ...pieces.map(([dt, v]): [number, number] => [(t += dt), v])];
      const limits = band(10 ** low, 10 ** (low + decades));
      const exact = peakInBand(wave(...points), limits).peak;
      const stepped = steppedPeak(wave(...points), limits, 100_000);
      const largest = Math.max(...points.map(([, v]) => Math.abs(v)));
      assert.ok(Math.abs(Math.abs(exact) - Math.abs(stepped)) < 1e-3 * largest + 1e-12, `${exact} ${stepped}`);
    }), { seed: 7, numRuns: 40 });
  });

  it('is odd and linear, and never larger than what a low pass is given', () => {
    const points: [number, number][] = [[0, 0], [1e-9, 0.3], [2e-9, -0.2], [5e-9, 0.1], [6e-9, 0]];
    const scaled = (factor: number) => wave(...points.map(([t, v]): [number, number] => [t, factor * v]));
    const limits = band(1e6, 200e6);
    const { peak } = peakInBand(scaled(1), limits);
    assert.ok(Math.abs(peakInBand(scaled(-2), limits).peak + 2 * peak) < 1e-12);
    assert.ok(Math.abs(peakInBand(scaled(1), band(0, 200e6)).peak) <= 0.3);
    assert.equal(peakInBand(wave([0, 0]), limits).peak, 0);
  });

  it('counts from a moment on what is left then: the decay of what came before', () => {
    const tau = 1 / (2 * Math.PI * 1e6);
    const pulse = wave([0, 0], [1e-9, 1], [2e-9, 0]);
    const whole = peakInBand(pulse, band(0, 1e6), seconds(2e-9));
    const later = peakInBand(pulse, band(0, 1e6), seconds(500e-9));
    assert.ok(Math.abs(later.peak / whole.peak / Math.exp(-(500e-9 - whole.time) / tau) - 1) < 1e-9 && later.time === 500e-9);
    // Inside the waveform, and before it.
    const ramped = wave([0, 0], [1e-6, 1], [2e-6, 0.5], [3e-6, 0]);
    assert.deepEqual(peakInBand(ramped, band(0, 1e8), seconds(-1)), peakInBand(ramped, band(0, 1e8)));
    const { peak, time } = peakInBand(ramped, band(0, 1e9), seconds(1.5e-6));
    assert.ok(Math.abs(peak - 0.75) < 1e-3 && time === 1.5e-6);
  });

  it('a high pass undershoots after the waveform, which is seen by who samples late', () => {
    const pulse = wave([0, 0], [1e-9, 1], [100e-9, 1], [101e-9, 0]);
    const later = peakInBand(pulse, band(1e6, 1e9), seconds(150e-9));
    // The droop of 100 ns, decaying for another 49 ns and a half: exp(-w t) (exp(-w 100 ns) - 1), edges aside.
    const w = 2 * Math.PI * 1e6;
    assert.ok(Math.abs(later.peak / (Math.exp(-w * 49.5e-9) * Math.expm1(-w * 100e-9)) - 1) < 2e-3, `${later.peak}`);
  });

  it('a sine settles at the ratio that the transfer says', () => {
    const limits = band(2e5, 3e6);
    for (const frequency of [5e4, 8e5, 1e7]) {
      const points = 40_000;
      const periods = 30 + frequency * 2e-5;
      const sine: Waveform = {
        times: Float64Array.from({ length: points + 1 }, (_, n) => (n * periods) / (points * frequency)),
        values: Float64Array.from({ length: points + 1 }, (_, n) => Math.sin((2 * Math.PI * n * periods) / points)),
      };
      const settled = peakInBand({ times: sine.times, values: sine.values }, limits, seconds((periods - 5) / frequency));
      assert.ok(Math.abs(Math.abs(settled.peak) / bandTransfer(hertz(frequency), limits) - 1) < 1e-3, `${frequency}`);
    }
    assert.equal(bandTransfer(hertz(0), limits), 0);
    assert.equal(bandTransfer(hertz(0), band(0, 1e6)), 1);
  });
});
