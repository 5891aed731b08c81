/**
 * Runs the benchmarks: `node test/bench/run.mjs [name…]`. Bundles every `*.bench.ts` beside it whose name holds one of the words,
 * runs each in a process of its own, and prints medians, 95th percentiles, the median processor time (more than
 * the time where the machine collects garbage beside it, less where others use the machine) and, where a case
 * names another, the ratio to it.
 *
 * A bench exports `cases`: a list of { name, run, prepare?, against?, goal? }. `run` does the work once, with what
 * `prepare` made for it off the clock; inputs are seeded. `goal` is in milliseconds, and the ratio to it is printed.
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
for (const { name, run, against, prepare, goal } of cases) {
  const samples = [];
  const processor = [];
  let spent = 0;
  const once = () => {
    const input = prepare?.();
    const usage = process.cpuUsage();
    const before = milliseconds();
    run(input);
    const took = milliseconds() - before;
    const { user, system } = process.cpuUsage(usage);
    processor.push((user + system) / 1e3);
    spent += took;
    return took;
  };
  const cold = once();
  processor.length = 0;
  spent = 0;
  // Half a second, or ten runs where one takes long; the first tenth warms up.
  while (samples.length < 10 || (spent < 500 && samples.length < 2000)) samples.push(once());
  const warm = samples.slice(Math.floor(samples.length / 10)).sort((a, b) => a - b);
  const median = warm[Math.floor(warm.length / 2)];
  medians.set(name, median);
  const ratio = (against === undefined ? '' : (median / medians.get(against)).toFixed(2) + ' of ' + against) + (goal === undefined ? '' : (median / goal).toFixed(1) + ' of the goal');
  console.log('  ' + name.padEnd(44) + inText(median).padStart(10) + '  p95 ' + inText(warm[Math.floor(warm.length * 0.95)]).padStart(9) + '  cpu ' + inText(processor.sort((a, b) => a - b)[Math.floor(processor.length / 2)]).padStart(9) + '  first ' + inText(cold).padStart(9) + '  ' + ratio);
}
function inText(value) {
  return value < 1 ? (value * 1e3).toPrecision(3) + ' us' : value.toPrecision(3) + ' ms';
}
`;
}
