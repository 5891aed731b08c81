import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { currentAsVoltage, type CurrentRamp } from '../../../server/src/physics/lines/currentAsVoltage';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import { lumpedRun } from '../../../server/src/physics/lines/lumpedRun';
import type { CoupledLines } from '../../../server/src/physics/lines/lines';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { lineTransfer } from '../../../server/src/physics/lines/transfer';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { amperes, hertz, seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair, referenceCases } from './build';

function drawn(line: number, side: 'left' | 'right', amplitude: number, duration: number): CurrentRamp {
  return { line, end: side, amplitude: amperes(amplitude), duration: seconds(duration) };
}

function answered(coupled: CoupledLines, current: CurrentRamp, window: number) {
  const { lines: driven, ramp } = currentAsVoltage(coupled, current);
  return lineResponse(driven, ramp, seconds(window));
}

const alone = (left: number, right: number) => lines({ inductance: [[5e-7]], capacitance: [[2e-10]], length: 0.1, left: [end(left)], right: [end(right)] });

describe('a current drawn at a load', () => {
  it('pulls a matched line down by the current through line and load', () => {
    // 50 ohm line beside a 200 ohm load: 40 ohm.
    const { right, left } = answered(alone(50, 200), drawn(0, 'right', 0.1, 1e-9), 5e-9);
    near(valueAt(right[0], seconds(1e-9)), -0.1 * 40, 1e-12);
    near(valueAt(left[0], seconds(3e-9)), -0.1 * 40, 1e-12);
  });

  it('at an open load: all of it comes through the line', () => {
    const { right, left, errorBar } = answered(alone(50, Infinity), drawn(0, 'right', 0.1, 1e-9), 5e-9);
    near(valueAt(right[0], seconds(1e-9)), -0.1 * 50, 1e-6);
    near(valueAt(left[0], seconds(3e-9)), -0.1 * 50, 1e-6);
    assert.ok(errorBar[0] < 1e-4 * 5);
  });

  it('open load, low source: settles at the drop over the source resistance', () => {
    const { right } = answered(alone(20, Infinity), drawn(0, 'right', 0.1, 1e-9), 60e-9);
    near(valueAt(right[0], seconds(60e-9)), -0.1 * 20, 1e-6);
  });

  it('an ideal source feels nothing', () => {
    const { ramp } = currentAsVoltage(alone(0, 50), drawn(0, 'left', 0.1, 1e-9));
    assert.equal(Math.abs(ramp.amplitude), 0);
  });

  it('slow ramps: the plateau is what a sine of the same slope gives', () => {
    const two = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 });
    for (const load of [1e4, Infinity]) {
      const coupled = lines({ ...two, length: 0.05, left: [end(1), end(80)], right: [end(load, 3e-12), end(45)] });
      const duration = 4e-7;
      const edge = answered(coupled, drawn(0, 'right', 1, duration), duration);
      const sine = lineTransfer(coupled, [{ line: 0, end: 'right', kind: 'current', amplitude: 1 }], hertz(1e4));
      for (const place of ['left', 'right'] as const) {
        near(sine[place].imaginary[1] / (2 * Math.PI * 1e4), valueAt(edge[place][1], seconds(0.9 * duration)) * duration, 1e-4, `${load} ${place}`);
      }
    }
  });

  // Source: reference/lumped.json. The case's current enters the aggressor at its near end and leaves at the far end: the current
  // that the load draws. Coils without capacitance; what little they have here is 1e-4 of the answer.
  for (const given of referenceCases('lumped.json').filter(({ id }) => id === 'E-ind-1' || id === 'E-ind-3')) {
    it(`${given.id}: coupled coils under the load's current`, () => {
      const { inputs_SI: { M, Lv, R_near, R_far, I, tr }, outputs } = given;
      const coil = lines({ inductance: [[Lv, M], [M, Lv]], capacitance: [[1e-16, 0], [0, 1e-16]], length: 1, left: [end(0), end(R_near)], right: [end(Infinity), end(R_far)] });
      const { lines: driven, ramp } = currentAsVoltage(coil, drawn(0, 'right', I, tr));
      const { left, right } = lumpedRun(driven, ramp, seconds(0), seconds(3 * tr));
      near(peakOf(left[1]).value, outputs.V_near_peak, 1e-3);
      near(peakOf(right[1]).value, outputs.V_far_peak, 1e-3);
    });
  }
});
