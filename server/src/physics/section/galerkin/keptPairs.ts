/**
 * Blocks of two views, kept by how far they are apart: in a bus most pairs have their like, and an edit of one gap leaves all
 * pairs on either side of it as they were.
 *
 * Distances are rounded before anything is computed, so that a block is the same to the last digit whoever asked first.
 */
import type { OutsideView } from './outsideView';

let pairs = new Map<OutsideView, Map<OutsideView, Map<number, Float64Array>>>();
let size = 0;
/** Numbers kept: 16 MB. */
const keptLimit = 1 << 21;

/** `write` gets the rounded distance from the lower one's foot to the upper's, and answers a block of its own. */
export function keptPair(upper: OutsideView, lower: OutsideView, apart: number, write: (apart: number) => Float64Array): Float64Array {
  const steps = Math.round(apart / grain);
  let row = pairs.get(upper);
  if (row === undefined) pairs.set(upper, (row = new Map()));
  let blocks = row.get(lower);
  if (blocks === undefined) row.set(lower, (blocks = new Map()));
  const known = blocks.get(steps);
  if (known !== undefined) return known;
  const made = write(steps * grain);
  size += made.length;
  if (keptLimit < size) {
    // This one is lost with the others, and made again by who asks for it next.
    pairs = new Map();
    size = 0;
    return made;
  }
  blocks.set(steps, made);
  return made;
}

/** Of the unit of the solve: far below what any block depends on, far above the rounding of places. */
const grain = 1e-10;
