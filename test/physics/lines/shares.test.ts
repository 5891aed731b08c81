import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { couplingShares } from '../../../server/src/physics/lines/shares';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, ramp, referenceCases, rowOfLines } from './build';

const given = new Map(referenceCases('lumped.json').map((one) => [one.id as string, one]));

describe('capacitive and inductive share', () => {
  it('E-comb-1: both parts of a short line, and their sum against the exact line', () => {
    // Source: reference/lumped.json, Paul's inductive-capacitive coupling model.
    const { inputs_SI: q, outputs, checks } = given.get('E-comb-1')!;
    const own = checks.exact_line_self_terms;
    const coupled = lines({
      inductance: [[own.L11_H_per_m, q.Lm_per_m], [q.Lm_per_m, own.L11_H_per_m]],
      capacitance: [[own.C11_F_per_m, -q.Cm_per_m], [-q.Cm_per_m, own.C11_F_per_m]],
      length: q.length,
      left: [end(q.R_source), end(q.R_near)], right: [end(q.R_load), end(q.R_far)],
    });
    const drive = ramp(0, 'left', q.V0, q.tr);
    const { near: atNear, far: atFar } = couplingShares(coupled, drive, 1);
    near(atNear.capacitive, outputs.V_capacitive, 1e-9);
    near(atNear.inductive, outputs.V_inductive_near, 1e-9);
    near(atFar.capacitive, outputs.V_capacitive, 1e-9);
    near(atFar.inductive, outputs.V_inductive_far, 1e-9);
    const exact = lineResponse(coupled, drive, seconds(8e-9));
    near(peakOf(exact.left[1]).value, checks.exact_lossless_coupled_line_peaks_V[0], 2e-6);
    near(peakOf(exact.right[1]).value, checks.exact_lossless_coupled_line_peaks_V[1], 2e-6);
    near(atNear.capacitive + atNear.inductive, peakOf(exact.left[1]).value, 1e-3);
  });

  for (const id of ['E-cap-1', 'E-cap-3']) {
    it(`${id}: exact for a capacitor into one node`, () => {
      const { inputs_SI: { Cm, Cv, Rv, V, tr }, outputs } = given.get(id)!;
      const coupled = lines({
        inductance: [[1e-15, 0], [0, 1e-15]], capacitance: [[1e-15 + Cm, -Cm], [-Cm, Cm + 1e-30]], length: 1,
        left: [end(0), end(Rv, Cv)], right: [end(Infinity), end(Infinity)],
      });
      near(couplingShares(coupled, ramp(0, 'left', V, tr), 1).far.capacitive, outputs.V_peak, 1e-9);
    });
  }

  for (const id of ['E-ind-1', 'E-ind-3']) {
    it(`${id}: exact for a mutual inductance into one loop`, () => {
      const { inputs_SI: { M, Lv, R_near, R_far, I, tr }, outputs } = given.get(id)!;
      const behind = 1e9;
      const coupled = lines({
        inductance: [[Lv, M], [M, Lv]], capacitance: [[1e-25, 0], [0, 1e-25]], length: 1,
        left: [end(behind), end(R_near)], right: [end(0), end(R_far)],
      });
      const shares = couplingShares(coupled, ramp(0, 'left', I * behind, tr), 1);
      near(shares.near.inductive, outputs.V_near_peak, 1e-7);
      near(shares.far.inductive, outputs.V_far_peak, 1e-7);
    });
  }

  it('mirrors when the driver is at the right', () => {
    const there = lines({ ...rowOfLines(2), length: 0.02, left: [end(10), end(50)], right: [end(1e4, 3e-12), end(200, 1e-12)] });
    const back = lines({ ...rowOfLines(2), length: 0.02, left: there.right as never, right: there.left as never });
    assert.deepEqual(couplingShares(there, ramp(0, 'left', 1, 1e-8), 1), couplingShares(back, ramp(0, 'right', 1, 1e-8), 1));
  });

  it('has a number for every end', () => {
    for (const resistance of [0, 1e-9, 50, 1e12, Infinity]) {
      for (const other of [0, 50, Infinity]) {
        for (const capacitance of [0, 1e-12, 1]) {
          const coupled = lines({ ...rowOfLines(2), length: 0.02, left: [end(other), end(resistance, capacitance)], right: [end(resistance), end(other, capacitance)] });
          for (const duration of [0, 1e-15, 1e-8, 1e3]) {
            const shares = couplingShares(coupled, ramp(0, 'left', 1, duration), 1);
            for (const value of [...Object.values(shares.near), ...Object.values(shares.far)]) assert.ok(Number.isFinite(value), `${resistance} ${other} ${capacitance} ${duration}: ${value}`);
          }
        }
      }
    }
  });
});
