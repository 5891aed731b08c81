import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { circuitTransfer } from '../../../server/src/physics/circuit/circuitTransfer';
import { densityOverBand } from '../../../server/src/physics/noise/densityOverBand';
import { networkThermalNoise } from '../../../server/src/physics/noise/networkThermalNoise';
import { henries, kelvins, ohms } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { band, plainSum, shunt, twoNodeImpedance } from './networks';

const boltzmann = 1.380649e-23;
const room = kelvins(300);

interface Case {
  readonly id: string;
  readonly inputs_SI: Readonly<Record<string, number>>;
  readonly outputs: Readonly<Record<string, number>>;
}
const cases = (JSON.parse(readFileSync('test/reference/fields-and-noise.json', 'utf8')) as { cases: readonly Case[] }).cases;
const caseOf = (id: string) => cases.find((each) => each.id === id)!;

describe('thermal noise of a network: independent reference cases', () => {
  it('D-thermal-1', () => {
    const { inputs_SI: { R, B, T }, outputs } = caseOf('D-thermal-1');
    near(networkThermalNoise({ nodes: 1, shunts: [shunt(1, 0, R!)], weights: [1] }, { temperature: kelvins(T!), band: band(0, B!) })!.rms, outputs.V_rms!, 1e-9);
  });

  it('D-kTC-1, whatever the resistance', () => {
    const { inputs_SI: { C, T }, outputs } = caseOf('D-kTC-1');
    for (const resistance of [1, 1e4, 1e12]) near(networkThermalNoise({ nodes: 1, shunts: [shunt(1, 0, resistance, C)], weights: [1] }, { temperature: kelvins(T!), band: null })!.rms, outputs.V_rms!, 1e-9);
  });

  it('D-RC-noise-1, and its limits without a capacitance and without a band', () => {
    const { inputs_SI: { R, C, T, f1, f2 }, outputs } = caseOf('D-RC-noise-1');
    const noise = (capacitance: number, all = false) => networkThermalNoise({ nodes: 1, shunts: [shunt(1, 0, R!, capacitance)], weights: [1] }, { temperature: kelvins(T!), band: all ? null : band(f1!, f2!) })!.rms;
    near(noise(C!), outputs.V_rms!, 1e-9);
    near(noise(0), outputs.white_no_C_V_rms!, 1e-9);
    near(noise(C!, true), outputs.kTC_limit_V_rms!, 1e-9);
  });
});

describe('thermal noise of a network', () => {
  const pair = [shunt(1, 0, 50, 3e-12), shunt(1, 0, 1e4), shunt(2, 0, 2e3, 8e-12), shunt(1, 2, 120, 1e-12)];
  const readings = [[1, -1], [0.5, 0.5], [1.0005, -0.9995], [1, 0]] as const;
  const noise = (weights: readonly number[], limits: ReturnType<typeof band> | null, shunts = pair) => networkThermalNoise({ nodes: 2, shunts, weights }, { temperature: room, band: limits });

  it('is 4.07 nV/√Hz for 1 kΩ at 300 K (Nyquist 1928, textbook value)', () => {
    near(networkThermalNoise({ nodes: 1, shunts: [shunt(1, 0, 1000)], weights: [1] }, { temperature: room, band: band(10, 11) })!.rms, 4.07e-9, 1e-3);
  });

  it('as a sum over its resistors is 4 k T Re Z of what is read, summed plainly, whatever is read and in any band', () => {
    for (const [w1, w2] of readings) {
      for (const [from, to] of [[1e3, 1e6], [1e6, 3e9], [1e8, 1.1e8], [1e10, 1e12]] as const) {
        const sum = plainSum(from, to, (f) => {
          const { re } = twoNodeImpedance(pair, f);
          return 4 * boltzmann * room * (w1 * w1 * re[0]! + 2 * w1 * w2 * re[1]! + w2 * w2 * re[2]!);
        });
        const found = noise([w1, w2], band(from, to))!;
        near(found.rms, Math.sqrt(sum), 1e-6, `${w1} ${w2}, ${from} to ${to}`);
        assert.ok(0 < found.errorBar && found.errorBar < 1e-8 * found.rms, `${found.errorBar} of ${found.rms}`);
      }
    }
  });

  it('of a band from 0 Hz joins what lies below and above any frequency', () => {
    for (const weights of readings) {
      const [low, high, whole] = [band(0, 3e7), band(3e7, 1e10), band(0, 1e10)].map((each) => noise(weights, each)!.rms);
      near(whole!, Math.hypot(low!, high!), 1e-9);
    }
  });

  it('over all frequencies is k T of the inverse capacitances that are read (equipartition)', () => {
    for (const weights of readings) near(noise(weights, null)!.rms, noise(weights, band(0, 1e18))!.rms, 1e-5, `${weights}`);
    // A differential node: across, beside both to ground in series.
    const c = 1e-12 + 1 / (1 / 3e-12 + 1 / 8e-12);
    near(noise([1, -1], null)!.rms, Math.sqrt((boltzmann * room) / c), 1e-12);
  });

  it('of a difference that only a capacitance across bounds is kT/C, and its mean has no limit', () => {
    const across = [shunt(1, 0, 50), shunt(2, 0, 50), shunt(1, 2, Infinity, 2e-12)];
    near(noise([1, -1], null, across)!.rms, Math.sqrt((boltzmann * room) / 2e-12), 1e-12);
    assert.equal(noise([0.5, 0.5], null, across), null);
    assert.equal(noise([1.01, -0.99], null, across), null);
  });

  it('has nothing of what no resistance reaches', () => {
    const floating = [shunt(1, 0, Infinity, 10e-12), shunt(2, 0, 50, 5e-12), shunt(1, 2, Infinity, 2e-12)];
    assert.equal(noise([1, 0], null, [shunt(1, 0, Infinity, 1e-12), shunt(2, 0, 50, 1e-12)])!.rms, 0);
    // Node 2 alone is a node of 5 pF beside 2 pF and 10 pF in series; a divider takes its part to node 1.
    const [c, share] = [5e-12 + 20 / 12 * 1e-12, 2 / 12];
    near(noise([0, 1], null, floating)!.rms, Math.sqrt((boltzmann * room) / c), 1e-12);
    near(noise([1, 0], null, floating)!.rms, share * Math.sqrt((boltzmann * room) / c), 1e-12);
    near(noise([1, 0], band(0, 1e18), floating)!.rms, share * Math.sqrt((boltzmann * room) / c), 1e-5);
  });

  it('of a symmetrical pair is that of one pole, for the difference and for the mean', () => {
    const symmetrical = [shunt(1, 0, 300, 4e-12), shunt(2, 0, 300, 4e-12), shunt(1, 2, 100, 1e-12)];
    const onePole = (resistance: number, capacitance: number) => networkThermalNoise({ nodes: 1, shunts: [shunt(1, 0, resistance, capacitance)], weights: [1] }, { temperature: room, band: band(1e5, 2e9) })!.rms;
    near(noise([1, -1], band(1e5, 2e9), symmetrical)!.rms, onePole(1 / (1 / 600 + 1 / 100), 3e-12), 1e-9);
    near(noise([0.5, 0.5], band(1e5, 2e9), symmetrical)!.rms, onePole(150, 8e-12), 1e-9);
  });

  it('of nets with nothing across is that of each, unrelated; a short circuit is quiet, and ties what it joins', () => {
    const apart = [shunt(1, 0, 50, 3e-12), shunt(2, 0, 2e3, 8e-12)];
    const one = (which: 0 | 1) => noise(which === 0 ? [1, 0] : [0, 1], band(0, 1e9), apart)!.rms;
    near(noise([1, -1], band(0, 1e9), apart)!.rms, Math.hypot(one(0), one(1)), 1e-14);
    const tied = [shunt(1, 0, 0), ...pair];
    assert.equal(noise([1, 0], band(0, 1e9), tied)!.rms, 0);
    near(noise([1, -1], band(0, 1e9), tied)!.rms, networkThermalNoise({ nodes: 1, shunts: [shunt(1, 0, 2e3, 9e-12), shunt(1, 0, 120)], weights: [1] }, { temperature: room, band: band(0, 1e9) })!.rms, 1e-12);
    assert.equal(noise([1, -1], band(0, 1e9), [...pair, shunt(1, 2, 0)])!.rms, 0);
  });

  it('of three nodes that hang together is the integral of the circuit’s own answer, too, and k T over all frequencies', () => {
    const shunts = [...pair, shunt(2, 3, 700), shunt(3, 0, Infinity, 2e-12)];
    const transfer = circuitTransfer({ nodes: 3, shunts, branches: [], mutuals: [] });
    const weights = [1, -1, 0.3];
    const sum = densityOverBand(band(1e4, 1e10), (f) => weights.reduce((all, weight, at) => {
      const answer = transfer({ kind: 'current', node: at + 1 }, f)!;
      return all + 4 * boltzmann * room * weight * weights.reduce((inner, other, node) => inner + other * answer[node]!.re, 0);
    }, 0));
    const found = (limits: ReturnType<typeof band> | null) => networkThermalNoise({ nodes: 3, shunts, weights }, { temperature: room, band: limits })!.rms;
    near(found(band(1e4, 1e10)), Math.sqrt(sum.value), 1e-8);
    near(found(null), found(band(0, 1e18)), 1e-5);
  });

  it('keeps its digits behind a strong connection: a difference across 1 mΩ between nets of 1 GΩ', () => {
    const strong = [shunt(1, 0, 1e9, 1e-12), shunt(2, 0, 2e9, 3e-12), shunt(1, 2, 1e-3)];
    near(noise([1, -1], band(1e3, 2e3), strong)!.rms, Math.sqrt(4 * boltzmann * room * 1e-3 * 1e3), 1e-9);
  });

  it('is what the answer of the circuit gives, and of one with a coil the same integral', () => {
    const circuit = { nodes: 2, shunts: pair, branches: [], mutuals: [] };
    const transfer = circuitTransfer(circuit);
    const sum = densityOverBand(band(1e4, 1e10), (f) => 4 * boltzmann * room * transfer({ kind: 'current', node: 1 }, f)![0]!.re);
    near(noise([1, 0], band(1e4, 1e10))!.rms, Math.sqrt(sum.value), 1e-9);
    // Whatever stands between a warm resistance and a capacitance, over all frequencies the capacitance has k T / C.
    const coil = circuitTransfer({ nodes: 1, shunts: [shunt(1, 0, Infinity, 10e-12)], branches: [{ from: 0, to: 1, resistance: ohms(300), inductance: henries(1e-6) }], mutuals: [] });
    const all = densityOverBand(band(0, 1e14), (f) => 4 * boltzmann * room * coil({ kind: 'current', node: 1 }, f)![0]!.re);
    near(Math.sqrt(all.value), Math.sqrt((boltzmann * room) / 10e-12), 1e-4);
  });
});
