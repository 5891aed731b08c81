/**
 * Which side is the mirror image of which, where a section is its own image about its vertical middle.
 *
 *   |  |            A mirrored side is run through backwards, so that the dielectric keeps its place beside it:
 *   s  |  image     its polynomial p_m is (-1)^m times the image's
 *   |  |
 */
import type { Side } from './side';

/** Of each side the index of its image, its own where it straddles the middle; null where some side has none. */
export function mirrorImages(sides: readonly Side[]): Int32Array | null {
  let [left, right] = [Infinity, -Infinity];
  for (const { x0, x1 } of sides) {
    left = Math.min(left, x0, x1);
    right = Math.max(right, x0, x1);
  }
  const images = new Int32Array(sides.length).fill(-1);
  for (let s = 0; s < sides.length; s += 1) {
    if (0 <= images[s]) continue;
    let t = s;
    while (t < sides.length && !isImage(sides[s], sides[t], left + right)) t += 1;
    if (t === sides.length) return null;
    images[s] = t;
    images[t] = s;
  }
  return images;
}

/** In the unit of the solve: far above the rounding of places, far below what any charge depends on. */
const tolerance = 1e-10;
const equal = (a: number, b: number) => Math.abs(a - b) <= tolerance;

function isImage(side: Side, other: Side, twiceMiddle: number): boolean {
  return equal(side.x0 + other.x1, twiceMiddle) && equal(side.x1 + other.x0, twiceMiddle) && equal(side.y0, other.y1) && equal(side.y1, other.y0)
    && side.order === other.order && side.layer === other.layer && side.basis.start === other.basis.end && side.basis.end === other.basis.start;
}
