/**
 * The equations of the charges that are even, or odd, about the middle of a section that is its own mirror image: half as many
 * each, an eighth of the work; or of all charges, where it is not.
 *
 *   A q = b      even and odd charges only see right sides of their own kind, so the rows of one half of the section
 *                and the columns of both, added with the kind's sign, say all
 *
 * Ordered so that the leading unknowns are those of a coarser system. Row-major.
 */
import { luInOrder, solveUnitLower, solveUpperTransposed } from '../../../numeric/luInOrder';
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { Side } from '../basis/side';

export interface Folding {
  /** mirrorImages.ts; null where the section is no image of itself. */
  readonly images: Int32Array | null;
  /** Of the charges: 1 for even, -1 for odd; unused without images. */
  readonly sign: 1 | -1;
  /** How many polynomials of each side the coarser system has. */
  readonly kept: Int32Array;
}

export interface Products {
  readonly fine: Float64Array;
  readonly coarse: Float64Array;
}

export class FoldedSystem {
  readonly unknowns: number;
  private readonly coarse: number;
  private readonly matrix: Float64Array;
  /** Of polynomial m of side s, at s × polynomialLimit + m: its unknown or -1, and its sign against it. */
  private readonly unknown: Int32Array;
  private readonly factor: Float64Array;

  constructor(private readonly sides: readonly Side[], private readonly folding: Folding, memory: (size: number) => Float64Array) {
    const { images, sign, kept } = folding;
    this.unknown = new Int32Array(sides.length * polynomialLimit).fill(-1);
    this.factor = new Float64Array(sides.length * polynomialLimit);
    let at = 0;
    const number = (take: (s: number, m: number) => boolean) => sides.forEach(({ order }, s) => {
      const image = images === null ? s : images[s];
      if (image < s) return;
      for (let m = 0; m < order; m += 1) {
        const parity = m % 2 === 0 ? sign : -sign;
        // A side across the middle has polynomials of either kind.
        if (!take(s, m) || (images !== null && image === s && parity < 0)) continue;
        this.unknown[s * polynomialLimit + m] = at;
        this.factor[s * polynomialLimit + m] = 1;
        if (image !== s) {
          this.unknown[image * polynomialLimit + m] = at;
          this.factor[image * polynomialLimit + m] = parity;
        }
        at += 1;
      }
    });
    number((s, m) => m < kept[s]);
    this.coarse = at;
    number((s, m) => kept[s] <= m);
    this.unknowns = at;
    this.matrix = memory(at * at);
    this.matrix.fill(0, 0, at * at);
  }

  /** Adds the entries of polynomial m of side `row` and n of `column`, at from + m × down + n × along; `row` precedes its image. */
  add(row: number, column: number, values: Float64Array, from: number, down: number, along: number): void {
    const { unknowns, unknown, factor, matrix } = this;
    const rows = this.sides[row].order;
    const columns = this.sides[column].order;
    const left = row * polynomialLimit;
    const top = column * polynomialLimit;
    for (let m = 0; m < rows; m += 1) {
      if (unknown[left + m] < 0) continue;
      const to = unknown[left + m] * unknowns;
      for (let n = 0; n < columns; n += 1) {
        if (0 <= unknown[top + n]) matrix[to + unknown[top + n]] += factor[top + n] * values[from + m * down + n * along];
      }
    }
  }

  /** `value` on the potential of each of the first `count` sides, of every charge there. */
  addConstant(count: number, value: number): void {
    for (let s = 0; s < count; s += 1) {
      const row = this.unknown[s * polynomialLimit];
      if (row < 0 || !this.leads(s)) continue;
      for (let t = 0; t < count; t += 1) {
        const column = this.unknown[t * polynomialLimit];
        if (0 <= column) this.matrix[row * this.unknowns + column] += value * this.factor[t * polynomialLimit];
      }
    }
  }

  /**
   * Of the charges that set i of sides collects when set j is at potential 1: entry i × sets + j, for all unknowns and for the
   * coarser system. Null where a pivot vanishes. The system is used up.
   */
  products(sets: readonly (readonly number[])[]): Products | null {
    const { unknowns } = this;
    const count = sets.length;
    const collected = new Float64Array(count * unknowns);
    const potentials = new Float64Array(count * unknowns);
    let any = false;
    sets.forEach((set, i) => {
      for (const s of set) {
        const at = this.unknown[s * polynomialLimit];
        if (at < 0) continue;
        const factor = this.factor[s * polynomialLimit];
        collected[i * unknowns + at] += factor;
        potentials[i * unknowns + at] += this.folding.images === null || this.folding.images[s] === s ? factor : factor / 2;
      }
    });
    for (let at = 0; at < potentials.length; at += 1) any ||= potentials[at] !== 0;
    if (!any) return { fine: new Float64Array(count * count), coarse: new Float64Array(count * count) };
    if (!luInOrder(this.matrix, unknowns)) return null;
    solveUnitLower(this.matrix, unknowns, potentials, count);
    solveUpperTransposed(this.matrix, unknowns, collected, count);
    return { fine: innerProducts(collected, potentials, unknowns, unknowns, count), coarse: innerProducts(collected, potentials, unknowns, this.coarse, count) };
  }

  private leads(s: number): boolean {
    return this.folding.images === null || s <= this.folding.images[s];
  }
}

function innerProducts(left: Float64Array, right: Float64Array, stride: number, to: number, count: number): Float64Array {
  const products = new Float64Array(count * count);
  for (let a = 0; a < count; a += 1) {
    for (let b = 0; b < count; b += 1) {
      let sum = 0;
      for (let i = 0; i < to; i += 1) sum += left[a * stride + i] * right[b * stride + i];
      products[a * count + b] = sum;
    }
  }
  return products;
}
