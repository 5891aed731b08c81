/** What a person does in the workbench, each with the wait that makes it certain to have happened. */
export function actions(page, screenshots) {
  const editor = '.editor-instance .monaco-editor';
  const input = page.locator('.quick-input-widget input').first();
  const widget = page.locator('.quick-input-widget');

  const exactly = (text) => new RegExp(`^\\s*${text.replace(/\W/g, '\\$&')}\\s*$`);
  const suggestion = (label) => page.locator('.suggest-widget.visible .monaco-list-row').filter({ has: page.locator('.label-name', { hasText: exactly(label) }) }).first();

  // Generous: other work may keep the machine busy. A wait that is met takes no longer for it.
  page.setDefaultTimeout(60_000);

  const ui = {
    async ready() {
      await page.waitForSelector('.monaco-workbench');
      await page.locator('[id="workbench.parts.statusbar"]').waitFor();
    },

    /** The list of commands does not grow once it is open: an extension that is still being read is asked for again. */
    async command(title) {
      const row = page.locator('.quick-input-list .monaco-list-row').filter({ hasText: title }).first();
      for (let attempt = 1; ; attempt += 1) {
        await page.keyboard.press('F1');
        await input.waitFor({ state: 'visible' });
        await input.fill(`>${title}`);
        try {
          await row.waitFor({ timeout: 5000 });
          break;
        } catch (error) {
          if (attempt === 6) throw error;
          await page.keyboard.press('Escape');
        }
      }
      await row.click();
      await widget.waitFor({ state: 'hidden' });
    },

    /** Opens a file of the workspace in the explorer: no search reaches the web host's file system. */
    async open(file) {
      const parts = file.split('/');
      for (const [at, part] of parts.entries()) {
        const row = page.locator(`.explorer-folders-view .monaco-list-row[aria-level="${at + 1}"]`).filter({ has: page.locator('.label-name', { hasText: new RegExp(`^${part.replace(/\W/g, '\\$&')}$`) }) }).first();
        await row.waitFor();
        if (at === parts.length - 1) await row.dblclick();
        else if ((await row.getAttribute('aria-expanded')) === 'false') await row.click();
      }
      const name = parts[parts.length - 1];
      await page.locator('.tab.active').filter({ hasText: name }).waitFor();
      await page.locator(`${editor} .view-line`).first().waitFor();
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
      await ui.waitForCaret(line, column);
    },

    async waitForCaret(line, column) {
      await page.locator('[id="status.editor.selection"]').filter({ hasText: new RegExp(`^Ln ${line}, Col ${column}( |$)`) }).waitFor();
    },

    /** A part of a hint, by all of its text. */
    hint: (pattern) => page.locator(`${editor} .view-line span span`).filter({ hasText: pattern }).first(),

    /** The editor underlines what can be followed once the mouse is there: only then does a click with the key down count. */
    async followHint(pattern) {
      const isLink = (source) => [...document.querySelectorAll('.editor-instance .view-line span')].some((found) => found.childElementCount === 0 && new RegExp(source).test(found.textContent) && getComputedStyle(found).textDecorationLine.includes('underline'));
      await ui.hint(pattern).hover();
      await page.waitForFunction(isLink, pattern.source);
      await page.keyboard.down('Control');
      try {
        await ui.hint(pattern).click();
      } finally {
        await page.keyboard.up('Control');
      }
      await page.mouse.move(5, 5);
    },

    /** Selects this much of the line from the caret on, so that what is typed takes its place. */
    async select(characters) {
      for (let i = 0; i < characters; i += 1) await page.keyboard.press('Shift+ArrowRight');
      await page.locator('[id="status.editor.selection"]').filter({ hasText: `(${characters} selected)` }).waitFor();
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
      }, [`${editor} .squiggly-${severity}`, wanted]);
    },

    /** What is hovered at the caret; with a pattern, once that is there: findings come first, and the rest later. */
    async hover(pattern = null) {
      const row = page.locator('.monaco-hover .hover-row').filter({ visible: true }).first();
      await page.waitForFunction(() => ![...document.querySelectorAll('.monaco-hover')].some((found) => found.offsetParent !== null && 0 < found.offsetHeight), null);
      for (let attempt = 1; ; attempt += 1) {
        await page.keyboard.press('Control+k');
        await page.keyboard.press('Control+i');
        try {
          await row.waitFor({ timeout: 5000 });
          break;
        } catch (error) {
          if (attempt === 6) throw error;
        }
      }
      await page.waitForFunction(() => ![...document.querySelectorAll('.monaco-hover')].some((found) => /Loading\.\.\./.test(found.textContent)), null);
      return ui.hovered(pattern ?? /./);
    },

    /** What the hovers on the screen say, read in the moment in which it is there: they are drawn in parts, and anew. */
    async hovered(pattern) {
      const said = await page.waitForFunction((source) => {
        const visible = [...document.querySelectorAll('.monaco-hover')].filter((found) => 0 < found.offsetHeight && getComputedStyle(found).visibility !== 'hidden');
        const text = visible.map((found) => found.textContent).join(' ').replace(/\s+/g, ' ');
        return new RegExp(source).test(text) && text;
      }, pattern.source);
      return said.jsonValue();
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
          if (attempt === 6) throw error;
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

    /** Labels of the list of suggestions, once this one is among them; typing asks for some lists, this for any. */
    async suggestions(wanted) {
      const row = suggestion(wanted);
      for (let attempt = 1; !(await row.isVisible()); attempt += 1) {
        await page.keyboard.press('Control+Space');
        try {
          await row.waitFor({ timeout: 5000 });
        } catch (error) {
          if (attempt === 6) throw error;
          await page.keyboard.press('Escape');
        }
      }
      return (await page.locator('.suggest-widget.visible .monaco-list-row .label-name').allTextContents()).map((text) => text.trim());
    },

    /** Moves to a suggestion that is shown, and takes it as a person does, with Enter. */
    async accept(wanted) {
      const focused = page.locator('.suggest-widget.visible .monaco-list-row.focused').filter({ has: page.locator('.label-name', { hasText: exactly(wanted) }) });
      for (let i = 0; i < 30 && !(await focused.isVisible()); i += 1) await page.keyboard.press('ArrowDown');
      await focused.waitFor();
      await page.keyboard.press('Enter');
      await page.locator('.suggest-widget.visible').waitFor({ state: 'hidden' });
    },

    async problems() {
      await page.keyboard.press('Control+Shift+m');
      const rows = page.locator('.markers-panel .monaco-list-row');
      await rows.first().waitFor();
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
      await page.waitForFunction(([selector, source, flags]) => new RegExp(source, flags).test([...document.querySelectorAll(selector)].map((line) => line.textContent.replace(/\s/g, ' ')).join('\n')), [`${editor} .view-line`, pattern.source, pattern.flags]);
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
