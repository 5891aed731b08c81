/**
 * Double integrals of w p_m (on one side) w p_n (on another) times a kernel that is singular, or nearly so.
 *
 *   ======+==+=|||   both sides are halved where they are close, until parts are far enough from each other for a
 *              ---   product of Gauss rules; parts that meet in a corner are integrated with the corner scaled out
 *                =
 *                =   Method    dyadic parts; a pair is far when its distance is 0.6 of the longer part: the rules' error is
 *                +             then 2.76^-(2 points), 1e-8 with 9 points
 *
 * Source    hierarchical subdivision and Gauss-Jacobi rules, textbook; accuracy measured in the test
 */
import { pointsOn, type Segment, type Side } from '../basis/side';
import type { PartRule } from '../basis/partRule';
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { Image } from '../kernel/layeredKernel';
import { addCorner } from './cornerBlock';
import { segmentDistance } from './segmentDistance';

export interface PairKernel {
  /** Of the second side, in each of which the kernel may be singular. */
  readonly images: readonly Image[];
  /** `factor` ln r of the only image, which may share a corner with the first side; otherwise the kernel is finite. */
  readonly logarithm: number | null;
  readonly value: (dx: number, y: number, ySource: number) => number;
}

const farRatio = 0.6;
/** Halving stops here: parts of a millionth of a side. What is nearer than that has been refused before. */
const deepest = 20;

/** Adds to `block`, first.order × second.order. */
export function addPairIntegral(first: Side, second: Side, kernel: PairKernel, block: Float64Array): void {
  const pair: Pair = { first, second, kernel, block, corner: kernel.logarithm === null ? null : cornerOf(first, imageOf(second, kernel.images[0])) };
  visit(pair, 0, 0, 0, 0);
}

export function imageOf(segment: Segment, { sign, shift }: Image): Segment {
  return { x0: segment.x0, y0: sign * segment.y0 + shift, x1: segment.x1, y1: sign * segment.y1 + shift };
}

interface Pair {
  readonly first: Side;
  readonly second: Side;
  readonly kernel: PairKernel;
  readonly block: Float64Array;
  readonly corner: Corner | null;
}

/** Which ends of the two sides meet, and under what angle. */
interface Corner {
  readonly firstAtEnd: boolean;
  readonly secondAtEnd: boolean;
  readonly cosine: number;
}

function visit(pair: Pair, firstLevel: number, firstIndex: number, secondLevel: number, secondIndex: number): void {
  const { first, second, kernel } = pair;
  const a = partOf(first, firstLevel, firstIndex);
  const b = partOf(second, secondLevel, secondIndex);
  const firstLength = first.length * 2 ** -firstLevel;
  const secondLength = second.length * 2 ** -secondLevel;
  const longer = Math.max(firstLength, secondLength);
  let distance = Infinity;
  for (const image of kernel.images) distance = Math.min(distance, segmentDistance(a, imageOf(b, image)));
  if (farRatio * longer <= distance) return addProduct(pair, firstLevel, firstIndex, secondLevel, secondIndex);
  const { corner } = pair;
  if (corner !== null && 0 < firstLevel && 0 < secondLevel && longer <= 2 * Math.min(firstLength, secondLength)
    && firstIndex === (corner.firstAtEnd ? 2 ** firstLevel - 1 : 0) && secondIndex === (corner.secondAtEnd ? 2 ** secondLevel - 1 : 0)) {
    return addMeeting(pair, corner, firstLevel, secondLevel);
  }
  if (deepest <= firstLevel && deepest <= secondLevel) return addProduct(pair, firstLevel, firstIndex, secondLevel, secondIndex);
  if (secondLength <= firstLength && firstLevel < deepest || deepest <= secondLevel) {
    visit(pair, firstLevel + 1, 2 * firstIndex, secondLevel, secondIndex);
    visit(pair, firstLevel + 1, 2 * firstIndex + 1, secondLevel, secondIndex);
  } else {
    visit(pair, firstLevel, firstIndex, secondLevel + 1, 2 * secondIndex);
    visit(pair, firstLevel, firstIndex, secondLevel + 1, 2 * secondIndex + 1);
  }
}

function partOf({ x0, y0, x1, y1 }: Segment, level: number, index: number): Segment {
  const from = index * 2 ** -level;
  const to = (index + 1) * 2 ** -level;
  return { x0: x0 + (x1 - x0) * from, y0: y0 + (y1 - y0) * from, x1: x0 + (x1 - x0) * to, y1: y0 + (y1 - y0) * to };
}

const ruleOf = ({ basis, order }: Side, level: number, index: number): PartRule => (level === 0 ? basis.whole(Math.min(order + 8, 24)) : basis.part(level, index));

function addProduct({ first, second, kernel, block }: Pair, firstLevel: number, firstIndex: number, secondLevel: number, secondIndex: number): void {
  const firstRule = ruleOf(first, firstLevel, firstIndex);
  const secondRule = ruleOf(second, secondLevel, secondIndex);
  const p = pointsOn(first, firstRule.t);
  const q = pointsOn(second, secondRule.t);
  if (kernel.logarithm === null) {
    addProductOf(firstRule, secondRule, first.order, second.order, block, (i, j) => kernel.value(p.x[i] - q.x[j], p.y[i], q.y[j]));
  } else {
    const { sign, shift } = kernel.images[0];
    const half = kernel.logarithm / 2;
    addProductOf(firstRule, secondRule, first.order, second.order, block, (i, j) => {
      const dx = p.x[i] - q.x[j];
      const dy = p.y[i] - sign * q.y[j] - shift;
      return half * Math.log(dx * dx + dy * dy);
    });
  }
}

const row = new Float64Array(polynomialLimit);

/** block[m, n] += sum over i, j of first[i, m] value(i, j) second[j, n]. */
export function addProductOf(first: PartRule, second: PartRule, rows: number, columns: number, block: Float64Array, value: (i: number, j: number) => number): void {
  for (let i = 0; i < first.count; i += 1) {
    for (let n = 0; n < columns; n += 1) row[n] = 0;
    for (let j = 0; j < second.count; j += 1) {
      const v = value(i, j);
      const at = j * polynomialLimit;
      for (let n = 0; n < columns; n += 1) row[n] += v * second.weighted[at + n];
    }
    for (let m = 0; m < rows; m += 1) {
      const weight = first.weighted[i * polynomialLimit + m];
      for (let n = 0; n < columns; n += 1) block[m * columns + n] += weight * row[n];
    }
  }
}

const meeting = new Float64Array(polynomialLimit * polynomialLimit);

function addMeeting({ first, second, kernel, block }: Pair, { firstAtEnd, secondAtEnd, cosine }: Corner, firstLevel: number, secondLevel: number): void {
  const rows = first.order;
  const columns = second.order;
  meeting.fill(0, 0, rows * columns);
  addCorner(
    { basis: firstAtEnd ? first.basis.reversed() : first.basis, level: firstLevel, length: first.length * 2 ** -firstLevel },
    { basis: secondAtEnd ? second.basis.reversed() : second.basis, level: secondLevel, length: second.length * 2 ** -secondLevel },
    cosine, rows, columns, meeting,
  );
  const factor = -(kernel.logarithm ?? 0);
  for (let m = 0; m < rows; m += 1) {
    for (let n = 0; n < columns; n += 1) {
      // Run through backwards, p_m changes its sign with its parity.
      const odd = (firstAtEnd ? m : 0) + (secondAtEnd ? n : 0);
      block[m * columns + n] += (odd % 2 === 0 ? factor : -factor) * meeting[m * columns + n];
    }
  }
}

function cornerOf(first: Side, second: Segment): Corner | null {
  for (const firstAtEnd of [false, true]) {
    for (const secondAtEnd of [false, true]) {
      const [x, y, fx, fy] = firstAtEnd ? [first.x1, first.y1, first.x0, first.y0] : [first.x0, first.y0, first.x1, first.y1];
      const [u, v, gx, gy] = secondAtEnd ? [second.x1, second.y1, second.x0, second.y0] : [second.x0, second.y0, second.x1, second.y1];
      if (Math.hypot(x - u, y - v) <= 1e-12 * first.length) {
        const cosine = ((fx - x) * (gx - x) + (fy - y) * (gy - y)) / (Math.hypot(fx - x, fy - y) * Math.hypot(gx - x, gy - y));
        return { firstAtEnd, secondAtEnd, cosine };
      }
    }
  }
  return null;
}
