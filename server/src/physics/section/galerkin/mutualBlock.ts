/**
 * The block of two conductors: side by side where they are close, from node to node at once where they are far.
 *
 * Row-major, polynomials side after side, rows of the conductor in the higher layer. The result is scratch memory, good until
 * the next call.
 */
import type { ChargedConductor } from '../basis/chargedConductor';
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { Side } from '../basis/side';
import type { Kernel } from '../kernel/layeredKernel';
import { writeKernelValues } from './kernelValues';
import { NodeSet } from './nodeSet';
import { farRatio } from './pairIntegral';
import { writeSideBlock } from './sideBlock';

export function mutualBlock(upper: ChargedConductor, lower: ChargedConductor, kernel: Kernel): Float64Array {
  const rows = orderOf(upper);
  const columns = orderOf(lower);
  if (block.length < rows * columns) block = new Float64Array(2 * rows * columns);
  // All images of a point lie straight above or below it: none is nearer than this.
  const across = Math.max(leftOf(upper) - rightOf(lower), leftOf(lower) - rightOf(upper));
  if (across < farRatio * Math.max(longestOf(upper), longestOf(lower))) writeBySides(upper, lower, kernel, columns);
  else writeAtOnce(upper, lower, kernel, across, columns);
  return block;
}

let block = new Float64Array(1024);
const sideBlock = new Float64Array(polynomialLimit * polynomialLimit);

const orderOf = ({ sides }: ChargedConductor) => sides.reduce((sum, { order }) => sum + order, 0);
const longestOf = ({ sides }: ChargedConductor) => sides.reduce((longest, { length }) => Math.max(longest, length), 0);
const leftOf = ({ sides }: ChargedConductor) => sides.reduce((left, { x0 }) => Math.min(left, x0), Infinity);
const rightOf = ({ sides }: ChargedConductor) => sides.reduce((right, { x1 }) => Math.max(right, x1), -Infinity);

function writeBySides(upper: ChargedConductor, lower: ChargedConductor, kernel: Kernel, columns: number): void {
  let row = 0;
  for (const first of upper.sides) {
    let column = 0;
    for (const second of lower.sides) {
      writeSideBlock(first, second, kernel, sideBlock);
      for (let m = 0; m < first.order; m += 1) {
        for (let n = 0; n < second.order; n += 1) block[(row + m) * columns + column + n] = sideBlock[m * second.order + n];
      }
      column += second.order;
    }
    row += first.order;
  }
}

const firstNodes = new NodeSet();
const secondNodes = new NodeSet();
let values = new Float64Array(1024);
let half = new Float64Array(1024);

function writeAtOnce(upper: ChargedConductor, lower: ChargedConductor, kernel: Kernel, distance: number, columns: number): void {
  firstNodes.place(upper.sides, distance);
  secondNodes.place(lower.sides, distance);
  const size = firstNodes.count * Math.max(secondNodes.count, columns);
  if (values.length < size) {
    values = new Float64Array(2 * size);
    half = new Float64Array(2 * size);
  }
  writeKernelValues(kernel, firstNodes, secondNodes, values);
  sumOverColumns(lower.sides, columns);
  sumOverRows(upper.sides, columns);
}

/** half[i, n] = sum over j of values[i, j] w p_n; what a rule cannot tell from lower polynomials stays zero. */
function sumOverColumns(sides: readonly Side[], columns: number): void {
  const count = secondNodes.count;
  half.fill(0, 0, firstNodes.count * columns);
  for (let i = 0; i < firstNodes.count; i += 1) {
    let from = i * count;
    let to = i * columns;
    for (let s = 0; s < sides.length; s += 1) {
      const rule = secondNodes.rules[s];
      const order = Math.min(sides[s].order, rule.count);
      for (let j = 0; j < rule.count; j += 1) {
        const value = values[from + j];
        const at = j * polynomialLimit;
        for (let n = 0; n < order; n += 1) half[to + n] += value * rule.weighted[at + n];
      }
      from += rule.count;
      to += sides[s].order;
    }
  }
}

function sumOverRows(sides: readonly Side[], columns: number): void {
  let row = 0;
  let node = 0;
  for (let s = 0; s < sides.length; s += 1) {
    const rule = firstNodes.rules[s];
    const { order } = sides[s];
    block.fill(0, row * columns, (row + order) * columns);
    for (let i = 0; i < rule.count; i += 1) {
      const from = (node + i) * columns;
      for (let m = 0; m < Math.min(order, rule.count); m += 1) {
        const weight = rule.weighted[i * polynomialLimit + m];
        const to = (row + m) * columns;
        for (let n = 0; n < columns; n += 1) block[to + n] += weight * half[from + n];
      }
    }
    row += order;
    node += rule.count;
  }
}
