/** Small circuits against independent reference cases, closed forms and each other. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import type { Circuit } from '../../../server/src/physics/circuit/circuit';
import { circuitTransfer } from '../../../server/src/physics/circuit/circuitTransfer';
import { circuitWaveforms } from '../../../server/src/physics/circuit/circuitWaveforms';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { farads, henries, hertz, ohms, seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import reference from '../../reference/lumped.json';

const none = { resistance: ohms(Infinity), capacitance: farads(0) };
type Numbers = Readonly<Record<string, number>>;
const caseOf = (id: string) => reference.cases.find((each) => each.id === id) as unknown as { inputs_SI: Numbers; outputs: Numbers };

describe('a small circuit answers a ramp', () => {
  for (const id of ['E-cap-1', 'E-cap-3']) {
    it(`${id}: capacitance into R beside C`, () => {
      const { inputs_SI: { Cm, Cv, Rv, V, tr }, outputs } = caseOf(id);
      const circuit: Circuit = {
        nodes: 2,
        shunts: [{ node: 1, to: 2, ...none, capacitance: farads(Cm) }, { node: 2, to: 0, resistance: ohms(Rv), capacitance: farads(Cv) }],
        branches: [{ from: 0, to: 1, resistance: ohms(0), inductance: henries(0) }],
        mutuals: [],
      };
      const { nodes } = circuitWaveforms(circuit, { drive: { kind: 'voltage', branch: 0 }, amplitude: V, duration: seconds(tr) });
      near(peakOf(nodes[1]).value, outputs.V_peak, 2e-6);
      near(peakOf(nodes[1]).width, outputs.width_50pct_s, 1e-4);
    });
  }

  it('E-cap-src-1: behind a source resistance, of second order', () => {
    const { inputs_SI: { Rs, Ca, Cm, Cv, Rv, V, tr }, outputs } = caseOf('E-cap-src-1');
    const circuit: Circuit = {
      nodes: 2,
      shunts: [{ node: 1, to: 0, ...none, capacitance: farads(Ca) }, { node: 1, to: 2, ...none, capacitance: farads(Cm) }, { node: 2, to: 0, resistance: ohms(Rv), capacitance: farads(Cv) }],
      branches: [{ from: 0, to: 1, resistance: ohms(Rs), inductance: henries(0) }],
      mutuals: [],
    };
    const { nodes } = circuitWaveforms(circuit, { drive: { kind: 'voltage', branch: 0 }, amplitude: V, duration: seconds(tr) });
    // 2 000 steps of the reference leave its peak a millionth low.
    near(peakOf(nodes[1]).value, outputs.V_peak, 3e-6);
  });

  for (const id of ['E-ind-1', 'E-ind-3']) {
    it(`${id}: a mutual inductance into a loop with two ends`, () => {
      const { inputs_SI: { M, Lv, R_near, R_far, I, tr }, outputs } = caseOf(id);
      // The current flows through a coil; the victim's loop runs from the near end to the far one.
      const circuit: Circuit = {
        nodes: 3,
        shunts: [{ node: 1, to: 0, resistance: ohms(1e9), capacitance: farads(0) }, { node: 2, to: 0, resistance: ohms(R_near), capacitance: farads(0) }, { node: 3, to: 0, resistance: ohms(R_far), capacitance: farads(0) }],
        branches: [{ from: 1, to: 0, resistance: ohms(0), inductance: henries(1e-12) }, { from: 2, to: 3, resistance: ohms(0), inductance: henries(Lv) }],
        mutuals: [{ by: 0, into: 1, inductance: henries(M) }],
      };
      const { nodes } = circuitWaveforms(circuit, { drive: { kind: 'current', node: 1 }, amplitude: I, duration: seconds(tr) });
      near(peakOf(nodes[1]).value, outputs.V_near_peak, 1e-6);
      near(peakOf(nodes[2]).value, outputs.V_far_peak, 1e-6);
    });
  }

  it('a receiver a million times smaller than its source keeps its digits', () => {
    const small = farads(1e-18);
    const circuit: Circuit = {
      nodes: 2,
      shunts: [{ node: 1, to: 2, ...none, capacitance: small }, { node: 2, to: 0, resistance: ohms(50), capacitance: farads(1e-12) }],
      branches: [{ from: 0, to: 1, resistance: ohms(0), inductance: henries(0) }],
      mutuals: [],
    };
    const { nodes, errorBar } = circuitWaveforms(circuit, { drive: { kind: 'voltage', branch: 0 }, amplitude: 1, duration: seconds(1e-9) });
    const exact = ((50 * small) / 1e-9) * -Math.expm1(-1e-9 / (50 * (1e-12 + small)));
    assert.ok(errorBar[1] <= 2e-6 * exact);
    near(peakOf(nodes[1]).value, exact, 1e-6);
  });

  it('follows a coil and a capacitor in series to its overshoot', () => {
    // Closed form of a step into L, R, C in series: overshoot exp(-pi z / sqrt(1 - z²)).
    const [R, L, C] = [5, 1e-6, 1e-9];
    const circuit: Circuit = { nodes: 1, shunts: [{ node: 1, to: 0, ...none, capacitance: farads(C) }], branches: [{ from: 0, to: 1, resistance: ohms(R), inductance: henries(L) }], mutuals: [] };
    const { nodes } = circuitWaveforms(circuit, { drive: { kind: 'voltage', branch: 0 }, amplitude: 1, duration: seconds(1e-13) });
    const damping = (R / 2) * Math.sqrt(C / L);
    near(peakOf(nodes[0]).value, 1 + Math.exp((-Math.PI * damping) / Math.sqrt(1 - damping * damping)), 2e-5);
  });
});

describe('a small circuit answers a sine', () => {
  const circuit: Circuit = {
    nodes: 2,
    shunts: [{ node: 1, to: 0, resistance: ohms(1e3), capacitance: farads(1e-9) }, { node: 2, to: 0, resistance: ohms(50), capacitance: farads(0) }],
    branches: [{ from: 0, to: 1, resistance: ohms(10), inductance: henries(0) }, { from: 1, to: 2, resistance: ohms(0), inductance: henries(1e-6) }],
    mutuals: [],
  };

  it('as its divider says in closed form', () => {
    for (const frequency of [1, 1e5, 3e6, 1e9]) {
      const w = 2 * Math.PI * frequency;
      // Y at node 1: 1/1k + jwC + 1/(50 + jwL); v1 = (1/10) / (1/10 + Y); v2 = v1 50/(50 + jwL).
      const square = 50 * 50 + (w * 1e-6) ** 2;
      const y = { re: 0.1 + 1e-3 + 50 / square, im: w * 1e-9 - (w * 1e-6) / square };
      const magnitude1 = 0.1 / Math.hypot(y.re, y.im);
      const magnitude2 = (magnitude1 * 50) / Math.sqrt(square);
      const answer = circuitTransfer(circuit)({ kind: 'voltage', branch: 0 }, hertz(frequency));
      assert.ok(answer !== null);
      near(Math.hypot(answer[0].re, answer[0].im), magnitude1, 1e-12);
      near(Math.hypot(answer[1].re, answer[1].im), magnitude2, 1e-12);
    }
  });

  it('says so where nothing holds a node', () => {
    const open: Circuit = { nodes: 1, shunts: [{ node: 1, to: 0, ...none }], branches: [], mutuals: [] };
    assert.equal(circuitTransfer(open)({ kind: 'current', node: 1 }, hertz(1e6)), null);
  });

  it('is reciprocal between two nodes', () => {
    const transfer = circuitTransfer(circuit);
    const [ab, ba] = [transfer({ kind: 'current', node: 1 }, hertz(2e6)), transfer({ kind: 'current', node: 2 }, hertz(2e6))];
    near(ab![1].re, ba![0].re, 1e-12);
    near(ab![1].im, ba![0].im, 1e-12);
  });
});
