/**
 * The outer face of a film that follows the copper, as a line of horizontal and vertical steps.
 *
 *          ._________.                     Geometry  flat at `thickness` over the laminate; over each conductor a box
 *          |  .---.  |      ._____                   whose roof is `thickness` above the conductor's top and whose
 *   _______|  |   |  |______|                        sides are vertical, `thickness` from its wider face (also where
 *   ----------'---'------------- laminate            the copper is undercut); square corners. Boxes that meet, overlap, or leave
 *                                                    less than a fiftieth of the film's thickness of air between
 *                                                    them are one: the film fills the gap up to the roof
 *
 * Real film has rounded, thinner shoulders; this is the usual idealisation, and that of the reference cases.
 */
export interface FilmedConductor {
  /** Extremes of both faces. */
  readonly left: number;
  readonly right: number;
  /** Top face. */
  readonly top: number;
}

export interface OutlinePoint {
  readonly x: number;
  readonly y: number;
}

/** Corners from left to right; before the first and after the last the film is flat. */
export function filmOutline(conductors: readonly FilmedConductor[], laminate: number, thickness: number): OutlinePoint[] {
  const flat = laminate + thickness;
  const boxes = conductors.map(({ left, right, top }) => ({ left: left - thickness, right: right + thickness, roof: top + thickness }));
  const corners: OutlinePoint[] = [];
  let height = flat;
  for (const { from, roof } of steps(boxes, flat, closedSlot * thickness)) {
    if (Math.abs(roof - height) <= negligibleStep * thickness) continue;
    corners.push({ x: from, y: height }, { x: from, y: roof });
    height = roof;
  }
  return corners;
}

/** Of the film's thickness: no film leaves such a slot, and the charge on its walls is the hardest to resolve. */
const closedSlot = 0.02;
/** Of the film's thickness: lower steps are none. */
export const negligibleStep = 1e-3;

interface Box { readonly left: number; readonly right: number; readonly roof: number }

/** Height of the union of the boxes, from each place where it may change. */
function steps(boxes: readonly Box[], flat: number, narrow: number): { from: number; roof: number }[] {
  const places = [...new Set(boxes.flatMap(({ left, right }) => [left, right]))].sort((a, b) => a - b);
  const found = places.map((from, i) => {
    const middle = (from + (places[i + 1] ?? from)) / 2;
    const over = boxes.filter(({ left, right }) => left < middle && middle < right);
    return { from, to: places[i + 1] ?? Infinity, roof: over.reduce((roof, box) => Math.max(roof, box.roof), flat) };
  });
  // A slot or sliver takes the height of its higher neighbour.
  return found.map(({ from, to, roof }, i) => ({
    from,
    roof: narrow < to - from ? roof : Math.max(roof, Math.min(found[i - 1]?.roof ?? flat, found[i + 1]?.roof ?? flat)),
  }));
}
