/**
 * A quantity of a strip of zero thickness, from strips of small thickness.
 *
 * A thin strip acts as one that is wider by about (t/pi)(1 + ln(…/t)), so the quantity runs as c0 + c1 t ln t + c2 t:
 * fitted through t, t/2 and t/4, c0 is what is left. The next terms are of order (t ln t)².
 */
export function thinLimit(quantities: (thickness: number) => readonly number[], t: number): number[] {
  const [coarse, middle, fine] = [t, t / 2, t / 4].map(quantities);
  // In units of t: thicknesses 1, 1/2, 1/4 and x ln x = 0, -ln2/2, -ln2/2 of them.
  return coarse.map((a, i) => {
    const b = middle[i];
    const c = fine[i];
    // a = c0 + c2, b = c0 - c1 ln2/2 + c2/2, c = c0 - c1 ln2/2 + c2/4.
    const c2 = 4 * (b - c);
    return a - c2;
  });
}
