/** Writing: what is suggested while one types, taken with Enter; a slip in a unit, and its mending. */
import assert from 'node:assert/strict';

const valve = 'valve/valve.quiet';

export const scenes = [
  {
    title: 'complete a statement, its unit and its words',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'tolerates 2 mV peak', 'tolerates 2 mV peak'.length));
      await page.keyboard.press('Enter');
      await ui.type('ba');
      const statements = await ui.suggestions('band');
      assert.ok(!statements.includes('gap'), 'a statement of another block');
      await shot('suggested-statement');
      await ui.accept('band');
      await ui.waitForText(/^ {2}band$/m);
      await ui.type(' 10 H');
      const units = await ui.suggestions('Hz');
      assert.ok(!units.includes('mm'), 'a unit of another quantity');
      await shot('suggested-unit');
      await ui.accept('Hz');
      await ui.type(' t');
      await ui.suggestions('to');
      await ui.accept('to');
      await ui.type(' 1 kH');
      await ui.suggestions('kHz');
      await ui.accept('kHz');
      await ui.waitForText(/^ {2}band 10 Hz to 1 kHz$/m);
      // What a receiver does not hear below 1 kHz of a 30 ns edge leaves it in peace.
      await ui.waitForSquiggles('error', 0);
      await ui.waitForText(/≈ [\d.]+ µV · < 1 %/);
      await shot('completed');
    },
  },
  {
    title: 'complete the name of a layer of another file, and of a net',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'TOP for'));
      await ui.select(3);
      await ui.type('B');
      await ui.suggestions('BOTTOM');
      await shot('suggested-layer');
      await ui.accept('BOTTOM');
      await ui.waitForText(/run past-the-sensor on BOTTOM for 26 mm/);
      await ui.caret(...at(valve, 'GATE  0.25'));
      await ui.select(4);
      await ui.type('S');
      const nets = await ui.suggestions('SPARE');
      assert.ok(nets.includes('SENSE'), nets.join(' '));
      await shot('suggested-net');
      await ui.accept('SPARE');
      await ui.waitForText(/trace SPARE {2}0\.25 mm/);
      // The other driver of the same family: as loud as the first.
      await ui.waitForText(/≈ [\d.]+ mV · \d+ %/);
      await page.keyboard.press('Escape');
      await ui.waitForSquiggles('error', 1);
    },
  },
  {
    title: 'type a wrong unit: its fix writes the right one',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, '26 mm', 3));
      await ui.select(2);
      await ui.type('MM');
      await page.keyboard.press('Escape');
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, '26 mm', 4));
      assert.match(await ui.hover(/no unit/), /no unit .MM.; mm\?/);
      const fixes = await ui.quickFixes();
      await shot('unit-fixes');
      assert.ok(fixes.some((title) => /mm/.test(title)), fixes.join('\n'));
      await ui.choose(fixes.find((title) => /mm/.test(title)));
      await ui.waitForText(/for 26 mm/);
      await ui.waitForText(/≈ [\d.]+ mV · \d+ %/);
      await ui.waitForSquiggles('error', 1);
    },
  },
];
