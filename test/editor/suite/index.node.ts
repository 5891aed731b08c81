/** Entry in an extension host of node: code-server here, a desktop VS Code in `npm run test:desktop`. */
import Mocha from 'mocha';
import { loadAll } from './all';
import { report } from './report';

/** Set when the suite is bundled. */
declare const ONLY: string;

export async function run(): Promise<void> {
  const mocha = new Mocha({ ui: 'bdd', timeout: 120_000, reporter: class {} as never });
  if (ONLY !== '') mocha.fgrep(ONLY);
  mocha.suite.emit('pre-require', globalThis, '', mocha);
  await loadAll();
  const counts = await new Promise<{ passed: number; failed: number }>((resolve) => {
    const runner = mocha.run(() => resolve(counts_));
    const counts_ = report(runner as never).counts;
  });
  if (0 < counts.failed || counts.passed === 0) throw new Error(`${counts.passed} passed, ${counts.failed} failed`);
}
