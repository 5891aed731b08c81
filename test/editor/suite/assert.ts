/** The checks of the suite: node's `assert` is not there in a Web Worker. */
export function equal<T>(found: T, wanted: T, what = 'value'): void {
  const [a, b] = [JSON.stringify(found), JSON.stringify(wanted)];
  if (a !== b) throw new Error(`${what}: found ${a}, wanted ${b}`);
}

export function ok(holds: unknown, what: string): asserts holds {
  if (!holds) throw new Error(what);
}

export function match(text: string, pattern: RegExp, what = 'text'): void {
  if (!pattern.test(text)) throw new Error(`${what}: ${JSON.stringify(text)} does not match ${String(pattern)}`);
}

/** Asks again until it is answered: findings arrive when the server has them. */
export async function eventually<T>(ask: () => T | undefined | Promise<T | undefined>, what: string, milliseconds = 60_000): Promise<T> {
  const end = Date.now() + milliseconds;
  for (;;) {
    const answer = await ask();
    if (answer !== undefined) return answer;
    if (end < Date.now()) throw new Error(`waited ${milliseconds} ms for ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
