/**
 * Blocks of near pairs, kept with their kernel by the shapes of the two sides and how far they are apart: an edit of a gap, and
 * the next trace of the same width, meet most of them again. Near pairs cost most of a solve.
 *
 * A pair and its mirror image have the same block but for signs (mirrorImages.ts): the two halves of a box share theirs.
 * Every block is computed with the first side at the origin, distances rounded, and of the two images always the same one, so
 * that it is the same to the last digit whoever asked first.
 */
import { sideBasis } from '../basis/sideBasis';
import type { Side } from '../basis/side';
import type { Kernel } from '../kernel/layeredKernel';

/** A side without its place along the section. */
export interface Shape {
  readonly id: number;
  readonly key: string;
  /** From its start to its end, in grains. */
  readonly across: number;
  /** Starting at x = 0. */
  readonly atOrigin: Side;
  /** The same side in a mirror, run through backwards. */
  readonly mirrored: () => Shape;
}

const shapes = new Map<string, Shape>();
const shapeLimit = 20_000;
let nextId = 1;
/** Of the unit of the solve: far below what any block depends on, far above the rounding of places. */
const grain = 1e-10;

export function shapeOf(side: Side): Shape {
  const across = Math.round((side.x1 - side.x0) / grain);
  const key = `${across} ${side.y0} ${side.y1} ${side.order} ${side.layer} ${side.basis.start} ${side.basis.end}`;
  const known = shapes.get(key);
  if (known !== undefined) return known;
  if (shapeLimit <= shapes.size) shapes.clear();
  const x1 = across * grain;
  let image: Shape | null = null;
  const atOrigin = { ...side, x0: 0, x1, length: Math.hypot(x1, side.y1 - side.y0) };
  const made: Shape = { id: nextId, key, across, atOrigin, mirrored: () => (image ??= shapeOf({ ...atOrigin, y0: side.y1, y1: side.y0, basis: sideBasis(side.basis.end, side.basis.start) })) };
  nextId += 1;
  shapes.set(key, made);
  return made;
}

interface Kept {
  readonly blocks: Map<number, Map<number, Float64Array>>;
  size: number;
}

const potentials = new WeakMap<Kernel, Kept>();
const fluxes = new WeakMap<Kernel, Kept>();
/** Numbers kept for one kernel: 4 MB. */
const keptLimit = 1 << 19;

export interface PairOfShapes {
  readonly kind: 'potential' | 'flux';
  readonly kernel: Kernel;
  readonly first: Shape;
  readonly second: Shape;
  /** From the start of the first to the start of the second. */
  readonly apart: number;
}

/** `compute` gets both sides in place and answers a block of its own, row by row of the first side's polynomials. */
export function keptBlock(pair: PairOfShapes, compute: (first: Side, second: Side) => Float64Array): Float64Array {
  return keptAt(pair, Math.round(pair.apart / grain), compute);
}

function keptAt(pair: PairOfShapes, steps: number, compute: (first: Side, second: Side) => Float64Array): Float64Array {
  const { kind, kernel, first, second } = pair;
  const store = kind === 'potential' ? potentials : fluxes;
  let kept = store.get(kernel);
  if (kept === undefined) store.set(kernel, (kept = { blocks: new Map(), size: 0 }));
  const ids = first.id * 2 ** 26 + second.id;
  const known = kept.blocks.get(ids)?.get(steps);
  if (known !== undefined) return known;
  const made = blockOf(pair, steps, compute);
  if (keptLimit < kept.size + made.length) {
    kept.blocks.clear();
    kept.size = 0;
  }
  kept.size += made.length;
  const row = kept.blocks.get(ids);
  if (row === undefined) kept.blocks.set(ids, new Map([[steps, made]]));
  else row.set(steps, made);
  return made;
}

/** Computed as it stands, or taken from its mirror image. */
function blockOf(pair: PairOfShapes, steps: number, compute: (first: Side, second: Side) => Float64Array): Float64Array {
  const { first, second } = pair;
  const stepsInMirror = first.across - second.across - steps;
  if (stepsInMirror < steps || (stepsInMirror === steps && !mirrorIsFirst(first, second))) {
    const x = steps * grain;
    return compute(first.atOrigin, { ...second.atOrigin, x0: x, x1: x + second.atOrigin.x1 });
  }
  const image = keptAt({ ...pair, first: first.mirrored(), second: second.mirrored() }, stepsInMirror, compute);
  const block = Float64Array.from(image);
  const columns = second.atOrigin.order;
  for (let m = 0; m * columns < block.length; m += 1) {
    // Run through backwards, p_n changes its sign with its parity.
    for (let n = (m + 1) % 2; n < columns && m * columns + n < block.length; n += 2) block[m * columns + n] = -block[m * columns + n];
  }
  return block;
}

/** Which of two images at equal distances is computed: by what they are, not by who came first. */
function mirrorIsFirst(first: Shape, second: Shape): boolean {
  const [own, other] = [`${first.key} ${second.key}`, `${first.mirrored().key} ${second.mirrored().key}`];
  return other < own;
}
