/**
 * A circle of current: its vector potential, and its mutual inductance with a coaxial circle.
 *
 *        | z       P (rho, z)      Formula   k² = 4 a rho / ((a + rho)² + z²),  g(k) = (1 - k²/2) K(k) - E(k)
 *        |        .                          A_phi = mu0 I / (pi k) sqrt(a/rho) g(k);   M = 2 mu0 sqrt(a b) g(k) / k
 *   -----+-----a---> rho           Symbols   a, b radii, z along the axis (m)
 *                                  Method    g by the arithmetic-geometric mean as a sum of positive terms: g = K Σ 2^(n-1) c_n², n >= 1;
 *                                            the difference of K and E would lose all digits far away
 *                                  Source    Maxwell, Treatise 1873, art. 701; Grover 1946 ch. 11; sum: Abramowitz & Stegun 17.6, from memory
 *                                  Range     everywhere but on the circle itself       Accuracy  rounding at all distances
 */

/** N = 4 pi M / mu0 of two coaxial circles, m; `apart` between their planes. */
export function coaxialNeumann(a: number, b: number, apart: number): number {
  const { modulus, complement } = modulusOf(a, b, apart);
  return (8 * Math.PI * Math.sqrt(a) * Math.sqrt(b) * reducedIntegral(modulus, complement)) / modulus;
}

/** A_phi 4 pi / mu0 for 1 A, no unit. On the axis 0. */
export function circlePotential(a: number, rho: number, z: number): number {
  if (rho === 0) return 0;
  const { modulus, complement } = modulusOf(a, rho, z);
  return (4 / modulus) * Math.sqrt(a / rho) * reducedIntegral(modulus, complement);
}

function modulusOf(a: number, rho: number, z: number): { modulus: number; complement: number } {
  const far = Math.hypot(a + rho, z);
  return { modulus: (2 * Math.sqrt(a) * Math.sqrt(rho)) / far, complement: Math.hypot(a - rho, z) / far };
}

/** (1 - k²/2) K(k) - E(k), from k and sqrt(1 - k²). */
function reducedIntegral(modulus: number, complement: number): number {
  if (complement === 0) return Infinity;
  let arithmetic = (1 + complement) / 2;
  let geometric = Math.sqrt(complement);
  let gap = (modulus * modulus) / (2 * (1 + complement));
  let weight = 1;
  let sum = gap * gap;
  for (let round = 0; round < 40 && 1e-17 * arithmetic < gap; round += 1) {
    const mean = (arithmetic + geometric) / 2;
    geometric = Math.sqrt(arithmetic * geometric);
    gap = (gap * gap) / (4 * mean);
    arithmetic = mean;
    weight *= 2;
    sum += weight * gap * gap;
  }
  return (Math.PI / (2 * arithmetic)) * sum;
}
