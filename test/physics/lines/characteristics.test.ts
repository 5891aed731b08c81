import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse, prepareLines } from '../../../server/src/physics/lines/lineResponse';
import type { CoupledLines, LineResponse, Waveform } from '../../../server/src/physics/lines/lines';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { seeded } from '../../support/seeded';
import { end, lines, pair, ramp, rowOfLines } from './build';

const nanosecond = 1e-9;
const picofarad = 1e-12;
const single = { inductance: [[300e-9]], capacitance: [[120e-12]] };
const impedance = 50;
const slowness = 6e-9;

/** Largest difference at the times of the first. */
function apart(one: Waveform, other: Waveform): number {
  return Math.max(...[...one.times].map((time) => Math.abs(valueAt(one, seconds(time)) - valueAt(other, seconds(time)))));
}

/** A ramp through R into C: first-order circuit, exact. */
function charged(time: number, duration: number, constant: number): number {
  const rise = (t: number) => (t <= 0 ? 0 : (t + constant * Math.expm1(-t / constant)) / duration);
  return rise(time) - rise(time - duration);
}

describe('method of characteristics', () => {
  it('charges a capacitor behind a matched line as a circuit does, one delay later', () => {
    for (const capacitance of [0.5, 2, 10, 50].map((value) => value * picofarad)) {
      const coupled = lines({ ...single, length: 0.1, left: [end(impedance)], right: [end(Infinity, capacitance)] });
      const response = lineResponse(coupled, ramp(0, 'left', 1, nanosecond), seconds(6 * nanosecond));
      assert.equal(response.method, 'characteristics');
      const { times, values } = response.right[0];
      times.forEach((time, n) => {
        const exact = charged(time - 0.1 * slowness, nanosecond, impedance * capacitance);
        assert.ok(Math.abs(values[n] - exact) < 2e-5, `${capacitance} F at ${time}: ${values[n]} instead of ${exact}`);
      });
    }
  });

  it('is the even and the odd mode, each a line of its own, for equal ends', () => {
    const ratios = { inductive: 0.2, capacitive: 0.12 };
    const ends = { left: [end(15), end(15)], right: [end(1e4, 4 * picofarad), end(1e4, 4 * picofarad)] };
    const window = seconds(14 * nanosecond);
    const both = lineResponse(lines({ ...pair({ impedance: 50, slowness }, ratios), length: 0.1, ...ends }), ramp(0, 'left', 1, 0.5 * nanosecond), window);
    const mode = (sign: number) => lineResponse(lines({
      inductance: [[impedance * slowness * (1 + sign * ratios.inductive)]],
      capacitance: [[(slowness / impedance) * (1 - sign * ratios.capacitive)]],
      length: 0.1, left: [ends.left[0]], right: [ends.right[0]],
    }), ramp(0, 'left', 1, 0.5 * nanosecond), window);
    const [even, odd] = [mode(1), mode(-1)];
    both.right[1].times.forEach((time, n) => {
      const expected = (valueAt(even.right[0], seconds(time)) - valueAt(odd.right[0], seconds(time))) / 2;
      assert.ok(Math.abs(both.right[1].values[n] - expected) < 3e-4);
    });
  });

  it('agrees with the lattice where there is no capacitor to speak of', () => {
    const own = { ...rowOfLines(3), length: 0.1 };
    const resistive = { left: [end(20), end(50), end(30)], right: [end(300), end(60), end(1e5)] };
    const barely = { left: resistive.left, right: [resistive.right[0], end(60, 1e-20), resistive.right[2]] };
    const window = seconds(14 * nanosecond);
    const exact = lineResponse(lines({ ...own, ...resistive }), ramp(0, 'left', 1, 0.7 * nanosecond), window);
    const marched = lineResponse(lines({ ...own, ...barely }), ramp(0, 'left', 1, 0.7 * nanosecond), window);
    assert.equal(exact.method, 'lattice');
    assert.equal(marched.method, 'characteristics');
    for (const line of [0, 1, 2]) {
      assert.ok(apart(exact.left[line], marched.left[line]) < 1e-4, `left ${line}: ${apart(exact.left[line], marched.left[line])}`);
      assert.ok(apart(exact.right[line], marched.right[line]) < 1e-4, `right ${line}: ${apart(exact.right[line], marched.right[line])}`);
    }
  });

  it('errs less by the second order of the step, and its error bar says how much', () => {
    const coupled = lines({ ...rowOfLines(2, 0.2), length: 0.08, left: [end(20), end(25)], right: [end(1e6, 6 * picofarad), end(1e6, 9 * picofarad)] });
    const drive = ramp(0, 'left', 1, 0.4 * nanosecond);
    const window = seconds(12 * nanosecond);
    const best = peakOf(prepareLines(coupled, 16).response(drive, window).right[1]).value;
    const bars = [1, 2, 4].map((refinement) => prepareLines(coupled, refinement).response(drive, window).errorBar[1]);
    near(bars[0] / bars[1], 4, 0.3);
    near(bars[1] / bars[2], 4, 0.3);
    const found = peakOf(prepareLines(coupled).response(drive, window).right[1]).value;
    near(found, best, 2e-4);
    assert.ok(Math.abs(found - best) <= bars[0]);
  });

  it('takes a lead of the same line as more length', () => {
    const drive = ramp(0, 'left', 1, 0.3 * nanosecond);
    const window = seconds(10 * nanosecond);
    for (const capacitance of [0, 3 * picofarad]) {
      for (const [here, there] of [[0.03, 0.04], [0.0001, 0.002]]) {
        const whole = lineResponse(lines({ ...single, length: 0.1 + here + there, left: [end(12)], right: [end(1e4, capacitance)] }), drive, window);
        const parts = lineResponse(lines({
          ...single, length: 0.1,
          left: [end(12, 0, { impedance, delay: here * slowness })],
          right: [end(1e4, capacitance, { impedance, delay: there * slowness })],
        }), drive, window);
        const tolerance = capacitance === 0 ? 1e-9 : 1e-4;
        assert.ok(apart(whole.right[0], parts.rightTermination[0]) < tolerance, `${here} m, ${there} m and ${capacitance} F: ${apart(whole.right[0], parts.rightTermination[0])}`);
        assert.ok(apart(whole.left[0], parts.leftTermination[0]) < tolerance);
      }
    }
  });

  it('is exact for leads between resistors', () => {
    const leads = { left: [end(40, 0, { impedance: 60, delay: 0.11 * nanosecond }), end(50)], right: [end(60), end(100, 0, { impedance: 66, delay: 0.07 * nanosecond })] };
    const response = lineResponse(lines({ ...rowOfLines(2), length: 0.1, ...leads }), ramp(0, 'left', 1, nanosecond), seconds(15 * nanosecond));
    assert.equal(response.method, 'lattice');
    // The same with a capacitor that is next to nothing has to be marched.
    const barely = { ...leads, right: [leads.right[0], { ...leads.right[1], capacitance: end(100, 1e-20).capacitance }] };
    const marched = lineResponse(lines({ ...rowOfLines(2), length: 0.1, ...barely }), ramp(0, 'left', 1, nanosecond), seconds(15 * nanosecond));
    assert.equal(marched.method, 'characteristics');
    for (const place of ['left', 'right', 'leftTermination', 'rightTermination'] as const) {
      for (const line of [0, 1]) assert.ok(apart(response[place][line], marched[place][line]) < 1e-4, `${place} ${line}: ${apart(response[place][line], marched[place][line])}`);
    }
  });

  it('is reciprocal with capacitors', () => {
    const coupled = lines({ ...rowOfLines(3), length: 0.07, left: [end(15), end(70), end(10, 2 * picofarad)], right: [end(400, 5 * picofarad), end(33), end(1e5, 8 * picofarad)] });
    const prepared = prepareLines(coupled);
    const there = prepared.response(ramp(0, 'left', 1, nanosecond), seconds(9 * nanosecond)).right[2];
    const back = prepared.response(ramp(2, 'right', 1, nanosecond), seconds(9 * nanosecond)).left[0];
    const scaled = { times: back.times, values: back.values.map((value) => (value * 1e5) / 15) };
    assert.ok(apart(there, scaled) < 2e-3 * Math.abs(peakOf(there).value));
  });

  it('keeps its error bar over random pairs with capacitors and leads', () => {
    const random = seeded(11);
    const between = (low: number, high: number) => low * (high / low) ** random();
    const pick = <T>(...choices: readonly T[]) => choices[Math.floor(random() * choices.length)];
    let outside = 0;
    let loose = 0;
    let counted = 0;
    for (let trial = 0; trial < 40; trial += 1) {
      const termination = () => end(pick(10, 25, 50, between(5, 1e3), 1e6), pick(0, between(1, 20) * picofarad), pick(null, null, { impedance: between(40, 80), delay: between(0.01, 1) * nanosecond }));
      const coupled = lines({ ...rowOfLines(2, between(0.01, 0.25)), length: between(0.02, 0.2), left: [termination(), termination()], right: [termination(), termination()] });
      const duration = between(0.2, 5) * nanosecond;
      const window = seconds(duration + 20 * coupled.length * 6.5e-9);
      const [found, better] = [prepareLines(coupled), prepareLines(coupled, 6)].map((prepared) => prepared.response(ramp(0, 'left', 1, duration), window));
      for (const place of ['left', 'right', 'rightTermination'] as const) {
        const difference = Math.abs(Math.abs(peakOf(found[place][1]).value) - Math.abs(peakOf(better[place][1]).value));
        counted += 1;
        if (found.errorBar[1] < difference) outside += 1;
        if (1e-3 * Math.abs(peakOf(better[place][1]).value) < difference) loose += 1;
      }
    }
    assert.ok(outside <= 0.02 * counted, `${outside} of ${counted} outside their error bar`);
    assert.ok(loose <= 0.03 * counted, `${loose} of ${counted} off by more than a thousandth of the peak`);
  });

  it('answers rise and fall, and shorter windows, from one preparation', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.08, left: [end(20), end(25)], right: [end(1e6, 6 * picofarad), end(1e6, 6 * picofarad)] });
    const prepared = prepareLines(coupled);
    const alone = (duration: number, window: number): LineResponse => lineResponse(coupled as CoupledLines, ramp(0, 'left', 1, duration), seconds(window));
    prepared.response(ramp(0, 'left', 1, 2 * nanosecond), seconds(14 * nanosecond));
    const again = prepared.response(ramp(0, 'left', 1, 0.5 * nanosecond), seconds(11 * nanosecond));
    assert.ok(apart(alone(0.5 * nanosecond, 11 * nanosecond).right[1], again.right[1]) < 1e-4);
    near(again.right[1].times[again.right[1].times.length - 1], 11 * nanosecond, 1e-12);
  });

  it('bounds its work', () => {
    const order = 16;
    const many = (resistance: number, capacitance: number) => Array.from({ length: order }, (_, i) => end(resistance, capacitance, { impedance: 55, delay: (i + 1) * 0.02 * nanosecond }));
    const coupled = lines({ ...rowOfLines(order), length: 0.1, left: many(10, 0), right: many(1e6, 5 * picofarad) });
    const response = lineResponse(coupled, ramp(8, 'left', 1, nanosecond), seconds(nanosecond + 20 * 0.8 * nanosecond));
    assert.ok(response.work < 12_000, `${response.work} steps and states`);
  });
});
