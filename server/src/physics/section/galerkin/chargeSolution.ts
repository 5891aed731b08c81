/**
 * Charges of conductors at unit potentials, and from them the capacitance matrix, at two degrees of the charge series at once.
 *
 *   A Q = V     A  Galerkin matrix of the sides, symmetric positive definite        Method  A = L L^T,  L Y = B,
 *               B  ones in the net-charge row of every side of a conductor                  C = Y^T Y
 *
 * With the highest polynomials of every side ordered last, the leading rows of Y are those of the system without them:
 * C of the lower degree is the same sum cut short. Two are left out together, one even and one odd: a charge that is nearly
 * symmetric hardly takes the odd one, and the difference to one degree less was seen to miss errors four times its size.
 *
 * Model     without a plane the potential has no zero: only charge-neutral states count. A constant on every potential
 *           changes none of them; one large enough makes A positive definite, and the projection
 *           C - (C 1)(C 1)^T / (1^T C 1) removes it
 * Source    Harrington 1968 for the moment method; Weeks 1970; Kelvin's and Thomson's theorems in any textbook
 * Accuracy  C in units of 2 pi eps0. The constant is removed to 1e-15 times its size
 */
import { cholesky, forwardSubstitute } from '../../../numeric/cholesky';
import type { ChargedConductor } from '../basis/chargedConductor';
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { Side } from '../basis/side';
import type { Kernel } from '../kernel/layeredKernel';
import { ownBlock } from './ownBlock';
import { writeSideBlock } from './sideBlock';

export interface ChargeProblem {
  readonly conductors: readonly ChargedConductor[];
  /** Of the matrix asked for, in order; other conductors are at zero potential. */
  readonly signals: readonly number[];
  readonly kernel: (lower: number, upper: number) => Kernel;
  /** On every potential, or null where planes give it a zero. */
  readonly constant: number | null;
}

export interface ChargeSolution {
  readonly order: number;
  readonly fine: Float64Array;
  readonly coarse: Float64Array;
  readonly unknowns: number;
}

/** Null where the matrix is not positive definite: some integral was not accurate enough. */
export function chargeSolution({ conductors, signals, kernel, constant }: ChargeProblem): ChargeSolution | null {
  const layout = layOut(conductors);
  const { unknowns, coarse, sides } = layout;
  const matrix = new Float64Array(unknowns * unknowns);
  conductors.forEach((conductor, index) => {
    placeOwn(conductor, index, layout, kernel, matrix);
    for (let other = 0; other < index; other += 1) placeMutual(layout, [index, other], kernel, matrix);
  });
  if (constant !== null) {
    // Only net charges feel a constant.
    for (const { start: row } of sides) for (const { start: column } of sides) if (column <= row) matrix[row * unknowns + column] += constant;
  }
  if (!cholesky(matrix, unknowns)) return null;
  const count = signals.length + (constant === null ? 0 : 1);
  const right = new Float64Array(count * unknowns);
  for (const { side, start } of sides) {
    const index = signals.indexOf(side.conductor);
    if (0 <= index) right[index * unknowns + start] = 1;
    if (constant !== null) right[signals.length * unknowns + start] = 1;
  }
  forwardSubstitute(matrix, unknowns, right, count);
  const finish = (to: number) => {
    const products = innerProducts(right, unknowns, to, count);
    return constant === null ? products : neutral(products, count);
  };
  return { order: signals.length, fine: finish(unknowns), coarse: finish(coarse), unknowns };
}

interface Layout {
  readonly unknowns: number;
  /** Unknowns without the highest polynomials. */
  readonly coarse: number;
  readonly sides: readonly PlacedSide[];
  /** Where each conductor's sides begin among them; one more at the end. */
  readonly firstSide: readonly number[];
}

interface PlacedSide {
  readonly side: Side;
  /** Polynomials of the coarser answer, and where they begin; where the others do. */
  readonly kept: number;
  readonly start: number;
  readonly highest: number;
}

/** Polynomials that the coarser answer goes without. */
export const leftOut = (order: number) => (order < 4 ? 1 : 2);

function layOut(conductors: readonly ChargedConductor[]): Layout {
  const all = conductors.flatMap(({ sides }) => sides);
  const coarse = all.reduce((sum, { order }) => sum + order - leftOut(order), 0);
  let start = 0;
  let highest = coarse;
  const sides = all.map((side) => {
    const kept = side.order - leftOut(side.order);
    const placed = { side, kept, start, highest };
    start += kept;
    highest += side.order - kept;
    return placed;
  });
  const firstSide = [0];
  for (const { sides: own } of conductors) firstSide.push(firstSide[firstSide.length - 1] + own.length);
  return { unknowns: highest, coarse, sides, firstSide };
}

const rowOf = ({ kept, start, highest }: PlacedSide, m: number) => (m < kept ? start + m : highest + m - kept);

/** The lower triangle of a conductor's own block. */
function placeOwn(conductor: ChargedConductor, index: number, { unknowns, sides, firstSide }: Layout, kernel: ChargeProblem['kernel'], matrix: Float64Array): void {
  const { layer } = conductor.sides[0];
  const own = ownBlock(conductor, kernel(layer, layer));
  const rows: number[] = [];
  for (let s = firstSide[index]; s < firstSide[index + 1]; s += 1) {
    for (let m = 0; m < sides[s].side.order; m += 1) rows.push(rowOf(sides[s], m));
  }
  for (let a = 0; a < rows.length; a += 1) {
    for (let b = 0; b <= a; b += 1) matrix[Math.max(rows[a], rows[b]) * unknowns + Math.min(rows[a], rows[b])] = own[a * rows.length + b];
  }
}

const block = new Float64Array(polynomialLimit * polynomialLimit);

function placeMutual({ unknowns, sides, firstSide }: Layout, [first, second]: readonly [number, number], kernel: ChargeProblem['kernel'], matrix: Float64Array): void {
  // The kernel wants the conductor in the higher layer first.
  const [above, below] = sides[firstSide[first]].side.layer < sides[firstSide[second]].side.layer ? [second, first] : [first, second];
  const between = kernel(sides[firstSide[below]].side.layer, sides[firstSide[above]].side.layer);
  for (let s = firstSide[above]; s < firstSide[above + 1]; s += 1) {
    for (let t = firstSide[below]; t < firstSide[below + 1]; t += 1) {
      const [upper, lower] = [sides[s], sides[t]];
      const columns = lower.side.order;
      writeSideBlock(upper.side, lower.side, between, block);
      for (let m = 0; m < upper.side.order; m += 1) {
        const i = rowOf(upper, m);
        for (let n = 0; n < columns; n += 1) {
          const j = rowOf(lower, n);
          matrix[i < j ? j * unknowns + i : i * unknowns + j] = block[m * columns + n];
        }
      }
    }
  }
}

function innerProducts(rows: Float64Array, stride: number, to: number, count: number): Float64Array {
  const products = new Float64Array(count * count);
  for (let a = 0; a < count; a += 1) {
    for (let b = 0; b <= a; b += 1) {
      let sum = 0;
      for (let i = 0; i < to; i += 1) sum += rows[a * stride + i] * rows[b * stride + i];
      products[a * count + b] = products[b * count + a] = sum;
    }
  }
  return products;
}

/** The last row and column belong to all conductors at potential 1 together. */
function neutral(products: Float64Array, count: number): Float64Array {
  const order = count - 1;
  const all = products[count * count - 1];
  const result = new Float64Array(order * order);
  for (let a = 0; a < order; a += 1) {
    for (let b = 0; b < order; b += 1) result[a * order + b] = products[a * count + b] - (products[a * count + order] * products[b * count + order]) / all;
  }
  return result;
}
