/**
 * The sides of a trapezoid, each with its edge exponents and number of polynomials.
 *
 *      4-----3       Method    one side each; a wide bottom or top is cut into end panels, which carry the edge's
 *     /       \                exponent, and middle panels, which carry none
 *    1---------2     Formula   exponents from the dielectric's angles around each edge (wedgeExponent.ts)
 *
 * A conductor of no height is one side with the square-root edges of a thin strip, whatever dielectrics meet there.
 */
import type { Stack } from '../kernel/stack';
import { wedgeExponent } from './wedgeExponent';
import { sideBasis } from './sideBasis';
import type { Side } from './side';
import type { SideOrders } from './orders';

/** In the unit of the solve. */
export interface Trapezoid {
  readonly x: number;
  readonly bottom: number;
  readonly top: number;
  readonly width: number;
  readonly undercut: number;
  /** Of the stack; `bottom` and `top` may equal its faces. */
  readonly layer: number;
}

export function conductorSides(trapezoid: Trapezoid, conductor: number, stack: Stack, orders: SideOrders): Side[] {
  const { x, bottom, top, width, undercut, layer } = trapezoid;
  const right = x + width;
  if (top === bottom) return cut([x, bottom, right, bottom], -0.5, -0.5);
  const foot = bottomExponent(trapezoid, stack) - 1;
  const crown = topExponent(trapezoid, stack) - 1;
  return [
    ...cut([x, bottom, right, bottom], foot, foot),
    side([right, bottom, right - undercut, top], foot, crown, orders.wall),
    ...cut([right - undercut, top, x + undercut, top], crown, crown),
    side([x + undercut, top, x, bottom], crown, foot, orders.wall),
  ];

  function side([x0, y0, x1, y1]: readonly [number, number, number, number], start: number, end: number, order: number): Side {
    return { x0, y0, x1, y1, length: Math.hypot(x1 - x0, y1 - y0), basis: sideBasis(start, end), order, conductor, layer };
  }

  function cut([x0, y0, x1]: readonly [number, number, number, number], start: number, end: number): Side[] {
    const cuts = orders.cuts;
    const last = cuts.length - 2;
    return cuts.slice(0, -1).map((from, i) => side(
      // The ends exactly, so that neighbours meet.
      [i === 0 ? x0 : x0 + (x1 - x0) * from, y0, i === last ? x1 : x0 + (x1 - x0) * cuts[i + 1], y0],
      i === 0 ? start : 0, i === last ? end : 0, orders.panels[i],
    ));
  }
}

export function bottomExponent({ bottom, top, undercut, layer }: Trapezoid, { layers }: Stack): number {
  const neighbour = bottom === layers[layer].bottom ? layers[layer - 1] : undefined;
  return edgeExponent(Math.atan2(top - bottom, undercut), layers[layer].permittivity, neighbour?.permittivity);
}

export function topExponent({ bottom, top, undercut, layer }: Trapezoid, { layers }: Stack): number {
  const neighbour = top === layers[layer].top ? layers[layer + 1] : undefined;
  return edgeExponent(Math.PI - Math.atan2(top - bottom, undercut), layers[layer].permittivity, neighbour?.permittivity);
}

/** `metal` is the angle inside the conductor; a face that lies in an interface has the other dielectric all along it. */
function edgeExponent(metal: number, own: number, touching: number | undefined): number {
  if (touching === undefined) return wedgeExponent({ angle: 2 * Math.PI - metal, permittivity: own });
  return wedgeExponent({ angle: Math.PI - metal, permittivity: own }, { angle: Math.PI, permittivity: touching });
}
