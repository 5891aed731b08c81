/**
 * A section in the unit of its own size, each conductor in the layer that it lies in.
 *
 * The unit makes a section and its enlargement the same numbers. A face within a millionth of an interface is put into it:
 * sums of thicknesses differ from heights by their rounding.
 */
import type { Trapezoid } from './basis/conductorSides';
import { stackHeight, stackOf, type Stack } from './kernel/stack';
import type { Section, SectionRefusal } from './section';

export interface Placement {
  readonly unit: number;
  readonly stack: Stack;
  readonly conductors: readonly Trapezoid[];
}

export function placementOf(section: Section): Placement | { readonly refused: SectionRefusal } {
  const unit = unitOf(section, stackOf(section, 1));
  const stack = stackOf(section, unit);
  const left = Math.min(...section.conductors.map(({ x }) => x));
  const conductors: Trapezoid[] = [];
  const smallest = section.conductors.reduce((least, { width, height }) => Math.min(least, width, 0 < height ? height : width), Infinity) / unit;
  if (stack.layers.some(({ bottom, top }) => top - bottom < thinnest * smallest)) return { refused: { reason: 'not-covered', what: 'a layer thinner than a thousandth of a conductor' } };
  for (const [index, { x, y, width, height, undercut }] of section.conductors.entries()) {
    const placed = place(stack, y / unit, (y + height) / unit, Math.min(width, 0 < height ? height : width) / unit);
    if (placed === null) return { refused: { reason: 'not-in-dielectric', conductor: index } };
    if (placed === 'near') return { refused: { reason: 'not-covered', what: 'a conductor nearer to an interface or plane than a thousandth of its size' } };
    conductors.push({ ...placed, x: (x - left) / unit, width: width / unit, undercut: undercut / unit });
  }
  return { unit, stack, conductors };
}

/** Images in a layer or a gap thinner than this, of a conductor's size, are so near that their integrals would take seconds. */
const thinnest = 1e-3;

/** The stack's height, or where it has none the conductors' own extent. */
function unitOf(section: Section, whole: Stack): number {
  const height = stackHeight(whole);
  if (0 < height) return height;
  const left = Math.min(...section.conductors.map(({ x }) => x));
  return Math.max(...section.conductors.map(({ x, y, width, height: own }) => Math.max(x + width - left, own, Math.abs(y), Math.abs(y + own))));
}

function place({ layers }: Stack, bottom: number, top: number, size: number): { readonly bottom: number; readonly top: number; readonly layer: number } | 'near' | null {
  const snap = 1e-6 * size;
  for (let layer = 0; layer < layers.length; layer += 1) {
    const { bottom: low, top: high } = layers[layer];
    if (bottom < low - snap || high + snap < top) continue;
    const onLow = Math.abs(bottom - low) <= snap;
    const onHigh = Math.abs(top - high) <= snap;
    // In the face of a plane it is the plane.
    if ((onLow && layer === 0) || (onHigh && layer === layers.length - 1)) return null;
    if ((!onLow && bottom - low < thinnest * size) || (!onHigh && high - top < thinnest * size)) return 'near';
    const placedBottom = onLow ? low : bottom;
    const placedTop = top === bottom ? placedBottom : onHigh ? high : top;
    // A strip of no height in an interface belongs to either side; the mirror makes it the same.
    return { bottom: placedBottom, top: placedTop, layer };
  }
  return null;
}
