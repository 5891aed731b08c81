/** Comparing: the board in view with another file that is chosen from the list, as a page beside it. */
export const scenes = [
  {
    title: 'comparing: choose the older revision from a list and read what became of the margins',
    async run({ page, ui, shot }) {
      await ui.open('valve/valve.quiet');
      await ui.waitForSquiggles('error', 1);
      await page.keyboard.press('F1');
      await page.keyboard.type('Compare with Another Revision');
      // The list that it asks with takes the place of the list of commands.
      await page.locator('.quick-input-list .monaco-list-row').filter({ hasText: 'Quietrun: Compare' }).first().click();
      await page.locator('.quick-input-list .monaco-list-row').filter({ hasText: 'quiet-corner.quiet' }).first().waitFor();
      await shot('compare-choice');
      await page.keyboard.type('quiet-corner');
      await page.keyboard.press('Enter');
      const table = page.frameLocator('iframe.webview').first().frameLocator('#active-frame').locator('table');
      await table.waitFor();
      await shot('compare-page');
    },
  },
];
