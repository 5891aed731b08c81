/**
 * Integral of a function over [low, high] that is smooth but for a few places, near which intervals are halved.
 *
 * Method    10-point Gauss-Legendre on an interval against the same on its halves; the widest error is not chased, each interval
 *           meets its share of the tolerance, at most `mostDepth` halvings deep. Stops early when `mostIntervals` are used
 * Source    textbook; Davis & Rabinowitz, Methods of Numerical Integration
 * Accuracy  `error` is the sum of the differences between the two estimates, which is far above the error of the better one
 */
import { gaussJacobi } from './gaussJacobi';

export interface AdaptiveIntegral {
  readonly value: number;
  readonly error: number;
  readonly evaluations: number;
}

/** `tolerance`: absolute. */
export function adaptiveGauss(f: (x: number) => number, low: number, high: number, tolerance: number): AdaptiveIntegral {
  let value = 0;
  let error = 0;
  let intervals = 0;
  const refine = (from: number, to: number, whole: number, depth: number): void => {
    const middle = (from + to) / 2;
    const left = panel(f, from, middle);
    const right = panel(f, middle, to);
    intervals += 1;
    const off = Math.abs(left + right - whole);
    if (off <= Math.max((tolerance * (to - from)) / (high - low), 4e-16 * Math.abs(whole)) || mostDepth <= depth || mostIntervals <= intervals || !Number.isFinite(off)) {
      value += left + right;
      error += off;
      return;
    }
    refine(from, middle, left, depth + 1);
    refine(middle, to, right, depth + 1);
  };
  if (low !== high) refine(low, high, panel(f, low, high), 0);
  return { value, error, evaluations: rule.nodes.length * (1 + 2 * intervals) };
}

const rule = gaussJacobi(10, 0, 0);
const mostDepth = 60;
const mostIntervals = 4000;

function panel(f: (x: number) => number, from: number, to: number): number {
  const half = (to - from) / 2;
  const middle = (from + to) / 2;
  let sum = 0;
  for (let i = 0; i < rule.nodes.length; i += 1) sum += rule.weights[i] * f(middle + half * rule.nodes[i]);
  return sum * half;
}
