/**
 * A rectangle cut into cells for the current that crowds to its surface: fine where it does, coarse inside.
 *
 *   |.|..|...|.....|.....|...|..|.|     each cell `growth` times its outer neighbour, the outermost a share of the skin depth
 */
export interface Cell {
  readonly x: number;
  readonly y: number;
  /** Half its size. */
  readonly halfWidth: number;
  readonly halfHeight: number;
}

/** Edges from 0 inwards to `half`, the last cell no larger than it has to be. */
export function gradedEdges(half: number, finest: number, growth: number): readonly number[] {
  const sizes: number[] = [];
  let sum = 0;
  for (let size = Math.min(finest, half / 2); sum < half; size *= growth) {
    sizes.push(size);
    sum += size;
  }
  // Stretched to fit: every cell by the same factor.
  let edge = 0;
  // The last exactly: a cell as thin as a rounding error would cancel every digit of its mean logarithm.
  return [0, ...sizes.slice(0, -1).map((size) => (edge += (size * half) / sum)), half];
}

/** Mean of ln r over two rectangles, whose centres are `x` and `y` apart; any may touch or be the same. */
export function meanLogarithm(a: Cell, b: Cell, x: number, y: number): number {
  const far = farCells * Math.max(a.halfWidth, a.halfHeight, b.halfWidth, b.halfHeight);
  if (far * far < x * x + y * y) return farMean(a, b, x, y);
  let sum = 0;
  for (const [i, dx] of offsets(a.halfWidth, b.halfWidth)) for (const [j, dy] of offsets(a.halfHeight, b.halfHeight)) sum += i * j * fourfold(Math.abs(x + dx), Math.abs(y + dy));
  return sum / (16 * a.halfWidth * a.halfHeight * b.halfWidth * b.halfHeight);
}

/** In units of the largest half size: beyond that the closed form would cancel its digits away, and the series needs no more terms. */
const farCells = 12;

/** ln r at the centres, with the second moments of both cells: the next term is below 1e-6. */
function farMean(a: Cell, b: Cell, x: number, y: number): number {
  const square = x * x + y * y;
  const spread = (a.halfWidth ** 2 + b.halfWidth ** 2 - a.halfHeight ** 2 - b.halfHeight ** 2) / 6;
  return Math.log(square) / 2 + (spread * (y * y - x * x)) / (square * square);
}

function offsets(a: number, b: number): readonly (readonly [number, number])[] {
  return [[1, a + b], [-1, a - b], [-1, b - a], [1, -a - b]];
}

/** Twice integrated over x and twice over y: its fourth mixed derivative is ln sqrt(x² + y²). */
function fourfold(x: number, y: number): number {
  const [xx, yy] = [x * x, y * y];
  if (xx + yy === 0) return 0;
  return ((6 * xx * yy - xx * xx - yy * yy) * Math.log(xx + yy)) / 48 + (x * xx * y * Math.atan2(y, x) + x * y * yy * Math.atan2(x, y)) / 6 - (25 / 48) * xx * yy;
}
