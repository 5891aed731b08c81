/** Names: one is given anew with F2, it is asked who disturbs a net, and a statement shows its form while it is written. */
import assert from 'node:assert/strict';

const valve = 'valve/valve.quiet';

export const scenes = [
  {
    title: 'names: rename a net with F2, wherever it stands',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'SENSE 0.15', 2));
      assert.equal(await rename(page), 'SENSE');
      await ui.type('flow sensor');
      await shot('rename');
      await page.keyboard.press('Enter');
      await ui.waitForText(/net "flow sensor" \{/);
      await ui.waitForText(/trace "flow sensor" 0\.15 mm/);
      // The finding is the same, on the new name.
      await ui.waitForSquiggles('error', 1);
      await ui.undo();
      await ui.waitForText(/trace SENSE 0\.15 mm/);
    },
  },
  {
    title: 'names: be told why a name cannot be given',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'SENSE 0.15', 2));
      await rename(page);
      await ui.type('GATE');
      await page.keyboard.press('Enter');
      // Said to screen readers in either editor; one of the two keeps the notification itself in its list.
      await page.locator('.monaco-alert').filter({ hasText: 'There is a net GATE already (valve.quiet, line 8).' }).first().waitFor({ state: 'attached' });
      await shot('rename-refused');
    },
  },
  {
    title: 'names: ask who disturbs a net, from its row',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'trace SENSE', 2));
      await page.keyboard.press('Shift+Alt+h');
      const row = page.locator('.sidebar .monaco-list-row').filter({ hasText: /GATE/ }).first();
      await row.waitFor();
      assert.match((await row.textContent()).replace(/\s+/g, ' '), /GATE ?[\d.]+ mV \(\d+ %\) on SENSE in run past-the-sensor/);
      await row.click();
      await shot('who-disturbs');
      await ui.command('View: Show Explorer');
    },
  },
  {
    title: 'names: see the form of a statement while it is written',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'tolerates 2 mV peak', 'tolerates 2 mV peak'.length));
      await page.keyboard.press('Enter');
      const form = page.locator('.parameter-hints-widget.visible');
      await ui.type('band ');
      await form.filter({ hasText: 'band FREQUENCY to FREQUENCY' }).waitFor();
      await shot('form-first');
      await ui.type('10 kHz ');
      await page.waitForFunction(() => document.querySelector('.parameter-hints-widget .signature .active')?.textContent === 'to FREQUENCY');
      await shot('form-second');
      await ui.type('to 4 MHz ');
      await form.waitFor({ state: 'hidden' });
    },
  },
];

/** What stands in the box; it is there before it takes what is typed. */
async function rename(page) {
  await page.keyboard.press('F2');
  await page.waitForFunction(() => document.activeElement?.closest('.rename-box') !== null);
  return page.locator('.rename-box input').inputValue();
}
