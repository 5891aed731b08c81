/** Kernels by the numbers of their stack: an edit of a gap or a width meets the same ones again. */
import { layeredKernel, type Kernel } from './layeredKernel';
import type { Stack } from './stack';

const kept = new Map<string, Map<number, Kernel>>();
const keptLimit = 64;

export function kernelsOf(stack: Stack): (lower: number, upper: number) => Kernel {
  const { layers, planeBelow, planeAbove } = stack;
  const key = JSON.stringify([planeBelow, planeAbove, ...layers.flatMap(({ permittivity, top }) => [permittivity, top])]);
  let kernels = kept.get(key);
  if (kernels === undefined) {
    // The oldest goes: a map lists its keys in the order they came.
    if (keptLimit <= kept.size) kept.delete(kept.keys().next().value as string);
    kernels = new Map();
    kept.set(key, kernels);
  }
  const known = kernels;
  return (lower, upper) => {
    const at = lower * layers.length + upper;
    let kernel = known.get(at);
    if (kernel === undefined) {
      kernel = layeredKernel(stack, lower, upper);
      known.set(at, kernel);
    }
    return kernel;
  };
}
