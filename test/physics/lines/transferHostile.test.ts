import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Across, CoupledLines, Termination } from '../../../server/src/physics/lines/lines';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import { lineTransfer, type Drive } from '../../../server/src/physics/lines/transfer';
import { worstTransfer } from '../../../server/src/physics/lines/worstTransfer';
import { farads, hertz, ohms, seconds } from '../../../server/src/units/quantity';
import { chainTransfer } from './chainTransfer';
import { end, lines, ramp, rowOfLines } from './build';

/** Seeded, from 0 to 1. */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Over decades, sometimes at the very ends. */
function hostileLines(next: () => number): CoupledLines {
  const order = 1 + Math.floor(next() * 4);
  const resistance = () => (next() < 0.12 ? 0 : next() < 0.15 ? Infinity : 10 ** (-2 + 9 * next()));
  const capacitance = () => (next() < 0.4 ? 0 : 10 ** (-15 + 9 * next()));
  const ends = (): Termination[] => Array.from({ length: order }, () => end(resistance(), capacitance(), next() < 0.3 ? { impedance: 20 + 100 * next(), delay: 10 ** (-13 + 4 * next()) } : null));
  const across = (): Across[] => (order < 2 || next() < 0.6 ? [] : [{ first: 0, second: 1, resistance: ohms(next() < 0.2 ? Infinity : 10 ** (6 * next())), capacitance: farads(capacitance()) }]);
  return { ...lines({ ...rowOfLines(order, 0.05 + 0.2 * next()), length: 10 ** (-4 + 4 * next()), left: ends(), right: ends() }), leftAcross: across(), rightAcross: across() };
}

describe('transfers of hostile lines', () => {
  it('300 of them: finite, and as another way says within what is said of the error', () => {
    const next = seeded(7);
    let compared = 0;
    for (let n = 0; n < 300; n += 1) {
      const coupled = hostileLines(next);
      const frequency = 10 ** (1 + 8.5 * next());
      const drive: Drive = { line: Math.floor(next() * coupled.order), end: next() < 0.5 ? 'left' : 'right', kind: next() < 0.5 ? 'voltage' : 'current', amplitude: 1 };
      const ours = lineTransfer(coupled, [drive], hertz(frequency));
      for (const place of ['left', 'right', 'leftTermination', 'rightTermination'] as const) {
        assert.ok([...ours[place].real, ...ours[place].imaginary].every(Number.isFinite), `case ${n}`);
      }
      if (ours.undamped) continue;
      const other = chainTransfer(coupled, [drive], frequency);
      let [largest, off] = [0, 0];
      for (const place of ['left', 'right'] as const) {
        for (let line = 0; line < coupled.order; line += 1) {
          largest = Math.max(largest, Math.hypot(ours[place].real[line], ours[place].imaginary[line]));
          off = Math.max(off, Math.hypot(ours[place].real[line] - other[place].real[line], ours[place].imaginary[line] - other[place].imaginary[line]));
        }
      }
      // The other way loses digits to currents and voltages that cancel; so do leads too short to be counted, in ours.
      assert.ok(off <= 1e-4 * largest + 100 * ours.error, `case ${n}: off by ${off} of ${largest}, said ${ours.error}`);
      compared += 1;
    }
    assert.ok(200 < compared, `${compared}`);
  });

  it('40 of them over all frequencies: finite, bounded work, and no single frequency above the worst', () => {
    const next = seeded(11);
    for (let n = 0; n < 40; n += 1) {
      const coupled = hostileLines(next);
      const drive: Drive = { line: 0, end: 'left', kind: 'voltage', amplitude: 1 };
      const worst = worstTransfer(coupled, [drive], { from: hertz(1e3), to: hertz(1e9) });
      assert.ok(worst.readings.every(({ magnitude }) => Number.isFinite(magnitude)) && worst.work < 30_000, `case ${n}`);
      if (worst.undamped || !worst.resolved) continue;
      for (let m = 0; m < 200; m += 1) {
        const transfer = lineTransfer(coupled, [drive], hertz(10 ** (3 + 6 * next())));
        (['left', 'right'] as const).forEach((place, p) => transfer[place].real.forEach((value, line) => {
          const magnitude = Math.hypot(value, transfer[place].imaginary[line]);
          assert.ok(magnitude <= worst.readings[p * coupled.order + line].magnitude * (1 + 1e-5) + transfer.error, `case ${n}: ${magnitude} at ${transfer.frequency}`);
        }));
      }
    }
  });

  it('20 of them in time, whatever is across: finite', () => {
    const next = seeded(13);
    for (let n = 0; n < 20; n += 1) {
      const coupled = { ...hostileLines(next), length: hostileLines(next).length };
      const answer = lineResponse(coupled, ramp(0, 'left', 1, 10 ** (-10 + 3 * next())), seconds(2e-8));
      for (const place of ['left', 'right'] as const) assert.ok(answer[place].every(({ values }) => values.every(Number.isFinite)), `case ${n}`);
    }
  });
});
