/**
 * Integral of 1/R along a straight filament, seen from a point.
 *
 *            . P                Formula   ∫ dt / sqrt(rho² + (t - s)²), t = 0..l  =  asinh((l - s)/rho) + asinh(s/rho)
 *          /   \                Symbols   l length; s how far along the filament the foot of P lies, rho how far beside it (m)
 *   0 ----+--s--+---- l         Source    elementary; Grover, Inductance Calculations, 1946
 *                               Range     rho above 0, or 0 beyond either end; Infinity on the filament itself
 *                               Accuracy  rounding at every place
 */
export function filamentPotential(length: number, foot: number, beside: number): number {
  // Beyond an end the two terms would cancel; there R1 + R2 - l is a sum of positive distances.
  if (0 <= foot && foot <= length) return asinhOver(length - foot, beside) + asinhOver(foot, beside);
  const outside = foot < 0 ? -foot : foot - length;
  const near = Math.hypot(outside, beside);
  const far = Math.hypot(outside + length, beside);
  return 2 * Math.atanh(length / (near + far));
}

/** asinh(x/y) for a quotient that may overflow. */
function asinhOver(x: number, y: number): number {
  if (x === 0) return 0;
  const quotient = x / y;
  return quotient < 1e15 ? Math.asinh(quotient) : Math.log(2 * x) - Math.log(y);
}
