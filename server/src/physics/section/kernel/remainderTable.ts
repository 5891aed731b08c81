/**
 * The part of a layered kernel that neither mirrors nor planes explain, as a function of one complex variable, in a table
 * of Taylor series.
 *
 *   x |  \ 3 |  2  /    F(z) = integral over k > 0 of [f(k) e^(-kz)]/k,  z = (Y + depth) + i |dx|
 *     |   \  | /  1     f dies away at least as e^(-k depth) does once that factor is taken out, so F's nearest
 *     |    \ |/___ 0    singularity is z = 0. Rings of z widen by root 2, each cut into four sectors: every cell
 *     |-----+------     is within 0.27 of its centre's distance from 0, and one series serves it
 *          Re z
 *   Model     f analytic for Re k > 0 (passive layers); the potential is Re F
 *   Method    Taylor coefficients are integrals over k themselves: the ray of integration is turned by half the centre's
 *             angle, which leaves f and e^(-kz) mildly oscillating only, and the trapezoidal rule in ln k converges
 *             exponentially. f(0) is taken out as -f(0) ln z; what lies below the first sample is linear in k and summed
 *             in closed form. No images are fitted, so there is no fit residual
 *   Formula   F(z) = -f(0) ln z + integral of (f - f(0)) e^(-kz)/k;  n-th coefficient: (-k)^n / n! in the integrand
 *   Source    discrete-image methods fit f by exponentials (Hua & Sarkar 1989); contour and rule are our own
 *   Accuracy  4e-10 absolute of f's largest value (the test, against images in closed form); 12 µs for a cell, 40 ns for a value
 */
import { complex, minus, type Complex } from './complex';

/** Odd, so that even and odd degrees come in pairs. */
const order = 13;
const stride = 2 * (order + 1);
const sectors = 4;
/** Of ln k. */
const step = 0.2;
const sectorAngle = (sector: number) => (Math.PI / 8) * (sector + 0.5);
const firstTangent = Math.tan(Math.PI / 8);

export interface Spectrum {
  /** f times e^(k depth) stays bounded as k grows. */
  readonly f: (k: Complex) => Complex;
  /** The smallest |z| that will be asked for. */
  readonly nearest: number;
  /** The length over which f changes at small k: the stack's height. */
  readonly height: number;
}

export class RemainderTable {
  private readonly cells: (Float64Array | undefined)[] = [];
  private readonly inverseSquare: number;
  private readonly samples: readonly RaySamples[];
  private readonly atZero: number;

  constructor(private readonly spectrum: Spectrum) {
    this.inverseSquare = (1 - 1e-12) / (spectrum.nearest * spectrum.nearest);
    this.atZero = limitAtZero(spectrum);
    this.samples = Array.from({ length: sectors }, (_, sector) => sampleRay(spectrum, this.atZero, sectorAngle(sector) / 2));
  }

  /** Largest |f - f(0)| and |f(0)| met: zero where the layers make no difference. */
  get size(): number {
    return this.samples.reduce((largest, { re, im }) => re.reduce((size, value, i) => Math.max(size, Math.hypot(value, im[i])), largest), Math.abs(this.atZero));
  }

  /** Re F at z = re + i im, im at least 0. */
  value(re: number, im: number): number {
    const cell = this.cellAt(re, im);
    const zr = re - cell[stride];
    const zi = im - cell[stride + 1];
    // Even and odd degrees side by side, in powers of z²: two short chains of sums instead of a long one.
    const sr = zr * zr - zi * zi;
    const si = 2 * zr * zi;
    let er = cell[stride - 4];
    let ei = cell[stride - 3];
    let or = cell[stride - 2];
    let oi = cell[stride - 1];
    for (let at = stride - 8; 0 <= at; at -= 4) {
      const nextEven = er * sr - ei * si + cell[at];
      const nextOdd = or * sr - oi * si + cell[at + 2];
      ei = er * si + ei * sr + cell[at + 1];
      oi = or * si + oi * sr + cell[at + 3];
      er = nextEven;
      or = nextOdd;
    }
    return er + or * zr - oi * zi;
  }

  /** Rate of change of Re F along a step of z = a + i b. */
  slope(re: number, im: number, a: number, b: number): number {
    const cell = this.cellAt(re, im);
    const zr = re - cell[stride];
    const zi = im - cell[stride + 1];
    // F' = sum of n c_n z^(n-1), even and odd powers side by side as above.
    const sr = zr * zr - zi * zi;
    const si = 2 * zr * zi;
    let er = order * cell[2 * order];
    let ei = order * cell[2 * order + 1];
    let or = 0;
    let oi = 0;
    for (let n = order - 2; 0 < n; n -= 2) {
      const nextOdd = or * sr - oi * si + (n + 1) * cell[2 * n + 2];
      const nextEven = er * sr - ei * si + n * cell[2 * n];
      oi = or * si + oi * sr + (n + 1) * cell[2 * n + 3];
      ei = er * si + ei * sr + n * cell[2 * n + 1];
      or = nextOdd;
      er = nextEven;
    }
    const fr = er + or * zr - oi * zi;
    const fi = ei + or * zi + oi * zr;
    return fr * a - fi * b;
  }

  private cellAt(re: number, im: number): Float64Array {
    const square = (re * re + im * im) * this.inverseSquare;
    // Rings of |z|² double: the exponent of the number is the ring.
    const ring = square < 1e9 ? 31 - Math.clz32(square | 0) : Math.floor(Math.log2(square));
    const sector = im < re ? (im < firstTangent * re ? 0 : 1) : re < firstTangent * im ? 3 : 2;
    const index = (0 < ring ? ring : 0) * sectors + sector;
    return this.cells[index] ?? (this.cells[index] = this.cell(0 < ring ? ring : 0, sector));
  }

  /** Coefficients from degree 0 up, real and imaginary parts in turn, then the centre. */
  private cell(ring: number, sector: number): Float64Array {
    const distance = this.spectrum.nearest * 2 ** (ring / 2) * 1.2;
    const angle = sectorAngle(sector);
    const cell = new Float64Array(stride + 2);
    addIntegrals(this.samples[sector], distance, cell);
    addLogarithm(-this.atZero, distance, angle, cell);
    cell[stride] = distance * Math.cos(angle);
    cell[stride + 1] = distance * Math.sin(angle);
    return cell;
  }
}

/** f - f(0) along k = size e^(-i turn). */
interface RaySamples {
  readonly turn: number;
  readonly sizes: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

function sampleRay({ f, nearest, height }: Spectrum, atZero: number, turn: number): RaySamples {
  const low = Math.log(1e-6 / height);
  const high = Math.log(44 / (nearest * Math.cos(turn)));
  const count = Math.ceil((high - low) / step) + 1;
  const sizes = Float64Array.from({ length: count }, (_, i) => Math.exp(low + i * step));
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    const difference = minus(f(complex(sizes[i] * Math.cos(turn), -sizes[i] * Math.sin(turn))), complex(atZero));
    re[i] = difference.re;
    im[i] = difference.im;
  }
  return { turn, sizes, re, im };
}

/** f is real on the real axis, with a series in k there; a formula at k = 0 itself would be 0/0 between planes. */
function limitAtZero({ f, height }: Spectrum): number {
  const k = 1e-4 / height;
  return 3 * f(complex(k)).re - 3 * f(complex(2 * k)).re + f(complex(3 * k)).re;
}

function addIntegrals({ turn, sizes, re, im }: RaySamples, distance: number, cell: Float64Array): void {
  const cosine = Math.cos(turn);
  const sine = Math.sin(turn);
  for (let i = 0; i < sizes.length; i += 1) {
    const along = sizes[i] * distance;
    if (44 < along * cosine) break;
    // With k z = |k| |z| e^(i turn). The first sample stands for all the ones below it too, which halve as k does.
    const weight = step * Math.exp(-along * cosine) / (i === 0 ? 1 - Math.exp(-step) : 1);
    const phase = along * sine;
    const cr = weight * Math.cos(phase);
    const ci = -weight * Math.sin(phase);
    let tr = cr * re[i] - ci * im[i];
    let ti = cr * im[i] + ci * re[i];
    const kr = -sizes[i] * cosine;
    const ki = sizes[i] * sine;
    for (let n = 0; n <= order; n += 1) {
      cell[2 * n] += tr;
      cell[2 * n + 1] += ti;
      const next = (tr * kr - ti * ki) / (n + 1);
      ti = (tr * ki + ti * kr) / (n + 1);
      tr = next;
    }
  }
}

/** factor ln z about z = distance e^(i angle). */
function addLogarithm(factor: number, distance: number, angle: number, cell: Float64Array): void {
  cell[0] += factor * Math.log(distance);
  cell[1] += factor * angle;
  for (let n = 1; n <= order; n += 1) {
    const size = ((n % 2 === 1 ? factor : -factor) / n) * distance ** -n;
    cell[2 * n] += size * Math.cos(n * angle);
    cell[2 * n + 1] -= size * Math.sin(n * angle);
  }
}
