/**
 * Everything the editor tests need on a fresh machine, made where it is missing: a Chromium, the two
 * editors, and the parts of the second that its package leaves to be installed.
 */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const here = path.dirname(fileURLToPath(import.meta.url));
const modules = path.join(here, 'node_modules');

/** Answers where Chromium is; throws one sentence that says what is missing and what to do. */
export function setUp() {
  if (process.platform !== 'linux' || process.arch !== 'x64') {
    throw new Error('The editor tests run on Linux x64 (the editor they install is built for it); elsewhere use `npm run test:desktop`.');
  }
  const chromium = findChromium() ?? installChromium();
  once(path.join(modules, '.installed-for'), () => {
    step('installing the two editors (1.4 GB, under a minute)');
    run('npm', ['ci', '--ignore-scripts', '--no-audit', '--no-fund', '--loglevel=error'], here);
  });
  // code-server's package holds the workbench without its dependencies. `npm ci` refuses its
  // shrinkwrap, which is out of step with its package.json.
  const workbench = path.join(modules, 'code-server/lib/vscode');
  once(path.join(workbench, '.installed-for'), () => {
    step('installing what the editor in code-server needs');
    run('npm', ['install', '--omit=dev', '--ignore-scripts', '--no-audit', '--no-fund', '--loglevel=error'], workbench);
  });
  return { chromium, modules };
}

function findChromium() {
  const given = process.env.CHROMIUM;
  if (given !== undefined && given !== '') {
    if (!existsSync(given)) throw new Error(`CHROMIUM names ${given}, and there is no such file.`);
    return given;
  }
  return ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'].find((file) => existsSync(file)) ?? null;
}

function installChromium() {
  if (!existsSync('/etc/debian_version') || process.getuid() !== 0) {
    throw new Error('No Chromium found: install one, or set CHROMIUM to its path.');
  }
  step('installing Chromium from the distribution');
  const quietly = { env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } };
  run('apt-get', ['update', '-qq'], here, quietly);
  run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], here, quietly);
  return '/usr/bin/chromium';
}

/** Done when the mark holds today's lock file: an installation that was cut short leaves none. */
function once(mark, install) {
  const lock = createHash('sha256').update(readFileSync(path.join(here, 'package-lock.json'))).digest('hex');
  if (existsSync(mark) && readFileSync(mark, 'utf8') === lock) return;
  install();
  writeFileSync(mark, lock);
}

export function step(text) {
  console.log(`editor: ${text}`);
}

function run(command, words, cwd, options = {}) {
  const { status, stdout, stderr, error } = spawnSync(command, words, { cwd, encoding: 'utf8', maxBuffer: 1 << 26, ...options });
  if (status !== 0) throw new Error(`${command} ${words.join(' ')} failed in ${path.relative(process.cwd(), cwd) || '.'}:\n${error?.message ?? (stderr || stdout).trim()}`);
}
