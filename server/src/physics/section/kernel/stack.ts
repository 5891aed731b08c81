/**
 * The planar dielectrics of a section in the form the kernel is built from: neighbours of equal permittivity
 * merged, interfaces by height, lengths in a unit of the section's own size.
 */
import type { Section } from '../section';

export interface Stack {
  /** From bottom to top; the outermost reach to -Infinity or Infinity where no plane ends them. */
  readonly layers: readonly StackLayer[];
  readonly planeBelow: boolean;
  readonly planeAbove: boolean;
}

export interface StackLayer {
  readonly permittivity: number;
  readonly bottom: number;
  readonly top: number;
}

/** Lengths divided by `unit`. An interface between equal dielectrics would otherwise get a mirror image of strength zero. */
export function stackOf({ layers, planeBelow, planeAbove }: Pick<Section, 'layers' | 'planeBelow' | 'planeAbove'>, unit: number): Stack {
  const merged: { permittivity: number; bottom: number; top: number }[] = [];
  // Height zero is the lower plane's face, or the bottom of the lowest finite layer.
  let height = planeBelow ? 0 : -Infinity;
  for (const { permittivity, thickness } of layers) {
    const bottom = height;
    height = height === -Infinity ? (layers.length === 1 ? Infinity : 0) : height + thickness / unit;
    const below = merged.at(-1);
    if (below?.permittivity === permittivity) below.top = height;
    else if (bottom < height) merged.push({ permittivity, bottom, top: height });
  }
  return { layers: merged, planeBelow, planeAbove };
}

/** The same places with nothing in them. */
export function inAir(stack: Stack): Stack {
  const bottom = stack.layers[0].bottom;
  const top = stack.layers[stack.layers.length - 1].top;
  return { ...stack, layers: [{ permittivity: 1, bottom, top }] };
}

/** From the lowest finite interface to the uppermost: 0 where there is at most one. */
export function stackHeight({ layers }: Stack): number {
  const first = layers[0];
  const last = layers[layers.length - 1];
  const low = first.bottom === -Infinity ? first.top : first.bottom;
  const high = last.top === Infinity ? last.bottom : last.top;
  return low < high && high < Infinity && -Infinity < low ? high - low : 0;
}
