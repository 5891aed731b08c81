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
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Segment, Side } from '../basis/side';
import type { Image, KernelRest } from '../kernel/layeredKernel';
import { addCorner } from './cornerBlock';
import { addLogarithms, addRest, finishPairs, startPairs } from './pointPairs';
import { segmentDistance } from './segmentDistance';

/** `factor` ln r from one image of the second side, which may share a corner with the first; or what is finite everywhere. */
export type PairKernel =
  | { readonly factor: number; readonly image: Image }
  | { readonly rest: KernelRest };

export const farRatio = 0.6;
/** Halving stops here: parts of a millionth of a side. What is nearer than that has been refused before. */
const deepest = 20;

/** Adds to `block`, first.order × second.order. */
export function addPairIntegral(first: Side, second: Side, kernel: PairKernel, block: Float64Array): void {
  const corner = 'rest' in kernel ? null : cornerOf(first, imageOf(second, kernel.image));
  const images = imagesOf(kernel);
  visit({ first, second, kernel, images, block, corner }, 0, 0, 0, 0);
}

export const imagesOf = (kernel: PairKernel): readonly Image[] => ('rest' in kernel ? kernel.rest.images : [kernel.image]);

/** Smallest distance of the first segment from any image of the second. */
export function distanceToImages(first: Segment, second: Segment, images: readonly Image[]): number {
  let distance = Infinity;
  for (const image of images) distance = Math.min(distance, segmentDistance(first, writeImage(second, image, imaged)));
  return distance;
}

interface MutableSegment {
  x0: number;
  y0: number;
  x1: number;
  y1: number;
}

const blank = (): MutableSegment => ({ x0: 0, y0: 0, x1: 0, y1: 0 });
const imaged = blank();
const firstPart = blank();
const secondPart = blank();

function writeImage({ x0, y0, x1, y1 }: Segment, { sign, shift }: Image, into: MutableSegment): MutableSegment {
  into.x0 = x0;
  into.y0 = sign * y0 + shift;
  into.x1 = x1;
  into.y1 = sign * y1 + shift;
  return into;
}

export const imageOf = (segment: Segment, image: Image): Segment => writeImage(segment, image, blank());

interface Pair {
  readonly first: Side;
  readonly second: Side;
  readonly kernel: PairKernel;
  readonly images: readonly Image[];
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
  const { first, second } = pair;
  const firstLength = first.length * 2 ** -firstLevel;
  const secondLength = second.length * 2 ** -secondLevel;
  const longer = Math.max(firstLength, secondLength);
  const distance = distanceToImages(writePart(first, firstLevel, firstIndex, firstPart), writePart(second, secondLevel, secondIndex, secondPart), pair.images);
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

function writePart({ x0, y0, x1, y1 }: Segment, level: number, index: number, into: MutableSegment): MutableSegment {
  const size = 2 ** -level;
  const from = index * size;
  const to = from + size;
  into.x0 = x0 + (x1 - x0) * from;
  into.y0 = y0 + (y1 - y0) * from;
  into.x1 = x0 + (x1 - x0) * to;
  into.y1 = y0 + (y1 - y0) * to;
  return into;
}

const ruleOf = ({ basis, order }: Side, level: number, index: number): PartRule => (level === 0 ? basis.whole(order + 8) : basis.part(level, index));

function addProduct({ first, second, kernel, block }: Pair, firstLevel: number, firstIndex: number, secondLevel: number, secondIndex: number): void {
  const rules = { first: ruleOf(first, firstLevel, firstIndex), second: ruleOf(second, secondLevel, secondIndex) };
  startPairs(rules, first, second);
  if ('rest' in kernel) addRest(rules, kernel.rest);
  else addLogarithms(rules, kernel.factor, kernel.image);
  finishPairs(rules, { rows: first.order, columns: second.order, stride: second.order }, block);
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
  const factor = 'rest' in kernel ? 0 : -kernel.factor;
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
