/**
 * The block of the Galerkin matrix that belongs to two sides: every part of the kernel by the means it needs.
 *
 * Method    a part that is far compared with the sides is evaluated from node to node: for polynomials times the edge
 *           weight that *is* the double integral, to the order of the Gauss rules. What is near goes to pairIntegral; a
 *           side on itself to its table. A side that lies in the interface of a mirror coincides with its image there, so
 *           that the mirror's factor simply adds to the direct one
 */
import type { Side } from '../basis/side';
import type { Kernel, Mirror } from '../kernel/layeredKernel';
import { addPairIntegral, distanceToImages, farRatio, imagesOf, type PairKernel } from './pairIntegral';
import { addLogarithms, addRest, finishPairs, startPairs } from './pointPairs';

/** Sides closer to an interface than this part of their length lie in it. */
const contact = 1e-9;
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
  const parts: PairKernel[] = apart.map(({ factor, at }) => ({ factor: -factor, image: { sign: -1, shift: 2 * at } }));
  if (upper === lower) addSelf(upper, direct, block);
  else if (direct !== 0) parts.push({ factor: -direct, image: identity });
  if (kernel.rest !== null) parts.push({ rest: kernel.rest });
  const longer = Math.max(upper.length, lower.length);
  const far: PairKernel[] = [];
  let nearest = Infinity;
  for (const part of parts) {
    const distance = distanceToImages(upper, lower, imagesOf(part));
    if (distance < farRatio * longer) {
      addPairIntegral(upper, lower, part, block);
    } else {
      far.push(part);
      nearest = Math.min(nearest, distance);
    }
  }
  if (0 < far.length) addFar(upper, lower, far, nearest, block);
}

const liesIn = ({ y0, y1, length }: Side, height: number) => Math.abs(y0 - height) <= contact * length && Math.abs(y1 - height) <= contact * length;

function addSelf({ basis, order, length }: Side, factor: number, block: Float64Array): void {
  const { entries, stride } = basis.self(order);
  for (let m = 0; m < order; m += 1) {
    for (let n = 0; n < order; n += 1) block[m * order + n] += factor * entries[m * stride + n];
  }
  // -ln of half the length, which scales u to metres, meets the net charge only.
  block[0] -= factor * Math.log(length / 2);
}

function addFar(upper: Side, lower: Side, parts: readonly PairKernel[], distance: number, block: Float64Array): void {
  const rules = { first: upper.basis.whole(farPoints(distance / upper.length)), second: lower.basis.whole(farPoints(distance / lower.length)) };
  startPairs(rules, upper, lower);
  for (const part of parts) {
    if ('rest' in part) addRest(rules, part.rest);
    else addLogarithms(rules, part.factor, part.image);
  }
  // Polynomials that the rule cannot tell from lower ones see nothing of a kernel so smooth: their entries stay zero.
  finishPairs(rules, { rows: Math.min(upper.order, rules.first.count), columns: Math.min(lower.order, rules.second.count), stride: lower.order }, block);
}

/**
 * Nodes for a kernel whose nearest singularity is `relative` side lengths away: its polynomial content falls as
 * ellipse^-degree (Bernstein), and with n nodes the highest polynomial kept meets an error of ellipse^-(n + 1).
 */
export function farPoints(relative: number): number {
  return Math.ceil(9 / Math.log(2 * relative + Math.sqrt(4 * relative * relative + 1))) + 1;
}
