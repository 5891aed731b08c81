/** The main job: from the squiggle through hover and hint to a fix that makes it go, and back. */
import assert from 'node:assert/strict';

const board = 'buoy/listening-post.quiet';
const valve = 'valve/valve.quiet';

export const scenes = [
  {
    title: 'open an example: what is over budget is underlined',
    async run({ ui, shot, at }) {
      await ui.open(board);
      await ui.caret(...at(board, 'net HYDRO_A'));
      await ui.waitForSquiggles('error', 'some');
      const problems = await ui.problems();
      assert.ok(problems.some((text) => /of 2\.00 mV on HYDRO_A.*over-budget/.test(text)), problems.join('\n'));
      await shot('opened');
    },
  },
  {
    title: 'widen the gap: the squiggle goes, and comes back with undo',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'net SENSE', 5));
      const fixes = await ui.quickFixes();
      assert.ok(fixes.some((title) => /^Widen the gap to [\d.]+ mm: [\d.]+ mV of 2\.00 mV/.test(title)), fixes.join('\n'));
      await shot('quick-fixes');
      await ui.choose('Widen the gap');
      await ui.waitForSquiggles('error', 0);
      await shot('widened');
      await ui.focusEditor();
      await page.keyboard.press('Control+z');
      await ui.waitForSquiggles('error', 1);
    },
  },
  {
    title: 'add a guard: the squiggle goes',
    async run({ ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'net SENSE', 5));
      await ui.quickFixes();
      await ui.choose('Add a guard');
      await ui.waitForSquiggles('error', 0);
      await ui.waitForText(/guard \S+/);
      await shot('guarded');
    },
  },
  {
    title: 'type a wrong unit: the finding says which fit',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'for 26 mm', 7));
      for (let i = 0; i < 2; i += 1) await page.keyboard.press('Delete');
      await ui.type('MM');
      await page.waitForFunction(() => 0 < document.querySelectorAll('.editor-instance .squiggly-error').length);
      await ui.caret(...at(valve, 'for 26 mm', 8));
      const text = await ui.hover();
      await shot('wrong-unit');
      assert.match(text, /\bmm\b/);
      assert.match(text, /unit/);
    },
  },
];
