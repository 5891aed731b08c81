import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { inputNoise, type NoisyInput } from '../../../server/src/physics/noise/inputNoise';
import { networkThermalNoise } from '../../../server/src/physics/noise/networkThermalNoise';
import { currentNoiseDensity, hertz, kelvins, voltageNoiseDensity } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { band, plainSum, shunt, twoNodeImpedance } from './networks';

const input = (node: number, voltage: number, current: number, corner: number): NoisyInput => ({ node, voltage: voltageNoiseDensity(voltage), current: currentNoiseDensity(current), corner: hertz(corner) });
const node = (resistance: number, capacitance = 0) => ({ nodes: 1, shunts: [shunt(1, 0, resistance, capacitance)], weights: [1] });

describe('noise of an input at a single node', () => {
  it('is white: en and in R over the width of the band', () => {
    const { white, flicker } = inputNoise(node(10e3), [input(1, 5e-9, 2e-12, 0)], band(0, 1e6));
    near(white.rms, Math.hypot(5e-9, 2e-12 * 10e3) * 1e3, 1e-13);
    assert.equal(flicker.rms, 0);
    assert.ok(0 < white.errorBar && white.errorBar < 1e-13 * white.rms);
  });

  it('flickers: fc ln(f2/f1) in place of the width', () => {
    const { white, flicker } = inputNoise(node(10e3), [input(1, 5e-9, 2e-12, 2e3)], band(10, 1e5));
    near(white.rms, Math.hypot(5e-9, 20e-9) * Math.sqrt(1e5 - 10), 1e-13);
    near(flicker.rms, Math.hypot(5e-9, 20e-9) * Math.sqrt(2e3 * Math.log(1e4)), 1e-13);
  });

  it('is the integral of (en² + in² |Z|²)(1 + fc/f), summed plainly, wherever the pole lies', () => {
    for (const resistance of [1, 200, 1e6, 1e10]) {
      for (const [from, to] of [[1, 10], [10e3, 4e6], [1e8, 1.001e8]] as const) {
        const { white, flicker } = inputNoise(node(resistance, 8e-12), [input(1, 5e-9, 2e-12, 2e3)], band(from, to));
        const density = (f: number) => 5e-9 ** 2 + (2e-12 * resistance) ** 2 / (1 + (2 * Math.PI * f * resistance * 8e-12) ** 2);
        near(white.rms, Math.sqrt(plainSum(from, to, density)), 1e-6);
        near(flicker.rms, Math.sqrt(plainSum(from, to, (f) => (density(f) * 2e3) / f)), 1e-6);
      }
    }
  });

  it('has limits: nothing but a capacitance, and a narrow band far above the pole', () => {
    const [from, to, c] = [100, 1e4, 10e-12];
    const only = inputNoise(node(Infinity, c), [input(1, 0, 1e-15, 50)], band(from, to));
    near(only.white.rms, (1e-15 / (2 * Math.PI * c)) * Math.sqrt(1 / from - 1 / to), 1e-12);
    near(only.flicker.rms, (1e-15 / (2 * Math.PI * c)) * Math.sqrt((50 / 2) * (1 / from ** 2 - 1 / to ** 2)), 1e-12);
    near(inputNoise(node(1e15, c), [input(1, 0, 1e-15, 50)], band(from, to)).flicker.rms, only.flicker.rms, 1e-6);
    const narrow = inputNoise(node(2e3, 3e-12), [input(1, 0, 1e-12, 1e3)], band(1e14, 1.0001e14)).white.rms;
    near(narrow, (1e-12 / (2 * Math.PI * 1.00005e14 * 3e-12)) * Math.sqrt(1e10), 1e-6);
    assert.equal(inputNoise(node(Infinity, c), [input(1, 0, 1e-15, 0)], band(0, to)).white.rms, Infinity);
    assert.equal(inputNoise(node(0, c), [input(1, 0, 1e-12, 0)], band(0, to)).white.rms, 0);
  });

  it('of a 2 kΩ source at an input of 5 nV/√Hz and 2 pA/√Hz is 8.6 nV/√Hz in all (by hand: the root of the squares of 5, 4 and 5.755)', () => {
    const source = node(2e3);
    const thermal = networkThermalNoise(source, { temperature: kelvins(300), band: band(1000, 1001) })!.rms;
    near(thermal, 5.755e-9, 1e-3);
    near(Math.hypot(thermal, inputNoise(source, [input(1, 5e-9, 2e-12, 0)], band(1000, 1001)).white.rms), 8.61e-9, 1e-3);
  });
});

describe('published relations', () => {
  it('white and 1/f in one: en sqrt((f2 - f1) + fc ln(f2/f1)) (Motchenbacher & Connelly, Low-Noise Electronic System Design, 1993; from memory)', () => {
    const { white, flicker } = inputNoise(node(1), [input(1, 3.2e-9, 0, 2.7)], band(0.1, 10));
    near(Math.hypot(white.rms, flicker.rms), 3.2e-9 * Math.sqrt(9.9 + 2.7 * Math.log(100)), 1e-13);
  });

  it('an input is least noisy behind en/in, where both add alike (the same; optimum source resistance)', () => {
    const factor = (resistance: number) => {
      const warm = networkThermalNoise(node(resistance), { temperature: kelvins(290), band: band(1e3, 2e3) })!.rms;
      return (inputNoise(node(resistance), [input(1, 4e-9, 1e-12, 0)], band(1e3, 2e3)).white.rms / warm) ** 2;
    };
    const best = 4e-9 / 1e-12;
    // F - 1 there is en in / (2 k T).
    near(factor(best), (4e-9 * 1e-12) / (2 * 1.380649e-23 * 290), 1e-12);
    for (const other of [0.5, 0.99, 1.01, 2]) assert.ok(factor(best) < factor(other * best));
  });
});

describe('noise of the two inputs of a pair', () => {
  const shunts = [shunt(1, 0, 1e3, 3e-12), shunt(2, 0, 20e3, 8e-12), shunt(1, 2, 5e3, 1e-12)];
  const inputs = [input(1, 3e-9, 1e-12, 1e3), input(2, 4e-9, 2e-12, 500)];

  it('is the sum over both inputs, each by its own way to what is read, summed plainly', () => {
    for (const [w1, w2] of [[1, -1], [0.5, 0.5], [1.05, -0.95]] as const) {
      for (const [from, to] of [[10, 1e5], [1e6, 1e9]] as const) {
        const { white, flicker } = inputNoise({ nodes: 2, shunts, weights: [w1, w2] }, inputs, band(from, to));
        const parts = (f: number) => {
          const { re, im } = twoNodeImpedance(shunts, f);
          const square = (a: number, b: number) => (w1 * re[a]! + w2 * re[b]!) ** 2 + (w1 * im[a]! + w2 * im[b]!) ** 2;
          return [(w1 * 3e-9) ** 2 + 1e-24 * square(0, 1), (w2 * 4e-9) ** 2 + 4e-24 * square(1, 2)] as const;
        };
        near(white.rms, Math.sqrt(plainSum(from, to, (f) => parts(f)[0] + parts(f)[1])), 1e-6);
        near(flicker.rms, Math.sqrt(plainSum(from, to, (f) => (1e3 * parts(f)[0] + 500 * parts(f)[1]) / f)), 1e-6);
        assert.ok(0 < white.errorBar && white.errorBar < 1e-8 * white.rms);
      }
    }
  });

  it('with nothing across is that of two single nodes', () => {
    const apart = shunts.slice(0, 2);
    const one = (at: 0 | 1) => inputNoise({ nodes: 1, shunts: [{ ...apart[at]!, node: 1 }], weights: [1] }, [{ ...inputs[at]!, node: 1 }], band(10, 1e7));
    const both = inputNoise({ nodes: 2, shunts: apart, weights: [1, -1] }, inputs, band(10, 1e7));
    near(both.white.rms, Math.hypot(one(0).white.rms, one(1).white.rms), 1e-13);
    near(both.flicker.rms, Math.hypot(one(0).flicker.rms, one(1).flicker.rms), 1e-13);
  });

  it('has no end towards 0 Hz where no resistance leads its current away, unless what is read does not see it', () => {
    const floating = [shunt(1, 0, Infinity, 3e-12), shunt(2, 0, Infinity, 3e-12), shunt(1, 2, 1e4)];
    const white = (weights: readonly number[]) => inputNoise({ nodes: 2, shunts: floating, weights }, [input(1, 0, 1e-12, 0)], band(0, 1e3)).white.rms;
    assert.equal(white([0.5, 0.5]), Infinity);
    near(white([1, -1]), 1e-12 * 0.5e4 * Math.sqrt(1e3), 1e-6);
  });
});
