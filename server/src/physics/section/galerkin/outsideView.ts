/**
 * What the rest of a section sees of one conductor: a few points where its potential is felt, and a few charges that it answers with.
 *
 *      |    ____    |         Model     everything else lies beyond two upright lines, and so do all its images in horizontal
 *    | |   /____\   | |                 planes: whatever it does here is harmonic between them
 *      |<->      <->|         Method    training fields from charges on the two lines. Points: skeleton.ts. Charges: the conductor's
 *      distance                         own, and its answers to the training fields as far as they are independent; orthonormal in
 *                                       the energy, so that the conductor's own block is the unit matrix
 *
 * What is left out of the charge is of second order in C (Thomson). The same is made for the shorter polynomial series of layout.ts,
 * with which the error bar compares.
 *
 * Source    reduced bases: textbook, from memory
 * Accuracy  1e-5 of C, mutuals of a ten-thousandth included (the test, against the system of all polynomials)
 */
import { cholesky, forwardSubstitute } from '../../../numeric/cholesky';
import type { ChargedConductor } from '../basis/chargedConductor';
import type { Kernel } from '../kernel/layeredKernel';
import { layOut } from './layout';
import { extentOf, mirrorPairs, nodesWithin } from './momentNodes';
import { ownBlock } from './ownBlock';
import { pivotedBasis } from './pivotedBasis';
import { preferenceOf, skeletonOf, type Skeleton } from './skeleton';
import { trainingFields, type TrainingFields } from './trainingFields';

export interface OutsideView {
  readonly charges: number;
  /** Net charge of the first one, the others have none: of all polynomials, and of the shorter series. */
  readonly fineNet: number;
  readonly coarseNet: number;
  readonly near: Sight;
  /** For what is at least `farDistance` away: fewer points, found when first asked for. */
  readonly far: () => Sight;
  readonly farDistance: number;
  /** Of the polynomials behind it. */
  readonly unknowns: number;
}

export interface Sight {
  readonly points: number;
  /** From the left end of the conductor's foot, and absolute. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** 2 charges × points: what each charge is worth at each point, of all polynomials and then of the shorter series. */
  readonly worth: Float64Array;
}

/** Square root of the energy of an answer, to a field that changes by 1 across the conductor. */
const leastAnswer = 3e-4;

export interface Outside {
  readonly kernel: Kernel;
  readonly distance: number;
  /** At which a second view is made, with fewer points. */
  readonly farDistance: number;
  /** On every potential. */
  readonly constant: number;
}

/** Null where the conductor's own block is not positive definite. */
export function outsideView(conductor: ChargedConductor, { kernel, distance, farDistance, constant }: Outside): OutsideView | null {
  const { unknowns, coarse, rows: [rows], charges: [netRows] } = layOut([conductor]);
  const lower = ownFactor(ownBlock(conductor, kernel), constant, { rows, charges: netRows, unknowns });
  if (lower === null) return null;
  const net = new Float64Array(unknowns);
  for (const row of netRows) net[row] = 1;
  forwardSubstitute(lower, unknowns, net);
  const sides = conductor.atOrigin();
  const { left, right } = extentOf(sides);
  const seenFrom = (least: number) => {
    const nodes = nodesWithin(sides, { left: left - least, right: right + least });
    const pairs = mirrorPairs(nodes);
    const fields = trainingFields(nodes, pairs, least, conductor.effort);
    const skeleton = skeletonOf(nodes, pairs, fields, { rows, effort: conductor.effort, lean: conductor.lean });
    forwardSubstitute(lower, unknowns, skeleton.moments, skeleton.points);
    return { fields, skeleton };
  };
  const near = seenFrom(distance);
  const answers = answersOf(near.skeleton, near.fields, unknowns);
  const least = leastAnswer / 3 ** conductor.effort;
  const { heights } = near.fields;
  const preference = preferenceOf(2 * heights.length, (f) => heights[f % heights.length], conductor.lean);
  const fine = chargesOf({ answers, net, least, preference }, unknowns, null);
  const coarseCharges = chargesOf({ answers, net, least, preference }, coarse, fine.count);
  const sight = ({ points, x, y, moments }: Skeleton): Sight => ({ points, x, y, worth: worthOf(fine, coarseCharges, moments, points, unknowns) });
  const nearSight = sight(near.skeleton);
  let farSight = distance < farDistance ? null : nearSight;
  return {
    charges: fine.count, fineNet: fine.net, coarseNet: coarseCharges.net, unknowns,
    near: nearSight, far: () => (farSight ??= sight(seenFrom(farDistance).skeleton)), farDistance: Math.max(distance, farDistance),
  };
}

interface OwnLayout {
  readonly rows: Int32Array;
  readonly charges: Int32Array;
  readonly unknowns: number;
}

function ownFactor(own: Float64Array, constant: number, { rows, charges, unknowns }: OwnLayout): Float64Array | null {
  const lower = new Float64Array(unknowns * unknowns);
  for (let a = 0, at = 0; a < unknowns; a += 1) {
    for (let b = 0; b < unknowns; b += 1, at += 1) if (rows[b] <= rows[a]) lower[rows[a] * unknowns + rows[b]] = own[at];
  }
  for (const row of charges) for (const column of charges) if (column <= row) lower[row * unknowns + column] += constant;
  return cholesky(lower, unknowns) ? lower : null;
}

/** fields × unknowns, but for the constant: the conductor's own charge answers that. */
function answersOf({ points, taken, moments }: Skeleton, { even, odd }: TrainingFields, unknowns: number): Float64Array {
  const half = points / 2;
  const answers = new Float64Array((even.count - 1 + odd.count) * unknowns);
  const [sum, difference] = [new Float64Array(unknowns), new Float64Array(unknowns)];
  for (let p = 0; p < half; p += 1) {
    for (let m = 0; m < unknowns; m += 1) {
      sum[m] = moments[p * unknowns + m] + moments[(half + p) * unknowns + m];
      difference[m] = moments[p * unknowns + m] - moments[(half + p) * unknowns + m];
    }
    for (let f = 0; f < even.count - 1; f += 1) addScaled(even.values[taken[p] * even.count + f], sum, answers, f * unknowns);
    for (let f = 0; f < odd.count; f += 1) addScaled(odd.values[taken[p] * odd.count + f], difference, answers, (even.count - 1 + f) * unknowns);
  }
  return answers;
}

function addScaled(scale: number, from: Float64Array, to: Float64Array, at: number): void {
  for (let m = 0; m < from.length; m += 1) to[at + m] += scale * from[m];
}

interface Answers {
  readonly answers: Float64Array;
  readonly net: Float64Array;
  /** Smaller ones are left out. */
  readonly least: number;
  readonly preference: Float64Array;
}

interface Charges {
  readonly count: number;
  /** count × length, orthonormal. */
  readonly vectors: Float64Array;
  readonly length: number;
  readonly net: number;
}

/** With the first `length` unknowns only; as many charges as are wanted, or as are needed. */
function chargesOf({ answers, net, least, preference }: Answers, length: number, wanted: number | null): Charges {
  const unknowns = net.length;
  const count = answers.length / unknowns;
  const square = product(net, 0, net, 0, length);
  const own = Math.sqrt(square);
  const vectors = new Float64Array(count * length);
  for (let f = 0; f < count; f += 1) {
    const part = product(answers, f * unknowns, net, 0, length) / square;
    for (let m = 0; m < length; m += 1) vectors[f * length + m] = answers[f * unknowns + m] - part * net[m];
  }
  const { pivots } = pivotedBasis([{ vectors, count, length, preference }], least, (wanted ?? length) - 1);
  // Where the shorter series has fewer that are independent, the others are nothing.
  const taken = new Float64Array((wanted ?? pivots.length + 1) * length);
  for (let m = 0; m < length; m += 1) taken[m] = net[m] / own;
  pivots.forEach((f, c) => taken.set(vectors.subarray(f * length, (f + 1) * length), (c + 1) * length));
  return { count: taken.length / length, vectors: taken, length, net: own };
}

function worthOf(fine: Charges, coarse: Charges, moments: Float64Array, points: number, unknowns: number): Float64Array {
  const worth = new Float64Array(2 * fine.count * points);
  [fine, coarse].forEach(({ count, vectors, length }, which) => {
    for (let c = 0; c < count; c += 1) {
      for (let p = 0; p < points; p += 1) worth[(which * count + c) * points + p] = product(vectors, c * length, moments, p * unknowns, length);
    }
  });
  return worth;
}

function product(a: Float64Array, from: number, b: Float64Array, to: number, length: number): number {
  let sum = 0;
  for (let m = 0; m < length; m += 1) sum += a[from + m] * b[to + m];
  return sum;
}
