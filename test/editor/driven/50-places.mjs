/** Places: where a name is declared, who else uses it, and what a file holds. */
import assert from 'node:assert/strict';

const valve = 'valve/valve.quiet';
const post = 'buoy/listening-post.quiet';

export const scenes = [
  {
    title: 'go to a definition in another file, and back',
    async run({ page, ui, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      const from = at(valve, 'is gate-drive', 5);
      await ui.caret(...from);
      await page.keyboard.press('F12');
      await page.locator('.tab.active').filter({ hasText: 'parts.quiet' }).waitFor();
      await ui.waitForCaret(...at('valve/parts.quiet', 'gate-drive {'));
      await ui.command('Go Back');
      await page.locator('.tab.active').filter({ hasText: 'valve.quiet' }).waitFor();
      await ui.waitForCaret(...from);
      await ui.closeAll();
    },
  },
  {
    title: 'go from a trace to its net',
    async run({ page, ui, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'trace GATE', 8));
      await page.keyboard.press('F12');
      await ui.waitForCaret(...at(valve, 'GATE is'));
    },
  },
  {
    title: 'see every place that names a family, in all files',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'is gate-drive', 5));
      await page.keyboard.press('Shift+F12');
      const rows = page.locator('.zone-widget .ref-tree .monaco-list-row');
      await rows.filter({ hasText: 'parts.quiet' }).first().waitFor();
      await rows.filter({ hasText: 'valve.quiet' }).first().waitFor();
      await page.locator('.zone-widget .peekview-title').filter({ hasText: '(3)' }).waitFor();
      await shot('references');
      await page.keyboard.press('Escape');
    },
  },
  {
    title: 'see every place that names a net',
    async run({ page, ui, shot, at }) {
      await ui.open(post);
      await ui.waitForSquiggles('error', 'some');
      await ui.caret(...at(post, 'net HYDRO_A', 5));
      await page.keyboard.press('Shift+F12');
      const rows = page.locator('.zone-widget .ref-tree .monaco-list-row');
      await rows.filter({ hasText: /trace HYDRO_A/ }).first().waitFor();
      await shot('references-net');
      await page.keyboard.press('Escape');
    },
  },
  {
    title: 'outline a board, and go to a run of it',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.focusEditor();
      await page.keyboard.press('Control+Shift+o');
      const rows = page.locator('.quick-input-list .monaco-list-row');
      await rows.filter({ hasText: 'past-the-sensor' }).first().waitFor();
      const shown = (await rows.allTextContents()).map((text) => text.replace(/\s+/g, ' ').trim());
      for (const name of ['valve', 'GATE', 'SPARE', 'SENSE']) assert.ok(shown.some((text) => text.includes(name)), shown.join('\n'));
      await shot('outline');
      await page.keyboard.type('past');
      await rows.first().filter({ hasText: 'past-the-sensor' }).waitFor();
      await page.keyboard.press('Enter');
      await ui.waitForCaret(...at(valve, 'past-the-sensor'));
    },
  },
];
