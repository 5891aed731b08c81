/**
 * An orthonormal basis of the first few directions that a set of vectors needs, the largest remainder first.
 *
 * Method    Gram-Schmidt with pivoting; each vector that is taken is cleared once more of what rounding has left in it
 * Source    textbook; Golub & Van Loan
 */
export interface VectorSet {
  /** One after the other; overwritten: what is left of each, but of the pivots the basis. */
  readonly vectors: Float64Array;
  readonly count: number;
  readonly length: number;
  /** Only so many of the first may be taken; all where it is not said. */
  readonly eligible?: number;
  /** Times the square of each, where it is compared with the others: who is to be taken of two that are equal but for rounding. */
  readonly preference?: Float64Array;
}

export interface PivotedBasis {
  readonly count: number;
  /** Which vectors were taken, in order. */
  readonly pivots: Int32Array;
  /** count × vectors of every set: the vectors in its basis, row-major. */
  readonly parts: readonly Float64Array[];
}

/**
 * Until no remainder is longer than `tolerance`; at most `most` of them. Of several sets of equally many vectors, each has a basis
 * of its own, but the same vectors are taken of all.
 */
export function pivotedBasis(sets: readonly VectorSet[], tolerance: number, most: number): PivotedBasis {
  const [{ count }] = sets;
  const pivots = new Int32Array(Math.min(most, count, Math.max(...sets.map(({ length }) => length))));
  const parts = sets.map(() => new Float64Array(pivots.length * count));
  const squares = sets.map(({ vectors, length }) => Float64Array.from({ length: count }, (_, v) => product(vectors, v, v, length)));
  const taken = new Uint8Array(count);
  const { eligible = count, preference = null } = sets[0];
  let found = 0;
  while (found < pivots.length) {
    const best = largest(squares, taken, eligible, preference);
    if (best < 0 || !isLonger(squares, best, tolerance)) break;
    // Subtraction may have left more than is there.
    for (let s = 0; s < sets.length; s += 1) squares[s][best] = product(sets[s].vectors, best, best, sets[s].length);
    if (!isLonger(squares, best, tolerance)) continue;
    taken[best] = 1;
    for (let s = 0; s < sets.length; s += 1) take(sets[s], squares[s], parts[s], { best, found, taken, pivots, tolerance });
    pivots[found] = best;
    found += 1;
  }
  return { count: found, pivots: pivots.subarray(0, found), parts };
}

function isLonger(squares: readonly Float64Array[], v: number, tolerance: number): boolean {
  for (let s = 0; s < squares.length; s += 1) if (tolerance * tolerance < squares[s][v]) return true;
  return false;
}

function largest(squares: readonly Float64Array[], taken: Uint8Array, eligible: number, preference: Float64Array | null): number {
  let best = -1;
  let size = 0;
  for (let v = 0; v < eligible; v += 1) {
    if (taken[v] === 1) continue;
    let sum = 0;
    for (let s = 0; s < squares.length; s += 1) sum += squares[s][v];
    if (preference !== null) sum *= preference[v];
    if (size < sum) {
      best = v;
      size = sum;
    }
  }
  return best;
}

interface Step {
  readonly best: number;
  readonly found: number;
  readonly taken: Uint8Array;
  readonly pivots: Int32Array;
  readonly tolerance: number;
}

function take({ vectors, count, length }: VectorSet, squares: Float64Array, parts: Float64Array, { best, found, taken, pivots, tolerance }: Step): void {
  for (let f = 0; f < found; f += 1) parts[f * count + best] += clear(vectors, best, pivots[f], length);
  const size = Math.sqrt(product(vectors, best, best, length));
  // Taken for another set's sake, it may have nothing left in this one.
  const scale = tolerance / 4 < size ? 1 / size : 0;
  for (let i = 0, at = best * length; i < length; i += 1, at += 1) vectors[at] *= scale;
  parts[found * count + best] = scale === 0 ? 0 : size;
  for (let v = 0; v < count; v += 1) {
    if (taken[v] === 1) continue;
    if (scale === 0) continue;
    const part = clear(vectors, v, best, length);
    parts[found * count + v] = part;
    // Shorter by what was taken out; afresh where little is left, for rounding's sake.
    const left = squares[v] - part * part;
    squares[v] = left < lost * squares[v] ? product(vectors, v, v, length) : left;
  }
}

/** Of a square: less is not left by subtraction with enough digits. */
const lost = 1e-3;

function product(vectors: Float64Array, a: number, b: number, length: number): number {
  let sum = 0;
  for (let i = 0, at = a * length, to = b * length; i < length; i += 1) sum += vectors[at + i] * vectors[to + i];
  return sum;
}

/** Takes the part along the unit vector `unit` out of vector `v`. */
function clear(vectors: Float64Array, v: number, unit: number, length: number): number {
  const part = product(vectors, v, unit, length);
  for (let i = 0, at = v * length, from = unit * length; i < length; i += 1) vectors[at + i] -= part * vectors[from + i];
  return part;
}
