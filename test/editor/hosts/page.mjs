/** What a person does in the workbench, each with the wait that makes it certain to have happened. */
export function actions(page, screenshots) {
  const editor = '.editor-instance .monaco-editor';
  const input = page.locator('.quick-input-widget input').first();
  const widget = page.locator('.quick-input-widget');

  const ui = {
    async ready() {
      await page.waitForSelector('.monaco-workbench', { timeout: 60_000 });
      await page.locator('[id="workbench.parts.statusbar"]').waitFor({ timeout: 60_000 });
    },

    async command(title) {
      await page.keyboard.press('F1');
      await input.waitFor({ state: 'visible' });
      await input.fill(`>${title}`);
      const row = page.locator('.quick-input-list .monaco-list-row').filter({ hasText: title }).first();
      await row.waitFor({ timeout: 15_000 });
      await row.click();
      await widget.waitFor({ state: 'hidden' });
    },

    /** Opens a file of the workspace in the explorer: no search reaches the web host's file system. */
    async open(file) {
      const parts = file.split('/');
      for (const [at, part] of parts.entries()) {
        const row = page.locator(`.explorer-folders-view .monaco-list-row[aria-level="${at + 1}"]`).filter({ has: page.locator('.label-name', { hasText: new RegExp(`^${part.replace(/\W/g, '\\$&')}$`) }) }).first();
        await row.waitFor({ timeout: 30_000 });
        if (at === parts.length - 1) await row.dblclick();
        else if ((await row.getAttribute('aria-expanded')) === 'false') await row.click();
      }
      const name = parts[parts.length - 1];
      await page.locator('.tab.active').filter({ hasText: name }).waitFor();
      await page.locator(`${editor} .view-line`).first().waitFor({ timeout: 30_000 });
      await page.mouse.move(5, 5);
    },

    /** Clicks in the middle of what is seen of the editor; the element itself is as tall as the file. */
    async focusEditor() {
      await page.mouse.move(5, 5);
      await page.keyboard.press('Escape');
      const box = await page.locator(editor).first().boundingBox();
      await page.mouse.click(box.x + box.width * 0.6, box.y + box.height * 0.6);
      await page.mouse.move(5, 5);
    },

    /** Line and column count from 1; the column in UTF-16 units, as the status bar does. */
    async caret(line, column) {
      await ui.focusEditor();
      await page.keyboard.press('Control+g');
      await input.waitFor({ state: 'visible' });
      await input.fill(`:${line}:${column}`);
      await page.keyboard.press('Enter');
      await widget.waitFor({ state: 'hidden' });
      await page.locator('[id="status.editor.selection"]').filter({ hasText: `Ln ${line}, Col ${column}` }).waitFor({ timeout: 5000 });
    },

    async type(text) {
      await page.keyboard.type(text, { delay: 15 });
    },

    async undo(times = 1) {
      for (let i = 0; i < times; i += 1) await page.keyboard.press('Control+z');
    },

    squiggles: (severity) => page.locator(`${editor} .squiggly-${severity}`).count(),

    /** `wanted` is a count, or a predicate as text for "some", as "0 < n". */
    async waitForSquiggles(severity, wanted) {
      await page.waitForFunction(([selector, count]) => {
        const n = document.querySelectorAll(selector).length;
        return count === 'some' ? 0 < n : n === count;
      }, [`${editor} .squiggly-${severity}`, wanted], { timeout: 20_000 });
    },

    /** What is hovered at the caret; with a pattern, once that is there: findings come first, and the rest later. */
    async hover(pattern = null) {
      const row = page.locator('.monaco-hover .hover-row').filter({ visible: true }).first();
      await page.waitForFunction(() => ![...document.querySelectorAll('.monaco-hover')].some((found) => found.offsetParent !== null && 0 < found.offsetHeight), null, { timeout: 5000 });
      for (let attempt = 1; ; attempt += 1) {
        await page.keyboard.press('Control+k');
        await page.keyboard.press('Control+i');
        try {
          await row.waitFor({ timeout: 3000 });
          break;
        } catch (error) {
          if (attempt === 3) throw error;
        }
      }
      await page.waitForFunction(() => ![...document.querySelectorAll('.monaco-hover')].some((found) => /Loading\.\.\./.test(found.textContent)), null, { timeout: 10_000 });
      if (pattern !== null) {
        await page.waitForFunction((source) => new RegExp(source).test([...document.querySelectorAll('.monaco-hover')].map((found) => found.textContent).join(' ').replace(/\s+/g, ' ')), pattern.source, { timeout: 20_000 });
      }
      const text = (await page.locator('.monaco-hover').filter({ visible: true }).allTextContents()).join('\n');
      return text.replace(/\s+/g, ' ');
    },

    /** Titles that the light bulb offers at the caret; the list stays open. */
    async quickFixes() {
      const rows = page.locator('.action-widget .monaco-list-row.action');
      for (let attempt = 1; ; attempt += 1) {
        await page.keyboard.press('Control+.');
        try {
          await rows.first().waitFor({ timeout: 4000 });
          break;
        } catch (error) {
          if (attempt === 3) throw error;
        }
      }
      return (await rows.allTextContents()).map((text) => text.replace(/\s+/g, ' ').trim());
    },

    /** By keyboard: the list takes no click in its first moments, lest one be meant for what it covers. */
    async choose(title) {
      const titles = await page.locator('.action-widget .monaco-list-row.action').allTextContents();
      const index = titles.findIndex((each) => each.replace(/\s+/g, ' ').includes(title));
      if (index < 0) throw new Error(`no ${title} among ${titles.join(' | ')}`);
      const focused = page.locator('.action-widget .monaco-list-row.action.focused').filter({ hasText: title });
      for (let i = 0; i < titles.length && !(await focused.isVisible()); i += 1) await page.keyboard.press('ArrowDown');
      await page.keyboard.press('Enter');
      await page.locator('.action-widget .monaco-list-row.action').first().waitFor({ state: 'hidden' });
    },

    async suggestions() {
      await page.keyboard.press('Control+Space');
      await page.locator('.suggest-widget.visible .monaco-list-row').first().waitFor({ timeout: 10_000 });
      return (await page.locator('.suggest-widget.visible .monaco-list-row .label-name').allTextContents()).map((text) => text.trim());
    },

    async problems() {
      await page.keyboard.press('Control+Shift+m');
      const rows = page.locator('.markers-panel .monaco-list-row');
      await rows.first().waitFor({ timeout: 10_000 });
      const texts = (await rows.allTextContents()).map((text) => text.replace(/\s+/g, ' ').trim());
      await page.keyboard.press('Control+Shift+m');
      return texts;
    },

    /** The text of the lines in view, inlay hints included; no-break spaces made plain. */
    async lines() {
      // Monaco keeps no order among the elements of its lines: what is seen is ordered by `top`.
      const lines = await page.locator(`${editor} .view-line`).evaluateAll((found) => found.map((line) => ({ top: Number.parseFloat(line.style.top), text: line.textContent ?? '' })));
      return lines.sort((a, b) => a.top - b.top).map(({ text }) => text.replace(/\s/g, ' '));
    },

    async waitForText(pattern) {
      await page.waitForFunction(([selector, source]) => new RegExp(source).test([...document.querySelectorAll(selector)].map((line) => line.textContent.replace(/\s/g, ' ')).join('\n')), [`${editor} .view-line`, pattern.source], { timeout: 20_000 });
    },

    async hints() {
      const texts = await page.locator(`${editor} .view-line [class*="dyn-rule"]`).allTextContents();
      return texts.map((text) => text.replace(/\s/g, ' ').trim()).filter((text) => text !== '');
    },

    async closeAll() {
      await page.keyboard.press('Escape');
      await ui.command('View: Revert and Close Editor');
    },

    shot: (name) => page.screenshot({ path: `${screenshots}/${name}.png` }),
  };
  return ui;
}
