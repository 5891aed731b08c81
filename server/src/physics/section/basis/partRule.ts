/**
 * Quadrature over a part of a side, [index, index + 1] / 2^level of its length, with the edge weight and the polynomials.
 *
 *   sum over f of weighted[f, m] g(u_f)  =  integral over the part of w p_m g
 *
 * Method    Gauss-Legendre; Gauss-Jacobi in the parts that hold an end, so that the edge's power is exact
 * Accuracy  degree 11 in p_m times a kernel whose nearest singularity is 0.6 of the part's length away: 1e-8 (test)
 */
import { keptRule } from './keptRule';
import { polynomialLimit, writePolynomials, type Recurrence } from './orthonormalJacobi';

export interface PartRule {
  readonly count: number;
  /** Of every node: 0 at the side's start, 1 at its end. */
  readonly t: Float64Array;
  /** count × polynomialLimit, row-major. */
  readonly weighted: Float64Array;
}

export interface WeightedPolynomials {
  readonly start: number;
  readonly end: number;
  /** Integral of (1 + u)^start (1 - u)^end over [-1, 1]. */
  readonly total: number;
  readonly recurrence: Recurrence;
}

export function partRule({ start, end, recurrence, total }: WeightedPolynomials, level: number, index: number, count = partPoints(level)): PartRule {
  const size = 2 ** -level;
  const atStart = index === 0;
  const atEnd = index === 2 ** level - 1;
  const { nodes, weights } = keptRule(count, atEnd ? end : 0, atStart ? start : 0);
  const t = new Float64Array(count);
  const weighted = new Float64Array(count * polynomialLimit);
  for (let f = 0; f < count; f += 1) {
    const fromStart = (index + (1 + nodes[f]) / 2) * size;
    const fromEnd = (2 ** level - index - (1 + nodes[f]) / 2) * size;
    t[f] = fromStart;
    // An end's power is in the Gauss weight (there 1 + x stands for 2 fromStart / size); elsewhere it is a factor.
    const weight = (weights[f] * size * (atStart ? size ** start : (2 * fromStart) ** start) * (atEnd ? size ** end : (2 * fromEnd) ** end)) / total;
    writePolynomials(recurrence, 2 * fromStart - 1, weight, weighted, f * polynomialLimit, polynomialLimit);
  }
  return { count, t, weighted };
}

/** Half a side has its polynomials bent twice as much to the node as a quarter. */
const partPoints = (level: number) => (level === 1 ? 14 : level === 2 ? 11 : 9);

/** The whole side, both ends' powers in the weight. */
export function wholeRule({ start, end, recurrence, total }: WeightedPolynomials, count: number): PartRule {
  const { nodes, weights } = keptRule(count, end, start);
  const weighted = new Float64Array(count * polynomialLimit);
  for (let f = 0; f < count; f += 1) writePolynomials(recurrence, nodes[f], weights[f] / total, weighted, f * polynomialLimit, polynomialLimit);
  return { count, t: nodes.map((u) => (1 + u) / 2), weighted };
}
