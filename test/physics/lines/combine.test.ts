import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { combinedWaveform, laterPart, peakAfter } from '../../../server/src/physics/lines/combine';
import { lineResponse } from '../../../server/src/physics/lines/lineResponse';
import type { Waveform } from '../../../server/src/physics/lines/lines';
import { peakOf } from '../../../server/src/physics/lines/peak';
import { valueAt } from '../../../server/src/physics/lines/waveform';
import { seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { end, lines, pair, ramp } from './build';

function waveform(...points: readonly (readonly [number, number])[]): Waveform {
  return { times: Float64Array.from(points, ([time]) => time), values: Float64Array.from(points, ([, value]) => value) };
}

const tooth = waveform([0, 0], [1, 2], [3, -1], [4, 0]);
const step = waveform([0.5, 0], [2, 3]);

describe('sums of waveforms', () => {
  it('is at every moment the sum of what each is at its own', () => {
    const sum = combinedWaveform([{ waveform: tooth, factor: -2 }, { waveform: step, factor: 0.5, shift: seconds(0.75) }]);
    for (let time = -1; time < 8; time += 0.0625) {
      near(valueAt(sum, seconds(time)), -2 * valueAt(tooth, seconds(time)) + 0.5 * valueAt(step, seconds(time - 0.75)), 1e-14);
    }
    assert.deepEqual([...sum.times], [0, 1, 1.25, 2.75, 3, 4]);
  });

  it('times that rounding tells apart are one', () => {
    const sum = combinedWaveform([{ waveform: tooth, factor: 1 }, { waveform: waveform([0, 0], [0.1 + 0.2 + 0.7, 1], [4, 0]), factor: 1 }]);
    assert.equal(sum.times.length, 4);
  });

  it('a waveform less itself is nothing, and nothing has no points', () => {
    assert.equal(peakOf(combinedWaveform([{ waveform: tooth, factor: 1 }, { waveform: tooth, factor: -1 }])).value, 0);
    assert.equal(combinedWaveform([]).times.length, 0);
    assert.equal(combinedWaveform([{ waveform: tooth, factor: 0 }]).times.length, 0);
  });

  it('two nets in opposition: the pair on a victim between their two single answers', () => {
    // Superposition: the answer to both at once is asked of even and odd modes of equal lines, each a line alone.
    const two = pair({ impedance: 60, slowness: 6e-9 }, { inductive: 0.3, capacitive: 0.2 });
    const coupled = lines({ ...two, length: 0.1, left: [end(40), end(40)], right: [end(1e3), end(1e3)] });
    const odd = lines({ inductance: [[two.inductance[0][0] - two.inductance[0][1]]], capacitance: [[two.capacitance[0][0] - two.capacitance[0][1]]], length: 0.1, left: [end(40)], right: [end(1e3)] });
    const window = seconds(2e-8);
    const plus = lineResponse(coupled, ramp(0, 'left', 1, 1e-9), window);
    const minus = lineResponse(coupled, ramp(1, 'left', -1, 1e-9), window);
    const first = combinedWaveform([{ waveform: plus.right[0], factor: 1 }, { waveform: minus.right[0], factor: 1 }]);
    const alone = lineResponse(odd, ramp(0, 'left', 1, 1e-9), window).right[0];
    for (let time = 0; time < window; time += 1.7e-10) assert.ok(Math.abs(valueAt(first, seconds(time)) - valueAt(alone, seconds(time))) < 1e-9);
  });
});

describe('what is left of a waveform after a while', () => {
  it('starts at its value there', () => {
    assert.deepEqual(laterPart(tooth, seconds(0.5)), waveform([0.5, 1], [1, 2], [3, -1], [4, 0]));
    assert.deepEqual(laterPart(tooth, seconds(1)), waveform([1, 2], [3, -1], [4, 0]));
  });

  it('is the whole before it begins, and its last value after it ends', () => {
    assert.deepEqual(laterPart(tooth, seconds(-1)), tooth);
    assert.deepEqual(laterPart(step, seconds(9)), waveform([9, 3]));
  });

  it('has a peak of its own', () => {
    const { value, time } = peakAfter(tooth, seconds(2.9));
    assert.deepEqual([value, time], [-1, 3]);
    assert.equal(peakAfter(step, seconds(9)).value, 3);
    assert.equal(peakAfter(waveform(), seconds(1)).value, 0);
  });
});
