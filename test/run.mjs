/**
 * Runs the tests and does all the set-up they need: `node test/run.mjs [unit|editor]`, both by default.
 *
 * unit    type check, then every `*.test.ts` outside `editor/`, bundled by esbuild, under node's runner
 * editor  the extension in two real hosts; see `editor/README.md`
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.dirname(path.dirname(fileURLToPath(import.meta.url)));
const wanted = process.argv.slice(2).filter((word) => !word.startsWith('-'));
const counts = { passed: 0, failed: 0 };

if (!existsSync(path.join(root, 'node_modules'))) run('npm', ['ci']);
if (wanted.length === 0 || wanted.includes('unit')) await unit();
if (wanted.length === 0 || wanted.includes('editor')) await editor();
console.log(`${counts.passed} passed, ${counts.failed} failed`);
process.exitCode = counts.failed === 0 && 0 < counts.passed ? 0 : 1;

async function unit() {
  step('types', () => run('npx', ['tsc', '--noEmit']));
  step('build', () => run('npm', ['run', '-s', 'build']));
  const out = path.join(root, '.test-build');
  rmSync(out, { recursive: true, force: true });
  const { build } = await import('esbuild');
  const entries = testFiles(path.join(root, 'test'));
  await build({ absWorkingDir: root, entryPoints: entries, outdir: out, outbase: 'test', outExtension: { '.js': '.mjs' }, bundle: true, splitting: true, format: 'esm', platform: 'node', target: 'node20', sourcemap: 'inline', packages: 'external', logLevel: 'warning' });
  const only = process.argv.includes('--only') ? process.argv[process.argv.indexOf('--only') + 1] : '';
  const built = entries.map((file) => path.join(out, path.relative(path.join(root, 'test'), file)).replace(/\.ts$/, '.mjs')).filter((file) => file.includes(only));
  const { status, stdout } = spawnSync(process.execPath, ['--enable-source-maps', '--test', '--test-reporter=spec', ...built], { cwd: root, encoding: 'utf8', maxBuffer: 1 << 28, stdio: ['ignore', 'pipe', 'inherit'] });
  process.stdout.write(stdout);
  const total = (word) => Number(new RegExp(`^ℹ ${word} (\\d+)`, 'm').exec(stdout)?.[1] ?? 0);
  counts.passed += total('pass');
  counts.failed += total('fail') + total('cancelled') + (status !== 0 && total('fail') === 0 ? 1 : 0);
}

async function editor() {
  const { runEditorTests } = await import('./editor/run.mjs');
  const result = await runEditorTests();
  counts.passed += result.passed;
  counts.failed += result.failed;
}

function testFiles(folder) {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const full = path.join(folder, entry.name);
    if (entry.isDirectory()) return ['editor', 'bench', 'node_modules'].includes(entry.name) ? [] : testFiles(full);
    return entry.name.endsWith('.test.ts') ? [full] : [];
  });
}

function step(name, action) {
  if (action() === 0) counts.passed += 1;
  else { counts.failed += 1; console.error(`${name} failed`); }
}

function run(command, args) {
  return spawnSync(command, args, { cwd: root, stdio: 'inherit', shell: process.platform === 'win32' }).status;
}
