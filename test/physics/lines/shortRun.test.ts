import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { prepareLines } from '../../../server/src/physics/lines/lineResponse';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { observationWindow, oneWayDelay } from '../../../server/src/physics/lines/window';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, ramp, rowOfLines } from './build';

// The leads ask for a window of thousands of the run's own delays, which no step that suits the run could fill.
describe('a short run in a long net', () => {
  const lead = { impedance: 60, delay: 1.5e-9 };
  const runOf = (order: number, length: number) => lines({
    ...rowOfLines(order, 0.2), length,
    left: Array.from({ length: order }, () => end(50, 0, lead)), right: Array.from({ length: order }, () => end(70, 2e-12, lead)),
  });
  const answer = (order: number, length: number, window: number | null) => {
    const coupled = runOf(order, length);
    const prepared = prepareLines(coupled);
    const whole = observationWindow({ duration: seconds(5e-10), delay: oneWayDelay(prepared.modes, coupled), repeats: null });
    return prepared.response(ramp(0, 'left', 1, 5e-10), window === null ? whole : seconds(window));
  };
  for (const order of [2, 3, 8]) {
    for (const length of [0.01, 0.005, 0.002]) {
      it(`${order} lines, ${length * 1e3} mm: the peak is that of a window just long enough for it`, () => {
        const whole = answer(order, length, null);
        const peak = peakOf(whole.rightTermination[1]).value;
        near(peak, peakOf(answer(order, length, 8e-9).rightTermination[1]).value, 1e-3);
        assert.ok(whole.errorBar[1] < 0.01 * Math.abs(peak), `error bar ${whole.errorBar[1]}`);
      });
    }

    it(`${order} lines: half the length, about half the noise`, () => {
      const [long, short] = [0.004, 0.002].map((length) => peakOf(answer(order, length, null).rightTermination[1]).value);
      // A little less, as what is longer answers an edge of given length less than all at once.
      near(long / short, 2, 0.05);
    });
  }

  it('a hundredth of a millimetre among leads of half a metre still has its size, and an error bar as large', () => {
    const far = { impedance: 60, delay: 2.5e-9 };
    const tiny = lines({ ...rowOfLines(3, 0.2), length: 1e-5, left: [end(50, 0, far), end(50, 0, far), end(50, 0, far)], right: [end(70, 2e-12, far), end(70, 2e-12, far), end(70, 2e-12, far)] });
    const { rightTermination, errorBar, method } = prepareLines(tiny).response(ramp(0, 'left', 1, 5e-10), seconds(1e-7));
    const peak = Math.abs(peakOf(rightTermination[1]).value);
    assert.equal(method, 'characteristics');
    // Per length, runs that are followed have 0.73 V/m.
    assert.ok(0.5 < peak / 1e-5 && peak / 1e-5 < 2, `${peak}`);
    assert.ok(peak <= errorBar[1]);
  });
});
