/** Emission of loops: an independent case, a limit of a published rule as a user's number, harmonics, bandwidth, distance, shields. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import reference from '../reference/fields-and-noise.json';
import { evaluated } from './board';

const emitted = (text: string) => evaluated(text).loops[0].emission;
const caseOf = (id: string) => reference.cases.find((each) => each.id === id) as unknown as { inputs_SI: Readonly<Record<string, number>>; outputs: Readonly<Record<string, number>> };
/** FCC part 15, class B, 30 to 88 MHz at 3 m: 100 µV/m; from memory. */
const limit = 'board b { emits at most 40 dBuV/m at 3 m from 30 MHz to 88 MHz }\n';
const loop = (side: number, more = '') => `loop out { carries A; rectangle ${side} mm by ${side} mm; wire 0.2 mm; ${more} }\n`;

describe('the emission of a loop', () => {
  it('D-loop-emission-1: near terms kept, doubled by the ground', () => {
    const { inputs_SI: { f, I, a, r }, outputs } = caseOf('D-loop-emission-1');
    const [found] = emitted(`board b { emits at most 40 dBuV/m at ${r} m from 88 MHz to 216 MHz }\nnet A { current ${I} A rms at ${f} Hz }\n${loop(a * 1e3)}`);
    near(found.field, 2 * outputs.E_V_per_m, 1e-4);
    near(found.marginDb!, 40 - outputs.E_dBuV_per_m - 20 * Math.log10(2), 1e-3);
  });

  it('of repeated edges is the worst harmonic in the limit’s range', () => {
    const clock = (more: string) => `${limit}net A { current 10 mA rise 1 ns; ${more} }\n${loop(10)}`;
    const [found] = emitted(clock('repeats 20 MHz'));
    // Odd harmonics of a half duty: 60 MHz is the only one from 30 to 88. rms = sqrt(2) A/(n pi) |sin(n pi d)| |sinc(n T/P)|.
    near(found.frequency, 60e6, 1e-12);
    const x = Math.PI * 60e6 * 1.25e-9;
    const rms = ((Math.SQRT2 * 10e-3) / (3 * Math.PI)) * (Math.sin(x) / x);
    const k = (2 * Math.PI * 60e6) / 299792458;
    near(found.field, (2 * 376.73 * k * rms * 1e-4 * Math.hypot(3 * k, 1)) / (4 * Math.PI * 9), 1e-3);
    assert.deepEqual(emitted(clock('once')), []);
  });

  it('adds in step what falls into the receiver’s bandwidth together (CISPR 16-1-1)', () => {
    const field = (repeats: string) => emitted(`${limit}net A { current 10 mA rise 1 ns; repeats ${repeats} }\n${loop(10)}`)[0].field;
    // Twelve lines of 10 kHz in 120 kHz: a line has a tenth of the amplitude of one of 100 kHz, and twelve add.
    near(field('10 kHz') / field('100 kHz'), 12 * 0.1 / 1.2, 2e-2);
  });

  it('far away is 263e-16 f² A I / r over a ground (Ott, Electromagnetic Compatibility Engineering, from memory: three figures)', () => {
    const [found] = emitted(`board b { emits at most 40 dBuV/m at 30 m from 88 MHz to 216 MHz }\nnet A { current 25 mA rms at 100 MHz }\n${loop(31.6228)}`);
    near(found.field, (263e-16 * 1e16 * 10e-4 * 25e-3) / 30, 2e-3);
  });

  it('grows with the area, and of a net without current is that of its ends', () => {
    const by = (net: string, side: number) => emitted(`${limit}${net}\n${loop(side)}`)[0].field;
    const stated = 'net A { current 10 mA peak at 50 MHz }';
    near(by(stated, 20) / by(stated, 10), 4, 1e-9);
    near(by('net A { sine 1 V peak at 50 MHz; source 50 ohm; load 50 ohm }', 2), by(stated, 2), 1e-3);
  });

  it('is less under a shield', () => {
    const text = `${limit}net A { current 10 mA peak at 50 MHz }\n${loop(10)}`;
    const [open, under] = [text, `${text}shield lid { covers out; sheet copper 35 um; slot 6 mm; grounded }\n`].map((each) => emitted(each)[0].field);
    // The slot, and a sheet as near as the loop is large: 4 Zs/Zw of what its thickness lets through, with Zw = w mu0 r and depth d.
    const [angular, depth] = [2 * Math.PI * 50e6, Math.sqrt(2 / (2 * Math.PI * 50e6 * 4e-7 * Math.PI * 5.8e7))];
    const sheet = ((4 * Math.SQRT2) / (5.8e7 * depth) / (angular * 4e-7 * Math.PI * Math.sqrt(1e-4 / Math.PI))) * Math.exp(-35e-6 / depth);
    near(under / open, (2 * 6e-3 * 50e6) / 299792458 + sheet, 1e-2);
    assert.ok(0.02 * under < sheet * open);
  });

  it('is nothing where no limit asks', () => {
    assert.deepEqual(emitted(`net A { current 10 mA peak at 50 MHz }\n${loop(10)}`), []);
  });

  it('of a sine over a range is that of its resonance, where the circuit has one', () => {
    const within = (range: string) => emitted(`${limit}net A { sine 1 V peak ${range}; source 5 ohm; load 1 Mohm, 100 pF }\n${loop(40)}`)[0];
    const [all, ends] = [within('at 30 MHz to 88 MHz'), ['at 30 MHz', 'at 88 MHz'].map(within)];
    assert.ok(30e6 < all.frequency && all.frequency < 88e6);
    assert.ok(ends.every(({ field }) => 1.5 * field < all.field), `${all.field}: ${ends.map(({ field }) => field)}`);
  });

  it('says where a small loop is no model: near to it, and where it is long', () => {
    const said = (text: string) => evaluated(text).limits.map(({ message }) => message).filter((message) => message.includes('emi'));
    const net = 'net A { current 10 mA peak at 50 MHz }\n';
    assert.deepEqual(said(`${limit}${net}${loop(100)}`), []);
    assert.match(said(`${limit}${net}${loop(400)}`).join(), /^loop out is 566 mm large, more than a tenth of the 3 m at which the board limits emission/);
    assert.match(said(`board b { emits at most 40 dBuV/m at 30 m from 30 MHz to 1 GHz }\nnet A { current 10 mA peak at 800 MHz }\n${loop(100)}`).join(), /^loop out emits most at 800 MHz, where it is 37\.\d %/);
  });
});
