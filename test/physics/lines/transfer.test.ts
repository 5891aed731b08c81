import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import type { Across, CoupledLines } from '../../../server/src/physics/lines/lines';
import { lineTransfer, type Drive, type LineTransfer, type Place } from '../../../server/src/physics/lines/transfer';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { farads, hertz, ohms, seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { chainTransfer } from './chainTransfer';
import { end, lines, pair, ramp, referenceCases, rowOfLines } from './build';

const volt = (line: number, side: 'left' | 'right' = 'left', amplitude = 1): Drive => ({ line, end: side, kind: 'voltage', amplitude });
const ampere = (line: number, side: 'left' | 'right', amplitude = 1): Drive => ({ line, end: side, kind: 'current', amplitude });
const between = (first: number, second: number, resistance: number, capacitance = 0): Across => ({ first, second, resistance: ohms(resistance), capacitance: farads(capacitance) });

function magnitude(transfer: LineTransfer, place: Place, line: number): number {
  return Math.hypot(transfer[place].real[line], transfer[place].imaginary[line]);
}

const places = ['left', 'right', 'leftTermination', 'rightTermination'] as const;

function checkSame(one: LineTransfer, other: Readonly<Record<Place, LineTransfer['left']>>, allowed: number): void {
  const largest = Math.max(...places.flatMap((place) => Array.from(one[place].real, (_, line) => magnitude(one, place, line))));
  for (const place of places) {
    one[place].real.forEach((value, line) => {
      const off = Math.hypot(value - other[place].real[line], one[place].imaginary[line] - other[place].imaginary[line]);
      assert.ok(off <= allowed * largest, `${place} of line ${line}: off by ${off} of ${largest}`);
    });
  }
}

/** Unequal in everything, with leads, capacitors and resistors across both ends. */
const crowded: CoupledLines = {
  ...lines({
    ...rowOfLines(3, 0.2),
    length: 0.15,
    left: [end(22, 3e-12, { impedance: 70, delay: 0.4e-9 }), end(1e3, 8e-12), end(0)],
    right: [end(1e4, 5e-12, { impedance: 55, delay: 0.9e-9 }), end(75, 0, { impedance: 90, delay: 0.2e-9 }), end(Infinity, 2e-12)],
  }),
  leftAcross: [between(0, 1, 220, 1e-12)],
  rightAcross: [between(0, 1, 100, 2e-12), between(1, 2, Infinity, 4e-12)],
};

describe('transfer of lines at one frequency', () => {
  it('single line: the textbook input and output of a terminated lossless line', () => {
    const [impedance, delay, source, load] = [50, 1e-9, 20, 300];
    const one = lines({ inductance: [[impedance * 1e-8]], capacitance: [[1e-8 / impedance]], length: 0.1, left: [end(source)], right: [end(load)] });
    for (const frequency of [1, 1e6, 2.5e8, 7.7e8, 3e9]) {
      const { right } = lineTransfer(one, [volt(0)], hertz(frequency));
      const angle = 2 * Math.PI * frequency * delay;
      // e / V_load = cos (1 + RS/RL) + j sin (RS/Z + Z/RL): chain matrix, Pozar, Microwave Engineering, table of ABCD parameters.
      const [a, b] = [Math.cos(angle) * (1 + source / load), Math.sin(angle) * (source / impedance + impedance / load)];
      assert.ok(Math.hypot(right.real[0] - a / (a * a + b * b), right.imaginary[0] + b / (a * a + b * b)) < 1e-12 / Math.hypot(a, b));
    }
  });

  // The chain matrix by its own series, and ends as one dense system: no modes anywhere.
  for (const frequency of [1e3, 1e6, 4.3e7, 3.21e8, 1.17e9]) {
    it(`agrees with the matrix exponential at ${frequency} Hz`, () => {
      for (const drives of [[volt(0)], [ampere(2, 'right')], [volt(1, 'right', -2), ampere(0, 'left', 0.01)]]) {
        const ours = lineTransfer(crowded, drives, hertz(frequency));
        checkSame(ours, chainTransfer(crowded, drives, frequency), 1e-9);
        assert.ok(!ours.undamped && ours.error < 1e-10);
      }
    });
  }

  it('is reciprocal: a current at one port, the voltage at another', () => {
    const ports = [[0, 'left'], [1, 'left'], [0, 'right'], [1, 'right'], [2, 'right']] as const;
    for (const frequency of [5e2, 2e7, 6.1e8]) {
      for (const [line, side] of ports) {
        for (const [other, otherSide] of ports) {
          const one = lineTransfer(crowded, [ampere(line, side)], hertz(frequency));
          const two = lineTransfer(crowded, [ampere(other, otherSide)], hertz(frequency));
          const [there, back] = [one[`${otherSide}Termination`], two[`${side}Termination`]];
          const size = Math.hypot(there.real[other], there.imaginary[other]);
          const off = Math.hypot(there.real[other] - back.real[line], there.imaginary[other] - back.imaginary[line]);
          assert.ok(off < 1e-10 * size + one.error + two.error && one.error < 1e-9, `${off} of ${size}`);
        }
      }
    }
  });

  it('adds drives, and takes a voltage behind R for the current V/R', () => {
    const frequency = hertz(2.2e8);
    const [one, other] = [lineTransfer(crowded, [volt(0)], frequency), lineTransfer(crowded, [ampere(2, 'right')], frequency)];
    const both = lineTransfer(crowded, [volt(0, 'left', 3), ampere(2, 'right', -0.2)], frequency);
    const sum = Object.fromEntries(places.map((place) => [place, {
      real: one[place].real.map((value, i) => 3 * value - 0.2 * other[place].real[i]),
      imaginary: one[place].imaginary.map((value, i) => 3 * value - 0.2 * other[place].imaginary[i]),
    }])) as unknown as LineTransfer;
    checkSame(both, sum, 1e-13);
    checkSame(one, lineTransfer(crowded, [ampere(0, 'left', -1 / 22)], frequency), 1e-13);
  });

  it('equal lines with a resistor across: half of it ends the difference, none of it the mean', () => {
    const two = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 });
    const bridged: CoupledLines = { ...lines({ ...two, length: 0.1, left: [end(40), end(40)], right: [end(1e3), end(1e3)] }), rightAcross: [between(0, 1, 100)] };
    const single = (sign: 1 | -1, load: number) => lines({
      inductance: [[two.inductance[0][0] + sign * two.inductance[0][1]]], capacitance: [[two.capacitance[0][0] + sign * two.capacitance[0][1]]],
      length: 0.1, left: [end(40)], right: [end(load)],
    });
    for (const frequency of [1e5, 3.7e8]) {
      const odd = lineTransfer(bridged, [volt(0, 'left', 0.5), volt(1, 'left', -0.5)], hertz(frequency)).right;
      const even = lineTransfer(bridged, [volt(0, 'left', 0.5), volt(1, 'left', 0.5)], hertz(frequency)).right;
      const oddAlone = lineTransfer(single(-1, 1 / (1 / 1e3 + 1 / 50)), [volt(0)], hertz(frequency)).right;
      const evenAlone = lineTransfer(single(1, 1e3), [volt(0)], hertz(frequency)).right;
      near(odd.real[0] - odd.real[1], oddAlone.real[0], 1e-11);
      near(odd.imaginary[0] - odd.imaginary[1], oddAlone.imaginary[0], 1e-11);
      near(even.real[0] + even.real[1], evenAlone.real[0], 1e-11);
      near(even.imaginary[0] + even.imaginary[1], evenAlone.imaginary[0], 1e-11);
    }
  });

  it('a sine far below everything is the flat top of a slow edge, for the same slope', () => {
    const two = lines({ ...pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 }), length: 0.05, left: [end(30), end(80)], right: [end(150), end(45)] });
    const duration = 2e-7;
    const edge = lineResponse(two, ramp(0, 'left', 1, duration), seconds(duration));
    const frequency = 1e4;
    const sine = lineTransfer(two, [volt(0)], hertz(frequency));
    for (const place of ['left', 'right'] as const) {
      const slope = valueAt(edge[place][1], seconds(0.9 * duration)) * duration;
      near(sine[place].imaginary[1] / (2 * Math.PI * frequency), slope, 1e-6, place);
    }
  });

  // Source: inputs of reference/lumped.json; Z = R / (1 + j omega R (Cm + Cv)), V = j omega Cm Z: circuit theory.
  for (const given of referenceCases('lumped.json').filter(({ id }) => id === 'E-cap-1' || id === 'E-cap-3')) {
    it(`${given.id}: the same node under a sine`, () => {
      const { Cm, Cv, Rv } = given.inputs_SI;
      const short = lines({
        inductance: [[1e-17, 0], [0, 1e-17]], capacitance: [[2 * Cm, -Cm], [-Cm, Cm]], length: 1, left: [end(0), end(Infinity)], right: [end(Infinity), end(Rv, Cv)],
      });
      for (const turn of [0.01, 1, 100]) {
        const omega = turn / (Rv * (Cm + Cv));
        const { right } = lineTransfer(short, [volt(0)], hertz(omega / (2 * Math.PI)));
        near(Math.hypot(right.real[1], right.imaginary[1]), (omega * Rv * Cm) / Math.hypot(1, turn), 1e-3);
      }
    });
  }

  it('keeps the digits of what is tiny: the mains through a picofarad', () => {
    const two = lines({ ...pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0, capacitive: 0.2 }), length: 0.05, left: [end(0), end(Infinity)], right: [end(Infinity), end(1)] });
    const { right } = lineTransfer(two, [volt(0)], hertz(50));
    near(right.imaginary[1], 2 * Math.PI * 50 * 0.2 * 1e-10 * 0.05, 1e-6);
  });

  it('answers beside a resonance that nothing damps, and says so', () => {
    const open = lines({ inductance: [[5e-7]], capacitance: [[2e-10]], length: 0.1, left: [end(0)], right: [end(Infinity)] });
    const quarter = 1 / (4 * 0.1 * 1e-8);
    const at = lineTransfer(open, [volt(0)], hertz(quarter));
    assert.ok(at.undamped && Number.isFinite(at.right.real[0]) && 1e4 < magnitude(at, 'right', 0));
    assert.equal(lineTransfer(open, [volt(0)], hertz(quarter / 2)).undamped, false);
  });

  it('a node that floats has its capacitive share at zero frequency', () => {
    const two = lines({ ...pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 }), length: 0.05, left: [end(10), end(Infinity)], right: [end(Infinity), end(Infinity)] });
    const { right, undamped } = lineTransfer(two, [volt(0)], hertz(0));
    assert.ok(undamped);
    near(right.real[1], 0.2, 1e-9);
  });

  it('an ideal source takes any current, an open end none of a voltage behind it', () => {
    const two = lines({ ...pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 }), length: 0.05, left: [end(0), end(50)], right: [end(Infinity), end(50)] });
    assert.equal(magnitude(lineTransfer(two, [ampere(0, 'left')], hertz(1e8)), 'left', 0), 0);
    assert.equal(magnitude(lineTransfer(two, [volt(0, 'right')], hertz(1e8)), 'right', 1), 0);
  });

  it('the error bound holds between equal problems in different order', () => {
    const swapped: CoupledLines = { ...crowded, left: crowded.right, right: crowded.left, leftAcross: crowded.rightAcross!, rightAcross: crowded.leftAcross! };
    const frequency = hertz(3.21e8);
    const one = lineTransfer(crowded, [volt(0)], frequency);
    const other = lineTransfer(swapped, [volt(0, 'right')], frequency);
    one.right.real.forEach((value, line) => assert.ok(Math.abs(value - other.left.real[line]) <= one.error));
  });
});
