/** Partial inductances and resistances of what currents share. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { barInductance } from '../../../server/src/physics/returns/barInductance';
import { viaInductance, viaResistance } from '../../../server/src/physics/returns/viaImpedance';
import { mu0 } from '../../../server/src/units/constants';
import { hertz, kelvins, metres } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import reference from '../../reference/inductance.json';

const caseOf = (id: string) => reference.cases.find((each) => each.id === id) as unknown as { inputs_SI: Readonly<Record<string, number>>; outputs: Readonly<Record<string, number>> };
const bar = (length: number, width: number, thickness: number) => barInductance(metres(length), metres(width), metres(thickness));

describe('the partial inductance of a bar', () => {
  it('C-bar-self-1: Hoer & Love’s closed form', () => {
    const { inputs_SI: { w, t, l }, outputs } = caseOf('C-bar-self-1');
    near(bar(l, w, t), outputs.Lp_H, 2e-9);
  });

  it('of a long one is Rosa’s: 2 l (ln(2l/(w+t)) + 1/2) cm and nH, to the second order of its section', () => {
    // Rosa 1908; Grover 1946, with 0.2235 (w+t)/l: within (w/l)² and the 0.2235, itself good to 2e-3 in the logarithm.
    const [l, w, t] = [0.1, 1e-3, 0.5e-3];
    near(bar(l, w, t), 2e-7 * l * (Math.log((2 * l) / (w + t)) + 0.5 + (0.2235 * (w + t)) / l), 1e-3);
  });

  it('scales, and does not care which side is the width', () => {
    near(bar(1, 0.1, 0.02), 1e3 * bar(1e-3, 1e-4, 2e-5), 1e-12);
    near(bar(0.03, 1e-3, 35e-6), bar(0.03, 35e-6, 1e-3), 1e-9);
  });

  it('of two halves is less than that of the whole: their mutual is missing', () => {
    const [whole, half] = [bar(0.02, 1e-3, 1e-4), bar(0.01, 1e-3, 1e-4)];
    assert.ok(2 * half < whole && whole < 4 * half);
  });

  it('is finite for what is wide, thin, short and small', () => {
    for (const [l, w, t] of [[1e-3, 1, 1e-6], [1, 1e-6, 1e-6], [1e-9, 1e-9, 1e-12], [10, 1e-7, 1]]) {
      const value = bar(l, w, t);
      assert.ok(0 < value && Number.isFinite(value), `${l} ${w} ${t}: ${value}`);
    }
  });
});

describe('vias', () => {
  const via = { count: 1, drill: metres(0.3e-3), length: metres(1.6e-3), temperature: kelvins(293.15) };
  it('have Rosa’s inductance of a straight wire: 2 l (ln(2l/r) - 1 + r/l), surface current, to the second order', () => {
    const [l, r] = [1.6e-3, 0.15e-3];
    near(viaInductance(via), (mu0 / (2 * Math.PI)) * l * (Math.log((2 * l) / r) - 1 + r / l), 3e-3);
  });
  it('have the resistance of a tube, and less of it conducts where the current crowds', () => {
    near(viaResistance(via, hertz(0)), (1.724e-8 * 1.6e-3) / (Math.PI * (0.15e-3 ** 2 - 0.125e-3 ** 2)), 1e-12);
    assert.ok(2 * viaResistance(via, hertz(0)) < viaResistance(via, hertz(1e9)));
    near(viaResistance({ ...via, count: 4 }, hertz(0)), viaResistance(via, hertz(0)) / 4, 1e-12);
  });
});
