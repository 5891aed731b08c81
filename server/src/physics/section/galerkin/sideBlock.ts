/**
 * The block of the Galerkin matrix that belongs to two sides: every part of the kernel by the means it needs.
 *
 * Method    a part that is far compared with the sides is evaluated from node to node: for polynomials times the edge
 *           weight that *is* the double integral, to the order of the Gauss rules. What is near goes to pairIntegral; a
 *           side on itself to its table. A side that lies in the interface of a mirror coincides with its image there, so
 *           that the mirror's factor simply adds to the direct one
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import { pointsOn, type Side } from '../basis/side';
import { restValue, type Kernel, type Mirror } from '../kernel/layeredKernel';
import { addPairIntegral, addProductOf, imageOf, type PairKernel } from './pairIntegral';
import { segmentDistance } from './segmentDistance';

/** Sides closer to an interface than this part of their length lie in it. */
const contact = 1e-9;
const farRatio = 0.6;
const identity = { sign: 1, shift: 0 } as const;

/** Overwrites the first upper.order × lower.order entries of `block`; `kernel` is that of the sides' layers, `upper` in the higher one. */
export function writeSideBlock(upper: Side, lower: Side, kernel: Kernel, block: Float64Array): void {
  block.fill(0, 0, upper.order * lower.order);
  let direct = kernel.direct;
  const apart: Mirror[] = [];
  for (const mirror of kernel.mirrors) {
    if (liesIn(upper, mirror.at) || liesIn(lower, mirror.at)) direct += mirror.factor;
    else apart.push(mirror);
  }
  const far: PairKernel[] = [];
  let nearest = Infinity;
  const longer = Math.max(upper.length, lower.length);
  const place = (part: PairKernel) => {
    let distance = Infinity;
    for (const image of part.images) distance = Math.min(distance, segmentDistance(upper, imageOf(lower, image)));
    if (distance < farRatio * longer) addPairIntegral(upper, lower, part, block);
    else {
      far.push(part);
      nearest = Math.min(nearest, distance);
    }
  };
  if (upper === lower) addSelf(upper, direct, block);
  else if (direct !== 0) place({ images: [identity], logarithm: -direct, value: () => 0 });
  for (const { factor, at } of apart) place({ images: [{ sign: -1, shift: 2 * at }], logarithm: -factor, value: () => 0 });
  const { rest } = kernel;
  if (rest !== null) place({ images: rest.images, logarithm: null, value: (dx, y, ySource) => restValue(rest, dx, y, ySource) });
  if (0 < far.length) addFar(upper, lower, far, nearest, block);
}

const liesIn = ({ y0, y1, length }: Side, height: number) => Math.abs(y0 - height) <= contact * length && Math.abs(y1 - height) <= contact * length;

function addSelf({ basis, order, length }: Side, factor: number, block: Float64Array): void {
  const self = basis.self();
  for (let m = 0; m < order; m += 1) {
    for (let n = 0; n < order; n += 1) block[m * order + n] += factor * self[m * polynomialLimit + n];
  }
  // -ln of half the length, which scales u to metres, meets the net charge only.
  block[0] -= factor * Math.log(length / 2);
}

function addFar(upper: Side, lower: Side, parts: readonly PairKernel[], distance: number, block: Float64Array): void {
  const upperRule = upper.basis.whole(farPoints(distance / upper.length, upper.order));
  const lowerRule = lower.basis.whole(farPoints(distance / lower.length, lower.order));
  const p = pointsOn(upper, upperRule.t);
  const q = pointsOn(lower, lowerRule.t);
  addProductOf(upperRule, lowerRule, upper.order, lower.order, block, (i, j) => {
    const dx = p.x[i] - q.x[j];
    let sum = 0;
    for (const { logarithm, images, value } of parts) {
      if (logarithm === null) sum += value(dx, p.y[i], q.y[j]);
      else {
        const dy = p.y[i] - images[0].sign * q.y[j] - images[0].shift;
        sum += (logarithm / 2) * Math.log(dx * dx + dy * dy);
      }
    }
    return sum;
  });
}

/** Nodes that leave 1e-8: the Gauss error is that of Bernstein's ellipse through the nearest singularity. */
function farPoints(relative: number, order: number): number {
  const ellipse = Math.log(2 * relative + Math.sqrt(4 * relative * relative + 1));
  return Math.max(Math.ceil(order / 2) + 1, Math.ceil(9.2 / ellipse + order / 4));
}
