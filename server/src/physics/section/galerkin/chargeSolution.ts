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
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { Side } from '../basis/side';
import type { Kernel } from '../kernel/layeredKernel';
import { writeSideBlock } from './sideBlock';

export interface ChargeProblem {
  readonly sides: readonly Side[];
  /** Of the matrix asked for, in order; other conductors are at zero potential. */
  readonly conductors: readonly number[];
  readonly kernel: (lower: number, upper: number) => Kernel;
  /** The constant on every potential, or null where planes give it a zero. */
  readonly constant: number | null;
}

export interface ChargeSolution {
  readonly order: number;
  readonly fine: Float64Array;
  readonly coarse: Float64Array;
  readonly unknowns: number;
}

/** Null where the matrix is not positive definite: some integral was not accurate enough. */
export function chargeSolution({ sides, conductors, kernel, constant }: ChargeProblem): ChargeSolution | null {
  const layout = layOut(sides);
  const matrix = assembled(sides, layout, kernel);
  const { unknowns, coarse } = layout;
  if (constant !== null) {
    // The net charges are the only ones that a constant acts on.
    for (const row of layout.start) for (const column of layout.start) if (column <= row) matrix[row * unknowns + column] += constant;
  }
  if (!cholesky(matrix, unknowns)) return null;
  const count = conductors.length + (constant === null ? 0 : 1);
  const right = new Float64Array(count * unknowns);
  sides.forEach((side, s) => {
    const index = conductors.indexOf(side.conductor);
    if (0 <= index) right[index * unknowns + layout.start[s]] = 1;
    if (constant !== null) right[conductors.length * unknowns + layout.start[s]] = 1;
  });
  forwardSubstitute(matrix, unknowns, right, count);
  const products = (to: number) => innerProducts(right, unknowns, to, count);
  const finish = (to: number) => (constant === null ? products(to) : neutral(products(to), count));
  return { order: conductors.length, fine: finish(unknowns), coarse: finish(coarse), unknowns };
}

interface Layout {
  readonly unknowns: number;
  /** Unknowns without the highest polynomials. */
  readonly coarse: number;
  /** Of each side's net charge, and of the highest polynomials. */
  readonly start: Int32Array;
  readonly highest: Int32Array;
}

/** Polynomials that the coarser answer goes without. */
export const leftOut = (order: number) => (order < 4 ? 1 : 2);

function layOut(sides: readonly Side[]): Layout {
  const start = new Int32Array(sides.length);
  const highest = new Int32Array(sides.length);
  let at = 0;
  sides.forEach(({ order }, s) => {
    start[s] = at;
    at += order - leftOut(order);
  });
  const coarse = at;
  sides.forEach(({ order }, s) => {
    highest[s] = at;
    at += leftOut(order);
  });
  return { unknowns: at, coarse, start, highest };
}

const block = new Float64Array(polynomialLimit * polynomialLimit);

/** The lower triangle. */
function assembled(sides: readonly Side[], { unknowns, start, highest }: Layout, kernel: ChargeProblem['kernel']): Float64Array {
  const matrix = new Float64Array(unknowns * unknowns);
  const place = (s: number, m: number) => {
    const kept = sides[s].order - leftOut(sides[s].order);
    return m < kept ? start[s] + m : highest[s] + m - kept;
  };
  for (let s = 0; s < sides.length; s += 1) {
    for (let t = 0; t <= s; t += 1) {
      const [upper, lower] = sides[s].layer < sides[t].layer ? [t, s] : [s, t];
      const columns = sides[lower].order;
      writeSideBlock(sides[upper], sides[lower], kernel(sides[lower].layer, sides[upper].layer), block);
      for (let m = 0; m < sides[upper].order; m += 1) {
        const i = place(upper, m);
        for (let n = 0; n < columns; n += 1) {
          const j = place(lower, n);
          matrix[i < j ? j * unknowns + i : i * unknowns + j] = block[m * columns + n];
        }
      }
    }
  }
  return matrix;
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
