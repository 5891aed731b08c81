/**
 * Flat strip of zero thickness over a plane, one dielectric: exact, by a Schwarz-Christoffel map.
 *
 *       w            Half of the region, cut at the strip's middle, maps to a rectangle K × K':
 *    -------         C = 2 eps0 K(k')/K(k),   |A| = h 2 K(k')/pi   (Legendre's relation),   b = E(k')/K(k')
 *       | h          w/2 = |A| integral from 0 to phi of (b - k² / D²) / D,   D² = 1 - k'² sin²,   D(phi)² = k²/b
 *  =============     k by bracketing w/h.
 *
 * Source   derived here; the same configuration is solved by Love 1923 and Palmer 1937, from memory
 * Range    0.0003 < w/h < 40                     Accuracy  1e-9 (quadrature halves, and the narrow-strip limit)
 */
import { ellipticK } from '../../../server/src/numeric/ellipticK';
import { gaussJacobi } from '../../../server/src/numeric/gaussJacobi';
import { root } from '../../../server/src/numeric/root';
import { epsilon0 } from '../../../server/src/units/constants';

/** F/m, relative permittivity 1. */
export function stripOverPlaneCapacitance(w: number, h: number): number {
  // Searched in ln(K'/K), which is close to linear in ln(w/h): k itself spans hundreds of decades.
  const search = root((logRatio) => Math.log(widthOf(modulusOf(Math.exp(logRatio))) / (w / h)), { low: Math.log(0.3), high: Math.log(22), tolerance: 1e-13 });
  if (!('found' in search)) throw new Error(`no strip of w/h = ${w / h}: ${search.missing}`);
  return 2 * epsilon0 * Math.exp(search.found);
}

interface Moduli { readonly k: number; readonly complement: number }

/** Moduli of a given K(k')/K(k), by the nome q = exp(-pi K'/K) and its theta series. */
function modulusOf(ratio: number): Moduli {
  // For a small ratio the series of the exchanged moduli converges instead.
  if (ratio < 1) {
    const { k, complement } = modulusOf(1 / ratio);
    return { k: complement, complement: k };
  }
  const nome = Math.exp(-Math.PI * ratio);
  let second = 0;
  let third = 1;
  let fourth = 1;
  for (let n = 0; n < 12; n += 1) {
    second += 2 * nome ** ((n + 0.5) ** 2);
    const power = 2 * nome ** ((n + 1) ** 2);
    third += power;
    fourth += n % 2 === 0 ? -power : power;
  }
  return { k: Math.min(1, (second / third) ** 2), complement: Math.min(1, (fourth / third) ** 2) };
}

/** w/h of the strip that a modulus belongs to. */
function widthOf({ k, complement }: Moduli): number {
  const K = ellipticK(complement, k);
  const b = ellipticE(complement, k) / K;
  // Tip of the strip, where the map folds: D² = k²/b.
  const cosine = k * Math.sqrt(1 / b - 1) / complement;
  const phi = Math.atan2(Math.sqrt(1 - (k * k) / b) / complement, cosine);
  // D² = k² + k'² cos² shrinks to k² near pi/2: panels shrink with it, counted from pi/2.
  const rule = gaussJacobi(24, 0, 0);
  const start = Math.PI / 2 - phi;
  let sum = 0;
  for (let low = start; low < Math.PI / 2;) {
    const high = Math.min(Math.PI / 2, low + Math.max(k, low) / 2);
    for (let i = 0; i < 24; i += 1) {
      const angle = low + ((high - low) * (1 + rule.nodes[i])) / 2;
      const squared = k * k + (complement * Math.sin(angle)) ** 2;
      sum += ((rule.weights[i] * (high - low)) / 2) * (b - (k * k) / squared) / Math.sqrt(squared);
    }
    low = high;
  }
  return (2 * sum * 2 * K) / Math.PI;
}

/** Complete elliptic integral of the second kind, by the arithmetic-geometric mean (Abramowitz & Stegun 1964, 17.6). */
function ellipticE(modulus: number, complement: number): number {
  let a = 1;
  let g = complement;
  let c = modulus;
  let sum = (c * c) / 2;
  for (let power = 1; power < 1e12 && 1e-18 < Math.abs(c); power *= 2) {
    c = (a - g) / 2;
    const mean = (a + g) / 2;
    g = Math.sqrt(a * g);
    a = mean;
    sum += power * c * c;
  }
  return ellipticK(modulus, complement) * (1 - sum);
}
