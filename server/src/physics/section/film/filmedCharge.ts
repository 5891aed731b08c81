/**
 * Capacitance of a section with a film that follows the copper: what is put where, and how finely.
 *
 * Method    filmCharge.ts on the outline of outline.ts. Conductors in layers under the film belong as they are; a film
 *           of the permittivity of what lies over it is none
 * Range     film on the upper face (upsideDown.ts for the other), air or another open dielectric over it
 * Accuracy  against the reference case 2e-5 and 3e-5 (self and mutual); over seeded random pairs against the finest
 *           setting, see the test
 */
import { chargedConductors, openConstant } from '../basis/chargedConductor';
import type { ChargeSolution } from '../galerkin/chargeSolution';
import { kernelsOf } from '../kernel/kernelCache';
import { placementOf } from '../placement';
import type { Section } from '../section';
import { filmCharge } from './filmCharge';
import { filmEdgeExponent } from './filmEdgeExponent';
import { filmOutline } from './outline';
import { outlinePanels, type PanelSetting } from './outlinePanels';

/** In units of 2 pi eps0; null where the system has no answer. `section` has its film above; `signals` are its conductors asked for. */
export function filmedCharge(section: Section, signals: readonly number[], effort: number): ChargeSolution | null {
  const { film, layers } = section;
  if (film === null) throw new Error('a section without a film');
  const outside = layers[layers.length - 1].permittivity;
  // As if the film filled all the space above the laminate.
  const placement = placementOf({ ...section, layers: [...layers.slice(0, -1), { ...layers[layers.length - 1], permittivity: film.permittivity }] });
  if ('refused' in placement) return null;
  const { unit, stack, conductors } = placement;
  const laminate = laminateTop(section) / unit;
  const thickness = film.thickness / unit;
  const covered = conductors.filter(({ bottom, top, width }) => laminate - 1e-5 * Math.max(top - bottom, width) <= bottom);
  const layer = stack.layers.length - 1;
  const corners = filmOutline(covered.map(({ x, width, undercut, top }) => ({ left: x + Math.min(0, undercut), right: x + width - Math.min(0, undercut), top })), laminate, thickness);
  const contrast = film.permittivity / outside;
  const panels = corners.length === 0 || contrast === 1 ? [] : outlinePanels(corners, panelSetting(thickness, filmEdgeExponent(contrast) - 1, layer, effort));
  return filmCharge({
    conductors: chargedConductors(conductors, stack, effort), signals, panels, kernel: kernelsOf(stack),
    permittivity: film.permittivity, outside, constant: openConstant(conductors, stack),
  });
}

/** Height of the face that the film lies on: the top of the uppermost finite layer. */
export function laminateTop({ layers }: Section): number {
  return layers.reduce((sum, { thickness }) => (thickness === Infinity ? sum : sum + thickness), 0);
}

function panelSetting(thickness: number, edge: number, layer: number, effort: number): PanelSetting {
  return { first: (3 - 0.4 * Math.min(effort, 4)) * thickness, firstOverNearest: 1.5, ratio: 4 - 0.4 * Math.min(effort, 4), longest: 3, reach: 50 * 2 ** effort, cornerOrder: 3 + effort, middleOrder: 3 + effort, edge, layer };
}
