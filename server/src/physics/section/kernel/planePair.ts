/**
 * Two planes with one dielectric between them, in closed form: all their images of a line charge, but not the charge itself.
 *
 *   ================ y1        Model     planes infinite, at zero potential
 *        o y'   . y            Method    conformal map of the strip on a half-plane; sinh² + sin² instead of cosh - cos,
 *   ================ y0                  which cancels where the two points are close
 *
 *   Formula   G = -1/2 ln[ (sinh²(q dx) + sin²(q(y - y'))) / (sinh²(q dx) + sin²(q(y + y' - 2 y0))) ],  q = pi / (2 (y1 - y0))
 *   Symbols   dx horizontal distance; the potential of a line charge Q is G Q / (2 pi eps)
 *   Source    textbook (conformal mapping of a strip), from memory; the test sums images
 *   Accuracy  1e-15 absolute
 */
export interface PlanePair {
  readonly low: number;
  readonly high: number;
}

/** G + ln r, smooth for all points between the planes. */
export function imagesBetweenPlanes({ low, high }: PlanePair, dx: number, y: number, ySource: number): number {
  const q = Math.PI / (2 * (high - low));
  const across = q * dx;
  const dy = y - ySource;
  const square = dx * dx + dy * dy;
  // e^-40 of the logarithm's own rounding: the two planes have shielded the charge.
  if (20 < Math.abs(across)) return 0.5 * Math.log(square);
  const sinh = Math.sinh(across);
  const difference = Math.sin(q * dy);
  const sum = Math.sin(q * (y + ySource - 2 * low));
  const numerator = sinh * sinh + difference * difference;
  const denominator = sinh * sinh + sum * sum;
  // Where numerator and square vanish together their ratio is q².
  const ratio = 0 < square && 1e-290 < numerator ? numerator / square : q * q;
  return 0.5 * Math.log(denominator / ratio);
}
