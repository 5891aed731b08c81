/**
 * A cross-section as the solver sees it: planar dielectrics, straight-sided conductors, up to two
 * planes of zero potential. Numbers only, SI; y points up.
 */
import type { Length } from '../../units/quantity';

export interface Section {
  /** Between the planes or half-spaces, from bottom to top; `thickness` of the outermost is Infinity where no plane ends it. */
  readonly layers: readonly SectionLayer[];
  /** A plane of zero potential below the lowest and above the uppermost layer. */
  readonly planeBelow: boolean;
  readonly planeAbove: boolean;
  /** In the order of the matrices. */
  readonly conductors: readonly SectionConductor[];
  /** Solder mask that follows the copper: on the laminate, on the traces' tops and on their sides. */
  readonly film: SectionFilm | null;
}

export interface SectionLayer {
  readonly permittivity: number;
  readonly thickness: Length;
}

/** A trapezoid between `y` and `y + height`. */
export interface SectionConductor {
  /** `reference`: at zero potential with the planes; without planes, the joined references are the zero of potential. */
  readonly role: 'signal' | 'reference';
  /** Left edge of the bottom face. */
  readonly x: Length;
  /** Bottom face, from the top of the plane below (or the bottom of the lowest finite layer). */
  readonly y: Length;
  readonly width: Length;
  readonly height: Length;
  /** How much narrower each side is at the top than at the bottom; negative where the top is the wider face. */
  readonly undercut: Length;
}

export interface SectionFilm {
  readonly permittivity: number;
  readonly thickness: Length;
  /** The face that the film lies on: the top of the uppermost or the bottom of the lowest laminate layer. */
  readonly side: 'above' | 'below';
}

/** Maxwell form, of the signal conductors only, row-major; references reduced out. */
export interface SectionMatrices {
  readonly order: number;
  /** F/m */
  readonly capacitance: Float64Array;
  /** F/m, every dielectric replaced by vacuum. */
  readonly capacitanceInAir: Float64Array;
  /** H/m; external inductance, high-frequency limit. */
  readonly inductance: Float64Array;
  /** Relative error bar of every entry, row-major: of `capacitance` and of `inductance`. */
  readonly capacitanceError: Float64Array;
  readonly inductanceError: Float64Array;
  /** Unknowns of the finest system solved: the work done. */
  readonly unknowns: number;
}

export type SectionRefusal =
  | { readonly reason: 'no-reference' | 'no-signal' }
  | { readonly reason: 'overlap' | 'touching'; readonly first: number; readonly second: number }
  | { readonly reason: 'not-in-dielectric' | 'degenerate'; readonly conductor: number }
  | { readonly reason: 'too-many'; readonly limit: number }
  /** A geometry that this solver does not yet cover. */
  | { readonly reason: 'not-covered'; readonly what: string }
  /** A factorisation failed or a residual was over its limit at every setting. */
  | { readonly reason: 'not-solved'; readonly what: string };

export type SectionSolution = { readonly solved: SectionMatrices } | { readonly refused: SectionRefusal };

