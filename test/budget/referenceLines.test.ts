/**
 * The whole way from text to volts against independent reference cases of coupled lines: the section is solved
 * here, not handed in. Their edges are 0–100 %: a stated `rise` is 0.8 of that.
 */
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import { couplingOf, evaluated, microstrip } from './board';

interface Case {
  readonly id: string;
  readonly outputs: { readonly near: { readonly peak_V: number }; readonly far: { readonly peak_V: number } };
}

const cases: readonly Case[] = JSON.parse(readFileSync('test/reference/coupled-lines.json', 'utf8')).cases;

function check(id: string, board: string, tolerance = 5e-3, stackup = microstrip): void {
  const reference = cases.find((each) => each.id === id);
  assert.ok(reference, id);
  const coupling = couplingOf(evaluated(stackup + board), 'A', 'V');
  near(coupling.nearEnd, reference.outputs.near.peak_V, tolerance, `${id} near end`);
  near(coupling.farEnd, reference.outputs.far.peak_V, tolerance, `${id} far end`);
  assert.equal(coupling.atReceiver, coupling.farEnd);
}

const pair = 'trace A 0.2 mm; gap 0.2 mm; trace V 0.2 mm';
// The polygons of A-GUARD-ms are 0.3 mm apart; its title says 0.2.
const guarded = (guard: string) => `trace A 0.2 mm; gap 0.3 mm; ${guard}; gap 0.3 mm; trace V 0.2 mm`;
const matched = (rise: string, swing: string) => `
  net A { swing ${swing}; rise ${rise}; source 50 ohm; load 50 ohm }
  net V { source 50 ohm; load 50 ohm; tolerates 1 V peak }
  net G { source 50 ohm; load 50 ohm }
`;

describe('runs against reference lines', () => {
  it('B-01: a short microstrip pair, 50 Ω everywhere', () => {
    check('B-01-short', `${matched('0.8 ns', '3.3 V')} run r on TOP for 10 mm { ${pair} }`);
  });

  it('B-05: drivers of low impedance, open ends, echo upon echo', () => {
    check('B-05-cmos', `
      net A { swing 3.3 V; rise 0.8 ns; source 15 ohm; load 1 Mohm }
      net V { source 25 ohm; load 1 Mohm, 5 pF; tolerates 1 V peak }
      run r on TOP for 150 mm { ${pair} }`);
  });

  it('B-07: under a mask that follows the traces, into capacitors', () => {
    // The mutual capacitance under such a mask is asked for within 2 %.
    const masked = `stackup { mask 25 um er 3.4; ${microstrip.slice(microstrip.indexOf('{') + 1)}`;
    check('B-07-capload', `
      net A { swing 1.8 V; rise 0.4 ns; source 33 ohm; load 1 Mohm, 10 pF }
      net V { source 20 ohm; load 1 Mohm, 10 pF; tolerates 1 V peak }
      run r on TOP for 80 mm { trace A 0.2 mm; gap 0.1 mm; trace V 0.2 mm }`, 1e-2, masked);
  });

  it('B-14: a third line between them, 50 Ω at its ends', () => {
    check('B-14-guard-terminated', `${matched('0.24 ns', '1 V')} run r on TOP for 100 mm { ${guarded('trace G 0.2 mm')} }`);
  });

  it('B-18: a guard that is tied everywhere', () => {
    check('B-18-guard-ideal', `${matched('0.24 ns', '1 V')} run r on TOP for 100 mm { ${guarded('guard GND 0.2 mm stitched 1 mm')} }`);
  });

  it('E-comb-1: what two short lines do is their capacitance and inductance', () => {
    const board = `${microstrip}
      net A { swing 3.3 V; rise 4 ns; source 50 ohm; load 50 ohm }
      net V { source 50 ohm; load 50 ohm; tolerates 1 V peak }
      run r on TOP for 20 mm { ${pair} }`;
    const coupling = couplingOf(evaluated(board), 'A', 'V');
    // Peaks of the exact line, as the case states them beside the closed form.
    near(coupling.nearEnd, 0.00728081, 2e-3);
    near(coupling.farEnd, -0.0038922, 2e-3);
    assert.equal(coupling.model, 'lumped');
    // The parts that the closed form has at the far end, where the receiver is.
    near(coupling.capacitivePart, 0.0016943025, 2e-3);
    near(coupling.inductivePart, -0.005586504, 2e-3);
  });
});
