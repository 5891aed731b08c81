/**
 * Flux through a panel of the images that the layers make of a charge, where one of those is near: both sides are halved
 * until their parts are short beside its distance.
 */
import type { Segment, Side } from '../basis/side';
import { segmentDistance } from '../galerkin/segmentDistance';
import type { Image, KernelRest } from '../kernel/layeredKernel';
import { addProduct, forgetLines, plainBasis } from './fluxProduct';
import { nearRule } from './nearRules';

/** Halved where an image of the source is near, until the parts are short beside its distance. */
export function addNearRest(rest: KernelRest, target: Side, source: Side, scale: number, block: Float64Array): void {
  // The logarithms are not singular at the same places and are added by themselves.
  forgetLines();
  visit({ rest, target, source, scale, block }, 0, 0, 0, 0);
}

interface NearRest {
  readonly rest: KernelRest;
  readonly target: Side;
  readonly source: Side;
  readonly scale: number;
  readonly block: Float64Array;
}

/** A part may be this much longer than the distance: the rest is itself a correction. */
const restRatio = 1 / 2;
const deepestRest = 8;

function visit(near: NearRest, targetLevel: number, targetIndex: number, sourceLevel: number, sourceIndex: number): void {
  const { rest, target, source, scale, block } = near;
  const targetLength = target.length * 2 ** -targetLevel;
  const sourceLength = source.length * 2 ** -sourceLevel;
  const distance = partDistance(rest.images, target, targetIndex * 2 ** -targetLevel, 2 ** -targetLevel, source, sourceIndex * 2 ** -sourceLevel, 2 ** -sourceLevel);
  if (restRatio * Math.max(targetLength, sourceLength) <= distance || (deepestRest <= targetLevel && deepestRest <= sourceLevel)) {
    const targetRule = nearRule(plainBasis(), targetLevel, targetIndex, distance / targetLength, target.order);
    addProduct(target, source, targetRule, nearRule(source.basis, sourceLevel, sourceIndex, distance / sourceLength, source.order), rest.families, scale, block);
  } else if ((sourceLength <= targetLength && targetLevel < deepestRest) || deepestRest <= sourceLevel) {
    visit(near, targetLevel + 1, 2 * targetIndex, sourceLevel, sourceIndex);
    visit(near, targetLevel + 1, 2 * targetIndex + 1, sourceLevel, sourceIndex);
  } else {
    visit(near, targetLevel, targetIndex, sourceLevel + 1, 2 * sourceIndex);
    visit(near, targetLevel, targetIndex, sourceLevel + 1, 2 * sourceIndex + 1);
  }
}

const targetPart = { x0: 0, y0: 0, x1: 0, y1: 0 };
const sourcePart = { x0: 0, y0: 0, x1: 0, y1: 0 };

/** Of a part of the target, [from, from + size] of its length, from the images of a part of the source. */
function partDistance(images: readonly Image[], target: Segment, from: number, size: number, source: Segment, sourceFrom: number, sourceSize: number): number {
  targetPart.x0 = alongX(target, from);
  targetPart.y0 = alongY(target, from);
  targetPart.x1 = alongX(target, from + size);
  targetPart.y1 = alongY(target, from + size);
  sourcePart.x0 = alongX(source, sourceFrom);
  sourcePart.x1 = alongX(source, sourceFrom + sourceSize);
  let distance = Infinity;
  for (let i = 0; i < images.length; i += 1) {
    const { sign, shift } = images[i];
    sourcePart.y0 = sign * alongY(source, sourceFrom) + shift;
    sourcePart.y1 = sign * alongY(source, sourceFrom + sourceSize) + shift;
    distance = Math.min(distance, segmentDistance(targetPart, sourcePart));
  }
  return distance;
}

const alongX = ({ x0, x1 }: Segment, t: number) => x0 + (x1 - x0) * t;
const alongY = ({ y0, y1 }: Segment, t: number) => y0 + (y1 - y0) * t;
