/** Waveforms, noise against gap and outlines of loops: drawn as kept, the numbers in words, names as text, of bounded size. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { loopOutline, type LoopOutline } from '../../server/src/pictures/loopOutline';
import { noiseAgainstGap, type NoiseAgainstGap } from '../../server/src/pictures/noiseAgainstGap';
import { waveforms, type Waveforms } from '../../server/src/pictures/waveforms';
import { checkDrawn, elementsNamed, hostileNames, textsOf } from './drawn';

const pulse: Waveforms = {
  from: 'VALVE', to: 'RX', tolerates: 2e-3, countedFrom: 60e-9, until: 200e-9,
  curves: [
    { where: 'receiver', times: [0, 20e-9, 40e-9, 60e-9, 200e-9], values: [0, 1e-3, 5e-3, 1e-3, 0] },
    { where: 'near end', times: [0, 10e-9, 40e-9, 50e-9], values: [0, 3e-3, 3e-3, 0] },
    { where: 'far end', times: [0, 30e-9, 60e-9], values: [0, -1e-3, 0] },
  ],
};

describe('waveforms', () => {
  it('look as they are kept', () => checkDrawn('waveforms', waveforms(pulse)));
  it('say every number in words', () => assert.equal(waveforms(pulse).words, 'What VALVE puts on RX over time: peak of 5.00 mV at the receiver after 40.0 ns, peak of 3.00 mV at the near end after 10.0 ns, peak of -1.00 mV at the far end after 30.0 ns; 2.00 mV tolerated. Shown for 200 ns of the 200 ns computed. What comes before 60.0 ns does not count.'));
  it('tell three curves apart without colour', () => assert.equal(new Set(elementsNamed(waveforms(pulse), 'polyline').map(({ attributes }) => attributes.get('stroke-dasharray') ?? 'solid')).size, 3));
  it('name a limit that is far above all noise at the edge', () => {
    const picture = waveforms({ ...pulse, tolerates: 0.6 });
    assert.ok(textsOf(picture).includes('tolerated 600 mV ↑ above this picture'));
  });
  it('keep the peak where it is', () => {
    const [circle] = elementsNamed(waveforms(pulse), 'circle');
    const [line] = elementsNamed(waveforms(pulse), 'polyline');
    const highest = line!.attributes.get('points')!.split(' ').map((point) => point.split(',')).reduce((best, point) => (Number(point[1]) < Number(best[1]) ? point : best));
    assert.deepEqual([circle!.attributes.get('cx'), circle!.attributes.get('cy')], highest);
  });
  it('stay small for ten thousand points, and draw none', () => {
    const times = Float64Array.from({ length: 10_000 }, (_, index) => index * 1e-11);
    assert.ok(waveforms({ ...pulse, curves: pulse.curves.map(({ where }) => ({ where, times, values: times.map((time) => Math.sin(time * 1e11)) })) }).svg.length < 22_000);
    elementsNamed(waveforms({ ...pulse, curves: [{ where: 'receiver', times: [], values: [] }], tolerates: null, countedFrom: null, until: 0 }), 'text');
  });
  it('keep every name as text', () => {
    for (const name of hostileNames) assert.deepEqual(elementsNamed(waveforms({ ...pulse, from: name, to: name }), 'script'), []);
  });
});

const falling: NoiseAgainstGap = {
  receiver: 'RX', measure: 'peak', present: { gap: 0.3e-3, noise: 5.3e-3 }, clearance: 0.12e-3, tolerates: 2e-3, wanted: 1.4e-3, enough: 0.92e-3,
  points: [0.1, 0.2, 0.3, 0.5, 0.8, 1.2].map((gap) => ({ gap: gap * 1e-3, noise: 5.3e-3 * (0.3 / gap) ** 1.2 })),
};

describe('noise against gap', () => {
  it('looks as it is kept', () => checkDrawn('noise-against-gap', noiseAgainstGap(falling)!));
  it('says every number in words', () => assert.equal(noiseAgainstGap(falling)!.words, 'Noise on RX against this gap: 5.30 mV at 0.3 mm now; 2.00 mV tolerated, 1.40 mV with the headroom. 0.92 mm would just do. 19.8 mV at 0.1 mm, 8.62 mV at 0.2 mm, 5.30 mV at 0.3 mm, 2.87 mV at 0.5 mm, 1.63 mV at 0.8 mm, 1.00 mV at 1.2 mm. No gap below 0.12 mm can be made.'));
  it('marks the gap as it is, the clearance, the budget and the gap that does, in words each', () => {
    const texts = textsOf(noiseAgainstGap(falling)!);
    for (const text of ['now 0.3 mm', 'clearance', 'tolerated 2.00 mV', 'enough 0.92 mm']) assert.ok(texts.includes(text), text);
  });
  it('draws a power of the gap as a straight line', () => {
    const points = elementsNamed(noiseAgainstGap(falling)!, 'polyline')[0]!.attributes.get('points')!.split(' ').map((point) => point.split(',').map(Number) as [number, number]);
    const slopes = points.slice(1).map(([x, y], index) => (y - points[index]![1]) / (x - points[index]![0]));
    for (const slope of slopes) assert.ok(Math.abs(slope / slopes[0]! - 1) < 2e-3, slopes.join(', '));
  });
  it('has no picture for fewer than three numbers', () => {
    assert.equal(noiseAgainstGap({ ...falling, points: falling.points.slice(0, 2) }), null);
    assert.equal(noiseAgainstGap({ ...falling, points: falling.points.map(({ gap }) => ({ gap, noise: NaN })) }), null);
  });
  it('keeps every name as text', () => {
    for (const name of hostileNames) assert.deepEqual(elementsNamed(noiseAgainstGap({ ...falling, receiver: name })!, 'script'), []);
  });
});

const rectangle: LoopOutline = {
  name: 'out', area: 198e-6, areaLimit: 120e-6, inductance: 21e-9, conductor: { form: 'strip', width: 1e-3 }, planes: ['GND'],
  points: [[0, 0, 0], [22e-3, 0, 0], [22e-3, 9e-3, 0], [0, 9e-3, 0]],
};

describe('outline of a loop', () => {
  it('looks as it is kept', () => checkDrawn('loop-over-plane', loopOutline(rectangle)!));
  it('says every number in words', () => assert.equal(loopOutline(rectangle)!.words, 'Outline of loop out, to scale: 22 mm by 9 mm; 198 mm² of 120 mm² at most; 21.0 nH; strip of 1 mm; over plane GND.'));
  it('is to scale, whichever way it stands', () => {
    for (const turned of [rectangle.points, rectangle.points.map(([x, y]) => [0, x, y] as const), rectangle.points.map(([x, y]) => [x, 0, y] as const)]) {
      const points = elementsNamed(loopOutline({ ...rectangle, points: turned })!, 'polygon')[0]!.attributes.get('points')!.split(' ').map((point) => point.split(',').map(Number) as [number, number]);
      const ratio = (points[1]![0] - points[0]![0]) / (points[1]![1] - points[2]![1]);
      assert.ok(Math.abs(ratio - 22 / 9) < 0.01, String(ratio));
    }
  });
  it('stays small for a path of a thousand points, and has no picture where there is none', () => {
    const points = Array.from({ length: 1000 }, (_, index) => [Math.cos(index / 159), Math.sin(index / 159), 0] as const);
    assert.ok(loopOutline({ ...rectangle, points })!.svg.length < 20_000);
    assert.equal(loopOutline({ ...rectangle, points: [] }), null);
    assert.equal(loopOutline({ ...rectangle, points: [[0, 0, 0], [1, 0, 0], [2, 0, 0]] }), null);
  });
  it('keeps every name as text', () => {
    for (const name of hostileNames) assert.deepEqual(elementsNamed(loopOutline({ ...rectangle, name, planes: [name] })!, 'script'), []);
  });
});
