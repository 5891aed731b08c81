import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { electricalLength } from '../../../server/src/physics/lines/electricalLength';
import { characteristicImpedance } from '../../../server/src/physics/lines/characteristicImpedance';
import { kneeFrequency, rampDuration } from '../../../server/src/physics/lines/knee';
import type { Waveform } from '../../../server/src/physics/lines/lines';
import { modesOf } from '../../../server/src/physics/lines/modes';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { thinnedWaveform, valueAt } from '../../../server/src/physics/lines/waveform';
import { observationWindow, oneWayDelay, stillGrowing } from '../../../server/src/physics/lines/window';
import { epsilon0, mu0, speedOfLight } from '../../../server/src/units/constants';
import { hertz, metres, seconds, volts } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair } from './build';

const waveform = (points: readonly (readonly [number, number])[]): Waveform => ({ times: Float64Array.from(points, ([time]) => time), values: Float64Array.from(points, ([, value]) => value) });

describe('peak of a waveform', () => {
  it('is the value of largest magnitude, with its sign, and its width at half', () => {
    const triangle = waveform([[0, 0], [1, 0.5], [2, 0], [4, -3], [5, 0], [6, 0.1]]);
    assert.deepEqual(peakOf(triangle), { value: -3, time: 4, width: 4.5 - 3 });
  });

  it('is at the end of a flat top, rounding aside', () => {
    const flat = waveform([[0, 0], [1, 2], [2, 2 - 1e-12], [3, 2 - 2e-12], [4, 0]]);
    assert.equal(peakOf(flat).time, 3);
    near(peakOf(flat).width, 3, 1e-9);
    assert.equal(peakOf(flat).value, 2);
  });

  it('is as wide as what is known where it does not come back', () => {
    near(peakOf(waveform([[0, 0], [2, 1], [10, 1.2]])).width, 10 - 1.2, 1e-12);
  });

  it('of nothing is nothing', () => {
    assert.deepEqual(peakOf(waveform([[0, 0], [1, 0]])), { value: 0, time: 0, width: 0 });
    assert.deepEqual(peakOf(waveform([])), { value: 0, time: 0, width: 0 });
  });
});

describe('waveform', () => {
  const steps = waveform([[1, 10], [2, 20], [4, 0]]);

  it('is straight between points and constant outside', () => {
    assert.deepEqual([0, 1, 1.5, 3, 4, 9].map((time) => valueAt(steps, seconds(time))), [10, 10, 15, 10, 0, 0]);
  });

  it('is thinned to within a tolerance, and keeps its ends', () => {
    const sine = waveform(Array.from({ length: 2000 }, (_, n) => [n / 100, Math.sin(n / 100)] as const));
    const thin = thinnedWaveform(sine, volts(1e-2));
    assert.ok(thin.times.length < 100 && 10 < thin.times.length, `${thin.times.length} points`);
    sine.times.forEach((time, n) => assert.ok(Math.abs(valueAt(thin, seconds(time)) - sine.values[n]) <= 1e-2 * (1 + 1e-9)));
    assert.equal(thin.times[thin.times.length - 1], sine.times[1999]);
    assert.equal(thinnedWaveform(waveform([[0, 1], [1, 2], [2, 3], [3, 4]]), volts(1e-12)).times.length, 2);
    assert.equal(thinnedWaveform(waveform([[0, 1]]), volts(1)).times.length, 1);
  });
});

describe('window', () => {
  it('is the edge and twenty delays, at most half a period', () => {
    near(observationWindow({ duration: seconds(1e-9), delay: seconds(0.5e-9), repeats: null }), 11e-9, 1e-12);
    near(observationWindow({ duration: seconds(1e-9), delay: seconds(0.5e-9), repeats: hertz(100e6) }), 5e-9, 1e-12);
    near(observationWindow({ duration: seconds(1e-9), delay: seconds(0.5e-9), repeats: hertz(1e3) }), 11e-9, 1e-12);
  });

  it('counts the way through the longest leads', () => {
    const lead = { impedance: 50, delay: 0.3e-9 };
    const coupled = lines({ ...pair({ impedance: 50, slowness: 6e-9 }, { inductive: 0.2, capacitive: 0.1 }), length: 0.1, left: [end(50, 0, lead), end(50)], right: [end(50), end(50, 0, { ...lead, delay: 0.1e-9 })] });
    near(oneWayDelay(modesOf(coupled, metres(0.1)), coupled), 0.6e-9 * Math.sqrt(1.2 * 0.9) + 0.3e-9, 1e-12);
  });

  it('says when a response still grows at its end', () => {
    const growing = waveform([[0, 0], [1, 1], [2, -1.2], [3, 1.4], [3.9, -1.6], [4, 0]]);
    assert.equal(stillGrowing(growing, seconds(4)), true);
    assert.equal(stillGrowing(waveform([[0, 0], [1, 1], [3.9, -1.001], [4, 0]]), seconds(4)), false);
    // The end of a slow edge is no growth.
    assert.equal(stillGrowing(waveform([[0, 0], [3.8, 1], [4, 0]]), seconds(4), seconds(3.8)), false);
  });
});

describe('names of an edge', () => {
  it('knows its knee and its whole duration', () => {
    near(kneeFrequency(seconds(1e-9)), 350e6, 1e-12);
    near(rampDuration(seconds(0.8e-9)), 1e-9, 1e-12);
  });

  it('calls a run lumped below a sixth of the edge', () => {
    assert.equal(electricalLength(seconds(0.16e-9), seconds(1e-9)), 'lumped');
    assert.equal(electricalLength(seconds(0.17e-9), seconds(1e-9)), 'line');
  });
});

describe('characteristic impedance of each line alone', () => {
  it('is sqrt(L/C) where nothing couples, and the wave impedance of the dielectric', () => {
    const airy = 4 * epsilon0;
    const [alone] = characteristicImpedance({ order: 1, capacitance: Float64Array.of(3 * airy), capacitanceInAir: Float64Array.of(airy) });
    near(alone.impedance, Math.sqrt(mu0 / epsilon0) / 4 / Math.sqrt(3), 1e-9);
    near(alone.delay, Math.sqrt(3) / speedOfLight, 1e-9);
  });

  it('holds the others at zero potential: both modes of a pair give it', () => {
    // In a homogeneous dielectric Z_alone is the diagonal entry of the impedance matrix' inverse, inverted.
    const capacitance = Float64Array.of(100e-12, -20e-12, -20e-12, 100e-12);
    const inAir = capacitance.map((value) => value / 4);
    const [alone] = characteristicImpedance({ order: 2, capacitance, capacitanceInAir: inAir });
    const slowness = 2 * Math.sqrt(mu0 * epsilon0);
    const [even, odd] = [slowness / 80e-12, slowness / 120e-12];
    near(alone.impedance, 2 / (1 / even + 1 / odd), 1e-12);
  });
});
