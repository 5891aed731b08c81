/**
 * The textbook's way to the capacitance of traces on a laminate over a plane, written plainly, to measure against.
 *
 *      ___     ___         Model     the charge of every side is constant on each of its pieces (pulses), and the potential is
 *     |___|   |___|                  right in the middle of each piece (point matching)
 *   -----------------      Method    potential of a piece: exact for itself and its image in the laminate's face, from its
 *       laminate                     middle for the images in the plane and beyond; Gaussian elimination
 *   =================      Formula   -ln r - K ln r0 + (1 - K²) sum of K^(n-1) ln rn, rn from the image 2 n h below the face's,
 *                                    K = (1 - e)/(1 + e), in units of Q / (2 pi eps0)
 *   Source    R. F. Harrington, Field Computation by Moment Methods, 1968; Silvester 1968 for the images; both from memory
 *
 * Kinder than the book in one thing: pieces get narrower towards the edges (by the cosine), without which the error falls with the
 * first power of their number.
 */
import { luFactor, luSolve } from '../../server/src/numeric/lu';

export interface Rectangle {
  readonly x: number;
  readonly width: number;
  readonly height: number;
}

export interface Pulses {
  readonly traces: readonly Rectangle[];
  /** Of the laminate. */
  readonly permittivity: number;
  readonly thickness: number;
  /** On the top and on the bottom of a trace; its walls have a third as many. */
  readonly count: number;
}

interface Piece {
  readonly x0: number;
  readonly y0: number;
  readonly x1: number;
  readonly y1: number;
  readonly trace: number;
}

/** In units of 2 pi eps0, row-major; heights count from the laminate's face. */
export function pulseCapacitance({ traces, permittivity, thickness, count }: Pulses): Float64Array {
  const pieces = traces.flatMap((trace, index) => piecesOf(trace, index, count));
  const order = pieces.length;
  const matrix = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) {
    const [x, y] = middle(pieces[i]);
    for (let j = 0; j < order; j += 1) matrix[i * order + j] = potential(pieces[j], x, y, permittivity, thickness);
  }
  const exchanged = luFactor(matrix, order);
  if (exchanged === null) throw new Error('singular');
  const result = new Float64Array(traces.length ** 2);
  for (let driven = 0; driven < traces.length; driven += 1) {
    const charge = Float64Array.from(pieces, ({ trace }) => (trace === driven ? 1 : 0));
    luSolve(matrix, exchanged, charge);
    pieces.forEach(({ trace }, i) => { result[trace * traces.length + driven] += charge[i]; });
  }
  return result;
}

function piecesOf({ x, width, height }: Rectangle, trace: number, count: number): Piece[] {
  const corners = [[x, 0], [x + width, 0], [x + width, height], [x, height]];
  return corners.flatMap(([x0, y0], side) => {
    const [x1, y1] = corners[(side + 1) % 4];
    const pieces = side % 2 === 0 ? count : Math.max(2, Math.round(count / 3));
    const at = (k: number) => (1 - Math.cos((Math.PI * k) / pieces)) / 2;
    return Array.from({ length: pieces }, (_, k) => ({ x0: x0 + (x1 - x0) * at(k), y0: y0 + (y1 - y0) * at(k), x1: x0 + (x1 - x0) * at(k + 1), y1: y0 + (y1 - y0) * at(k + 1), trace }));
  });
}

const middle = ({ x0, y0, x1, y1 }: Piece) => [(x0 + x1) / 2, (y0 + y1) / 2];

/** Of charge 1 on the piece. */
function potential(piece: Piece, x: number, y: number, permittivity: number, thickness: number): number {
  const k = (1 - permittivity) / (1 + permittivity);
  let sum = -meanLogarithm(piece, x, y) - k * meanLogarithm(piece, x, -y);
  const [px, py] = middle(piece);
  let strength = 1 - k * k;
  for (let n = 1; 1e-7 < Math.abs(strength); n += 1) {
    sum += strength * 0.5 * Math.log((x - px) ** 2 + (y + py + 2 * n * thickness) ** 2);
    strength *= k;
  }
  return sum;
}

/** Of the distance from a point to the piece. */
function meanLogarithm({ x0, y0, x1, y1 }: Piece, x: number, y: number): number {
  const length = Math.hypot(x1 - x0, y1 - y0);
  const along = ((x - x0) * (x1 - x0) + (y - y0) * (y1 - y0)) / length;
  const off = Math.abs((x - x0) * (y1 - y0) - (y - y0) * (x1 - x0)) / length;
  const upTo = (t: number) => (t === 0 && off === 0 ? 0 : 0.5 * t * Math.log(t * t + off * off) - t + (off === 0 ? 0 : off * Math.atan2(t, off)));
  return (upTo(length - along) - upTo(-along)) / length;
}
