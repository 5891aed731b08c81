import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { combinedWaveform, laterPart } from '../../../server/src/physics/lines/combine';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import type { CoupledLines, Waveform } from '../../../server/src/physics/lines/lines';
import { prepareTransfer, type Drive } from '../../../server/src/physics/lines/transfer';
import { transferAtHarmonics } from '../../../server/src/physics/lines/transferAtHarmonics';
import { magnitudeOf, type Reading } from '../../../server/src/physics/lines/reading';
import { harmonicsOf, type PulseTrain } from '../../../server/src/physics/noise/harmonics';
import { addedInGroup, harmonicsInBand, rmsThroughTransfer } from '../../../server/src/physics/noise/rmsThroughTransfer';
import { hertz, ratio, seconds, volts } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair, ramp } from '../lines/build';

const driven: readonly Drive[] = [{ line: 0, end: 'left', kind: 'voltage', amplitude: 1 }];
const victim: Reading = [{ line: 1, place: 'right', factor: 1 }];
const two = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 });
const resistive = lines({ ...two, length: 0.15, left: [end(30), end(80)], right: [end(150), end(45)] });
const capacitive = lines({ ...two, length: 0.15, left: [end(30), end(80)], right: [end(150, 4e-12), end(200, 6e-12)] });
const pulses: PulseTrain = { swing: volts(3.3), rise: seconds(1.25e-9), fall: seconds(2.5e-9), repeats: hertz(5e6), duty: ratio(0.3) };

function rmsOf(coupled: CoupledLines, train: PulseTrain, from: number, to: number) {
  const band = { from: hertz(from), to: hertz(to) };
  const harmonics = harmonicsOf(train, band.to);
  const prepared = prepareTransfer(coupled);
  const { magnitudes: [magnitudes] } = transferAtHarmonics(prepared, driven, { fundamental: train.repeats, ...harmonicsInBand(harmonics, band) }, [victim]);
  return rmsThroughTransfer(harmonics, magnitudes, band, 1);
}

/** One period of the steady state: the answers to both edges, as many earlier ones added as still move. */
function steadyPeriod(coupled: CoupledLines, { swing, rise, fall, repeats, duty }: PulseTrain): Waveform {
  const period = 1 / repeats;
  const answer = (amplitude: number, duration: number) => lineResponse(coupled, ramp(0, 'left', amplitude, duration), seconds(1.5 * period)).right[1];
  const [up, down] = [answer(swing, rise), answer(-swing, fall)];
  // The fall is centred `duty` of a period after the rise's centre.
  const later = rise / 2 + duty * period - fall / 2;
  return laterPart(combinedWaveform([
    { waveform: up, factor: 1 }, { waveform: down, factor: 1, shift: seconds(later) },
    { waveform: up, factor: 1, shift: seconds(-period) }, { waveform: down, factor: 1, shift: seconds(later - period) },
  ]), seconds(0));
}

/** Integral of the square over one period, piece by piece. */
function rmsOverPeriod({ times, values }: Waveform, period: number): number {
  let sum = 0;
  for (let i = 0; i + 1 < times.length; i += 1) {
    if (times[i] < 0 || period <= times[i]) continue;
    const until = Math.min(times[i + 1], period);
    const last = values[i] + ((values[i + 1] - values[i]) * (until - times[i])) / (times[i + 1] - times[i]);
    sum += ((values[i] ** 2 + values[i] * last + last ** 2) / 3) * (until - times[i]);
  }
  return Math.sqrt(sum / period);
}

/** Harmonic n of the piecewise-linear waveform, rms: c = 1/(w² P) sum of slope (exp(-jwb) - exp(-jwa)) for what starts and ends alike. */
function harmonicOf({ times, values }: Waveform, period: number, n: number): number {
  const omega = (2 * Math.PI * n) / period;
  let [real, imaginary] = [0, 0];
  for (let i = 0; i + 1 < times.length; i += 1) {
    if (times[i] < 0 || period <= times[i]) continue;
    const until = Math.min(times[i + 1], period);
    const slope = (values[i + 1] - values[i]) / (times[i + 1] - times[i]);
    real += slope * (Math.cos(omega * until) - Math.cos(omega * times[i]));
    imaginary -= slope * (Math.sin(omega * until) - Math.sin(omega * times[i]));
  }
  return (Math.SQRT2 * Math.hypot(real, imaginary)) / (omega ** 2 * period);
}

describe('rms of repeated edges through a transfer', () => {
  const period = 1 / pulses.repeats;
  for (const [name, coupled, allowed] of [['resistive ends', resistive, 1e-6], ['capacitive ends', capacitive, 3e-4]] as const) {
    const steady = steadyPeriod(coupled, pulses);

    it(`${name}: all frequencies, against the integral of the square in time`, () => {
      const { rms, error } = rmsOf(coupled, pulses, 0, 2e10);
      near(rms, rmsOverPeriod(steady, period), allowed, 'rms');
      assert.equal(error, 0);
    });

    for (const [from, to] of [[1e6, 6e7], [1e8, 4e8]] as const) {
      it(`${name}: ${from} to ${to} Hz, against the waveform's own harmonics`, () => {
        let sum = 0;
        for (let n = Math.ceil(from * period); n <= to * period * (1 + 1e-12); n += 1) sum += harmonicOf(steady, period, n) ** 2;
        near(rmsOf(coupled, pulses, from, to).rms, Math.sqrt(sum), 1e-5 + 3 * allowed);
      });
    }
  }

  it('says how much the harmonics beyond those listed may add', () => {
    const band = { from: hertz(0), to: hertz(2e10) };
    const few = harmonicsOf(pulses, band.to, 40);
    const { magnitudes: [magnitudes] } = transferAtHarmonics(prepareTransfer(resistive), driven, { fundamental: pulses.repeats, ...harmonicsInBand(few, band) }, [victim]);
    const noise = rmsThroughTransfer(few, magnitudes, band, 1);
    const whole = rmsOf(resistive, pulses, 0, 2e10).rms;
    assert.ok(noise.rms < whole && whole <= noise.rms + noise.error);
  });

  it('joins harmonics that lie close to what each of them is', () => {
    const long = lines({ ...two, length: 15, left: [end(5), end(80)], right: [end(1e4, 2e-10), end(1e4)] });
    const prepared = prepareTransfer(long);
    const answer = transferAtHarmonics(prepared, driven, { fundamental: hertz(2e3), first: 1, last: 20_000 }, [victim]);
    assert.ok(answer.work < 4000 && !answer.undamped, `${answer.work} solved`);
    assert.equal(answer.magnitudes[0][77], Math.hypot(answer.phasors[0].real[77], answer.phasors[0].imaginary[77]));
    const { real, imaginary } = prepared.at(driven, hertz(78 * 2e3)).right;
    assert.ok(Math.hypot(answer.phasors[0].real[77] - real[1], answer.phasors[0].imaginary[77] - imaginary[1]) < 1e-5 * Math.hypot(real[1], imaginary[1]));
    let largest = 0;
    for (const size of answer.magnitudes[0]) largest = Math.max(largest, size);
    for (let n = 1; n <= 20_000; n += 7) {
      const exact = magnitudeOf(victim, prepared.at(driven, hertz(n * 2e3)));
      assert.ok(Math.abs(answer.magnitudes[0][n - 1] - exact) < 2e-5 * Math.max(exact, 0.05 * largest), `harmonic ${n}: ${answer.magnitudes[0][n - 1]} for ${exact}`);
    }
  });

  it('a band between two harmonics has none', () => {
    assert.equal(rmsOf(resistive, pulses, 5.5e6, 9e6).rms, 0);
  });

  it('nets that switch together add before they are squared', () => {
    const one = rmsOf(resistive, pulses, 1e6, 1e8);
    const other = rmsOf(capacitive, pulses, 2e7, 2e8);
    const both = addedInGroup([one, other]);
    assert.ok(Math.hypot(one.rms, other.rms) < both.rms && both.rms < one.rms + other.rms);
    near(addedInGroup([one, one]).rms, 2 * one.rms, 1e-15);
    near(both.magnitudes[4 - both.first], one.magnitudes[4 - one.first] + other.magnitudes[4 - other.first], 1e-15);
    assert.equal(addedInGroup([]).rms, 0);
  });
});
