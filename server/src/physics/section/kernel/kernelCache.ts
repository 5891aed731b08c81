/**
 * Kernels by the numbers of their stack: an edit of a gap or a width meets the same ones again.
 *
 * The latest is looked at first, and numbers are compared as they are: to write them as text takes longer than what is found saves.
 */
import { layeredKernel, type Kernel } from './layeredKernel';
import type { Stack } from './stack';

interface KeptStack {
  readonly stack: Stack;
  /** Of the layers of source and observer. */
  readonly kernels: (Kernel | undefined)[];
  readonly kernel: (lower: number, upper: number) => Kernel;
}

/** The latest last. */
const kept: KeptStack[] = [];
const keptLimit = 64;

export function kernelsOf(stack: Stack): (lower: number, upper: number) => Kernel {
  for (let at = kept.length - 1; 0 <= at; at -= 1) {
    const found = kept[at];
    if (!areEqual(found.stack, stack)) continue;
    // Two stacks take turns, a section's and its own in air: no need to reorder those.
    if (at < kept.length - 2) kept.push(...kept.splice(at, 1));
    return found.kernel;
  }
  if (keptLimit <= kept.length) kept.shift();
  const made = keptStack(stack);
  kept.push(made);
  return made.kernel;
}

function areEqual(a: Stack, b: Stack): boolean {
  if (a.layers.length !== b.layers.length || a.planeBelow !== b.planeBelow || a.planeAbove !== b.planeAbove) return false;
  for (let i = 0; i < a.layers.length; i += 1) {
    const [own, other] = [a.layers[i], b.layers[i]];
    if (own.permittivity !== other.permittivity || own.bottom !== other.bottom || own.top !== other.top) return false;
  }
  return true;
}

function keptStack(stack: Stack): KeptStack {
  const kernels: (Kernel | undefined)[] = [];
  const { length } = stack.layers;
  return { stack, kernels, kernel: (lower, upper) => (kernels[lower * length + upper] ??= layeredKernel(stack, lower, upper)) };
}
