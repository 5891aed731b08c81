/** Experiment driver for now. */
import { conductorSides, type Trapezoid } from '../basis/conductorSides';
import { sideOrders } from '../basis/orders';
import type { ChargeSolution } from '../galerkin/chargeSolution';
import { kernelsOf } from '../kernel/kernelCache';
import type { Stack } from '../kernel/stack';
import { filmCharge } from './filmCharge';
import { filmEdgeExponent } from './filmEdgeExponent';
import { filmOutline } from './outline';
import { outlinePanels } from './outlinePanels';

export interface FilmSetting {
  readonly effort: number;
  readonly first: number;
  readonly ratio: number;
  readonly longest: number;
  readonly reach: number;
  readonly cornerOrder: number;
  readonly middleOrder: number;
}

export interface FilmedStack {
  /** With the film in place of what lies over it. */
  readonly stack: Stack;
  readonly laminate: number;
  readonly thickness: number;
  readonly permittivity: number;
  readonly outside: number;
}

export function filmedCharge(film: FilmedStack, conductors: readonly Trapezoid[], signals: readonly number[], constant: number | null, setting: FilmSetting, surroundings: (own: Trapezoid) => Parameters<typeof sideOrders>[0]): ChargeSolution | null {
  const { stack, laminate, thickness, permittivity, outside } = film;
  const sides = conductors.flatMap((conductor, index) => conductorSides(conductor, index, stack, sideOrders(surroundings(conductor), setting.effort)));
  const layer = stack.layers.length - 1;
  const covered = conductors.filter((conductor) => laminate - 1e-9 <= conductor.bottom);
  const corners = filmOutline(covered.map(({ x, width, undercut, top }) => ({ left: Math.min(x, x + undercut), right: Math.max(x + width, x + width - undercut), top })), laminate, thickness);
  const panels = outlinePanels(corners, {
    first: setting.first * thickness, ratio: setting.ratio, longest: setting.longest, reach: setting.reach,
    cornerOrder: setting.cornerOrder, middleOrder: setting.middleOrder, edge: filmEdgeExponent(permittivity / outside) - 1, layer,
  });
  return filmCharge({ sides, conductors: signals, panels, kernel: kernelsOf(stack), permittivity, outside, constant });
}
