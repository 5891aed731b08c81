/**
 * Capacitance of a section with a film that follows the copper: what is put where, and how finely.
 *
 * Method    filmCharge.ts on the outline of outline.ts. Conductors in layers under the film belong as they are
 * Range     film on the upper face (upsideDown.ts for the other) that some copper stands out into (asLayers.ts for none), air
 *           or another open dielectric over it
 * Accuracy  against the reference case 2e-5 and 3e-5 (self and mutual); over seeded random pairs against the finest
 *           setting, see the test
 */
import { chargedConductors, openConstant } from '../basis/chargedConductor';
import type { ChargeSolution } from '../galerkin/chargeSolution';
import { kernelsOf } from '../kernel/kernelCache';
import { placementOf } from '../placement';
import type { Section } from '../section';
import { filmCharge, type FilmProblem } from './filmCharge';
import { filmEdgeExponent } from './filmEdgeExponent';
import { filmOutline } from './outline';
import { outlinePanels } from './outlinePanels';

export interface FilmedSolution extends ChargeSolution {
  /** Relative: errors up to this were seen that the difference to the coarser system does not show. */
  readonly unseen: number;
}

/** In units of 2 pi eps0; null where the system has no answer. `section` has its film above; `signals` are its conductors asked for. */
export function filmedCharge(section: Section, signals: readonly number[], effort: number): FilmedSolution | null {
  const posed = filmProblem(section, signals, effort);
  const solution = posed === null ? null : filmCharge(posed.problem);
  return posed === null || solution === null ? null : { ...solution, unseen: posed.unseen };
}

export interface PosedFilm {
  readonly problem: FilmProblem;
  readonly unseen: number;
}

/** Null where the section has no place for it. */
export function filmProblem(section: Section, signals: readonly number[], effort: number): PosedFilm | null {
  const { film, layers } = section;
  if (film === null) throw new Error('a section without a film');
  const outside = layers[layers.length - 1].permittivity;
  const placement = placementOf(filledWithFilm(section));
  if ('refused' in placement) return null;
  const { unit, stack, conductors } = placement;
  const laminate = laminateTop(section) / unit;
  const thickness = film.thickness / unit;
  const covered = conductors.filter(({ bottom, top, width }) => laminate - 1e-5 * Math.max(top - bottom, width) <= bottom);
  const shadows = covered.map(({ x, width, undercut, top }) => ({ left: x + Math.min(0, undercut), right: x + width - Math.min(0, undercut), top }));
  const corners = filmOutline(shadows, laminate, thickness);
  // A narrow slot of air between two boxes takes charge that changes fast along its walls.
  const slotted = corners.some(({ x }, i) => 0 < i && x !== corners[i - 1].x && x - corners[i - 1].x < narrow * thickness);
  const degree = 3 + effort + (slotted ? 1 : 0);
  const panels = outlinePanels(corners, {
    // Measured together on seeded random sections: shorter panels gain less than another polynomial.
    first: (3 - 0.4 * Math.min(effort, 4)) * thickness,
    firstOverNearest: 1.5,
    ratio: 4 - 0.4 * Math.min(effort, 4),
    longest: 3,
    longestOverEdges: 3 * thickness,
    edges: shadows.flatMap(({ left, right }) => [left, right]),
    reach: 50 * 2 ** effort,
    cornerOrder: degree,
    middleOrder: degree,
    edge: filmEdgeExponent(film.permittivity / outside) - 1,
    layer: stack.layers.length - 1,
  });
  const problem: FilmProblem = {
    // The copper's own setting is a step ahead: close conductors need it whatever covers them.
    conductors: chargedConductors(conductors, stack, effort + 1), signals, panels, kernel: kernelsOf(stack),
    permittivity: film.permittivity, outside, constant: openConstant(conductors, stack),
  };
  return { problem, unseen: (slotted ? 6e-4 : 1.5e-4) / 3.5 ** effort };
}

/** Of the film's thickness. */
const narrow = 0.3;

/** As if the film filled all the space above the laminate. */
export function filledWithFilm(section: Section): Section {
  const { film, layers } = section;
  const last = layers[layers.length - 1];
  return { ...section, film: null, layers: [...layers.slice(0, -1), { ...last, permittivity: film === null ? last.permittivity : film.permittivity }] };
}

/** Height of the face that the film lies on: the top of the uppermost finite layer. */
export function laminateTop({ layers }: Section): number {
  return layers.reduce((sum, { thickness }) => (thickness === Infinity ? sum : sum + thickness), 0);
}
