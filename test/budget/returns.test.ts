/** Shared returns: the reference case, circuit theory, and what each piece adds. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import reference from '../reference/fields-and-noise.json';
import { budgetOf, evaluated, microstrip } from './board';

const dropped = (text: string, name = 'V', measure: 'peak' | 'rms' = 'peak') => budgetOf(evaluated(text), name, measure).contributions.filter(({ channel }) => channel === 'shared return');
const open = 'net V { source 1 ohm; load 1 Gohm; tolerates 10 V peak }\n';
const measured = (more = '') => `return ground { measured 25 mohm, 20 nH; carries A; refers V; ${more} }\n`;

describe('a shared return', () => {
  it('D-shared-return-1: R i + L di/dt of a stated current', () => {
    const { inputs_SI: { R, L, I, tr }, outputs } = reference.cases.find(({ id }) => id === 'D-shared-return-1') as unknown as { inputs_SI: Readonly<Record<string, number>>; outputs: Readonly<Record<string, number>> };
    const [found] = dropped(`net A { current ${I} A rise ${0.8 * tr * 1e9} ns }\n${open}return ground { measured ${R} ohm, ${L * 1e9} nH; carries A; refers V }\n`);
    near(found.value, outputs.V_peak, 1e-5);
    assert.deepEqual([found.from, found.where, found.channel], ['A', 'ground', 'shared return']);
  });

  it('of a net without current is the exact series circuit of its ends', () => {
    // A step into R and L in series, loaded by resistors: v = V (Rs/(R) + (1 - Rs/R) exp(-t R/L)) for a fast edge; a ramp rounds it.
    const [Rs, Rl, L, R, V, T] = [10, 40, 20e-9, 0.025, 5, 1e-9];
    const sum = Rs + Rl + R;
    const tau = L / sum;
    // i(T) = V/(T sum) (T - tau (1 - e)); v = R i + L di/dt, di/dt = V/(T sum) (1 - e).
    const e = Math.exp(-T / tau);
    const exact = R * (V / (T * sum)) * (T - tau * (1 - e)) + L * (V / (T * sum)) * (1 - e);
    const [found] = dropped(`net A { swing ${V} V; rise ${0.8 * T * 1e9} ns; source ${Rs} ohm; load ${Rl} ohm }\n${open}${measured()}`);
    near(found.value, exact, 1e-5);
  });

  it('is divided by the ends of who refers to it', () => {
    const value = (ends: string) => dropped(`net A { current 1 A rise 80 ns }\nnet V { ${ends}; tolerates 10 V peak }\n${measured()}`)[0].value;
    near(value('source 100 ohm; load 300 ohm') / value('source 1 ohm; load 1 Gohm'), 0.75, 1e-3);
  });

  it('adds its pieces, whatever their order', () => {
    const returns = (pieces: string) => evaluated(`${microstrip}return ground { ${pieces} }\n`).returns[0];
    const [strip, via, bench] = ['strip 30 mm by 1.5 mm on TOP', 'via 3 drill 0.3 mm', 'measured 2 mohm, 1.2 nH'].map(returns);
    const all = returns('measured 2 mohm, 1.2 nH; strip 30 mm by 1.5 mm on TOP; via 3 drill 0.3 mm');
    near(all.resistance, strip.resistance + via.resistance + bench.resistance, 1e-12);
    near(all.inductance, strip.inductance + via.inductance + bench.inductance, 1e-12);
    // 25 °C: 1.965 % above 20 °C; a board of 0.253 mm.
    near(strip.resistance, (1.724e-8 * 1.01965 * 30e-3) / (1.5e-3 * 35e-6), 1e-9);
    assert.ok(strip.assumptions.some((words) => words.includes('upper bound')));
  });

  it('over a plane has the inductance of the section, which is much less', () => {
    const inductance = (over: string) => evaluated(`${microstrip}return ground { strip 30 mm by 1.5 mm on TOP; ${over} }\n`).returns[0].inductance;
    // Of a wide strip, Z0 = 377 / (u + 1.393 + 0.667 ln(u + 1.444)), u = w/h: Hammerstad 1975, from memory, 1 % for thin ones; ours is 35 µm thick.
    const u = 7.5;
    near(inductance('over GND'), ((376.73 / (u + 1.393 + 0.667 * Math.log(u + 1.444))) / 299792458) * 30e-3, 3e-2);
    assert.ok(inductance('over GND') < 0.3 * inductance(''));
  });

  it('counts the skin effect: at the edge’s knee, at each harmonic, at a sine', () => {
    const sine = (frequency: string) => dropped(`${microstrip}net A { current 1 A peak at ${frequency} }\n${open}return ground { strip 30 mm by 1.5 mm on TOP; over GND; carries A; refers V }\n`)[0].value;
    const { inductance } = evaluated(`${microstrip}return ground { strip 30 mm by 1.5 mm on TOP; over GND }\n`).returns[0];
    const resistance = (frequency: number) => Math.sqrt(sine(`${frequency} Hz`) ** 2 - (2 * Math.PI * frequency * inductance) ** 2);
    near(resistance(100), (1.724e-8 * 1.01965 * 30e-3) / (1.5e-3 * 35e-6), 1e-4);
    assert.ok(1.2 * resistance(100) < resistance(1e7) && resistance(1e7) < 2 * resistance(100), `${resistance(1e7) / resistance(100)}`);
  });

  it('of currents that switch together add', () => {
    const text = (group: string) => `net A { current 1 A rise 80 ns; ${group} }\nnet B { current 1 A rise 80 ns; ${group} }\n${open}${measured('carries B')}board b { combine rss }\n`;
    const total = (group: string) => budgetOf(evaluated(text(group)), 'V').total!;
    near(total('switches with G') / total(''), Math.SQRT2, 1e-3);
  });

  it('lifts the mean of a pair that refers to it, and the difference only where the pair is unequal', () => {
    const text = (load: string) => `net A { current 1 A rise 80 ns }\nnet P { source 50 ohm; load 50 ohm }\nnet N { source 50 ohm; load ${load} }\npair D { plus P; minus N; tolerates 1 V peak; common tolerates 1 V peak }\n${measured().replace('refers V', 'refers D')}`;
    const read = (load: string) => evaluated(text(load)).budgets.map(({ contributions }) => contributions.find(({ channel }) => channel === 'shared return')!.value);
    const [difference, mean] = read('50 ohm');
    assert.ok(difference < 1e-6 * mean);
    const [unequal] = read('200 ohm');
    assert.ok(0.1 * mean < unequal);
  });
});

describe('a run’s own return', () => {
  const ribbon = 'stackup ribbon { dielectric 0.3 mm er 2.8; copper WIRES 0.1 mm; dielectric 0.3 mm er 2.8 }\n';
  it('drops what its resistance makes of the currents that come back through it', () => {
    const text = `${ribbon}net A { current 100 mA peak at 50 Hz }\nnet V { source 10 ohm; load 1 Mohm; tolerates 1 V peak }
      run cable on WIRES for 2 m { trace A 0.4 mm; gap 0.8 mm; return GND 0.4 mm; gap 0.8 mm; trace V 0.4 mm }`;
    const budget = budgetOf(evaluated(text), 'V');
    assert.deepEqual(budget.unaccounted, []);
    const [found] = budget.contributions.filter(({ channel }) => channel === 'shared return');
    near(found.value, (0.1 * 1.724e-8 * 1.01965 * 2) / (0.4e-3 * 0.1e-3), 1e-4);
  });
});
