import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import type { Termination } from '../../../server/src/physics/lines/lines';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { tiedResponse, type Tie } from '../../../server/src/physics/lines/tiedLines';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, ramp, referenceCases } from './build';

const cases = new Map(referenceCases('coupled-lines.json').map((given) => [given.id as string, given]));
// Three lines over a plane, the guard in the middle: reference/coupled-lines.json, independent bounce tables.
const open = cases.get('B-14-guard-terminated')!;
const three = { inductance: open.inputs.L_H_per_m, capacitance: open.inputs.C_F_per_m, length: 0.1 };
const edge = ramp(0, 'left', 1, 3e-10);
const window = seconds(5e-9);
const matched = (): Termination[] => [end(50), end(50), end(50)];
const tiesEvery = (count: number, inductance: number): Tie[] => Array.from({ length: count + 1 }, (_, n) => ({ line: 1, at: n / count, inductance }));
const answer = (ties: readonly Tie[], left = matched(), right = matched()) => tiedResponse({ lines: lines({ ...three, left, right }), ties }, edge, window);

describe('lines with ties', () => {
  it('answer as the reference where the tie lets nothing through', () => {
    const { left, right, errorBar } = answer([{ line: 1, at: 0.37, inductance: 1 }]);
    near(peakOf(left[2]).value, open.outputs.near.peak_V, 3e-3);
    near(peakOf(right[2]).value, open.outputs.far.peak_V, 1e-2);
    assert.ok(Math.abs(peakOf(right[2]).value - open.outputs.far.peak_V) <= errorBar[2], `${peakOf(right[2]).value}, bar ${errorBar[2]}`);
  });

  it('come to the guard of zero potential as ties come closer, and to nothing better', () => {
    const ideal = cases.get('B-18-guard-ideal')!.outputs;
    const off = [1, 4, 16, 64].map((count) => Math.abs(peakOf(answer(tiesEvery(count, 1e-13)).left[2]).value / ideal.near.peak_V - 1));
    assert.ok(off[3] < 0.02, `${off.join(', ')}`);
    assert.ok(1 < off[0] && off[1] < off[0] / 10 && off[2] < off[1], `${off.join(', ')}`);
  });

  it('agree with lines that end in a short where there are ties of no inductance at the ends alone', () => {
    const shorted = lines({ ...three, left: [end(50), end(0), end(50)], right: [end(50), end(0), end(50)] });
    const exact = lineResponse(shorted, edge, window);
    const found = answer(tiesEvery(1, 1e-15));
    for (const side of ['left', 'right'] as const) {
      found[side][2].times.forEach((time, n) => assert.ok(Math.abs(found[side][2].values[n] - valueAt(exact[side][2], seconds(time))) <= found.errorBar[2] + 1e-6, `${side} at ${time}`));
      near(peakOf(found[side][2]).value, peakOf(exact[side][2]).value, 1e-2);
    }
  });

  it('take capacitors and leads as the other march does', () => {
    const lead = { impedance: 60, delay: 1.5e-10 };
    const left = [end(20, 0, lead), end(0), end(70, 2e-12)];
    const right = [end(1e6, 5e-12, lead), end(0), end(1e3, 3e-12, lead)];
    const exact = lineResponse(lines({ ...three, left, right }), edge, window);
    const found = answer(tiesEvery(1, 1e-15), left, right);
    for (const place of ['left', 'right', 'leftTermination', 'rightTermination'] as const) {
      near(peakOf(found[place][2]).value, peakOf(exact[place][2]).value, 2e-2);
    }
  });

  it('are worse with more inductance in their vias', () => {
    const peaks = [1e-10, 3e-10, 1e-9, 3e-9].map((inductance) => Math.abs(peakOf(answer(tiesEvery(10, inductance)).left[2]).value));
    peaks.slice(1).forEach((peak, n) => assert.ok(peaks[n] < peak, `${peaks.join(', ')}`));
  });

  it('are reciprocal', () => {
    const ties = tiesEvery(3, 4e-10);
    const [left, right] = [[end(20), end(0), end(80)], [end(300), end(0), end(40)]];
    const tied = { lines: lines({ ...three, left, right }), ties };
    const there = tiedResponse(tied, ramp(0, 'left', 1, 3e-10), window).right[2];
    const back = tiedResponse(tied, ramp(2, 'right', 1, 3e-10), window).left[0];
    const largest = Math.abs(peakOf(there).value);
    // Reciprocity of transfer admittances: current into a shorted source is what the other's voltage drives.
    there.values.forEach((value, n) => assert.ok(Math.abs(value / 40 - back.values[n] / 20) < 1e-9 + (2e-2 * largest) / 40));
  });

  it('bound their work', () => {
    const many = tiedResponse({ lines: lines({ ...three, length: 10, left: matched(), right: matched() }), ties: tiesEvery(64, 5e-10) }, edge, seconds(1e-6));
    assert.ok(many.work < 30_000, `${many.work}`);
    assert.ok(many.left[2].values.every(Number.isFinite));
  });
});
