/** The pictures in hovers: there, of a size to be seen, with their words; and looked at in light, dark and high contrast. */
import assert from 'node:assert/strict';

const valve = 'valve/valve.quiet';
const gauge = 'buoy/wave-gauge.quiet';

/** The pictures on the screen that are drawn, once there are so many. */
async function picturesShown(page, count) {
  const shown = await page.waitForFunction((wanted) => {
    const all = [...document.querySelectorAll('.monaco-hover img')].filter((image) => image.complete && 0 < image.naturalWidth && 0 < image.getBoundingClientRect().height);
    return wanted <= all.length && all.map((image) => ({ words: image.alt, natural: image.naturalWidth, width: image.getBoundingClientRect().width, height: image.getBoundingClientRect().height }));
  }, count);
  return shown.jsonValue();
}

/** A curve that takes too long for the first hover is there for a later one. */
async function lookForPicture(page, ui, goThere, said) {
  for (let look = 1; ; look += 1) {
    await goThere();
    await ui.hover(said);
    try {
      await page.locator('.monaco-hover img').first().waitFor({ timeout: 1500 });
      return;
    } catch (error) {
      if (look === 8) throw error;
    }
  }
}

async function theme(page, name) {
  const row = page.locator('.quick-input-list .monaco-list-row').filter({ hasText: name }).first();
  await page.keyboard.press('Control+k');
  await page.keyboard.press('Control+t');
  await page.locator('.quick-input-list .monaco-list-row').filter({ hasText: 'Modern' }).first().waitFor({ timeout: 10_000 });
  await page.locator('.quick-input-widget input').first().fill(name);
  await row.click();
  await page.locator('.quick-input-widget').waitFor({ state: 'hidden' });
}

/** Down to what a hover does not show at first. */
async function scrollHover(page) {
  await page.locator('.monaco-hover .hover-row').filter({ visible: true }).last().hover();
  await page.mouse.wheel(0, 900);
  await page.waitForTimeout(300);
}

export const scenes = [
  {
    title: 'see the pictures of a net and of a trace',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await ui.caret(...at(valve, 'net SENSE', 6));
      const said = await ui.hover(/SENSE: [\d.]+ mV/);
      const [bars] = await picturesShown(page, 1);
      await shot('picture-net');
      assert.ok(200 < bars.width && 60 < bars.height && bars.width <= bars.natural, JSON.stringify(bars));
      const [, total] = /SENSE: ([\d.]+ mV)/.exec(said);
      assert.ok(bars.words.startsWith(`Noise on SENSE: ${total}`), `${bars.words} for ${total}`);
      await ui.caret(...at(valve, 'trace SENSE', 8));
      await ui.hover(/near end/);
      const pictures = await picturesShown(page, 3);
      await shot('picture-trace');
      assert.deepEqual(pictures.map(({ words }) => /^\S+ \S+/.exec(words)[0]), ['What GATE', 'Cross-section of', 'Noise on']);
      assert.ok(pictures.every(({ width, height }) => 200 < width && 60 < height));
    },
  },
  {
    title: 'see the picture of noise against a gap, at once or at the second look',
    async run({ page, ui, shot, at }) {
      await ui.open(valve);
      await ui.waitForSquiggles('error', 1);
      await lookForPicture(page, ui, () => ui.caret(...at(valve, '0.35 mm', 2)), /would just do/);
      const [curve] = await picturesShown(page, 1);
      await shot('picture-gap');
      assert.match(curve.words, /^Noise on SENSE against this gap: [\d.]+ mV at 0\.35 mm now; 2\.00 mV tolerated/);
    },
  },
  {
    title: 'read the pictures in light, dark and high contrast',
    async run({ page, ui, shot, at, host, lineEnds }) {
      if (host !== 'web' || lineEnds !== 'lf') return;
      const points = [[valve, 'net SENSE', 6, 'net', /SENSE: [\d.]+ mV/], [valve, 'trace SENSE', 8, 'trace', /near end/], [valve, '0.35 mm', 2, 'gap', /would just do/], [valve, 'run past-the', 6, 'run', /from end to end/], [gauge, 'loop coil-leads', 7, 'loop', /mm²/]];
      for (const [name, word] of [['Dark Modern', 'dark'], ['Dark High Contrast', 'high-contrast'], ['Light High Contrast', 'light-high-contrast'], ['Light Modern', 'light']]) {
        await theme(page, name);
        for (const [file, text, further, what, said] of points) {
          await ui.open(file);
          await lookForPicture(page, ui, () => ui.caret(...at(file, text, further)), said);
          await picturesShown(page, 1);
          await shot(`${word}-${what}`);
          if (what !== 'trace') continue;
          await scrollHover(page);
          await shot(`${word}-${what}-below`);
        }
      }
      await ui.closeAll();
    },
  },
];
