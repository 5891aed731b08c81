/** One pass: a fresh workspace, one host, one browser, and either the suite or the scenes of one folder. */
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { launchBrowser } from './hosts/browser.mjs';
import { startNodeHost } from './hosts/node.mjs';
import { actions } from './hosts/page.mjs';
import { startWebHost } from './hosts/web.mjs';
import { freshWorkspace } from './hosts/workspace.mjs';
import { bundles } from './suite/build.mjs';

const here = path.dirname(fileURLToPath(import.meta.url));
const longest = 180_000;

const settings = {
  'workbench.startupEditor': 'none', 'workbench.tips.enabled': false, 'workbench.reduceMotion': 'on', 'workbench.colorTheme': 'Light Modern',
  'workbench.secondarySideBar.defaultVisibility': 'hidden', 'editor.minimap.enabled': false, 'editor.accessibilitySupport': 'off', 'chat.disableAIFeatures': true, 'files.hotExit': 'off', 'files.autoSave': 'off', 'extensions.autoUpdate': false,
  'telemetry.telemetryLevel': 'off', 'security.workspace.trust.enabled': false, 'files.simpleDialog.enable': true,
};

export async function runPass({ root, modules, chromium, host: kindOfHost, lineEnds, kind, screenshots, only }) {
  const workspace = freshWorkspace({ from: kind === 'newcomer' ? [] : [path.join(here, 'workspace'), path.join(root, 'examples')], lineEnds });
  const start = kindOfHost === 'web' ? startWebHost : startNodeHost;
  const host = await start({ modules, extension: root, workspace: workspace.folder, settings });
  const browser = await launchBrowser({ chromium });
  const label = `${kindOfHost} ${lineEnds}`;
  const counts = { passed: 0, failed: 0 };
  const tell = (title, error) => {
    counts[error === null ? 'passed' : 'failed'] += 1;
    console.log(`  ${error === null ? '✓' : '✗'} ${label}: ${title}${error === null ? '' : `\n      ${error.replace(/\n/g, '\n      ')}`}`);
  };
  try {
    const run = kind === 'suite' ? runSuite : runScenes;
    await run({ host, workspace: workspace.folder, page: browser.page, tell, lineEnds, screenshots, name: `${kindOfHost}-${lineEnds}`, folder: kind, only });
    const outside = [...browser.outside, ...host.outside];
    tell('nothing leaves this machine', outside.length === 0 ? null : outside.join('\n'));
  } catch (error) {
    tell(kind, String(error.stack ?? error));
    await browser.page.screenshot({ path: path.join(screenshots, `${kindOfHost}-${lineEnds}-${kind}-failed.png`) }).catch(() => {});
    if (0 < browser.problems.length) console.log(`      the page said: ${browser.problems.slice(0, 5).join('\n      ')}`);
  } finally {
    await browser.close();
    await host.close();
    workspace.remove();
  }
  return counts;
}

/** Mocha inside the extension host; its lines arrive as console messages of the page. */
async function runSuite({ host, page, tell }) {
  const other = [];
  const hear = (text) => {
    const line = /quietrun-test (\{.*\})/.exec(text);
    if (line === null) return other.push(text.slice(0, 500));
    const { title, error } = JSON.parse(line[1]);
    tell(title, error);
  };
  await page.exposeFunction('codeAutomationLog', (_type, words) => hear(words.map(String).join(' ')));
  const exit = new Promise((resolve) => page.exposeFunction('codeAutomationExit', resolve));
  await page.goto(host.address({ tests: bundles[host.name] }));
  const code = await within(longest, exit, 'the suite to end');
  if (code !== 0) tell('the suite ends with status 0', `status ${code}\n${other.slice(-10).join('\n')}`);
}

/** Each file of the folder exports scenes: a title, and what a person does and sees. */
async function runScenes({ host, workspace, page, tell, lineEnds, screenshots, name, folder, only }) {
  await page.goto(host.address());
  const ui = actions(page, screenshots);
  await ui.ready();
  /** Line and column, from 1, of a text in a file as it was opened, or of what follows it. */
  const at = (file, text, further = 0) => {
    const content = readFileSync(path.join(workspace, file), 'utf8').replace(/\r\n/g, '\n');
    const before = content.slice(0, content.indexOf(text) + further).split('\n');
    if (!content.includes(text)) throw new Error(`no ${text} in ${file}`);
    return [before.length, before[before.length - 1].length + 1];
  };
  for (const file of readdirSync(path.join(here, folder)).sort()) {
    const { scenes } = await import(`./${folder}/${file}`);
    for (const scene of scenes.filter(({ title }) => title.includes(only))) {
      const shot = (what) => ui.shot(`${name}-${what}`);
      try {
        await scene.run({ page, ui, shot, lineEnds, host: host.name, at });
        tell(scene.title, null);
      } catch (error) {
        await shot(`failed-${scene.title.replace(/\W+/g, '-')}`);
        tell(scene.title, String(error.stack ?? error));
      }
      await ui.closeAll();
    }
  }
}

function within(milliseconds, promise, what) {
  let timer;
  const late = new Promise((_, reject) => { timer = setTimeout(() => reject(new Error(`waited ${milliseconds / 1000} s for ${what}`)), milliseconds); });
  return Promise.race([promise, late]).finally(() => clearTimeout(timer));
}
