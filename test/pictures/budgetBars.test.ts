/** The bars say what the budget says, in the drawing and in words, and nothing that a net is called gets out of its text. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { budgetBars, type BudgetBars } from '../../server/src/pictures/budgetBars';
import { checkDrawn, elementsNamed, hostileNames, textsOf } from './drawn';

const over: BudgetBars = {
  receiver: 'RX', measure: 'peak', tolerates: 2e-3, wanted: 1.4e-3, total: 5.3e-3, sum: 'adds',
  parts: [{ name: 'VALVE', value: 5e-3, share: 0.94 }, { name: 'CLK', value: 0.29e-3, share: 0.055 }, { name: 'own thermal noise', value: 8e-6, share: 0.0015 }],
};

describe('budget bars', () => {
  it('look as they are kept', () => checkDrawn('budget-over', budgetBars(over)));
  it('look as they are kept, within budget and rms', () => checkDrawn('budget-within', budgetBars({ ...over, measure: 'rms', tolerates: 20e-3, wanted: null, sum: 'squares' })));

  it('say every number in words', () => {
    assert.equal(budgetBars(over).words, 'Noise on RX: 5.30 mV, 8.5 dB over; 2.00 mV tolerated, 1.40 mV with the headroom. Made up of VALVE 5.00 mV (94 %), CLK 290 µV (6 %), own thermal noise 8.00 µV (< 1 %); peaks add.');
  });

  it('say by hatching and in words what is over the limit, and nothing of the kind within it', () => {
    const hatched = (budget: BudgetBars) => elementsNamed(budgetBars(budget), 'rect').filter(({ attributes }) => attributes.get('fill') === 'url(#over)').length;
    assert.equal(hatched(over), 2);
    assert.ok(textsOf(budgetBars(over)).includes('5.30 mV · 8.5 dB over'));
    assert.equal(hatched({ ...over, tolerates: 6e-3 }), 0);
    assert.ok(textsOf(budgetBars({ ...over, tolerates: 6e-3 })).includes('5.30 mV · 1.1 dB to spare'));
  });

  it('draw bars as long as their numbers', () => {
    const picture = budgetBars({ ...over, total: 4e-3, tolerates: 10e-3, parts: [{ name: 'A', value: 3e-3, share: 0.75 }, { name: 'B', value: 1e-3, share: 0.25 }] });
    const widths = elementsNamed(picture, 'rect').filter(({ attributes }) => attributes.get('height') === '12').map(({ attributes }) => Number(attributes.get('width')));
    assert.equal(widths.length, 3);
    assert.ok(Math.abs(widths[0]! / widths[2]! - 0.75) < 2e-3 && Math.abs(widths[1]! / widths[2]! - 0.25) < 2e-3, String(widths));
  });

  it('keep every name as text', () => {
    for (const name of hostileNames) {
      const picture = budgetBars({ ...over, receiver: name, parts: [{ name, value: 1e-3, share: 1 }] });
      assert.deepEqual(elementsNamed(picture, 'script'), []);
      assert.ok(picture.words.includes(name));
    }
  });

  it('stay small for sixty contributions, and say how many are left out', () => {
    const parts = Array.from({ length: 60 }, (_, index) => ({ name: `NET_WITH_A_LONG_NAME_${index}`, value: 1e-4, share: 1 / 60 }));
    const picture = budgetBars({ ...over, parts });
    assert.ok(picture.svg.length < 8000, `${picture.svg.length} characters`);
    assert.ok(textsOf(picture).includes('and 52 more'));
    assert.match(picture.words, /and 52 more; peaks add/);
  });

  it('draw what has no total, is zero or is no number', () => {
    for (const total of [null, 0, NaN, Infinity, 1e300]) {
      const picture = budgetBars({ ...over, total, parts: [{ name: 'A', value: total ?? 0, share: 0 }] });
      elementsNamed(picture, 'rect');
      assert.ok(!/NaN|Infinity/.test(picture.svg.replace(/>[^<]*</g, '><')));
    }
  });

  it('are the same bytes for the same numbers', () => assert.equal(budgetBars(over).svg, budgetBars(structuredClone(over)).svg));
});
