/**
 * A side acting on itself: double integrals of w p_m w p_n (-ln |u - v|) over [-1, 1]², for m and n below `size`.
 *
 *      -1 ----a---- 0 ----b---- 1        Method  the square is cut at u = 0 and v = 0. The quarter of one half on itself
 *                                                is twice a triangle with its corner at the side's end, scaled
 *                                                out by v = r s, u = r; the quarter of one half on the other meets
 *                                                at one point only and is scaled out from there
 *
 *   Formula  -ln |u - v| = -ln r - ln(1 - s): the first by a rule with a logarithm in r, the second by one in 1 - s
 *   Source   Duffy 1982 for the change of variables, from memory
 *   Accuracy 1e-11, and 1e-7 where m + n comes near 2 size (the test); 1 ms once for every pair of exponents
 */
import { keptLogRule, keptRule } from './keptRule';
import { polynomialLimit, writePolynomials } from './orthonormalJacobi';
import { partRule, type PartRule } from './partRule';
import type { SideBasis } from './sideBasis';

export function selfTable(basis: SideBasis, size = polynomialLimit): Float64Array {
  // The products of two polynomials are of degree 2 size, but the halves see little of the highest.
  const points = Math.ceil(1.5 * size) + 2;
  const table = new Float64Array(size * size);
  addHalfOnItself(basis, { parity: 1, size, points }, table);
  addHalfOnItself(basis.reversed(), { parity: -1, size, points }, table);
  addMeetingQuarters(basis, { size, points }, table);
  // Parts that do not meet: plain product rules, the ends' powers in their weights.
  const [first, second, third, fourth] = [0, 1, 2, 3].map((index) => partRule(basis, 2, index, points));
  for (const [left, right] of [[first, third], [first, fourth], [second, fourth]]) addParts(left, right, size, table);
  for (let m = 0; m < size; m += 1) {
    for (let n = 0; n < m; n += 1) {
      const mean = (table[m * size + n] + table[n * size + m]) / 2;
      table[m * size + n] = table[n * size + m] = mean;
    }
  }
  return table;
}

interface TableSize {
  readonly size: number;
  /** Nodes of every rule. */
  readonly points: number;
}

/** u = -1 + r, v = -1 + r s, r and s in [0, 1]; and u exchanged with v. `parity` -1: for the basis run backwards. */
function addHalfOnItself(basis: SideBasis, { parity, size, points }: TableSize & { readonly parity: 1 | -1 }, table: Float64Array): void {
  const { start, end, total, recurrence } = basis;
  const radial = keptLogRule(points, 2 * start + 1);
  const near = keptRule(points, 0, start);
  const far = keptLogRule(points, 0);
  const outer = new Float64Array(size);
  const inner = new Float64Array(size);
  const plain = new Float64Array(size);
  const logged = new Float64Array(size);
  const addInner = (r: number, s: number, weight: number, logWeight: number) => {
    writePolynomials(recurrence, r * s - 1, ((2 - r * s) ** end) / total, inner, 0, size);
    for (let n = 0; n < size; n += 1) {
      plain[n] += weight * inner[n];
      logged[n] += logWeight * inner[n];
    }
  };
  for (let i = 0; i < points; i += 1) {
    const r = radial.nodes[i];
    writePolynomials(recurrence, r - 1, ((2 - r) ** end) / total, outer, 0, size);
    plain.fill(0);
    logged.fill(0);
    for (let k = 0; k < points; k += 1) {
      // s in [0, 1/2], with s^start in the rule; then s in [1/2, 1], with ln(1 - s) in the rule.
      const s = (1 + near.nodes[k]) / 4;
      const weight = near.weights[k] * 4 ** -(start + 1);
      addInner(r, s, weight, weight * -Math.log1p(-s));
      const x = far.nodes[k];
      const power = (1 - x / 2) ** start / 2;
      addInner(r, 1 - x / 2, far.weights[k] * power, (far.logWeights[k] + Math.LN2 * far.weights[k]) * power);
    }
    for (let m = 0; m < size; m += 1) {
      for (let n = 0; n < size; n += 1) {
        const sign = parity === -1 && (m + n) % 2 === 1 ? -1 : 1;
        const value = sign * outer[m] * (radial.weights[i] * logged[n] + radial.logWeights[i] * plain[n]);
        table[m * size + n] += value;
        table[n * size + m] += value;
      }
    }
  }
}

/** u in [-1/2, 0], v in [0, 1/2]: the larger of |u|, |v| is r, the smaller r s. */
function addMeetingQuarters({ start, end, total, recurrence }: SideBasis, { size, points }: TableSize, table: Float64Array): void {
  const radial = keptLogRule(points, 1);
  const angular = keptRule(points, 0, 0);
  const values = new Float64Array(size);
  const outer = new Float64Array(size);
  const inner = new Float64Array(size);
  const write = (u: number, into: Float64Array) => writePolynomials(recurrence, u, ((1 + u) ** start * (1 - u) ** end) / total, into, 0, size);
  for (const side of [-1, 1]) {
    for (let i = 0; i < points; i += 1) {
      const r = radial.nodes[i] / 2;
      write(side * r, outer);
      inner.fill(0);
      for (let k = 0; k < points; k += 1) {
        const s = (1 + angular.nodes[k]) / 2;
        const value = (angular.weights[k] / 8) * (radial.logWeights[i] + radial.weights[i] * (Math.LN2 - Math.log1p(s)));
        write(-side * r * s, values);
        for (let n = 0; n < size; n += 1) inner[n] += value * values[n];
      }
      addBothWays(outer, inner, table);
    }
  }
}

/** -ln |u - v| of two parts, the left one first. */
function addParts(left: PartRule, right: PartRule, size: number, table: Float64Array): void {
  const inner = new Float64Array(size);
  for (let f = 0; f < left.count; f += 1) {
    inner.fill(0);
    for (let g = 0; g < right.count; g += 1) {
      const value = -Math.log(2 * (right.t[g] - left.t[f]));
      for (let n = 0; n < size; n += 1) inner[n] += value * right.weighted[g * polynomialLimit + n];
    }
    addBothWays(left.weighted.subarray(f * polynomialLimit, f * polynomialLimit + size), inner, table);
  }
}

/** outer on u and inner on v, and exchanged. */
function addBothWays(outer: Float64Array, inner: Float64Array, table: Float64Array): void {
  const size = outer.length;
  for (let m = 0; m < size; m += 1) {
    for (let n = 0; n < size; n += 1) {
      const value = outer[m] * inner[n];
      table[m * size + n] += value;
      table[n * size + m] += value;
    }
  }
}
