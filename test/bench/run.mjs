/**
 * Runs the benchmarks: `node test/bench/run.mjs [name…]`. Bundles every `*.bench.ts` beside it whose name holds one of the words,
 * runs each in a process of its own, and prints medians and, where a case names another, the ratio to it.
 *
 * A bench exports `cases`: a list of { name, run, against? }. `run` does the work once; its inputs are seeded.
 */
import { spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const here = path.dirname(fileURLToPath(import.meta.url));
const root = path.dirname(path.dirname(here));
const out = path.join(root, '.test-build', 'bench');
const words = process.argv.slice(2);
const benches = readdirSync(here).filter((file) => file.endsWith('.bench.ts') && (words.length === 0 || words.some((word) => file.includes(word))));
if (benches.length === 0) {
  console.error(`no bench named ${words.join(', ')}`);
  process.exit(2);
}

await build({ absWorkingDir: root, entryPoints: benches.map((file) => path.join(here, file)), outdir: out, outExtension: { '.js': '.mjs' }, bundle: true, format: 'esm', platform: 'node', target: 'node20', packages: 'external', logLevel: 'warning' });
mkdirSync(out, { recursive: true });
const runner = path.join(out, 'measure.mjs');
writeFileSync(runner, measureText());
let failed = false;
for (const bench of benches) {
  console.log(`\n${bench.replace(/\.bench\.ts$/, '')}`);
  const { status } = spawnSync(process.execPath, [runner, path.join(out, bench.replace(/\.ts$/, '.mjs'))], { cwd: root, stdio: 'inherit' });
  failed ||= status !== 0;
}
process.exitCode = failed ? 1 : 0;

/** Written out, so that every bench is measured in a fresh process by the same lines. */
function measureText() {
  return `
import { pathToFileURL } from 'node:url';
const { cases } = await import(pathToFileURL(process.argv[2]).href);
const milliseconds = () => Number(process.hrtime.bigint()) / 1e6;
const medians = new Map();
for (const { name, run, against } of cases) {
  const first = milliseconds();
  run();
  const cold = milliseconds() - first;
  const samples = [];
  // Half a second, or five runs where one takes long; the first tenth warms up.
  for (const start = milliseconds(); samples.length < 5 || (milliseconds() - start < 500 && samples.length < 2000);) {
    const before = milliseconds();
    run();
    samples.push(milliseconds() - before);
  }
  const warm = samples.slice(Math.floor(samples.length / 10)).sort((a, b) => a - b);
  const median = warm[Math.floor(warm.length / 2)];
  medians.set(name, median);
  const ratio = against === undefined ? '' : (median / medians.get(against)).toFixed(2) + ' of ' + against;
  console.log('  ' + name.padEnd(44) + inText(median).padStart(10) + '  best ' + inText(warm[0]).padStart(9) + '  first ' + inText(cold).padStart(9) + '  ' + ratio);
}
function inText(value) {
  return value < 1 ? (value * 1e3).toPrecision(3) + ' us' : value.toPrecision(3) + ' ms';
}
`;
}
