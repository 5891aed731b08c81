/**
 * Neumann's integral over two closed sets of current that are small against their distance.
 *
 *     (  a  )                D                (  b  )        Formula   1/|D + u| = (1/D) Σ f_n(u), f_n homogeneous of degree n in u;
 *                                                                      N = ∮∮ da·db Σ_{n>=2} f_n(b - a)
 * Method    f_0 and f_1, and with them all that does not fall with the cube of the distance, vanish exactly along closed paths and are
 *           left out, so that nothing cancels: a loop of a millimetre 10 km away keeps all its digits. Gauss-Legendre along
 *           filaments, the trapezoidal rule around circles. The leading term is that of two dipoles
 * Source    Legendre's expansion; recurrence n f_n = -(2n-1) p f_n-1 - (n-1) q f_n-2, p = D·u/D², q = u²/D²
 * Range     radii of both together below a fifth of the distance of their centres: `distantShare`
 * Accuracy  share^15, below 1e-10 at the end of the range; rounding when far
 */
import type { Ball, CurrentPaths } from './currentPaths';
import { filamentStride } from './filamentMutual';
import { gaussJacobi } from '../../numeric/gaussJacobi';
import { difference, dot, frameAround, norm, type Vector } from './vector';

/** Of both radii to the distance. */
export const distantShare = 0.2;
const orders = 16;

export interface NeumannIntegral {
  /** m; M = mu0/(4 pi) times it. */
  readonly value: number;
  readonly error: number;
  /** Places, or pairs, that were summed. */
  readonly work: number;
}

export function distantNeumann(first: CurrentPaths, ball1: Ball, second: CurrentPaths, ball2: Ball): NeumannIntegral {
  const apart = difference(ball2.centre, ball1.centre);
  const distance = norm(apart);
  const share = (ball1.radius + ball2.radius) / distance;
  const a = elements(first, ball1, distance);
  const b = elements(second, ball2, distance);
  const [nx, ny, nz] = [apart[0] / distance, apart[1] / distance, apart[2] / distance];
  const count = Math.max(4, Math.min(orders, Math.ceil(2 + Math.log(1e-16) / Math.log(share))));
  let value = 0;
  let size = 0;
  for (let i = 0; i < a.length; i += 6) {
    for (let j = 0; j < b.length; j += 6) {
      const x = b[j] - a[i];
      const y = b[j + 1] - a[i + 1];
      const z = b[j + 2] - a[i + 2];
      const weight = a[i + 3] * b[j + 3] + a[i + 4] * b[j + 4] + a[i + 5] * b[j + 5];
      const term = weight * expansion(nx * x + ny * y + nz * z, x * x + y * y + z * z, count);
      value += term;
      size += Math.abs(term);
    }
  }
  // In units of the distance so far, which keeps squares of 1e-20 m in range.
  return { value: value * distance, error: distance * size * (share ** (count - 1) + 4e-16), work: (a.length * b.length) / 36 };
}

/** Σ f_n from n = 2. */
function expansion(p: number, q: number, count: number): number {
  let before = 1;
  let now = -p;
  let sum = 0;
  for (let n = 2; n <= count; n += 1) {
    const next = (-(2 * n - 1) * p * now - (n - 1) * q * before) / n;
    before = now;
    now = next;
    sum += next;
  }
  return sum;
}

/** Places from the centre and their vector weights, six numbers each, in units of the distance. */
function elements({ filaments, circles }: CurrentPaths, { centre }: Ball, distance: number): Float64Array {
  const found: number[] = [];
  for (let at = 0; at < filaments.length; at += filamentStride) {
    const direction: Vector = [filaments[at + 3], filaments[at + 4], filaments[at + 5]];
    const length = filaments[at + 6] / distance;
    const { nodes, weights } = ruleFor(length);
    for (let i = 0; i < nodes.length; i += 1) {
      const along = (length * (1 + nodes[i])) / 2;
      for (let axis = 0; axis < 3; axis += 1) found.push((filaments[at + axis] - centre[axis]) / distance + along * direction[axis]);
      for (let axis = 0; axis < 3; axis += 1) found.push((weights[i] * length * direction[axis]) / 2);
    }
  }
  for (const circle of circles) {
    const [u, v] = frameAround(circle.normal);
    const radius = circle.radius / distance;
    const from = difference(circle.centre, centre);
    for (let i = 0; i < placesAround; i += 1) {
      const angle = (2 * Math.PI * (i + 0.5)) / placesAround;
      const cosine = Math.cos(angle);
      const sine = Math.sin(angle);
      for (let axis = 0; axis < 3; axis += 1) found.push(from[axis] / distance + radius * (cosine * u[axis] + sine * v[axis]));
      for (let axis = 0; axis < 3; axis += 1) found.push((2 * Math.PI * radius * (cosine * v[axis] - sine * u[axis])) / placesAround);
    }
  }
  return Float64Array.from(found);
}

/** Exact for the trigonometric polynomials that the orders above make of a circle. */
const placesAround = 2 * orders + 4;
const rules = [2, 3, 4, 8].map((count) => gaussJacobi(count, 0, 0));

/** A polynomial of degree n in the length, of which degree 3 is always exact. */
function ruleFor(length: number): (typeof rules)[number] {
  return rules[length < 1e-4 ? 0 : length < 3e-3 ? 1 : length < 0.02 ? 2 : 3];
}

/** Moment of two dipoles, for whoever wants the leading term alone: N of vector areas S1, S2 at distance D. */
export function dipoleNeumann(area1: Vector, area2: Vector, apart: Vector): number {
  const distance = norm(apart);
  const n: Vector = [apart[0] / distance, apart[1] / distance, apart[2] / distance];
  return (3 * dot(area1, n) * dot(area2, n) - dot(area1, area2)) / distance ** 3;
}
