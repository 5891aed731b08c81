/**
 * The extension in two real editors: `node test/editor/run.mjs [web|node] [lf|crlf] [suite|driven|newcomer] [--only TEXT]`, everything by default.
 *
 * Sets up what is missing, builds the extension and the suite, and runs, in each host and with each
 * kind of line end, the mocha suite inside the extension host and then the scenes driven by hand; and once in each host the way of
 * a newcomer, who begins with an empty folder.
 */
import { spawnSync } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { setUp, step } from './setup.mjs';

const here = path.dirname(fileURLToPath(import.meta.url));
const root = path.dirname(path.dirname(here));

export async function runEditorTests(words = []) {
  const total = { passed: 0, failed: 0 };
  try {
    const tools = setUp();
    build(words);
    const { buildSuite } = await import('./suite/build.mjs');
    const only = words.includes('--only') ? words[words.indexOf('--only') + 1] : '';
    await buildSuite(only);
    const { runPass } = await import('./pass.mjs');
    const screenshots = path.join(here, 'screenshots');
    if (!words.includes('--keep')) rmSync(screenshots, { recursive: true, force: true });
    mkdirSync(screenshots, { recursive: true });
    for (const host of among(words, ['web', 'node'])) {
      for (const lineEnds of among(words, ['lf', 'crlf'])) {
        for (const kind of among(words, ['suite', 'driven', 'newcomer'])) {
          if (kind === 'newcomer' && lineEnds === 'crlf') continue; // there is no file yet that could have them
          const counts = await runPass({ ...tools, root, host, lineEnds, kind, screenshots, only });
          step(`${host}, ${lineEnds}, ${kind}: ${counts.passed} passed, ${counts.failed} failed`);
          total.passed += counts.passed;
          total.failed += counts.failed;
        }
      }
    }
  } catch (error) {
    console.error(`editor: ${error.stack ?? error}`);
    total.failed += 1;
  }
  return total;
}

const among = (words, all) => (all.some((word) => words.includes(word)) ? all.filter((word) => words.includes(word)) : all);

function build(words) {
  if (words.includes('--built')) return;
  step('building the extension');
  const { status } = spawnSync('npm', ['run', '-s', 'build'], { cwd: root, stdio: 'inherit' });
  if (status !== 0) throw new Error('the extension does not build');
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const { passed, failed } = await runEditorTests(process.argv.slice(2));
  console.log(`${passed} passed, ${failed} failed`);
  process.exitCode = failed === 0 && 0 < passed ? 0 : 1;
}
