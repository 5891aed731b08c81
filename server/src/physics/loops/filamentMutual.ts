/**
 * Neumann's integral over two straight filaments: N = ∫∫ ds1·ds2 / sqrt(R² + g²); M = mu0/(4 pi) N.
 *
 *     start1 ------l------> end1          g = 0: two filaments. g > 0: the same two, one moved by g at right angles to everything,
 *        \                                which is how a geometric mean distance keeps a conductor's own term finite
 *         \  d (common perpendicular)
 *     start2 --m--> end2
 *
 * Formula   N = cos e { (mu+l) P2(end1) - mu P2(start1) + (nu+m) P1(end2) - nu P1(start2) - d W / sin e },
 *           P the potentials of one filament at the ends of the other (`filamentPotential.ts`), mu and nu from the feet of the common
 *           perpendicular to the starts, W of four arctangents; d² + g² in the place of d²
 *           parallel: a four-point difference of f(x) = x asinh(x/d) - sqrt(x² + d²)
 * Method    the closed form where both are of a size with their distance; Gauss-Legendre over the one that is short against its
 *           distance to the other, or over both; adaptive quadrature of the closed inner integral where they are nearly but not quite
 *           parallel and the closed form would cancel
 * Source    Campbell 1915; Grover, Inductance Calculations, 1946, ch. 5 and 7, from memory
 * Range     any place and length. Infinite where the two overlap on one line and g = 0
 * Accuracy  1e-12 of l m / R and of the value, against adaptive quadrature (test/physics/loops/filamentMutual.test.ts)
 */
import { adaptiveGauss } from '../../numeric/adaptiveGauss';
import { gaussJacobi } from '../../numeric/gaussJacobi';
import { filamentPotential } from './filamentPotential';

/** Offsets of a filament in a flat array: x, y, z of its start, of its unit direction, and its length; m. */
export const filamentStride = 7;

export interface FilamentPair {
  /** m; signed by the cosine between the directions. */
  readonly value: number;
  readonly error: number;
}

export function filamentMutual(first: Float64Array, at1: number, second: Float64Array, at2: number, g = 0): FilamentPair {
  const l = first[at1 + 6];
  const m = second[at2 + 6];
  if (l < m) return filamentMutual(second, at2, first, at1, g);
  const ux = first[at1 + 3];
  const uy = first[at1 + 4];
  const uz = first[at1 + 5];
  const vx = second[at2 + 3];
  const vy = second[at2 + 4];
  const vz = second[at2 + 5];
  const cosine = ux * vx + uy * vy + uz * vz;
  if (Math.abs(cosine) < 1e-15) return nothing;
  // From start to start, seen from the first.
  const px = second[at2] - first[at1];
  const py = second[at2 + 1] - first[at1 + 1];
  const pz = second[at2 + 2] - first[at1 + 2];
  const mx = px + (m * vx - l * ux) / 2;
  const my = py + (m * vy - l * uy) / 2;
  const mz = pz + (m * vz - l * uz) / 2;
  const apart = Math.sqrt(mx * mx + my * my + mz * mz + g * g);
  if (l + m < 0.05 * apart) return { value: cosine * bothShort({ l, m, ux, uy, uz, vx, vy, vz, mx, my, mz, g, apart }), error: 0 };
  // Middle of the second, along and beside the first.
  const along = mx * ux + my * uy + mz * uz;
  const beyond = Math.max(0, Math.abs(along) - l / 2);
  const beside = sizeOfCross(mx, my, mz, ux, uy, uz);
  const sine = sizeOfCross(ux, uy, uz, vx, vy, vz);
  const pair: Pair = { l, m, cosine, sine, start: px * ux + py * uy + pz * uz, ...asideOf(px, py, pz, ux, uy, uz), wx: vx - cosine * ux, wy: vy - cosine * uy, wz: vz - cosine * uz, g };
  if (m < 0.1 * Math.hypot(beyond, beside, g)) return { value: cosine * shortSecond(pair), error: 0 };
  const d = distanceOfLines(px, py, pz, ux, uy, uz, vx, vy, vz, sine);
  const gap = Math.hypot(beside, g);
  if (l * sine <= 1e-13 * gap || sine === 0) return parallel(pair, Math.hypot(pair.ax, pair.ay, pair.az, g));
  if (sine < nearlyParallel) return nearParallel(pair);
  return skew(pair, { px, py, pz, ux, uy, uz, vx, vy, vz }, Math.hypot(d, g));
}

const nothing: FilamentPair = { value: 0, error: 0 };
/** Sine of the angle: below, the closed form loses more than four digits. */
const nearlyParallel = 1e-4;

interface Pair {
  readonly l: number;
  readonly m: number;
  readonly cosine: number;
  readonly sine: number;
  /** Start of the second in the first's frame: along it, and the vector beside it. */
  readonly start: number;
  readonly ax: number;
  readonly ay: number;
  readonly az: number;
  /** The second's direction less its part along the first. */
  readonly wx: number;
  readonly wy: number;
  readonly wz: number;
  readonly g: number;
}

const rules = [2, 3, 5, 8].map((count) => gaussJacobi(count, 0, 0));

function bothShort(p: { l: number; m: number; ux: number; uy: number; uz: number; vx: number; vy: number; vz: number; mx: number; my: number; mz: number; g: number; apart: number }): number {
  const share = (p.l + p.m) / p.apart;
  const { nodes, weights } = rules[share < 1e-4 ? 0 : share < 5e-3 ? 1 : 2];
  let total = 0;
  for (let i = 0; i < nodes.length; i += 1) {
    const s = (p.l / 2) * nodes[i];
    for (let j = 0; j < nodes.length; j += 1) {
      const t = (p.m / 2) * nodes[j];
      const x = p.mx + t * p.vx - s * p.ux;
      const y = p.my + t * p.vy - s * p.uy;
      const z = p.mz + t * p.vz - s * p.uz;
      total += (weights[i] * weights[j]) / Math.sqrt(x * x + y * y + z * z + p.g * p.g);
    }
  }
  return (total * p.l * p.m) / 4;
}

/** Potential of the first filament at a place t of the second. */
function potentialAt(p: Pair, t: number): number {
  return filamentPotential(p.l, p.start + t * p.cosine, Math.hypot(p.ax + t * p.wx, p.ay + t * p.wy, p.az + t * p.wz, p.g));
}

function shortSecond(p: Pair): number {
  const { nodes, weights } = rules[3];
  let total = 0;
  for (let j = 0; j < nodes.length; j += 1) total += weights[j] * potentialAt(p, (p.m / 2) * (1 + nodes[j]));
  return (total * p.m) / 2;
}

function nearParallel(p: Pair): FilamentPair {
  const { value, error } = adaptiveGauss((t) => potentialAt(p, t), 0, p.m, 1e-13 * p.m);
  return { value: p.cosine * value, error };
}

function parallel(p: Pair, d: number): FilamentPair {
  const from = p.start;
  const to = p.start + p.m * Math.sign(p.cosine);
  const low = Math.min(from, to);
  const high = Math.max(from, to);
  // Both beside or beyond the other's ends: ∫ of the potential over the second, as the difference of f at four places.
  const value = primitive(high, d) - primitive(low, d) - primitive(high - p.l, d) + primitive(low - p.l, d);
  return { value: Math.sign(p.cosine) * value, error: 1e-16 * (Math.abs(primitive(high, d)) + Math.abs(primitive(low - p.l, d))) };
}

/** Its logarithm is that of |x| + sqrt: the part in d alone cancels in the four-point difference only where no two overlap. */
function primitive(x: number, d: number): number {
  if (x === 0) return -d;
  if (d === 0) return Math.abs(x) * (Math.log(2 * Math.abs(x)) - 1);
  return x * Math.asinh(x / d) - Math.hypot(x, d);
}

function skew(p: Pair, v: { px: number; py: number; pz: number; ux: number; uy: number; uz: number; vx: number; vy: number; vz: number }, d: number): FilamentPair {
  const { l, m, cosine, sine } = p;
  const square = sine * sine;
  const onFirst = p.start;
  const onSecond = v.px * v.vx + v.py * v.vy + v.pz * v.vz;
  // From the feet of the common perpendicular to the starts.
  const mu = (onSecond * cosine - onFirst) / square;
  const nu = (onSecond - onFirst * cosine) / square;
  const far = (x: number, y: number): number => Math.sqrt(Math.max(0, x * x + y * y - 2 * x * y * cosine) + d * d);
  const feet = (x: number): { along: number; beside: number } => ({ along: x * cosine, beside: Math.hypot(x * sine, d) });
  const end1 = feet(mu + l);
  const start1 = feet(mu);
  const end2 = feet(nu + m);
  const start2 = feet(nu);
  const scale = l + m;
  const terms = [
    weighted(mu + l, filamentPotential(m, end1.along - nu, end1.beside), scale),
    -weighted(mu, filamentPotential(m, start1.along - nu, start1.beside), scale),
    weighted(nu + m, filamentPotential(l, end2.along - mu, end2.beside), scale),
    -weighted(nu, filamentPotential(l, start2.along - mu, start2.beside), scale),
  ];
  let value = terms[0] + terms[1] + terms[2] + terms[3];
  if (0 < d) {
    const angle = (x: number, y: number): number => Math.atan2(d * d * cosine + x * y * square, d * far(x, y) * sine);
    value -= (d / sine) * (angle(mu + l, nu + m) - angle(mu + l, nu) + angle(mu, nu) - angle(mu, nu + m));
  }
  return { value: cosine * value, error: 4e-16 * (Math.abs(terms[0]) + Math.abs(terms[1]) + Math.abs(terms[2]) + Math.abs(terms[3]) + d / sine) };
}

/** At a common point a foot of no length meets an infinite potential: x ln x vanishes there. */
function weighted(foot: number, potential: number, scale: number): number {
  return Math.abs(foot) <= 1e-14 * scale && 25 < potential ? 0 : foot * potential;
}

function sizeOfCross(ax: number, ay: number, az: number, bx: number, by: number, bz: number): number {
  const x = ay * bz - az * by;
  const y = az * bx - ax * bz;
  const z = ax * by - ay * bx;
  return Math.sqrt(x * x + y * y + z * z);
}

function asideOf(px: number, py: number, pz: number, ux: number, uy: number, uz: number): { ax: number; ay: number; az: number } {
  const along = px * ux + py * uy + pz * uz;
  return { ax: px - along * ux, ay: py - along * uy, az: pz - along * uz };
}

function distanceOfLines(px: number, py: number, pz: number, ux: number, uy: number, uz: number, vx: number, vy: number, vz: number, sine: number): number {
  return sine === 0 ? 0 : Math.abs(px * (uy * vz - uz * vy) + py * (uz * vx - ux * vz) + pz * (ux * vy - uy * vx)) / sine;
}
