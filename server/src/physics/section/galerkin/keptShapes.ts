/**
 * What was computed of conductors by their shapes, kept with the kernel: an edit of a gap moves conductors but leaves these as they are.
 *
 * Looked up by the numbers themselves: to write a dozen of them as text costs more than to solve a pair.
 */
import type { Kernel } from '../kernel/layeredKernel';
import type { OutsideView } from './outsideView';

export interface KeptShape {
  readonly shape: readonly number[];
  ownBlock: Float64Array | null;
  readonly views: KeptView[];
}

export interface KeptView {
  readonly distance: number;
  readonly constant: number;
  /** Null where there is none. */
  readonly view: OutsideView | null;
}

interface Kept {
  /** By width. */
  readonly shapes: Map<number, KeptShape[]>;
  count: number;
}

const kept = new WeakMap<Kernel, Kept>();
/** Of one kernel: some 20 kB each. */
const keptLimit = 512;
const viewLimit = 16;

export function keptShape(shape: readonly number[], kernel: Kernel): KeptShape {
  let own = kept.get(kernel);
  if (own === undefined) kept.set(kernel, (own = { shapes: new Map(), count: 0 }));
  const alike = own.shapes.get(shape[0]);
  if (alike !== undefined) for (const candidate of alike) if (areEqual(candidate.shape, shape)) return candidate;
  const made: KeptShape = { shape, ownBlock: null, views: [] };
  if (keptLimit <= own.count) {
    own.shapes.clear();
    own.count = 0;
  }
  own.count += 1;
  const row = own.shapes.get(shape[0]);
  if (row === undefined) own.shapes.set(shape[0], [made]);
  else row.push(made);
  return made;
}

function areEqual(a: readonly number[], b: readonly number[]): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i += 1) if (a[i] !== b[i]) return false;
  return true;
}

/** The view kept for these, or what `make` says. */
export function keptView({ views }: KeptShape, distance: number, constant: number, make: () => OutsideView | null): OutsideView | null {
  for (let i = 0; i < views.length; i += 1) if (views[i].distance === distance && views[i].constant === constant) return views[i].view;
  const view = make();
  if (viewLimit <= views.length) views.length = 0;
  views.push({ distance, constant, view });
  return view;
}
