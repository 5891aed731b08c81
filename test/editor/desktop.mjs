/**
 * `npm run test:desktop`: the same suite in a desktop VS Code, which is fetched, or named by
 * VSCODE_EXECUTABLE. It needs a display (`xvfb-run -a` gives one).
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { downloadAndUnzipVSCode, runTests } from '@vscode/test-electron';
import { freshWorkspace } from './hosts/workspace.mjs';
import { buildSuite, bundles } from './suite/build.mjs';

const here = path.dirname(fileURLToPath(import.meta.url));
const root = path.resolve(here, '../..');

process.exitCode = await runDesktopTests();

async function runDesktopTests() {
  const vscodeExecutablePath = await findEditor();
  if (vscodeExecutablePath === null) return 1;
  const built = spawnSync('npm', ['run', '-s', 'build'], { cwd: root, stdio: 'inherit', shell: process.platform === 'win32' });
  if (built.status !== 0) return 1;
  await buildSuite();
  const workspace = freshWorkspace({ from: [path.join(here, 'workspace'), path.join(root, 'examples')], lineEnds: 'lf' });
  const profile = mkdtempSync(path.join(os.tmpdir(), 'quietrun-desktop-'));
  try {
    await runTests({
      vscodeExecutablePath,
      extensionDevelopmentPath: root,
      extensionTestsPath: path.join(root, bundles.node),
      launchArgs: [workspace.folder, '--user-data-dir', profile, '--disable-workspace-trust', '--disable-telemetry', '--disable-extensions', ...(process.getuid?.() === 0 ? ['--no-sandbox'] : [])],
    });
    console.log('desktop: passed');
    return 0;
  } catch (error) {
    console.error(`desktop: ${error.message ?? error}`);
    return 1;
  } finally {
    workspace.remove();
    rmSync(profile, { recursive: true, force: true });
  }
}

async function findEditor() {
  const given = process.env.VSCODE_EXECUTABLE;
  if (given !== undefined && given !== '') {
    if (existsSync(given)) return given;
    console.error(`desktop: VSCODE_EXECUTABLE names ${given}, and there is no such file.`);
    return null;
  }
  try {
    return await downloadAndUnzipVSCode({ cachePath: path.join(here, '.vscode-test'), reporter: { report() {}, error() {} } });
  } catch (error) {
    console.error(`desktop: no desktop VS Code could be fetched (${error.message ?? error}); set VSCODE_EXECUTABLE to the path of an installed one.`);
    return null;
  }
}
