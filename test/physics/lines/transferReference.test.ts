import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { modesOf } from '../../../server/src/physics/lines/modes';
import { prepareTransfer, type Drive } from '../../../server/src/physics/lines/transfer';
import { harmonicsOf } from '../../../server/src/physics/noise/harmonics';
import { hertz, metres, ratio, seconds, volts } from '../../../server/src/units/quantity';
import { end, lines, referenceCases } from './build';

// Source: reference/coupled-lines.json, waveforms made by bounce tables and circuit simulation. Here as a Fourier series: one edge
// of a square wave so slow that everything is over before the next. What rings for longer than that has no such series.
describe('reference waveforms of coupled lines, from the transfer alone', () => {
  for (const given of referenceCases('coupled-lines.json').filter(({ id }) => id !== 'B-05-cmos')) {
    it(`${given.id}: near and far end`, () => {
      const { inputs, outputs } = given;
      const coupled = lines({
        inductance: inputs.L_H_per_m, capacitance: inputs.C_F_per_m, length: inputs.length_m,
        left: inputs.R_near_ohm.map((resistance: number, i: number) => end(resistance, inputs.C_near_F[i])),
        right: inputs.R_far_ohm.map((resistance: number, i: number) => end(resistance, inputs.C_far_F[i])),
      });
      const { delays } = modesOf(coupled, metres(inputs.length_m));
      const rise = inputs.rise_time_0_100_s as number;
      const period = 6 * Math.max(inputs.window_s, 20 * delays[delays.length - 1]);
      // What lies beyond rounds the corners of a linear edge: 2e-3 of a peak.
      const count = 20_000;
      const harmonics = harmonicsOf({ swing: volts(inputs.source_amplitude_V[0]), rise: seconds(rise), fall: seconds(rise), repeats: hertz(1 / period), duty: ratio(0.5) }, hertz(Infinity), count);
      const prepared = prepareTransfer(coupled);
      const driven: readonly Drive[] = [{ line: 0, end: 'left', kind: 'voltage', amplitude: 1 }];
      const victim = inputs.victim_index as number;
      const { start, stop, points } = outputs.waveform.t_s;
      const times = Array.from({ length: points }, (_, n) => start + ((stop - start) * n) / (points - 1));
      const sums = { left: new Float64Array(points), right: new Float64Array(points) };
      for (let n = 1; n <= count; n += 2) {
        const transfer = prepared.at(driven, hertz(n / period));
        for (const place of ['left', 'right'] as const) {
          const [re, im] = [transfer[place].real[victim], transfer[place].imaginary[victim]];
          const [a, b] = [harmonics.real[n - 1] * re - harmonics.imaginary[n - 1] * im, harmonics.real[n - 1] * im + harmonics.imaginary[n - 1] * re];
          times.forEach((time, m) => {
            // The series counts from the middle of the rise.
            const angle = (2 * Math.PI * n * (time - rise / 2)) / period;
            sums[place][m] += 2 * (a * Math.cos(angle) - b * Math.sin(angle));
          });
        }
      }
      for (const [place, side] of [['left', 'near'], ['right', 'far']] as const) {
        const expected: number[] = outputs.waveform[`${side}_V`];
        // Before the edge a noise of zero: whatever direct voltage the series leaves out is the same all the time.
        const level = sums[place][0] - expected[0];
        expected.forEach((value, m) => {
          const off = Math.abs(sums[place][m] - level - value);
          assert.ok(off < 4e-3 * Math.abs(outputs[side].peak_V), `${side} at ${times[m]}: off by ${off / Math.abs(outputs[side].peak_V)}`);
        });
      }
    });
  }
});
