import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import { modesOf } from '../../../server/src/physics/lines/modes';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { metres, seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, ramp, referenceCases } from './build';

// Source: reference/coupled-lines.json, independent bounce tables, method of characteristics and circuit simulation.
// Given uncertainties: 1e-6 for resistive ends, 1e-4 (1.2e-4 for one) with capacitors.
describe('reference cases of coupled lines', () => {
  for (const given of referenceCases('coupled-lines.json')) {
    const { inputs, outputs } = given;
    const coupled = lines({
      inductance: inputs.L_H_per_m,
      capacitance: inputs.C_F_per_m,
      length: inputs.length_m,
      left: inputs.R_near_ohm.map((resistance: number, i: number) => end(resistance, inputs.C_near_F[i])),
      right: inputs.R_far_ohm.map((resistance: number, i: number) => end(resistance, inputs.C_far_F[i])),
    });
    const curved = [...inputs.C_near_F, ...inputs.C_far_F].some((value: number) => value !== 0);
    const response = lineResponse(coupled, ramp(0, 'left', inputs.source_amplitude_V[0], inputs.rise_time_0_100_s), seconds(inputs.window_s));
    const victim = inputs.victim_index as number;

    it(`${given.id}: modal delays`, () => {
      const { delays } = modesOf(coupled, metres(inputs.length_m));
      given.modal_delays_s.forEach((delay: number, k: number) => near(delays[k], delay, 1e-6, `mode ${k}`));
    });

    it(`${given.id}: method and error bar`, () => {
      assert.equal(response.method, curved ? 'characteristics' : 'lattice');
      assert.ok(response.errorBar[victim] <= (curved ? 1e-3 : 1e-9) * Math.abs(outputs.near.peak_V), `error bar ${response.errorBar[victim]}`);
    });

    for (const side of ['near', 'far'] as const) {
      const waveform = side === 'near' ? response.left[victim] : response.right[victim];
      it(`${given.id}: ${side}-end peak`, () => {
        const peak = peakOf(waveform);
        near(peak.value, outputs[side].peak_V, curved ? 2e-4 : 1e-6, 'peak');
        near(peak.time, outputs[side].t_peak_s, curved ? 2e-3 : 1e-4, 'time of peak');
      });

      it(`${given.id}: ${side}-end waveform`, () => {
        const { start, stop, points } = outputs.waveform.t_s;
        const expected: number[] = outputs.waveform[`${side}_V`];
        expected.forEach((value, n) => {
          const time = start + ((stop - start) * n) / (points - 1);
          const difference = Math.abs(valueAt(waveform, seconds(time)) - value);
          assert.ok(difference <= (curved ? 1e-3 : 1e-5) * Math.abs(outputs[side].peak_V), `at ${time}: ${difference}`);
        });
      });
    }
  }
});
