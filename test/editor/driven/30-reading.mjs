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
    title: 'follow a finding to the page of its rule',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'net SENSE', 6));
      await ui.hover();
      await page.locator('.monaco-hover a').filter({ hasText: 'over-budget' }).first().click();
      await page.locator('.tab.active').filter({ hasText: 'over-budget.md' }).waitFor({ timeout: 10_000 });
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
      await card.waitFor({ timeout: 10_000 });
      await shot('status');
      assert.match((await card.textContent()).replace(/\s/g, ' '), /SENSE: [\d.]+ dB over/);
    },
  },
];
