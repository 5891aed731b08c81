/** What is read beside the text: hovers, hints, the page of a rule, the status. */
import assert from 'node:assert/strict';

const valve = 'valve/valve.quiet';

export const scenes = [
  {
    title: 'read the hover of a net: its budget',
    async run({ ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'net SENSE', 6));
      const text = await ui.hover(/The sensor, through 200 Ω\./);
      await shot('hover-net');
      assert.match(text, /[\d.]+ mV .*of 2\.00 mV/);
      assert.match(text, /The sensor, through 200 Ω\./);
      assert.match(text, /run past-the-sensor/);
    },
  },
  {
    title: 'read the hover of a trace: near end, far end, receiver',
    async run({ ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'trace SENSE', 8));
      const text = await ui.hover(/near end/);
      await shot('hover-trace');
      assert.match(text, /near/i);
      assert.match(text, /receiver/i);
    },
  },
  {
    title: 'see the hints, and see them follow an edit',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForText(/≈ [\d.]+ mV · \d+ %/);
      await ui.waitForText(/≥ [\d.]+ mm/);
      await shot('hints');
      await ui.caret(...at(valve, '0.35 mm'));
      await page.keyboard.press('Delete');
      await ui.type('3');
      await ui.waitForText(/3\.35 mm/);
      await ui.waitForText(/≈ [\d.]+ (mV|µV) · \d\d? %/);
      await ui.waitForSquiggles('error', 0);
      await shot('hints-after-edit');
    },
  },
  {
    title: 'follow a hint: to the source of the noise, and to who hears it',
    async run({ ui, page, at }) {
      await ui.open(valve);
      await ui.waitForText(/≈ [\d.]+ mV · \d+ %/);
      await ui.followHint(/^≈\s[\d.]+\smV$/);
      await ui.waitForCaret(...at(valve, 'GATE is gate-drive'));
      await ui.followHint(/^\s·\s\d+\s%$/);
      await ui.waitForCaret(...at(valve, 'SENSE {'));
      assert.equal(await page.locator('.tab.active').filter({ hasText: 'valve.quiet' }).count(), 1);
    },
  },
  {
    title: 'rest on a hint: what it says in full',
    async run({ page, ui, shot }) {
      await ui.open(valve);
      await ui.waitForText(/≥ [\d.]+ mm/);
      await ui.hint(/^≈\s[\d.]+\smV$/).hover();
      assert.match(await ui.hovered(/on SENSE in run .* that it tolerates/), /mV on SENSE in run past-the-sensor, \d+ % of the 2\.00 mV that it tolerates/);
      await shot('hint-noise');
      await page.mouse.move(5, 5);
      await ui.hint(/^no\slength\sis\senough$/).hover();
      assert.match(await ui.hovered(/No length down to .* may be/), /is enough for SENSE: a wider gap, a guard or another layer may be/);
      await shot('hint-length');
      await page.mouse.move(5, 5);
      await ui.hint(/^≥\s[\d.]+\smm$/).hover();
      assert.match(await ui.hovered(/would just do for/), /[\d.]+ mm would just do for SENSE/);
      await shot('hint-gap');
    },
  },
  {
    title: 'read the hover of a keyword and of a unit',
    async run({ ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'tolerates 2 mV', 3));
      const word = await ui.hover(/tolerates \(VOLTAGE/);
      await shot('hover-keyword');
      assert.match(word, /tolerates \(VOLTAGE peak\|rms \| none\)/);
      await ui.caret(...at(valve, '8 pF', 3));
      assert.match(await ui.hover(/measures/), /pF measures a capacitance: 1 pF is 10⁻¹² F\./);
      await shot('hover-unit');
    },
  },
  {
    title: 'follow a finding to the page of its rule',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'net SENSE', 6));
      await ui.hover();
      await page.locator('.monaco-hover a').filter({ hasText: 'over-budget' }).first().click();
      await page.locator('.tab.active').filter({ hasText: 'over-budget' }).waitFor();
      const text = page.frameLocator('iframe.webview.ready').frameLocator('#active-frame').locator('body');
      await text.filter({ hasText: 'Why it matters.' }).waitFor();
      assert.match(await text.innerText(), /^over-budget\s+A receiver on which the noise/);
      await shot('rule-page');
    },
  },
  {
    title: 'read the worst margin in the language status',
    async run({ page, ui, shot }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await page.locator('[id="status.languageStatus"]').first().hover();
      const card = page.locator('.hover-language-status').first();
      await card.waitFor();
      await shot('status');
      assert.match((await card.textContent()).replace(/\s/g, ' '), /SENSE: [\d.]+ dB over/);
    },
  },
];
