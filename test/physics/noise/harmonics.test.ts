import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { harmonicRms, harmonicsOf, type PulseTrain } from '../../../server/src/physics/noise/harmonics';
import { rootOfSquares } from '../../../server/src/physics/noise/rmsThroughTransfer';
import { hertz, ratio, seconds, volts } from '../../../server/src/units/quantity';
import { near } from '../../support/near';

function train(swing: number, rise: number, fall: number, repeats: number, duty: number): PulseTrain {
  return { swing: volts(swing), rise: seconds(rise), fall: seconds(fall), repeats: hertz(repeats), duty: ratio(duty) };
}

/** Rms without the mean, from the waveform itself: squares of the flat top and of the two ramps, integrated. */
function rmsOfWaveform({ swing, rise, fall, repeats, duty }: PulseTrain): number {
  const edges = (rise + fall) * repeats;
  return Math.abs(swing) * Math.sqrt(duty - edges / 2 + edges / 3 - duty ** 2);
}

describe('harmonics of a pulse train', () => {
  const cases = [
    train(3.3, 1e-9, 1e-9, 1e8, 0.5), train(5, 2e-9, 3e-9, 2.5e7, 0.3), train(24, 5e-8, 2e-7, 2e4, 0.9), train(1, 4e-7, 6e-7, 1e6, 0.5),
  ];
  cases.forEach((pulses, number) => {
    it(`train ${number}: Parseval, within what is said to lie beyond`, () => {
      const whole = rmsOfWaveform(pulses);
      let before = Infinity;
      for (const most of [3, 30, 300, 3000]) {
        const harmonics = harmonicsOf(pulses, hertz(Infinity), most);
        const listed = rootOfSquares(harmonicRms(harmonics));
        const missing = Math.sqrt(Math.max(0, whole ** 2 - listed ** 2));
        assert.ok(missing <= harmonics.beyond * (1 + 1e-9) + 1e-7 * whole, `${most}: ${missing} beyond, said ${harmonics.beyond}`);
        assert.ok(harmonics.beyond <= before);
        before = harmonics.beyond;
      }
      assert.ok(before < 0.03 * whole);
    });

    it(`train ${number}: coefficients by the midpoint rule`, () => {
      const { swing, rise, fall, repeats, duty } = pulses;
      const harmonics = harmonicsOf(pulses, hertz(8 * repeats));
      assert.equal(harmonics.real.length, 8);
      const points = 200_000;
      for (const n of [1, 2, 5, 8]) {
        let [real, imaginary] = [0, 0];
        for (let m = 0; m < points; m += 1) {
          // In periods, from the middle of the rise.
          const turn = (m + 0.5) / points;
          const fallen = Math.min(1, Math.max(0, (turn - duty) / (fall * repeats) + 0.5));
          const risen = (from: number) => Math.min(1, Math.max(0, (turn - from) / (rise * repeats) + 0.5));
          const level = swing * (risen(0) - fallen + risen(1));
          real += (level * Math.cos(2 * Math.PI * n * turn)) / points;
          imaginary -= (level * Math.sin(2 * Math.PI * n * turn)) / points;
        }
        assert.ok(Math.hypot(real - harmonics.real[n - 1], imaginary - harmonics.imaginary[n - 1]) < 2e-6 * Math.abs(swing), `harmonic ${n}: ${real} ${imaginary} against ${harmonics.real[n - 1]} ${harmonics.imaginary[n - 1]}`);
      }
    });
  });

  it('equal edges: the closed form of the textbooks', () => {
    // rms = sqrt 2 A/(n pi) |sin n pi d| |sinc(n T/P)|: Paul, Introduction to Electromagnetic Compatibility, from memory.
    const rms = harmonicRms(harmonicsOf(train(3.3, 4e-9, 4e-9, 2e7, 0.3), hertz(1e9)));
    rms.forEach((value, at) => {
      const n = at + 1;
      const x = n * 4e-9 * 2e7 * Math.PI;
      const expected = ((Math.SQRT2 * 3.3) / (n * Math.PI)) * Math.abs(Math.sin(n * Math.PI * 0.3)) * Math.abs(Math.sin(x) / x);
      assert.ok(Math.abs(value - expected) < 1e-14, `harmonic ${n}`);
    });
  });

  it('a duty of a half has no even harmonics at all', () => {
    const { real, imaginary } = harmonicsOf(train(1, 1e-9, 1e-9, 1e6, 0.5), hertz(1e9));
    for (let at = 1; at < real.length; at += 2) assert.ok(real[at] === 0 && imaginary[at] === 0);
  });

  it('steps without any duration have the square wave’s 2/(pi n)', () => {
    const rms = harmonicRms(harmonicsOf(train(1, 0, 0, 1e3, 0.5), hertz(9e3)));
    for (const n of [1, 3, 5, 7, 9]) near(rms[n - 1], Math.SQRT2 / (Math.PI * n), 1e-15);
  });

  it('never lists more than asked, and takes the harmonic on the limit', () => {
    assert.equal(harmonicsOf(cases[0], hertz(1e30)).real.length, 20_000);
    assert.equal(harmonicsOf(train(1, 0, 0, 0.1, 0.5), hertz(0.3)).real.length, 3);
    assert.equal(harmonicsOf(cases[0], hertz(1)).real.length, 0);
  });

  it('says where pulses are shorter than their edges', () => {
    assert.equal(harmonicsOf(train(1, 2e-7, 2e-7, 1e6, 0.1), hertz(1e7)).overlapping, true);
    assert.equal(harmonicsOf(train(1, 1e-7, 1e-7, 1e6, 0.1), hertz(1e7)).overlapping, false);
  });
});
