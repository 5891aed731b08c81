/**
 * Kernel values between the nodes of two sides, and their sums against the polynomials.
 *
 * Scratch memory is kept between calls: a solve makes thousands of small products, and arrays made afresh for
 * each took a quarter of its time.
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Segment } from '../basis/side';
import { restValue, type Image, type KernelRest } from '../kernel/layeredKernel';

/** Most nodes of a rule. */
const nodeLimit = 32;

export interface PointPairs {
  readonly first: PartRule;
  readonly second: PartRule;
}

const firstX = new Float64Array(nodeLimit);
const firstY = new Float64Array(nodeLimit);
const secondX = new Float64Array(nodeLimit);
const secondY = new Float64Array(nodeLimit);
/** Row by row of the first side's nodes. */
const values = new Float64Array(nodeLimit * nodeLimit);
const row = new Float64Array(polynomialLimit);

/** Places the nodes and clears the values. */
export function startPairs({ first, second }: PointPairs, a: Segment, b: Segment): void {
  placeNodes(first, a, firstX, firstY);
  placeNodes(second, b, secondX, secondY);
  values.fill(0, 0, first.count * second.count);
}

function placeNodes({ count, t }: PartRule, { x0, y0, x1, y1 }: Segment, x: Float64Array, y: Float64Array): void {
  for (let i = 0; i < count; i += 1) {
    x[i] = x0 + (x1 - x0) * t[i];
    y[i] = y0 + (y1 - y0) * t[i];
  }
}

/** Adds `factor` ln r, r from the first side's nodes to the images of the second's. */
export function addLogarithms({ first, second }: PointPairs, factor: number, { sign, shift }: Image): void {
  const half = factor / 2;
  let at = 0;
  for (let i = 0; i < first.count; i += 1) {
    const x = firstX[i];
    const y = firstY[i] - shift;
    for (let j = 0; j < second.count; j += 1) {
      const dx = x - secondX[j];
      const dy = y - sign * secondY[j];
      values[at] += half * Math.log(dx * dx + dy * dy);
      at += 1;
    }
  }
}

export function addRest({ first, second }: PointPairs, rest: KernelRest): void {
  let at = 0;
  for (let i = 0; i < first.count; i += 1) {
    for (let j = 0; j < second.count; j += 1) {
      values[at] += restValue(rest, firstX[i] - secondX[j], firstY[i], secondY[j]);
      at += 1;
    }
  }
}

export interface BlockSize {
  readonly rows: number;
  readonly columns: number;
  /** From one row of the block to the next. */
  readonly stride: number;
}

/** block[m, n] += sum over i, j of first[i, m] value(i, j) second[j, n]. */
export function finishPairs({ first, second }: PointPairs, { rows, columns, stride }: BlockSize, block: Float64Array): void {
  const left = first.weighted;
  const right = second.weighted;
  let at = 0;
  for (let i = 0; i < first.count; i += 1) {
    for (let n = 0; n < columns; n += 1) row[n] = 0;
    for (let j = 0; j < second.count; j += 1) {
      const value = values[at];
      at += 1;
      const from = j * polynomialLimit;
      for (let n = 0; n < columns; n += 1) row[n] += value * right[from + n];
    }
    for (let m = 0; m < rows; m += 1) {
      const weight = left[i * polynomialLimit + m];
      const to = m * stride;
      for (let n = 0; n < columns; n += 1) block[to + n] += weight * row[n];
    }
  }
}
