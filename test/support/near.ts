import assert from 'node:assert/strict';

/** Demands agreement to a relative tolerance (absolute where the expected value is below 1e-300). */
export function near(actual: number, expected: number, tolerance: number, what = ''): void {
  const difference = relativeDifference(actual, expected);
  assert.ok(difference <= tolerance, `${what} ${actual} instead of ${expected}: off by ${difference.toExponential(2)}, allowed ${tolerance}`.trim());
}

export function relativeDifference(actual: number, expected: number): number {
  if (Object.is(actual, expected)) return 0;
  const size = Math.abs(expected);
  return Math.abs(actual - expected) / (size < 1e-300 ? 1 : size);
}
