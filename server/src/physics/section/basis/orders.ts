/**
 * How many polynomials each side of a conductor gets, and where wide sides are cut.
 *
 * Model     beside an edge the charge changes over the conductor's height and over the gap to its neighbour, so the wider a
 *           side is than these, the more polynomials. Further in than the plane's distance it is nearly uniform, so sides
 *           wider than 2.6 of that are cut: end panels of 1.2, middle panels of 3 that grow threefold; of 2 that do
 *           not grow where it is another conductor that the side faces, whose edges may be anywhere; 16 of them at most
 * Symbols   effort 0, 1, 2 …: each step adds a polynomial to every side and more to wide ones
 * Accuracy  measured in the test on seeded random sections
 */
export interface SideOrders {
  /** Of the bottom and the top, 0 to 1. */
  readonly cuts: readonly number[];
  /** One for each piece between cuts. */
  readonly panels: readonly number[];
  readonly wall: number;
}

export interface Surroundings {
  readonly width: number;
  readonly height: number;
  /** To the nearest neighbour, or image of itself. */
  readonly gap: number;
  /** Upwards or downwards, to the nearest plane or conductor in front of a wide face. */
  readonly depth: number;
  /** True where that is a conductor: its edges may lie before any part of the face. */
  readonly facesConductor: boolean;
}

export function sideOrders({ width, height, gap, depth, facesConductor }: Surroundings, effort: number): SideOrders {
  const cuts = facesConductor ? cutsOf(width, Math.max(depth, width / 32), 2, 1) : cutsOf(width, depth, 3, 3);
  const detail = Math.max(height, 0.02 * width);
  const span = Math.log2(Math.min(width, 2 * depth) / Math.min(4 * detail, 2 * gap));
  const extra = Math.round((1.3 + 0.3 * effort) * Math.max(0, span));
  const ends = Math.min(4 + effort + extra, most);
  const count = cuts.length - 1;
  const middle = Math.min(3 + effort + (facesConductor ? 2 : 0), most);
  const panels = Array.from({ length: count }, (_, i) => (count === 1 || i === 0 || i === count - 1 ? ends : middle));
  return { cuts, panels, wall: Math.min(3 + effort + Math.round(Math.max(0, Math.log2(height / (2 * gap)))), most) };
}

const most = 16;

function cutsOf(width: number, depth: number, first: number, growth: number): number[] {
  if (width <= 2.6 * depth) return [0, 1];
  const end = Math.min(1.2 * depth, width / 3);
  const half: number[] = [];
  let at = end;
  let piece = first * depth;
  // The piece in the middle takes up what is left on both sides of the centre.
  do {
    half.push(at / width);
    at += piece;
    piece *= growth;
  } while (at < width / 2 - piece / 6);
  return [0, ...half, ...half.map((cut) => 1 - cut).reverse(), 1];
}
