/**
 * One line for each test on the console, which the driver reads: `quietrun-test {"title", "error"}`.
 * The last line counts them, so that a suite that loaded nothing does not pass.
 */
interface Runner {
  on(event: string, listener: (test: { fullTitle(): string }, error?: Error) => void): void;
}

export function report(runner: Runner): { readonly counts: { passed: number; failed: number } } {
  const counts = { passed: 0, failed: 0 };
  runner.on('pass', (test) => {
    counts.passed += 1;
    say({ title: test.fullTitle(), error: null });
  });
  runner.on('fail', (test, error) => {
    counts.failed += 1;
    say({ title: test.fullTitle(), error: String(error?.stack ?? error) });
  });
  return { counts };
}

function say(line: { title: string; error: string | null }) {
  console.log(`quietrun-test ${JSON.stringify(line)}`);
}
