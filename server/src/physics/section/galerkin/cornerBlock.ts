/**
 * Two parts of sides that meet in a corner: double integrals of w p_m w p_n (-ln r).
 *
 *        /               Model   -ln r is singular at one point of the square of the two distances from the corner
 *    r2 /                Method  each half of the square is scaled out from there: r1 = R, r2 = R S, and exchanged. What
 *      /__ angle __           depends on R is a power and a logarithm (logRule), on S a power and an analytic function
 *          r1
 *   Formula  -ln |l1 R - l2 R S e^(i angle)| = -ln l1 - ln R - 1/2 ln(1 - 2 q S cos angle + q² S²),  q = l2/l1
 *   Symbols  l1, l2 lengths of the two parts; R, S in [0, 1]
 *   Source   Duffy 1982 for the change of variables, from memory
 *   Range    parts of similar length that do not reach their sides' other ends; angle from 30 degrees to 180
 *   Accuracy 1e-9 for degrees up to 12 (the test, against graded panels)
 */
import { keptLogRule, keptRule } from '../basis/keptRule';
import { polynomialLimit, writePolynomials } from '../basis/orthonormalJacobi';
import type { SideBasis } from '../basis/sideBasis';

export interface CornerPart {
  /** Starting at the corner. */
  readonly basis: SideBasis;
  /** The part is [0, 2^-level] of its side. */
  readonly level: number;
  readonly length: number;
}

const radialPoints = 14;
const angularPoints = 12;

/** Adds to `block`, rows × columns: rows belong to `first`. */
export function addCorner(first: CornerPart, second: CornerPart, cosine: number, rows: number, columns: number, block: Float64Array): void {
  addHalf(first, second, cosine, rows, columns, block, columns, 1);
  addHalf(second, first, cosine, columns, rows, block, 1, columns);
}

/** Entry (m of outer, n of inner) is at m × outerStride + n × innerStride. */
function addHalf(outer: CornerPart, inner: CornerPart, cosine: number, outerCount: number, innerCount: number, block: Float64Array, outerStride: number, innerStride: number): void {
  const size = outerCount <= 8 && innerCount <= 8 ? 8 : polynomialLimit;
  const { radialWeights, radialLogWeights, spoke, nodes, angularWeights, fan, fanSum } = cornerTables(outer, inner, size);
  const ratio = inner.length / outer.length;
  const logOuter = -Math.log(outer.length);
  for (let k = 0; k < angularPoints; k += 1) {
    const reach = ratio * nodes[k];
    angular[k] = -0.5 * angularWeights[k] * Math.log(1 + reach * (reach - 2 * cosine));
  }
  for (let i = 0; i < radialPoints; i += 1) {
    const plain = radialWeights[i];
    const logged = radialLogWeights[i] + plain * logOuter;
    for (let n = 0; n < innerCount; n += 1) {
      let sum = 0;
      for (let k = 0; k < angularPoints; k += 1) sum += angular[k] * fan[(i * angularPoints + k) * size + n];
      const value = plain * sum + logged * fanSum[i * size + n];
      for (let m = 0; m < outerCount; m += 1) block[m * outerStride + n * innerStride] += spoke[i * size + m] * value;
    }
  }
}

const angular = new Float64Array(angularPoints);

interface CornerTables {
  readonly radialWeights: Float64Array;
  readonly radialLogWeights: Float64Array;
  /** The outer part's polynomials at R. */
  readonly spoke: Float64Array;
  readonly nodes: Float64Array;
  readonly angularWeights: Float64Array;
  /** The inner part's polynomials at R S, S fastest. */
  readonly fan: Float64Array;
  /** Summed over S with the weights. */
  readonly fanSum: Float64Array;
}

/** `size` polynomials of either part: most sides need few, and the tables' work is all in them. */
function cornerTables(outer: CornerPart, inner: CornerPart, size: number): CornerTables {
  const key = `corner ${size} ${outer.level} ${inner.level} ${inner.basis.start} ${inner.basis.end}`;
  const known = outer.basis.tables.get(key) as CornerTables | undefined;
  if (known !== undefined) return known;
  const radial = keptLogRule(radialPoints, outer.basis.start + inner.basis.start + 1);
  const { nodes, weights } = keptRule(angularPoints, 0, inner.basis.start);
  const scale = 2 ** -(inner.basis.start + 1);
  const made: CornerTables = {
    radialWeights: radial.weights,
    radialLogWeights: radial.logWeights,
    spoke: new Float64Array(radialPoints * size),
    nodes: nodes.map((x) => (1 + x) / 2),
    angularWeights: weights.map((w) => w * scale),
    fan: new Float64Array(radialPoints * angularPoints * size),
    fanSum: new Float64Array(radialPoints * size),
  };
  for (let i = 0; i < radialPoints; i += 1) {
    writeWithoutPower(outer, radial.nodes[i], made.spoke, i * size, size);
    for (let k = 0; k < angularPoints; k += 1) {
      const at = (i * angularPoints + k) * size;
      writeWithoutPower(inner, radial.nodes[i] * made.nodes[k], made.fan, at, size);
      for (let n = 0; n < size; n += 1) made.fanSum[i * size + n] += made.angularWeights[k] * made.fan[at + n];
    }
  }
  outer.basis.tables.set(key, made);
  return made;
}

/** w p_m du / dR at R, without the factor R^start that the rules hold. */
function writeWithoutPower({ basis, level }: CornerPart, radius: number, values: Float64Array, at: number, count: number): void {
  const { start, end, total, recurrence } = basis;
  const reach = 2 * 2 ** -level;
  const scale = (reach ** (start + 1) * (2 - reach * radius) ** end) / total;
  writePolynomials(recurrence, reach * radius - 1, scale, values, at, count);
}
