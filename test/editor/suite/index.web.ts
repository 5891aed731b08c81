/** Entry in the extension host of the web, a worker. */
import 'mocha/mocha.js';
import { loadAll } from './all';
import { report } from './report';

/** Set when the suite is bundled. */
declare const ONLY: string;

export async function run(): Promise<void> {
  mocha.setup({ ui: 'bdd', timeout: 120_000, reporter: class {} as never });
  if (ONLY !== '') mocha.fgrep(ONLY);
  await loadAll();
  const counts = await new Promise<{ passed: number; failed: number }>((resolve) => {
    const runner = mocha.run(() => resolve(counts_));
    const counts_ = report(runner as never).counts;
  });
  if (0 < counts.failed || counts.passed === 0) throw new Error(`${counts.passed} passed, ${counts.failed} failed`);
}

// The header of mocha's browser build replaces `module.exports`, and this file's with it.
declare const module: { exports: unknown };
module.exports = { run };
