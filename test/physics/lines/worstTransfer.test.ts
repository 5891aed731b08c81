import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { CoupledLines } from '../../../server/src/physics/lines/lines';
import { prepareTransfer, type Drive } from '../../../server/src/physics/lines/transfer';
import { magnitudeOf, type Reading } from '../../../server/src/physics/lines/reading';
import { everyPlace, worstTransfer } from '../../../server/src/physics/lines/worstTransfer';
import { bandTransfer } from '../../../server/src/physics/noise/bandTransfer';
import { hertz, type Frequency } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair, rowOfLines } from './build';

const driven: readonly Drive[] = [{ line: 0, end: 'left', kind: 'voltage', amplitude: 1 }];
const two = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 });

/** Even steps, many of them: what the march is measured against. */
function scanned(coupled: CoupledLines, from: number, to: number, steps: number): Float64Array {
  const prepared = prepareTransfer(coupled);
  const readings = everyPlace(coupled.order);
  const largest = new Float64Array(readings.length);
  for (let n = 0; n <= steps; n += 1) {
    const transfer = prepared.at(driven, hertz(from + ((to - from) * n) / steps));
    readings.forEach((reading, at) => (largest[at] = Math.max(largest[at], magnitudeOf(reading, transfer))));
  }
  return largest;
}

describe('worst transfer over a range of frequencies', () => {
  const cases: [string, CoupledLines][] = [
    ['matched', lines({ ...two, length: 0.2, left: [end(60), end(60)], right: [end(60), end(60)] })],
    ['low source, open ends', lines({ ...two, length: 0.2, left: [end(10), end(1e6, 5e-12)], right: [end(Infinity, 5e-12), end(10)] })],
    ['three lines with leads', lines({ ...rowOfLines(3), length: 0.1, left: [end(5), end(50, 0, { impedance: 60, delay: 1e-9 }), end(50)], right: [end(1e4, 3e-12, { impedance: 60, delay: 2e-9 }), end(1e5), end(50)] })],
  ];
  for (const [name, coupled] of cases) {
    it(`${name}: finds no less than a scan, and little more`, () => {
      const worst = worstTransfer(coupled, driven, { from: hertz(1e5), to: hertz(1e9) });
      assert.ok(worst.resolved && !worst.undamped && worst.work < 4000, `${worst.work} steps`);
      scanned(coupled, 1e5, 1e9, 6000).forEach((magnitude, at) => {
        const found = worst.readings[at].magnitude;
        assert.ok(magnitude * (1 - 1e-6) <= found && found <= magnitude * 1.02, `${at}: ${found} against ${magnitude}`);
      });
    });
  }

  it('finds a resonance a millionth of the range wide, which a scan would miss', () => {
    // Quarter wave on a victim of almost no damping, weakly coupled: the load's conductance is all there is, Q = pi R / (4 Z).
    const weak = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 1e-4, capacitive: 1e-4 });
    const sharp = lines({ ...weak, length: 0.2037, left: [end(60), end(0)], right: [end(60), end(1e6)] });
    const reading: Reading = [{ line: 1, place: 'right', factor: 1 }];
    const range = { from: hertz(1e6), to: hertz(1e9) };
    const { readings: [{ magnitude, frequency }], resolved, undamped } = worstTransfer(sharp, driven, range, [reading]);
    assert.ok(resolved && !undamped);
    const prepared = prepareTransfer(sharp);
    let best = 0;
    for (let n = -4000; n <= 4000; n += 1) best = Math.max(best, magnitudeOf(reading, prepared.at(driven, hertz(frequency * (1 + n * 2e-8)))));
    near(magnitude, best, 1e-5);
    const coarse = Math.max(...Array.from({ length: 2000 }, (_, n) => magnitudeOf(reading, prepared.at(driven, hertz(1e6 + n * 5e5)))));
    assert.ok(3 * coarse < magnitude, `${coarse} ${magnitude}`);
  });

  it('sees both peaks of two lines that hardly couple', () => {
    const weak = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.001, capacitive: 0 });
    const twins = lines({ ...weak, length: 0.2, left: [end(0.1), end(0.1)], right: [end(1e6), end(1e6)] });
    const [own, other] = worstTransfer(twins, driven, { from: hertz(1.5e8), to: hertz(2.5e8) }, [[{ line: 0, place: 'right', factor: 1 }], [{ line: 1, place: 'right', factor: 1 }]]).readings;
    const fine = scanned(twins, 2.05e8, 2.12e8, 20_000);
    near(own.magnitude, fine[2], 1e-3);
    near(other.magnitude, fine[3], 1e-3);
  });

  it('reads differences with their signs', () => {
    const equal = lines({ ...two, length: 0.2, left: [end(10), end(10)], right: [end(100), end(100)] });
    const both: readonly Drive[] = [...driven, { ...driven[0], line: 1 }];
    const [difference, mean] = worstTransfer(equal, both, { from: hertz(1e5), to: hertz(1e9) }, [
      [{ line: 0, place: 'right', factor: 1 }, { line: 1, place: 'right', factor: -1 }],
      [{ line: 0, place: 'right', factor: 0.5 }, { line: 1, place: 'right', factor: 0.5 }],
    ]).readings;
    assert.ok(difference.magnitude < 1e-12 && 1 < mean.magnitude);
  });

  it('weighs every frequency as the receiver does', () => {
    // A receiver of 10 kHz to 4 MHz, deep below what the line alone would call its worst.
    const coupled = cases[0][1];
    const band = { from: hertz(1e4), to: hertz(4e6) };
    const weight = (frequency: Frequency) => bandTransfer(frequency, band);
    const reading: Reading = [{ line: 1, place: 'left', factor: 1 }];
    const { readings: [{ magnitude }] } = worstTransfer(coupled, driven, { from: hertz(0), to: hertz(1e9), weight }, [reading]);
    const prepared = prepareTransfer(coupled);
    let best = 0;
    for (let n = 0; n < 6000; n += 1) {
      const frequency = hertz(1e3 * 10 ** (n / 1000));
      best = Math.max(best, weight(frequency) * magnitudeOf(reading, prepared.at(driven, frequency)));
    }
    near(magnitude, best, 1e-5);
    const source: Reading = [{ line: 0, place: 'right', factor: 1 }];
    const passed = worstTransfer(coupled, driven, { from: hertz(0), to: hertz(1e9), weight }, [source]).readings[0];
    near(passed.frequency, Math.sqrt(1e4 * 4e6), 0.02);
  });

  it('one frequency is the transfer there', () => {
    const coupled = cases[1][1];
    const at = prepareTransfer(coupled).at(driven, hertz(50));
    const { readings } = worstTransfer(coupled, driven, { from: hertz(50), to: hertz(50) });
    everyPlace(2).forEach((reading, n) => near(readings[n].magnitude, magnitudeOf(reading, at), 1e-14));
  });

  it('is finite where nothing damps, and says so', () => {
    const open = lines({ ...two, length: 0.2, left: [end(0), end(Infinity)], right: [end(Infinity), end(Infinity)] });
    const worst = worstTransfer(open, driven, { from: hertz(0), to: hertz(1e9) });
    assert.ok(worst.undamped && worst.readings.every(({ magnitude }) => Number.isFinite(magnitude)));
  });

  it('a slow node is damped, however slow', () => {
    const slow = lines({ ...two, length: 0.2, left: [end(10), end(1e8)], right: [end(1e3), end(1e8, 1e-9)] });
    assert.equal(worstTransfer(slow, driven, { from: hertz(0), to: hertz(1e6) }).undamped, false);
  });

  it('ends within its work whatever is asked, and says where that was too little', () => {
    const long = lines({ ...rowOfLines(8), length: 20, left: Array.from({ length: 8 }, () => end(1)), right: Array.from({ length: 8 }, () => end(1e6)) });
    const started = performance.now();
    const worst = worstTransfer(long, driven, { from: hertz(1), to: hertz(1e11) }, [[{ line: 1, place: 'right', factor: 1 }]]);
    assert.equal(worst.resolved, false);
    assert.ok(worst.work <= 70_000 && performance.now() - started < 60_000, `${worst.work}`);
  });
});
