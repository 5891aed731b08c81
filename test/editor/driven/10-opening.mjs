/** A board is opened and coloured; a slip of the pen is underlined and goes away again. */
import assert from 'node:assert/strict';

export const scenes = [
  {
    title: 'open a board: it is coloured',
    async run({ page, ui, shot }) {
      await ui.open('quiet-corner.quiet');
      await page.waitForFunction(() => 2 < new Set([...document.querySelectorAll('.editor-instance .view-line span > span')].map((found) => found.className)).size, null, { timeout: 20_000 });
      const language = await page.locator('[id="status.editor.mode"]').textContent();
      assert.equal(language.trim(), 'Quietrun');
      await shot('coloured');
    },
  },
  {
    title: 'break a line: a squiggle; mend it: none',
    async run({ ui, shot, at }) {
      await ui.open('quiet-corner.quiet');
      await ui.waitForSquiggles('error', 0);
      await ui.caret(...at('quiet-corner.quiet', 'trace SENSE', 11));
      await ui.type(' oops');
      await ui.waitForSquiggles('error', 'some');
      await shot('syntax-squiggle');
      for (let i = 0; i < 5; i += 1) await ui.undo();
      await ui.waitForSquiggles('error', 0);
    },
  },
];
