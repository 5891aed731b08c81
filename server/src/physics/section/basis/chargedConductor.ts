/**
 * The conductors of a section cut into sides, with how finely: what the charge is solved on.
 */
import type { Stack } from '../kernel/stack';
import { conductorSides, type Trapezoid } from './conductorSides';
import { sideOrders, type Surroundings } from './orders';
import type { Side } from './side';

export interface ChargedConductor {
  /** Made when first asked for: conductors that were met before are solved without. */
  readonly sides: readonly Side[];
  /** Everything about its sides but where it lies across the section: those of equal shape have equal blocks of their own. */
  readonly shape: readonly number[];
  readonly effort: number;
  readonly layer: number;
  /** Of both faces. */
  readonly left: number;
  readonly right: number;
  /** Left end of its foot. */
  readonly foot: number;
  /** How far off another's field still looks like a free line charge's: from there on the planes shape it. */
  readonly reach: number;
  /** -1 where the nearest plane is below it, 1 where above, 0 where neither is nearer: what is down in one board is up in its mirror. */
  readonly lean: -1 | 0 | 1;
  /** The same sides with the left end of its foot at 0. */
  readonly atOrigin: () => readonly Side[];
}

export function chargedConductors(conductors: readonly Trapezoid[], stack: Stack, effort: number): ChargedConductor[] {
  return conductors.map((conductor, index) => charged({ conductor, index, stack, effort, orders: sideOrders(surroundingsOf(conductor, conductors, stack), effort) }));
}

interface Charging {
  readonly conductor: Trapezoid;
  readonly index: number;
  readonly stack: Stack;
  readonly effort: number;
  readonly orders: ReturnType<typeof sideOrders>;
}

function charged({ conductor, index, stack, effort, orders }: Charging): ChargedConductor {
  const { x, bottom, top, width, undercut, layer } = conductor;
  let sides: readonly Side[] | null = null;
  return {
    get sides() {
      return (sides ??= conductorSides(conductor, index, stack, orders));
    },
    effort,
    shape: [width, bottom, top, undercut, layer, effort, orders.wall, ...orders.panels, ...orders.cuts],
    layer,
    left: x + Math.min(0, undercut),
    right: x + width - Math.min(0, undercut),
    foot: x,
    reach: reachOf(conductor, stack),
    lean: leanOf(conductor, stack),
    atOrigin: () => conductorSides({ ...conductor, x: 0 }, index, stack, orders),
  };
}

function surroundingsOf(own: Trapezoid, all: readonly Trapezoid[], { layers, planeBelow, planeAbove }: Stack): Surroundings {
  let gap = Infinity;
  let facing = Infinity;
  for (const other of all) {
    if (other === own) continue;
    const across = Math.max(other.x - own.x - own.width, own.x - other.x - other.width, 0);
    const up = Math.max(other.bottom - own.top, own.bottom - other.top, 0);
    gap = Math.min(gap, Math.sqrt(across * across + up * up));
    // Beside the face by less than the distance in front of it still bends the charge there.
    if (0 < up && across < up) facing = Math.min(facing, up);
  }
  // An image in an interface that the conductor does not touch acts as a neighbour does.
  const { bottom: low, top: high } = layers[own.layer];
  for (const distance of [Math.max(own.bottom - low, low - own.top), Math.max(own.bottom - high, high - own.top)]) {
    if (0 < distance) gap = Math.min(gap, 2 * distance);
  }
  const below = planeBelow ? own.bottom - layers[0].bottom : Infinity;
  const above = planeAbove ? layers[layers.length - 1].top - own.top : Infinity;
  const depth = Math.min(below, above, facing);
  return { width: own.width, height: own.top - own.bottom, gap, depth, facesConductor: facing < Infinity };
}

function leanOf({ bottom, top }: Trapezoid, { layers, planeBelow, planeAbove }: Stack): -1 | 0 | 1 {
  const below = planeBelow ? bottom - layers[0].bottom : Infinity;
  const above = planeAbove ? layers[layers.length - 1].top - top : Infinity;
  // Sums of thicknesses round.
  if (Math.abs(below - above) < 1e-9 * (below + above)) return 0;
  return below < above ? -1 : above < below ? 1 : 0;
}

function reachOf({ width, bottom, top }: Trapezoid, { layers, planeBelow, planeAbove }: Stack): number {
  const below = planeBelow ? top - layers[0].bottom : Infinity;
  const above = planeAbove ? layers[layers.length - 1].top - bottom : Infinity;
  return Math.min(4 * (width + top - bottom), planeBelow && planeAbove ? (below + above) / 2 : 2 * Math.min(below, above));
}

/** A potential larger than any negative one that a charge can have within the section; null where planes give it a zero. */
export function openConstant(conductors: readonly Trapezoid[], { layers, planeBelow, planeAbove }: Stack): number | null {
  if (planeBelow || planeAbove) return null;
  const left = Math.min(...conductors.map(({ x }) => x));
  const right = Math.max(...conductors.map(({ x, width }) => x + width));
  const low = Math.min(...conductors.map(({ bottom }) => bottom));
  const high = Math.max(...conductors.map(({ top }) => top));
  const extent = Math.max(right - left, high - low);
  const smallest = Math.min(...layers.map(({ permittivity }) => permittivity));
  // Rounded up, so that an edit of a gap leaves it as it is.
  return Math.ceil(4 + Math.max(0, Math.log(extent))) / smallest;
}
