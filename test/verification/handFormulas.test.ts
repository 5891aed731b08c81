/**
 * Peaks by hand from the matrices of the JSON, with formulas of textbooks that the product does not use for its numbers.
 *
 * Split of a short line (Paul, Introduction to Electromagnetic Compatibility, chapter on crosstalk, from memory):
 *   capacitive into both ends (Rn || Rf) Cm dVG/dt; inductive Rn/(Rn+Rf) Lm dIG/dt near, -Rf/(Rn+Rf) Lm dIG/dt far.
 * Two equal lines, ended in their own characteristic resistance network seen one by one: even and odd modes (any textbook on coupled
 *   lines): with every end R, mode m reflects (R - Zm)/(R + Zm) at both ends; victim = (even - odd)/2. Summed bounce by bounce here.
 */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { checkedRun, type RunReport } from '../support/checkedText';
import { near } from '../support/near';

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const coupling = (run_: RunReport) => run_.couplings.find(({ aggressor, edge }) => aggressor === 'A' && edge === 'rise') ?? assert.fail('no coupling');

describe('a short line by hand', () => {
  for (const { source, load, victimNear, victimFar, length } of [
    { source: 50, load: 50, victimNear: 50, victimFar: 50, length: 10 },
    { source: 30, load: 220, victimNear: 75, victimFar: 300, length: 12 },
    { source: 20, load: 40, victimNear: 10, victimFar: 90, length: 15 },
  ]) {
    it(`${source} Ω into ${load} Ω beside ${victimNear} Ω and ${victimFar} Ω over ${length} mm`, async () => {
      const [swing, rise] = [5, 100e-9];
      const run_ = await checkedRun(`${stackup}net A { swing ${swing} V; rise 80 ns; source ${source} ohm; load ${load} ohm }
        net V { source ${victimNear} ohm; load ${victimFar} ohm; tolerates 1 V peak }
        run r on TOP for ${length} mm { trace A 0.2 mm; gap 0.15 mm; trace V 0.3 mm }`);
      const [cm, lm] = [-run_.capacitance![0]![1]! * length * 1e-3, run_.inductance![0]![1]! * length * 1e-3];
      // A slow ramp: the aggressor's voltage and current rise by those of the resistors alone.
      const dv = swing * load / (source + load) / rise;
      const di = swing / (source + load) / rise;
      const capacitive = (victimNear * victimFar) / (victimNear + victimFar) * cm * dv;
      const inductiveNear = victimNear / (victimNear + victimFar) * lm * di;
      const inductiveFar = -victimFar / (victimNear + victimFar) * lm * di;
      const found = coupling(run_);
      assert.equal(found.model, 'lumped');
      // The plateau of the slow ramp. Where the ends are far from the line's own resistance, echoes of the ramp's corner overshoot it
      // for a few delays, however slow the ramp: the peak is then larger, never smaller.
      const matched = [source, load, victimNear, victimFar].every((ohm) => ohm === 50);
      for (const [end, value, plateau] of [['near', found.nearEnd, capacitive + inductiveNear], ['far', found.farEnd, capacitive + inductiveFar]] as const) {
        if (matched) near(value, plateau, 5e-3, `${end} end`);
        else assert.ok(0.995 * Math.abs(plateau) <= Math.abs(value) && Math.abs(value) <= 2 * (Math.abs(capacitive) + Math.abs(inductiveFar) + Math.abs(inductiveNear)), `${end} end ${value}, plateau ${plateau}`);
      }
      near(found.capacitivePart, capacitive, 5e-3, 'capacitive part');
      near(found.inductivePart, inductiveFar, 5e-3, 'inductive part');
    });
  }

  it('a ramp into a resistance with its capacitance: R Cm (dV/T) (1 - exp(-T / R C))', async () => {
    // A sensor's node, 100 kohm to a driver beside it; the aggressor is stiff, nothing rings.
    const run_ = await checkedRun(`${stackup}net A { swing 12 V; rise 0.8 us; source 1 ohm; load 1 Mohm }
      net V { source 100 kohm; load 1 Mohm, 10 pF; tolerates 1 V peak }
      run r on TOP for 20 mm { trace A 0.2 mm; gap 0.2 mm; trace V 0.2 mm }`);
    const cm = -run_.capacitance![0]![1]! * 0.02;
    const total = run_.capacitance![1]![1]! * 0.02 + 10e-12;
    const r = 1e11 / 1.1e6;
    const t = 1e-6;
    near(coupling(run_).atReceiver, r * cm * 12 / t * -Math.expm1(-t / (r * total)), 3e-3);
  });
});

/** Victim of two equal lines with R at all four ends, by echoes of the even and the odd mode. */
function echoed({ run: run_, length, ohm, swing, ramp, until }: { run: RunReport; length: number; ohm: number; swing: number; ramp: number; until: number }): { readonly near: number; readonly far: number } {
  const [c, l] = [run_.capacitance!, run_.inductance!];
  const modes = [1, -1].map((sign) => {
    const [cm, lm] = [c[0]![0]! + sign * c[0]![1]!, l[0]![0]! + sign * l[0]![1]!];
    const z = Math.sqrt(lm / cm);
    return { sign, delay: length * Math.sqrt(lm * cm), launch: z / (z + ohm), echo: (ohm - z) / (ohm + z) };
  });
  const edge = (time: number) => swing * Math.min(Math.max(time / ramp, 0), 1);
  // At the near end the forward wave and, at every second pass, an echo and its own reflection; at the far end at every odd pass.
  const at = (time: number, end: 'near' | 'far') => modes.reduce((sum, { sign, delay, launch, echo }) => {
    let voltage = end === 'near' ? launch * edge(time) : 0;
    for (let pass = 1; pass <= 60; pass += 1) {
      if ((end === 'far') === (pass % 2 === 1)) voltage += launch * echo ** (pass - 1) * (1 + echo) * edge(time - pass * delay);
    }
    return sum + sign * voltage / 2;
  }, 0);
  // Piecewise linear in time: the largest value stands where one of the pieces begins or ends.
  const kinks = modes.flatMap(({ delay }) => Array.from({ length: 61 }, (_, pass) => [pass * delay, pass * delay + ramp])).flat().filter((time) => time <= until);
  const peak = (end: 'near' | 'far') => kinks.map((time) => at(time, end)).reduce((largest, value) => (Math.abs(largest) < Math.abs(value) ? value : largest), 0);
  return { near: peak('near'), far: peak('far') };
}

describe('two equal lines by echoes of their modes', () => {
  for (const { ohm, length, ns, gap } of [{ ohm: 50, length: 100, ns: 0.24, gap: 0.2 }, { ohm: 65, length: 250, ns: 0.4, gap: 0.15 }, { ohm: 10, length: 60, ns: 0.16, gap: 0.3 }, { ohm: 400, length: 120, ns: 0.8, gap: 0.2 }, { ohm: 100, length: 30, ns: 2, gap: 0.1 }]) {
    it(`${ohm} Ω at every end, ${length} mm, gap ${gap} mm, ${ns} ns`, async () => {
      const run_ = await checkedRun(`${stackup}net A { swing 3.3 V; rise ${ns} ns; source ${ohm} ohm; load ${ohm} ohm }
        net V { source ${ohm} ohm; load ${ohm} ohm; tolerates 1 V peak }
        run r on TOP for ${length} mm { trace A 0.2 mm; gap ${gap} mm; trace V 0.2 mm }`);
      const ramp = ns * 1e-9 / 0.8;
      const slowest = Math.max(...[1, -1].map((sign) => length * 1e-3 * Math.sqrt((run_.inductance![0]![0]! + sign * run_.inductance![0]![1]!) * (run_.capacitance![0]![0]! + sign * run_.capacitance![0]![1]!))));
      const wanted = echoed({ run: run_, length: length * 1e-3, ohm, swing: 3.3, ramp, until: ramp + 20 * slowest });
      const found = coupling(run_);
      // Exact on both sides: the two diagonal entries of a symmetric pair agree to rounding.
      near(found.nearEnd, wanted.near, 1e-6, 'near end');
      near(found.farEnd, wanted.far, 1e-6, 'far end');
    });
  }

  it('saturates at Kb = (kC + kL) / 4 of the swing where every end is matched and the line is long', async () => {
    const run_ = await checkedRun(`${stackup}net A { swing 1 V; rise 0.1 ns; source 68 ohm; load 68 ohm }
      net V { source 68 ohm; load 68 ohm; tolerates 1 V peak }
      run r on TOP for 200 mm { trace A 0.2 mm; gap 0.8 mm; trace V 0.2 mm }`);
    const [c, l] = [run_.capacitance!, run_.inductance!];
    const backward = (-c[0]![1]! / c[0]![0]! + l[0]![1]! / l[0]![0]!) / 4;
    // Weak coupling: half the swing enters the line, and the ends are matched to a per cent.
    near(coupling(run_).nearEnd, backward * 0.5, 2e-2);
  });
});
