/** A row is written in haste, and the document set in order. */
export const scenes = [
  {
    title: 'format a document: columns line up, comments stay',
    async run({ page, ui, shot, at }) {
      const shows = (line) => page.waitForFunction((wanted) => [...document.querySelectorAll('.editor-instance .view-line')].some((found) => found.textContent.replaceAll('\u00a0', ' ').includes(wanted)), line);
      await ui.open('valve/valve.quiet');
      await ui.waitForSquiggles('error', 'some');
      await ui.caret(...at('valve/valve.quiet', 'trace GATE  0.25 mm', 'trace GATE  0.25 mm'.length));
      await ui.type('   reversed # in haste');
      await shows('0.25 mm   reversed # in haste');
      await shot('before-formatting');
      await ui.command('Format Document');
      await shows('source    200 Ω  # 😀');
      await shows('  trace GATE  0.25 mm reversed  # in haste');
      await shot('formatted');
    },
  },
];
