import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { lineResponse, prepareLines } from '../../../server/src/physics/lines/lineResponse';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { seconds } from '../../../server/src/units/quantity';
import { seeded } from '../../support/seeded';
import { end, lines, ramp, rowOfLines } from './build';

const impedance = 50;
const slowness = 6e-9;
const delay = 0.6e-9;

/** A ramp through R into C: first-order circuit, exact. */
function charged(time: number, duration: number, constant: number): number {
  const rise = (t: number) => (t <= 0 ? 0 : (t + constant * Math.expm1(-t / constant)) / duration);
  return rise(time) - rise(time - duration);
}

describe('edges that outlast their echoes', () => {
  // A matched source: the far end is a first-order circuit, one delay late.
  for (const share of [0.3, 5, 300]) {
    it(`charge a capacitor of ${share} delays behind a matched line as a circuit does`, () => {
      const capacitance = (share * delay) / impedance;
      const coupled = lines({ inductance: [[300e-9]], capacitance: [[120e-12]], length: 0.1, left: [end(impedance)], right: [end(Infinity, capacitance)] });
      for (const ratio of [50, 1e3, 1e4]) {
        const duration = ratio * delay;
        const response = lineResponse(coupled, ramp(0, 'left', 1, duration), seconds(duration + 20 * delay));
        const { times, values } = response.right[0];
        times.forEach((time, n) => {
          const exact = charged(time - 0.1 * slowness, duration, impedance * capacitance);
          const off = Math.abs(values[n] - exact);
          assert.ok(off <= response.errorBar[0] + 1e-9 && off < 2e-4, `edge ${ratio}, at ${time}: ${values[n]} instead of ${exact}, bar ${response.errorBar[0]}`);
        });
      }
    });
  }

  it('march for a small part of the window only', () => {
    const coupled = lines({ ...rowOfLines(2), length: 0.1, left: [end(40), end(60)], right: [end(200, 3e-12), end(80, 2e-12)] });
    const work = [1e3, 1e4, 1e5].map((ratio) => lineResponse(coupled, ramp(0, 'left', 1, ratio * delay), seconds((ratio + 20) * delay)).work);
    assert.ok(Math.max(...work) < 3500, `${work.join(', ')} steps`);
  });

  it('keep their error bar: peaks against steps four times finer', () => {
    const random = seeded(5);
    const between = (low: number, high: number) => low * (high / low) ** random();
    const pick = <T>(...from: readonly T[]) => from[Math.floor(random() * from.length)]!;
    let outside = 0;
    let counted = 0;
    for (let trial = 0; trial < 25; trial += 1) {
      const termination = () => end(pick(10, 25, 50, between(5, 1e3), 1e6), pick(0, between(0.3, 30) * 1e-12), pick(null, null, { impedance: between(40, 80), delay: between(0.1, 1) * delay }));
      const coupled = lines({ ...rowOfLines(2, between(0.02, 0.25)), length: 0.1, left: [termination(), termination()], right: [termination(), end(between(20, 1e5), between(1, 10) * 1e-12)] });
      const duration = between(30, 3e3) * delay;
      const window = seconds(duration + 40 * delay);
      const [found, better] = [prepareLines(coupled), prepareLines(coupled, 4)].map((prepared) => prepared.response(ramp(0, 'left', 1, duration), window));
      for (const place of ['left', 'right'] as const) {
        const difference = Math.abs(Math.abs(peakOf(found[place][1]).value) - Math.abs(peakOf(better[place][1]).value));
        counted += 1;
        if (found.errorBar[1] + better.errorBar[1] < difference) outside += 1;
      }
    }
    assert.ok(outside === 0, `${outside} of ${counted} outside their error bar`);
  });
});
