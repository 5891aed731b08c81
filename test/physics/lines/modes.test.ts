import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { modesOf } from '../../../server/src/physics/lines/modes';
import { metres } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { lines, pair, rowOfLines } from './build';

const at = (matrix: Float64Array, order: number, i: number, j: number) => matrix[i * order + j];

describe('modes', () => {
  it('has the even and the odd mode of two equal lines', () => {
    // Source: closed form, e.g. Paul: slowness² = (L ± Lm)(C ∓ Cm).
    const plain = pair({ impedance: 50, slowness: 6e-9 }, { inductive: 0.25, capacitive: 0.15 });
    const { delays } = modesOf(lines({ ...plain, length: 1, left: [], right: [] }), metres(0.2));
    const of = (sign: number) => 0.2 * 6e-9 * Math.sqrt((1 + sign * 0.25) * (1 - sign * 0.15));
    near(delays[0], of(-1), 1e-14);
    near(delays[1], of(1), 1e-14);
  });

  for (const order of [1, 2, 5, 16]) {
    it(`makes both matrices of ${order} lines diagonal, with positive delays`, () => {
      const given = lines({ ...rowOfLines(order, 0.2), length: 1, left: [], right: [] });
      const { delays, voltage, current } = modesOf(given, metres(1));
      for (let k = 0; k < order; k += 1) assert.ok(0 < delays[k]);
      // L Y = Tv diag(delay) and C Tv = Y diag(delay), by the telegrapher's equations of each mode.
      for (let i = 0; i < order; i += 1) {
        for (let k = 0; k < order; k += 1) {
          let flux = 0;
          let charge = 0;
          for (let j = 0; j < order; j += 1) {
            flux += given.inductance[i * order + j] * at(current, order, j, k);
            charge += given.capacitance[i * order + j] * at(voltage, order, j, k);
          }
          const scale = Math.abs(at(voltage, order, k, k)) * delays[k];
          assert.ok(Math.abs(flux - at(voltage, order, i, k) * delays[k]) < 1e-12 * scale);
          assert.ok(Math.abs(charge - at(current, order, i, k) * delays[k]) < 1e-12 * Math.abs(at(current, order, k, k)) * delays[k]);
        }
      }
    });
  }

  it('has equal delays in a homogeneous dielectric', () => {
    const plain = pair({ impedance: 50, slowness: 6e-9 }, { inductive: 0.2, capacitive: 0.2 });
    const { delays } = modesOf(lines({ ...plain, length: 1, left: [], right: [] }), metres(1));
    near(delays[0], delays[1], 1e-14);
    near(delays[0], 6e-9 * Math.sqrt(1 - 0.04), 1e-14);
  });

  it('refuses matrices that store negative energy, by name', () => {
    const plain = { inductance: [[1e-7, 2e-7], [2e-7, 1e-7]], capacitance: [[1e-10, 0], [0, 1e-10]], length: 1, left: [], right: [] };
    assert.throws(() => modesOf(lines(plain), metres(1)), /inductance matrix of 2 lines is not positive definite/);
    assert.throws(() => modesOf(lines({ ...plain, inductance: plain.capacitance, capacitance: plain.inductance }), metres(1)), /capacitance matrix/);
  });
});
