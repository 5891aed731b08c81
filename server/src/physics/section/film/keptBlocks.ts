/**
 * Blocks of near pairs, kept with their kernel by the shapes of the two sides and how far they are apart: an edit of a gap, and
 * the next trace of the same width, meet most of them again. Near pairs cost most of a solve.
 *
 * Every block is computed with the first side at the origin and distances rounded, so that it is the same to the last digit
 * whoever asked first.
 */
import type { Side } from '../basis/side';
import type { Kernel } from '../kernel/layeredKernel';

/** A side without its place along the section. */
export interface Shape {
  readonly id: number;
  /** Starting at x = 0. */
  readonly atOrigin: Side;
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
  const made = { id: nextId, atOrigin: { ...side, x0: 0, x1, length: Math.hypot(x1, side.y1 - side.y0) } };
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

/** `compute` gets both sides in place and answers a block of its own. */
export function keptBlock({ kind, kernel, first, second, apart }: PairOfShapes, compute: (first: Side, second: Side) => Float64Array): Float64Array {
  const store = kind === 'potential' ? potentials : fluxes;
  let kept = store.get(kernel);
  if (kept === undefined) store.set(kernel, (kept = { blocks: new Map(), size: 0 }));
  const pair = first.id * 2 ** 26 + second.id;
  const steps = Math.round(apart / grain);
  const known = kept.blocks.get(pair)?.get(steps);
  if (known !== undefined) return known;
  const x = steps * grain;
  const made = compute(first.atOrigin, { ...second.atOrigin, x0: x, x1: x + second.atOrigin.x1 });
  if (keptLimit < kept.size + made.length) {
    kept.blocks.clear();
    kept.size = 0;
  }
  kept.size += made.length;
  const row = kept.blocks.get(pair);
  if (row === undefined) kept.blocks.set(pair, new Map([[steps, made]]));
  else row.set(steps, made);
  return made;
}
