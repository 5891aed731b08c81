/** From an empty folder to a board within its budget, as someone goes who has only just installed the extension. */
import assert from 'node:assert/strict';

const mostActions = 15;

export const scenes = [
  {
    title: 'from an empty folder over the walkthrough to the first board, the first finding and the first fix',
    async run({ page, ui, shot }) {
      const actions = [];
      const act = async (what, action) => {
        actions.push(what);
        await action();
      };
      const step = (id) => page.locator(`.getting-started-step[data-step-id$="#${id}"]`);
      const isDone = (id) => page.waitForFunction((selector) => document.querySelector(selector)?.classList.contains('complete'), `.getting-started-step[data-step-id$="#${id}"] .codicon`);

      await act('open the first steps', () => ui.command('Quietrun: First Steps'));
      await step('make').waitFor();
      await shot('first-steps');
      await act('press New Board', () => step('make').locator('.monaco-button').filter({ hasText: 'New Board' }).click());
      await ui.waitForText(/run clock-past-sense/);
      await ui.waitForSquiggles('error', 'some');
      await isDone('make');
      await isDone('read');
      await shot('first-board');
      await act('go to the finding', () => page.keyboard.press('F8'));
      await page.locator('.monaco-editor .peekview-widget, .monaco-editor .zone-widget').first().waitFor();
      await shot('first-finding');
      assert.match(await page.locator('.monaco-editor .zone-widget').first().textContent(), /mV of 10\.0 mV on SENSE.*Widen the gap/s);
      await act('close what it says', () => page.keyboard.press('Escape'));
      let titles = [];
      await act('ask for fixes', async () => { titles = await ui.quickFixes(); });
      await shot('first-fixes');
      assert.match(titles[0], /^Widen the gap to [\d.]+ mm: [\d.]+ .?V of 10/);
      await act('take the first', () => ui.choose('Widen the gap'));
      await ui.waitForSquiggles('error', 0);
      await isDone('mend');
      await shot('first-fix');
      assert.ok(actions.length < mostActions, actions.join(', '));
    },
  },
];
