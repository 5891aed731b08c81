/**
 * Potential that the charge of one straight side makes on another that it does not touch, for every pair of polynomials.
 *
 *   block[m, n] = double integral of w p_m (on `upper`) w p_n (on `lower`) times the kernel
 *
 * As galerkin/sideBlock.ts, whose integrals go to 1e-8; what a film needs takes a third of the nodes.
 *
 * Method    what is far goes from node to node; what is near is halved until its parts are far
 * Accuracy  1e-6 of the largest entry and 1e-8 of the direct part (the test, against sideBlock)
 */
import type { Side } from '../basis/side';
import { segmentDistance } from '../galerkin/segmentDistance';
import { addLogarithms, addRest, finishPairs, startPairs, type PointPairs } from '../galerkin/pointPairs';
import type { Image, Kernel, KernelRest } from '../kernel/layeredKernel';
import { nearRule } from './nearRules';

/** Overwrites the first upper.order × lower.order entries of `block`; `kernel` is that of the sides' layers, `upper` in the higher one. */
export function writePotentialBlock(upper: Side, lower: Side, kernel: Kernel, block: Float64Array): void {
  block.fill(0, 0, upper.order * lower.order);
  far.length = 0;
  let nearest = Infinity;
  const take = (part: Part) => {
    const distance = distanceTo(part.images, upper, lower);
    if (distance < farRatio * Math.max(upper.length, lower.length)) visit({ upper, lower, part, block }, 0, 0, 0, 0);
    else {
      far.push(part);
      nearest = Math.min(nearest, distance);
    }
  };
  for (const part of partsOf(kernel)) take(part);
  if (0 < far.length) addProduct(upper, lower, far, rulesFor(upper, lower, nearest, 0, 0, 0, 0), block);
}

/** What is singular together: one logarithm, or the rest. */
interface Part {
  readonly factor: number;
  readonly images: readonly Image[];
  readonly rest: KernelRest | null;
}

const far: Part[] = [];
const partsKept = new WeakMap<Kernel, readonly Part[]>();

function partsOf(kernel: Kernel): readonly Part[] {
  let parts = partsKept.get(kernel);
  if (parts === undefined) {
    parts = [
      { factor: -kernel.direct, images: [{ sign: 1, shift: 0 }], rest: null },
      ...kernel.mirrors.map(({ factor, at }): Part => ({ factor: -factor, images: [{ sign: -1, shift: 2 * at }], rest: null })),
      ...(kernel.rest === null ? [] : [{ factor: 0, images: kernel.rest.images, rest: kernel.rest }]),
    ];
    partsKept.set(kernel, parts);
  }
  return parts;
}

const farRatio = 0.6;
/** Parts of a thousandth of a side: a film thinner than that beside the copper is refused. */
const deepest = 11;

interface Pair {
  readonly upper: Side;
  readonly lower: Side;
  readonly part: Part;
  readonly block: Float64Array;
}

interface MutableSegment { x0: number; y0: number; x1: number; y1: number }

const upperPart: MutableSegment = { x0: 0, y0: 0, x1: 0, y1: 0 };
const lowerPart: MutableSegment = { x0: 0, y0: 0, x1: 0, y1: 0 };

function visit(pair: Pair, upperLevel: number, upperIndex: number, lowerLevel: number, lowerIndex: number): void {
  const { upper, lower, part, block } = pair;
  const upperLength = upper.length * 2 ** -upperLevel;
  const lowerLength = lower.length * 2 ** -lowerLevel;
  const distance = distanceTo(part.images, writePart(upper, upperLevel, upperIndex, upperPart), writePart(lower, lowerLevel, lowerIndex, lowerPart));
  if (farRatio * Math.max(upperLength, lowerLength) <= distance || (deepest <= upperLevel && deepest <= lowerLevel)) {
    single[0] = part;
    addProduct(upper, lower, single, rulesFor(upper, lower, distance, upperLevel, upperIndex, lowerLevel, lowerIndex), block);
  } else if ((lowerLength <= upperLength && upperLevel < deepest) || deepest <= lowerLevel) {
    visit(pair, upperLevel + 1, 2 * upperIndex, lowerLevel, lowerIndex);
    visit(pair, upperLevel + 1, 2 * upperIndex + 1, lowerLevel, lowerIndex);
  } else {
    visit(pair, upperLevel, upperIndex, lowerLevel + 1, 2 * lowerIndex);
    visit(pair, upperLevel, upperIndex, lowerLevel + 1, 2 * lowerIndex + 1);
  }
}

const single: Part[] = [];

function rulesFor(upper: Side, lower: Side, distance: number, upperLevel: number, upperIndex: number, lowerLevel: number, lowerIndex: number): PointPairs {
  return {
    first: nearRule(upper.basis, upperLevel, upperIndex, (distance / upper.length) * 2 ** upperLevel, upper.order),
    second: nearRule(lower.basis, lowerLevel, lowerIndex, (distance / lower.length) * 2 ** lowerLevel, lower.order),
  };
}

function addProduct(upper: Side, lower: Side, parts: readonly Part[], rules: PointPairs, block: Float64Array): void {
  startPairs(rules, upper, lower);
  for (const { rest, factor, images } of parts) {
    if (rest === null) addLogarithms(rules, factor, images[0]);
    else addRest(rules, rest);
  }
  finishPairs(rules, { rows: upper.order, columns: lower.order, stride: lower.order }, block);
}

function writePart({ x0, y0, x1, y1 }: MutableSegment, level: number, index: number, into: MutableSegment): MutableSegment {
  const from = index * 2 ** -level;
  const to = (index + 1) * 2 ** -level;
  into.x0 = x0 + (x1 - x0) * from;
  into.y0 = y0 + (y1 - y0) * from;
  into.x1 = x0 + (x1 - x0) * to;
  into.y1 = y0 + (y1 - y0) * to;
  return into;
}

const imaged: MutableSegment = { x0: 0, y0: 0, x1: 0, y1: 0 };

function distanceTo(images: readonly Image[], upper: MutableSegment, { x0, y0, x1, y1 }: MutableSegment): number {
  let distance = Infinity;
  for (let i = 0; i < images.length; i += 1) {
    const { sign, shift } = images[i];
    imaged.x0 = x0;
    imaged.y0 = sign * y0 + shift;
    imaged.x1 = x1;
    imaged.y1 = sign * y1 + shift;
    distance = Math.min(distance, segmentDistance(upper, imaged));
  }
  return distance;
}
