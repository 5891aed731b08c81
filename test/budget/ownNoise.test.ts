import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { evaluate } from '../../server/src/budget/evaluate';
import type { Budget, Channel } from '../../server/src/budget/results';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { near } from '../support/near';
import { projectOf } from './project';
import { evaluated, microstrip } from './board';

const kT = 1.380649e-23 * 298.15;
const crest = 3.29;

function budgetsOf(text: string, name: string): readonly Budget[] {
  return evaluated(microstrip + text).budgets.filter(({ subject }) => subject.name === name);
}
const budget = (text: string, name = 'V', kind: Budget['kind'] | null = null, measure: Budget['measure'] | null = null) =>
  budgetsOf(text, name).find((each) => (kind === null || each.kind === kind) && (measure === null || each.measure === measure))!;
const valueOf = ({ contributions }: Budget, channel: Channel) => contributions.find((each) => each.channel === channel)?.value ?? 0;
const clauses = ({ unaccounted }: Budget) => unaccounted.map(({ what }) => what);
const net = (more: string) => `net V { source 2 kohm; load 8 kohm; ${more} }\n`;

describe('the own noise of a net', () => {
  const noisy = 'noise 5 nV/rtHz, 2 pA/rtHz corner 2 kHz; contact -20 dB at 5 V; band 1 kHz to 1 MHz';
  const parallel = 1600;

  it('is four kinds over its band, each by itself, in an rms budget as the root of squares', () => {
    const found = budget(net(`${noisy}; tolerates 1 mV rms`));
    near(valueOf(found, 'thermal'), Math.sqrt(4 * kT * parallel * 999e3), 1e-12);
    const density = Math.hypot(5e-9, 2e-12 * parallel);
    near(valueOf(found, 'amplifier'), density * Math.sqrt(999e3), 1e-12);
    near(valueOf(found, 'flicker'), density * Math.sqrt(2e3 * Math.log(1000)), 1e-12);
    near(valueOf(found, 'contact'), 0.1e-6 * 5 * Math.sqrt(3), 1e-12);
    near(found.total!, Math.hypot(...(['thermal', 'amplifier', 'flicker', 'contact'] as const).map((channel) => valueOf(found, channel))), 1e-12);
    assert.deepEqual([found.complete, found.contributions.length, found.verdict], [true, 4, 'pass']);
    for (const { errorBar, value, method, from, cause, channel } of found.contributions) {
      assert.ok(0 < errorBar && errorBar < 1e-9 * value);
      assert.ok(0 < method.length);
      assert.deepEqual([from, cause], [null, `own ${channel}`]);
    }
  });

  it('is 3.29 times that as a peak; peaks of kinds that are unrelated add, or their squares', () => {
    const rms = budget(net(`${noisy}; tolerates 1 mV rms`));
    const peak = budget(net(`${noisy}; tolerates 1 mV peak`));
    for (const channel of ['thermal', 'amplifier', 'flicker', 'contact'] as const) near(valueOf(peak, channel), crest * valueOf(rms, channel), 1e-12, channel);
    near(peak.total!, peak.contributions.reduce((sum, { value }) => sum + value, 0), 1e-12);
    near(budget(net(`${noisy}; tolerates 1 mV peak`) + 'board b { combine rss }').total!, crest * rms.total!, 1e-12);
    for (const { assumptions } of peak.contributions) assert.ok(assumptions.includes('its peak is 3.29 times its rms value, exceeded 0.1 % of the time'), `${assumptions}`);
  });

  it('without a band has what kT/C limits, and says what cannot be counted', () => {
    const found = budget('net V { source 2 kohm; load 8 kohm, 10 pF; noise 5 nV/rtHz; contact -20 dB at 5 V; tolerates 1 mV peak }');
    near(valueOf(found, 'thermal'), crest * Math.sqrt(kT / 10e-12), 1e-12);
    assert.deepEqual(found.contributions.map(({ channel }) => channel), ['thermal']);
    assert.deepEqual(clauses(found), ['the noise of its input is not counted: V has no `band`', 'the contact noise of its resistors is not counted: V has no `band`']);
    assert.deepEqual([found.verdict, found.marginDb], ['unknown', null]);
    const bare = budget(net('tolerates 1 mV peak'));
    assert.deepEqual([bare.total, bare.complete], [0, true]);
  });

  it('says of a band that could not be read nothing else', () => {
    for (const band of ['0 Hz to 1 MHz', '1 Hz to 1 M']) {
      const { budgets } = evaluate(projectOf(`${microstrip}${net(`noise 5 nV/rtHz corner 1 kHz; contact -20 dB at 5 V; band ${band}; tolerates 1 mV peak`)}`), createSolveCache());
      assert.equal(budgets[0]!.unaccounted.length, 1);
      assert.match(budgets[0]!.unaccounted[0]!.what, /band of net V could not be read$/);
    }
  });

  it('has no flicker of a noise that states no corner, and may then begin at 0 Hz', () => {
    const found = budget(net('noise 5 nV/rtHz; band 0 Hz to 1 MHz; tolerates 1 mV rms'));
    assert.deepEqual(found.contributions.map(({ channel }) => channel), ['thermal', 'amplifier']);
    near(valueOf(found, 'amplifier'), 5e-6, 1e-12);
  });

  it('takes an unstated source as open where that is the noisier, and says so', () => {
    const found = budget('net V { load 1 Mohm; noise 5 nV/rtHz, 2 pA/rtHz; band 1 kHz to 2 kHz; tolerates 1 mV rms }');
    near(valueOf(found, 'thermal'), Math.sqrt(4 * kT * 0.5e6 * 1e3), 1e-12);
    near(valueOf(found, 'amplifier'), Math.hypot(5e-9, 2e-12 * 0.5e6) * Math.sqrt(1e3), 1e-12);
    for (const { assumptions } of found.contributions) assert.ok(assumptions.includes('V states no `source`: both 0 Ω and 1 MΩ; the larger result counts'), `${assumptions}`);
  });

  it('says of a node that nothing but a capacitance holds that its current noise has no end', () => {
    const found = budget('net V { source 10 pF; load 8 pF; noise 5 nV/rtHz, 2 fA/rtHz; band 0 Hz to 2 kHz; tolerates 1 mV rms }');
    assert.deepEqual(clauses(found), ['the current noise of its input is not counted: at 0 Hz, where its band begins, no resistance holds V']);
    assert.equal(found.verdict, 'unknown');
    const held = budget('net V { source 10 pF; load 8 pF; noise 5 nV/rtHz, 2 fA/rtHz; band 1 Hz to 2 kHz; tolerates 1 mV rms }');
    near(valueOf(held, 'amplifier'), Math.hypot(5e-9 * Math.sqrt(1999), (2e-15 / (2 * Math.PI * 18e-12)) * Math.sqrt(1 - 1 / 2000)), 1e-12);
  });

  it('warms with the board, but for what is not thermal', () => {
    const at = (temperature: string) => budget(net(`${noisy}; tolerates 1 mV rms`) + `board b { temperature ${temperature} }`);
    near(valueOf(at('85 degC'), 'thermal'), valueOf(at('25 degC'), 'thermal') * Math.sqrt(358.15 / 298.15), 1e-12);
    for (const channel of ['amplifier', 'flicker', 'contact'] as const) assert.equal(valueOf(at('85 degC'), channel), valueOf(at('25 degC'), channel));
  });
});

describe('the own noise of a pair', () => {
  const ends = 'source 300 ohm; load 600 ohm, 4 pF';
  const pair = (more: string, { plus = ends, minus = ends } = {}) => `net P { ${plus} }\nnet N { ${minus} }\npair D { plus P; minus N; ${more} }\n`;
  const both = 'tolerates 1 mV rms; common tolerates 1 mV rms';

  it('of alike nets is that of one pole, for the difference and for the mean', () => {
    const text = pair(`across 100 ohm, 1 pF; band 100 kHz to 2 GHz; ${both}`);
    const onePole = (resistance: number, capacitance: number) => {
      const w = 2 * Math.PI * resistance * capacitance;
      return Math.sqrt(((2 * kT) / (Math.PI * capacitance)) * (Math.atan(w * 2e9) - Math.atan(w * 1e5)));
    };
    near(valueOf(budget(text, 'D', 'pair'), 'thermal'), onePole(1 / (1 / 400 + 1 / 100), 3e-12), 1e-8);
    near(valueOf(budget(text, 'D', 'common'), 'thermal'), onePole(100, 8e-12), 1e-8);
  });

  it('of a peak without a band is kT/C of what lies between, and of both in the mean', () => {
    const text = pair('across 100 ohm, 1 pF; tolerates 1 mV peak; common tolerates 1 mV peak');
    near(valueOf(budget(text, 'D', 'pair'), 'thermal'), crest * Math.sqrt(kT / 3e-12), 1e-12);
    near(valueOf(budget(text, 'D', 'common'), 'thermal'), crest * Math.sqrt(kT / 8e-12), 1e-12);
  });

  it('has the stated voltage noise in the difference, a current noise in each input, and half of the voltage in the mean', () => {
    const text = pair(`noise 5 nV/rtHz, 2 pA/rtHz corner 1 kHz; band 1 kHz to 100 kHz; ${both}`, { plus: 'source 1 kohm; load 1 Gohm', minus: 'source 3 kohm; load 1 Gohm' });
    const current = 2e-12 * Math.hypot(1 / (1 / 1e3 + 1e-9), 1 / (1 / 3e3 + 1e-9));
    const [width, decades] = [Math.sqrt(99e3), Math.sqrt(1e3 * Math.log(100))];
    near(valueOf(budget(text, 'D', 'pair'), 'amplifier'), Math.hypot(5e-9, current) * width, 1e-12);
    near(valueOf(budget(text, 'D', 'pair'), 'flicker'), Math.hypot(5e-9, current) * decades, 1e-12);
    near(valueOf(budget(text, 'D', 'common'), 'amplifier'), Math.hypot(2.5e-9, current / 2) * width, 1e-12);
    const { assumptions } = budget(text, 'D', 'common').contributions.find(({ channel }) => channel === 'amplifier')!;
    assert.ok(assumptions.includes('the stated voltage noise stands between its two inputs, and half of its mean square arises in each'), `${assumptions}`);
    assert.ok(assumptions.includes('the current noises of its two inputs are unrelated, and each as stated'), `${assumptions}`);
  });

  it('that states no noise has that of its nets', () => {
    const text = pair(`band 1 kHz to 100 kHz; ${both}`, { plus: `${ends}; noise 3 nV/rtHz`, minus: `${ends}; noise 4 nV/rtHz corner 1 kHz` });
    near(valueOf(budget(text, 'D', 'pair'), 'amplifier'), 5e-9 * Math.sqrt(99e3), 1e-12);
    near(valueOf(budget(text, 'D', 'pair'), 'flicker'), 4e-9 * Math.sqrt(1e3 * Math.log(100)), 1e-12);
    near(valueOf(budget(text, 'D', 'common'), 'amplifier'), 2.5e-9 * Math.sqrt(99e3), 1e-12);
    const endless = pair(`band 0 Hz to 100 kHz; ${both}`, { minus: `${ends}; noise 4 nV/rtHz corner 1 kHz` });
    assert.deepEqual(clauses(budget(endless, 'D', 'pair')), ['the flicker noise of its input is not counted: it has no end towards 0 Hz, where the band of D begins']);
    near(valueOf(budget(endless, 'D', 'pair'), 'amplifier'), 4e-9 * Math.sqrt(100e3), 1e-12);
  });

  it('has contact noise of the resistors of both nets, the pair’s where a net states none', () => {
    const found = (kind: Budget['kind'], minus = ends) => valueOf(budget(pair(`contact -20 dB at 5 V; band 1 kHz to 100 kHz; ${both}`, { minus }), 'D', kind), 'contact');
    const one = 0.1e-6 * 5 * Math.SQRT2;
    near(found('pair'), one * Math.SQRT2, 1e-12);
    near(found('common'), one / Math.SQRT2, 1e-12);
    near(found('pair', `${ends}; contact -20 dB at 0 V`), one, 1e-12);
    const unlimited = budget(pair('contact -20 dB at 5 V; tolerates 1 mV peak'), 'D', 'pair');
    assert.deepEqual(clauses(unlimited), ['the contact noise of its resistors is not counted: D has no `band`']);
  });

  it('reads a part of the mean as a difference where it states how much it rejects', () => {
    const text = (rejects: string) => pair(`${rejects} band 1 kHz to 100 kHz; ${both}`, { plus: 'source 1 kohm; load 1 Gohm', minus: 'source 3 kohm; load 1 Gohm' });
    const [p, n] = [1 / (1 / 1e3 + 1e-9), 1 / (1 / 3e3 + 1e-9)];
    const expected = (leak: number) => Math.sqrt(4 * kT * 99e3 * ((1 + leak / 2) ** 2 * p + (1 - leak / 2) ** 2 * n));
    near(valueOf(budget(text(''), 'D', 'pair'), 'thermal'), expected(0), 1e-12);
    near(valueOf(budget(text('rejects 20 dB;'), 'D', 'pair'), 'thermal'), expected(-0.1), 1e-12);
  });

  it('is not less with any source unstated than with each of what is assumed', () => {
    const of = (plus: string, minus: string) => valueOf(budget(pair(`across 1 kohm, 2 pF; band 1 MHz to 1 GHz; ${both}`, { plus: `load 1 Mohm, 30 pF${plus}`, minus: `load 1 Mohm, 10 pF${minus}` }), 'D', 'pair'), 'thermal');
    const each = ['; source 0 ohm', '; source 1 Mohm'].flatMap((plus) => ['; source 0 ohm', '; source 1 Mohm'].map((minus) => of(plus, minus)));
    near(of('', ''), Math.max(...each), 1e-12);
  });
});

describe('own noise that is asked for again', () => {
  it('is kept by every number that enters it: the same as computed afresh, whatever was changed', () => {
    const cache = createSolveCache();
    const board = (pair: string, net = '', settings = '') => `${microstrip}${settings}net P { source 1 kohm; load 1 Mohm, 3 pF }\nnet N { source 3 kohm; load 1 Mohm, 5 pF; ${net} }
      pair D { plus P; minus N; ${pair}; tolerates 1 mV rms; tolerates 1 mV peak; common tolerates 1 mV rms }`;
    const first = 'across 5 kohm, 1 pF; band 10 Hz to 1 MHz; noise 5 nV/rtHz, 2 pA/rtHz corner 1 kHz; contact -20 dB at 5 V';
    const texts = [
      board(first), board(first), board(first.replace('5 kohm', '6 kohm')), board(first.replace('1 pF', '2 pF')), board(first.replace('10 Hz', '20 Hz')), board(first.replace('5 nV', '6 nV')), board(first.replace('2 pA', '3 pA')),
      board(first.replace('corner 1 kHz', 'corner 2 kHz')), board(first.replace('at 5 V', 'at 6 V')), board(first, 'contact 0 dB at 1 V'), board(`${first}; rejects 20 dB`), board(first, '', 'board b { temperature 85 degC }\n'),
    ];
    const totals = texts.map((text) => {
      const known = evaluate(projectOf(text), cache).budgets.map(({ total }) => total);
      assert.deepEqual(known, evaluated(text).budgets.map(({ total }) => total));
      return known.join(' ');
    });
    assert.equal(new Set(totals).size, texts.length - 1);
  });
});

describe('own noise of whatever can be stated', () => {
  /** Seeded: the same boards every time (Park & Miller, CACM 1988). */
  function generator(seed: number): () => number {
    let state = seed;
    return () => (state = (state * 48271) % 2147483647) / 2147483647;
  }

  it('is finite with an error bar that is small, or said to be missing; an rms budget of two bands side by side makes that of both', () => {
    const random = generator(20260101);
    const pick = <Each>(all: readonly Each[]): Each => all[Math.floor(random() * all.length)]!;
    const size = (low: number, high: number) => (low * (high / low) ** random()).toPrecision(6);
    const end = () => pick([() => `${size(1e-6, 1e15)} ohm`, () => `${size(1e-18, 1e-3)} F`, () => `${size(1e-3, 1e12)} ohm, ${size(1e-15, 1e-6)} F`, () => '0 ohm'])();
    for (let n = 0; n < 200; n += 1) {
      // What nobody stated, a source or the sign of what is not rejected, can be worst one way in one band and another in the next.
      const known = random() < 0.5;
      const ends = () => `${pick([known ? `source ${end()};` : '', `source ${end()};`])} ${pick(['', `load ${end()};`])}`;
      const from = pick(['0', size(1e-6, 1e6)]);
      const [middle, to] = [1e6 * Number(size(1, 1e3)), 1e9 * Number(size(1.01, 1e4))];
      const noise = from === '0' ? 'noise 5 nV/rtHz, 1 pA/rtHz;' : 'noise 5 nV/rtHz, 1 pA/rtHz corner 1 kHz; contact -20 dB at 5 V;';
      const nets = `net P { ${ends()} }\nnet N { ${ends()} }\n`;
      const across = pick(['', `across ${end()};`]);
      const text = (one: string, other: string) => `${nets}pair D { plus P; minus N; ${across} ${known ? '' : 'rejects 40 dB;'} band ${one} Hz to ${other} Hz; ${noise} tolerates 1 mV rms; common tolerates 1 V peak }`;
      const texts = [text(from, `${to}`)].flatMap((whole) => [whole, whole.replace(/to [^ ]+ Hz/, `to ${middle} Hz`), whole.replace(/band [^ ]+ Hz/, `band ${middle} Hz`)]);
      const [whole, low, high] = texts.map((each) => budgetsOf(each, 'D'));
      for (const each of [...whole!, ...low!, ...high!]) {
        for (const { channel, value, errorBar } of each.contributions) {
          assert.ok(0 < value && value < Infinity && 0 < errorBar && errorBar < 1e-6 * value, `${channel} ${value} ± ${errorBar} of\n${texts[0]}`);
        }
      }
      if (known) whole!.forEach((each, at) => {
        for (const { channel, value } of each.contributions) near(value, Math.hypot(valueOf(low![at]!, channel), valueOf(high![at]!, channel)), 1e-6, `${channel} of ${each.kind} of\n${texts[0]}\n`);
      });
    }
  });
});
