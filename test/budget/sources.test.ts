/** Every kind of source and receiver in a run, held to what linearity and the Fourier series demand. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { combinedWaveform } from '../../server/src/physics/lines/combine';
import { peakOf } from '../../server/src/physics/lines/peak';
import { valueAt } from '../../server/src/physics/lines/waveform';
import { seconds } from '../../server/src/units/quantity';
import { near } from '../support/near';
import { budgetOf, couplingOf, evaluated, microstrip } from './board';

const ends = 'source 40 ohm; load 60 ohm, 3 pF';
const beside = (...nets: string[]) => `run r on TOP for 60 mm { ${nets.map((net) => `trace ${net} 0.2 mm`).join('; gap 0.25 mm; ')} }\n`;
const quiet = (name: string, more = '') => `net ${name} { ${ends}; ${more} }\n`;
const moving = (name: string, more = '') => `net ${name} { ${ends}; swing 3 V; rise 1 ns; ${more} }\n`;

describe('a pair as source', () => {
  it('puts on a net what its two nets put there, one against the other', () => {
    const victim = quiet('V', 'tolerates 1 V peak');
    const pair = `pair D { plus P; minus N; swing 3 V; rise 1 ns }\n`;
    const both = couplingOf(evaluated(microstrip + victim + quiet('P') + quiet('N') + pair + beside('V', 'P', 'N')), 'D', 'V');
    const byPlus = couplingOf(evaluated(microstrip + victim + moving('P') + quiet('N') + beside('V', 'P', 'N')), 'P', 'V');
    const byMinus = couplingOf(evaluated(microstrip + victim + quiet('P') + moving('N') + beside('V', 'P', 'N')), 'N', 'V');
    const difference = combinedWaveform([{ waveform: byPlus.waveform!, factor: 1 }, { waveform: byMinus.waveform!, factor: -1 }]);
    // Waveforms are kept to a thousandth of their own peaks.
    assert.ok(Math.abs(peakOf(difference).value - both.atReceiver) < 2e-3 * Math.abs(byPlus.atReceiver), `${peakOf(difference).value} and ${both.atReceiver}`);
    assert.ok(Math.abs(both.atReceiver) < 0.9 * Math.abs(byPlus.atReceiver));
  });
});

describe('a pair as receiver', () => {
  const source = moving('A');
  const pair = (more: string) => `pair D { plus P; minus N; tolerates 1 V peak; common tolerates 1 V peak; ${more} }\n`;
  const onPair = (more = '') => evaluated(microstrip + source + quiet('P') + quiet('N') + pair(more) + beside('A', 'P', 'N')).runs[0].couplings;

  it('reads the difference and the mean of its nets, in time', () => {
    const alone = (net: string) => couplingOf(evaluated(microstrip + source + quiet('P', net === 'P' ? 'tolerates 1 V peak' : '') + quiet('N', net === 'N' ? 'tolerates 1 V peak' : '') + beside('A', 'P', 'N')), 'A', net);
    // A receiver without more to say ends as the quiet net does, since both ends are stated.
    const [plus, minus] = [alone('P'), alone('N')];
    const [difference, mean] = onPair();
    assert.deepEqual([difference.kind, mean.kind], ['pair', 'common']);
    const read = (one: number, other: number) => peakOf(combinedWaveform([{ waveform: plus.waveform!, factor: one }, { waveform: minus.waveform!, factor: other }])).value;
    near(difference.atReceiver, read(1, -1), 3e-3);
    near(mean.atReceiver, read(0.5, 0.5), 3e-3);
  });

  it('hears a part of the mean where it states how much it rejects', () => {
    const [without] = onPair();
    const [with20] = onPair('rejects 20 dB');
    const [, mean] = onPair();
    const added = Math.abs(with20.atReceiver) - Math.abs(without.atReceiver);
    assert.ok(0 < added && added <= 0.1 * Math.abs(mean.atReceiver) * (1 + 1e-9), `${added} of ${mean.atReceiver}`);
  });

  it('has less of a difference with a resistor across', () => {
    assert.ok(Math.abs(onPair('across 30 ohm')[0].atReceiver) < 0.8 * Math.abs(onPair()[0].atReceiver));
  });

  it('does not hear its own nets', () => {
    const evaluation = evaluated(microstrip + moving('P') + quiet('N') + pair('') + beside('P', 'N'));
    assert.deepEqual(evaluation.runs[0].couplings, []);
  });
});

describe('a sine', () => {
  it('is the limit of a slow edge', () => {
    // Weak coupling into resistors is k dV/dt for what is slow: an edge of S volts in T has S/T, a sine of A volts 2 pi f A.
    const victim = `net V { source 40 ohm; load 60 ohm; tolerates 1 V peak }\n`;
    const edge = couplingOf(evaluated(`${microstrip}${victim}net A { source 40 ohm; load 60 ohm; swing 2 V; rise 0.8 us }\n${beside('A', 'V')}`), 'A', 'V');
    const sine = couplingOf(evaluated(`${microstrip}${victim}net A { source 40 ohm; load 60 ohm; sine 2 V peak at 100 kHz }\n${beside('A', 'V')}`), 'A', 'V');
    const plateau = valueAt(edge.waveform!, seconds(0.5e-6));
    near(sine.atReceiver / (2 * Math.PI * 1e5 * 2), Math.abs(plateau) / (2 / 1e-6), 5e-3);
    assert.deepEqual([sine.edge, sine.frequency, sine.peakTime, sine.waveform], ['sine', 1e5, null, null]);
  });

  it('counts its rms in an rms budget, within the band only, and its worst frequency of a range', () => {
    const victim = quiet('V', 'tolerates 1 V rms; band 10 kHz to 5 MHz');
    const total = (sine: string) => budgetOf(evaluated(`${microstrip}${victim}net A { ${ends}; sine ${sine} }\n${beside('A', 'V')}`), 'V', 'rms').contributions.find(({ channel }) => channel === 'coupled')!.value;
    near(total('1 V rms at 1 MHz'), total('1 V peak at 1 MHz') * Math.SQRT2, 1e-9);
    // Coupling rises with frequency here.
    near(total('1 V peak at 1 MHz to 4 MHz'), total('1 V peak at 4 MHz'), 1e-6);
    near(total('1 V peak at 1 MHz to 50 MHz'), total('1 V peak at 5 MHz'), 1e-6);
    assert.equal(total('1 V peak at 20 MHz'), 0);
  });

  it('is what a first-order filter leaves of it in a peak budget', () => {
    const contribution = (sine: string) => budgetOf(evaluated(`${microstrip}${quiet('V', 'tolerates 1 V peak; band 10 kHz to 1 MHz')}net A { ${ends}; sine 1 V peak at ${sine} }\n${beside('A', 'V')}`), 'V').contributions.find(({ channel }) => channel === 'coupled')!;
    const one = contribution('3 MHz');
    near(one.value / one.unfiltered!, 1 / Math.hypot(1, 3) / Math.hypot(1, 10e3 / 3e6), 2e-3);
    // k f / sqrt(1 + (f/f2)²) still rises at 10 MHz, and levels off: the worst of a wide range is at its end.
    near(contribution('1 kHz to 10 MHz').value, contribution('10 MHz').value, 3e-3);
  });
});

describe('a current drawn in step', () => {
  const victim = quiet('V', 'tolerates 1 V peak');
  const coupling = (more: string) => couplingOf(evaluated(`${microstrip}${victim}net A { ${ends}; ${more} }\n${beside('A', 'V')}`), 'A', 'V');
  it('adds to the voltage with the sign that makes it worse', () => {
    const [voltage, current, both] = [coupling('swing 3 V; rise 1 ns'), coupling('current 50 mA rise 1 ns'), coupling('swing 3 V; rise 1 ns; current 50 mA')];
    const read = (sign: number) => Math.abs(peakOf(combinedWaveform([{ waveform: voltage.waveform!, factor: 1 }, { waveform: current.waveform!, factor: sign }])).value);
    near(Math.abs(both.atReceiver), Math.max(read(1), read(-1)), 5e-3);
  });

  it('is in proportion to the current', () => {
    near(coupling('current 100 mA rise 2 ns').atReceiver, 2 * coupling('current 50 mA rise 2 ns').atReceiver, 1e-9);
  });
});

describe('repeated edges in an rms budget', () => {
  it('have the rms value of the waveform that they make', () => {
    const source = (more: string) => `net A { ${ends}; swing 3 V; rise 1 ns; fall 2 ns; ${more} }\n`;
    const listening = (tolerates: string) => quiet('V', `tolerates ${tolerates}; band 1 Hz to 8 GHz`);
    const rms = budgetOf(evaluated(microstrip + source('repeats 5 MHz duty 30 %') + listening('1 V rms') + beside('A', 'V')), 'V', 'rms').contributions.find(({ channel }) => channel === 'coupled')!;
    // Brute force: both edges' waveforms, which have died long before the next edge, squared and averaged over a period.
    const edge = (rise: string) => couplingOf(evaluated(`${microstrip}net A { ${ends}; swing 3 V; rise ${rise} }\n${quiet('V', 'tolerates 1 V peak')}${beside('A', 'V')}`), 'A', 'V').waveform!;
    const energy = [edge('1 ns'), edge('2 ns')].reduce((sum, { times, values }) => {
      let integral = 0;
      for (let i = 1; i < times.length; i += 1) integral += ((times[i] - times[i - 1]) * (values[i] ** 2 + values[i] * values[i - 1] + values[i - 1] ** 2)) / 3;
      return sum + integral;
    }, 0);
    near(rms.value, Math.sqrt(energy * 5e6), 5e-3);
  });

  it('of one group add as magnitudes, of different nets as squares', () => {
    const board = (more: string) => evaluated(`${microstrip}${moving('A', `repeats 1 MHz; ${more}`)}${moving('B', `repeats 1 MHz; ${more}`)}${quiet('V', 'tolerates 1 V rms; band 1 MHz to 20 MHz')}${beside('A', 'V', 'B')}`);
    const coupled = (more: string) => budgetOf(board(more), 'V', 'rms').contributions.filter(({ channel }) => channel === 'coupled').map(({ value }) => value);
    const [one] = coupled('');
    const thermal = budgetOf(board(''), 'V', 'rms').contributions.find(({ channel }) => channel === 'thermal')!.value;
    near(budgetOf(board(''), 'V', 'rms').total!, Math.hypot(Math.SQRT2 * one, thermal), 1e-6);
    near(budgetOf(board('switches with G'), 'V', 'rms').total!, Math.hypot(2 * one, thermal), 1e-6);
  });

  it('are nothing of an edge that comes once, and unknown where nobody said how often', () => {
    const budget = (more: string) => budgetOf(evaluated(microstrip + moving('A', more) + quiet('V', 'tolerates 1 V rms; band 1 kHz to 1 MHz') + beside('A', 'V')), 'V', 'rms');
    assert.deepEqual(budget('once').unaccounted, []);
    assert.deepEqual(budget('once').contributions.map(({ channel }) => channel), ['thermal']);
    assert.match(budget('').unaccounted[0].what, /^A has no rms value: how often it repeats is not stated/);
    assert.equal(budget('').verdict, 'unknown');
  });
});

describe('a receiver that samples later', () => {
  it('counts only what is left by then, of that group alone', () => {
    const counted = (samples: string, group: string) => couplingOf(evaluated(microstrip + moving('A', group) + moving('B', 'switches with OTHER') + quiet('V', `tolerates 1 V peak; ${samples}`) + beside('A', 'V')), 'A', 'V');
    const all = counted('', 'switches with G');
    assert.equal(all.counted, null);
    const later = counted('samples 20 ns after G', 'switches with G');
    assert.ok(Math.abs(later.counted!) < 0.01 * Math.abs(all.atReceiver), `${later.counted} of ${all.atReceiver}`);
    near(later.atReceiver, all.atReceiver, 1e-12);
    assert.equal(counted('samples 20 ns after OTHER', 'switches with G').counted, null);
  });
});
