import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse, prepareLines } from '../../../server/src/physics/lines/lineResponse';
import type { Waveform } from '../../../server/src/physics/lines/lines';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair, ramp, rowOfLines } from './build';

const nanosecond = 1e-9;

/** Largest difference of two waveforms at the times of both. */
function apart(one: Waveform, other: Waveform, factor = 1): number {
  const times = [...one.times, ...other.times].map((time) => seconds(time));
  return Math.max(...times.map((time) => Math.abs(valueAt(one, time) * factor - valueAt(other, time))));
}

function unitRamp(time: number, duration: number): number {
  return Math.min(1, Math.max(0, time / duration));
}

/** A single line between two resistors, as a sum of echoes: Bewley's diagram, by hand. */
function singleLine({ impedance, delay, source, load, duration }: { impedance: number; delay: number; source: number; load: number; duration: number }, time: number) {
  const back = (source - impedance) / (source + impedance);
  const there = (load - impedance) / (load + impedance);
  let wave = impedance / (source + impedance);
  let near = wave * unitRamp(time, duration);
  let far = 0;
  for (let trip = 0; trip < 60; trip += 1) {
    far += wave * (1 + there) * unitRamp(time - (2 * trip + 1) * delay, duration);
    wave *= there;
    near += wave * (1 + back) * unitRamp(time - (2 * trip + 2) * delay, duration);
    wave *= back;
  }
  return { near, far };
}

describe('lattice of echoes', () => {
  it('is the even and the odd mode by hand, for two equal lines with equal ends', () => {
    // Symmetric pair: driving one line is half an even and half an odd drive of both.
    const own = { impedance: 60, slowness: 6e-9 };
    const ratios = { inductive: 0.2, capacitive: 0.12 };
    const length = 0.1;
    const [source, load, duration] = [22, 180, 0.4 * nanosecond];
    const response = lineResponse(
      lines({ ...pair(own, ratios), length, left: [end(source), end(source)], right: [end(load), end(load)] }),
      ramp(0, 'left', 1, duration), seconds(12 * nanosecond));
    const mode = (sign: number) => ({
      impedance: own.impedance * Math.sqrt((1 + sign * ratios.inductive) / (1 - sign * ratios.capacitive)),
      delay: length * own.slowness * Math.sqrt((1 + sign * ratios.inductive) * (1 - sign * ratios.capacitive)),
      source, load, duration,
    });
    for (let time = 0; time <= 12 * nanosecond; time += 0.037 * nanosecond) {
      const even = singleLine(mode(1), time);
      const odd = singleLine(mode(-1), time);
      assert.ok(Math.abs(valueAt(response.left[1], seconds(time)) - (even.near - odd.near) / 2) < 1e-12);
      assert.ok(Math.abs(valueAt(response.right[1], seconds(time)) - (even.far - odd.far) / 2) < 1e-12);
      assert.ok(Math.abs(valueAt(response.right[0], seconds(time)) - (even.far + odd.far) / 2) < 1e-12);
    }
  });

  it('saturates near the driver at (Lm/L + Cm/C)/4 of the driven voltage, for weak coupling and matched ends', () => {
    // Source: backward coupling of long matched lines, e.g. Feller, Kaupp & Digiacomo 1965; textbook form, from memory.
    const ratios = { inductive: 0.002, capacitive: 0.0015 };
    const coupled = lines({ ...pair({ impedance: 50, slowness: 6e-9 }, ratios), length: 0.3, left: [end(50), end(50)], right: [end(50), end(50)] });
    const peak = peakOf(lineResponse(coupled, ramp(0, 'left', 2, nanosecond), seconds(20 * nanosecond)).left[1]);
    near(peak.value, (ratios.inductive + ratios.capacitive) / 4, 1e-4);
    near(peak.width, 2 * 0.3 * 6e-9, 1e-3, 'width: there and back');
  });

  it('puts (Cm Z - Lm/Z)/2 times length and slope on the far end, for weak coupling and matched ends', () => {
    // Source: forward coupling, textbook form, from memory.
    const ratios = { inductive: 0.002, capacitive: 0.0005 };
    const own = { impedance: 50, slowness: 6e-9 };
    const coupled = lines({ ...pair(own, ratios), length: 0.1, left: [end(50), end(50)], right: [end(50), end(50)] });
    const peak = peakOf(lineResponse(coupled, ramp(0, 'left', 2, nanosecond), seconds(20 * nanosecond)).right[1]);
    near(peak.value, ((ratios.capacitive - ratios.inductive) * own.slowness * 0.1) / 2 / nanosecond, 1e-3);
  });

  it('puts nothing on the far end in a homogeneous dielectric when the line network is matched', () => {
    // All modes have one delay: nothing is left behind on the way. Weakly coupled, single resistors all but match.
    const coupled = lines({ ...pair({ impedance: 50, slowness: 6e-9 }, { inductive: 1e-4, capacitive: 1e-4 }), length: 0.3, left: [end(50), end(50)], right: [end(50), end(50)] });
    const response = lineResponse(coupled, ramp(0, 'left', 1, nanosecond), seconds(20 * nanosecond));
    // What resistors without a bridge between them leave is of second order in the coupling.
    assert.ok(Math.abs(peakOf(response.right[1]).value) < 1e-8);
    assert.ok(2e-5 < Math.abs(peakOf(response.left[1]).value));
  });

  it('is reciprocal: drive and victim may change places', () => {
    const own = { ...rowOfLines(3), length: 0.12 };
    const left = [end(25), end(70), end(10)];
    const right = [end(400), end(33), end(1e6)];
    const prepared = prepareLines(lines({ ...own, left, right }));
    const window = seconds(15 * nanosecond);
    // By reciprocity of transfer impedances, a source behind R counts as e/R into its node.
    const there = prepared.response(ramp(0, 'left', 1, nanosecond), window).right[2];
    const back = prepared.response(ramp(2, 'right', 1, nanosecond), window).left[0];
    assert.ok(apart(there, back, 25 / 1e6) < 1e-15);
  });

  it('conserves energy: what the source gives is burnt in the ends or stored on the lines', () => {
    const own = rowOfLines(2, 0.2);
    const coupled = lines({ ...own, length: 0.1, left: [end(20), end(50)], right: [end(90), end(15)] });
    const window = 60 * nanosecond;
    const response = lineResponse(coupled, ramp(0, 'left', 1, nanosecond), seconds(window));
    const source: Waveform = { times: Float64Array.of(0, nanosecond, window), values: Float64Array.of(0, 1, 1) };
    const given = integrated([source, response.left[0]], ([e, v]) => (e * (e - v)) / 20);
    const burnt = integrated([source, response.left[0]], ([e, v]) => (e - v) ** 2 / 20)
      + integrated([response.left[1]], ([v]) => v ** 2 / 50)
      + integrated([response.right[0]], ([v]) => v ** 2 / 90)
      + integrated([response.right[1]], ([v]) => v ** 2 / 15);
    // At rest: line 0 at 90/110 V with 1/110 A, line 1 at zero.
    const stored = (0.1 * (own.capacitance[0][0] * (90 / 110) ** 2 + own.inductance[0][0] / 110 ** 2)) / 2;
    near(given, burnt + stored, 1e-9);
  });

  it('adds up: two sources at once are the sum of each, and volts scale', () => {
    const prepared = prepareLines(lines({ ...rowOfLines(3), length: 0.05, left: [end(10), end(20), end(30)], right: [end(100), end(50), end(80)] }));
    const window = seconds(8 * nanosecond);
    const one = prepared.response(ramp(0, 'left', 1, nanosecond), window).right[1];
    assert.ok(apart(one, prepared.response(ramp(0, 'left', -2.5, nanosecond), window).right[1], -2.5) < 1e-14);
    // A ramp of 2 ns is two of 1 ns, one after the other.
    const slow = prepared.response(ramp(0, 'left', 2, 2 * nanosecond), window).right[1];
    for (let time = 0; time < window; time += 0.1 * nanosecond) {
      near(valueAt(slow, seconds(time)) + 1, valueAt(one, seconds(time)) + (time < nanosecond ? 0 : valueAt(one, seconds(time - nanosecond))) + 1, 1e-13);
    }
  });

  it('scales: ten times the length with ten times the edge has the same peaks', () => {
    const ends = { left: [end(10), end(50)], right: [end(200), end(70)] };
    const at = (factor: number) => lineResponse(lines({ ...rowOfLines(2), length: 0.02 * factor, ...ends }), ramp(0, 'left', 1, 0.3 * nanosecond * factor), seconds(5 * nanosecond * factor));
    const one = at(1);
    for (const factor of [1e-6, 10, 1e6]) {
      near(peakOf(at(factor).left[1]).value, peakOf(one.left[1]).value, 1e-9, `near at ${factor}`);
      near(peakOf(at(factor).right[1]).value, peakOf(one.right[1]).value, 1e-9, `far at ${factor}`);
    }
  });

  it('reaches the resting voltages of the resistors', () => {
    const response = lineResponse(lines({ ...rowOfLines(2), length: 0.1, left: [end(30), end(40)], right: [end(60), end(50)] }), ramp(0, 'left', 1, nanosecond), seconds(200 * nanosecond));
    near(valueAt(response.right[0], seconds(200 * nanosecond)), 60 / 90, 1e-9);
    assert.ok(Math.abs(valueAt(response.right[1], seconds(200 * nanosecond))) < 1e-9);
  });

  it('is exact for sixteen lines where all modes have one delay', () => {
    const order = 16;
    const { capacitance } = rowOfLines(order);
    const inverse = inverseOf(capacitance).map((row) => row.map((value) => value * 36e-18));
    const coupled = lines({ inductance: inverse, capacitance, length: 0.1, left: Array.from({ length: order }, () => end(20)), right: Array.from({ length: order }, () => end(1e3)) });
    const response = lineResponse(coupled, ramp(7, 'left', 1, nanosecond), seconds(nanosecond + 20 * 0.6 * nanosecond));
    assert.equal(response.method, 'lattice');
    assert.ok(response.work < 50, `${response.work} states`);
  });

  it('counts its states: echoes that passed each mode equally often are one', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.1, left: [end(5), end(50)], right: [end(1e6), end(70)] });
    const window = 12 * nanosecond;
    const prepared = prepareLines(coupled);
    const [fast, slow] = prepared.modes.delays;
    let expected = 0;
    for (let n = 0; n * fast <= window; n += 1) for (let m = 0; n * fast + m * slow <= window; m += 1) if (0 < n + m) expected += 1;
    assert.equal(prepared.response(ramp(0, 'left', 1, nanosecond), seconds(window)).work, expected);
    assert.ok(200 < expected);
  });
});

/** Integral over time of a product of piecewise-linear waveforms: Simpson's rule is exact between points. */
function integrated(waveforms: readonly Waveform[], of: (values: number[]) => number): number {
  const times = [...new Set(waveforms.flatMap(({ times: own }) => [...own]))].sort((a, b) => a - b);
  let sum = 0;
  for (let n = 1; n < times.length; n += 1) {
    const at = (time: number) => of(waveforms.map((waveform) => valueAt(waveform, seconds(time))));
    sum += ((times[n] - times[n - 1]) * (at(times[n - 1]) + 4 * at((times[n - 1] + times[n]) / 2) + at(times[n]))) / 6;
  }
  return sum;
}

/** Gauss-Jordan, plainly, so that the test does not lean on what it tests. */
function inverseOf(matrix: readonly (readonly number[])[]): number[][] {
  const n = matrix.length;
  const rows = matrix.map((row, i) => [...row, ...row.map((_, j) => (i === j ? 1 : 0))]);
  for (let i = 0; i < n; i += 1) {
    const pivot = rows[i][i];
    rows[i] = rows[i].map((value) => value / pivot);
    for (let j = 0; j < n; j += 1) if (j !== i) rows[j] = rows[j].map((value, k) => value - rows[j][i] * rows[i][k]);
  }
  return rows.map((row) => row.slice(n));
}
