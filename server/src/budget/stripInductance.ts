/** Inductance per length of a strip over planes of its stackup, by the cross-section solver. */
import type { CopperRow, PlaneRow, Run, Stackup } from '../board/model';
import { henriesPerMetre, metres, type InductancePerLength, type Length } from '../units/quantity';
import { stackupHeights } from './loops/stackupHeights';
import { runSections } from './runs/runSection';
import type { SolveCache } from './solveCache';

export interface StripOver {
  readonly layer: CopperRow;
  readonly stackup: Stackup;
  readonly width: Length;
  /** Planes that carry its current back; others of the stackup are cut away. */
  readonly over: readonly PlaneRow[];
}

export interface StripInductance {
  /** Of the strip's middle above the stackup's underside. */
  readonly height: Length;
  readonly inductance: InductancePerLength;
  /** Relative. */
  readonly errorBar: number;
}

/** Null where no plane carries the current back, or the section has no solution. */
export function stripInductance({ layer, stackup, width, over }: StripOver, cache: SolveCache): StripInductance | null {
  const place = layer.place;
  const given = { value: width, tolerance: 0, place };
  // As a run of one trace: what fills the board beside it is for the run's own rules to say.
  const run: Run = {
    name: '', place, whole: place, documentation: null, length: { value: metres(1), tolerance: 0, place }, stackup,
    rows: [{ layer, shift: null, conductors: [{ kind: 'return', name: '', width: given, place, whole: place }], gaps: [] }],
    without: stackup.rows.flatMap((row) => (row.kind === 'plane' && !over.includes(row) ? [row.name] : [])),
  };
  const [{ section }] = runSections(run);
  if (!section.planeAbove && !section.planeBelow) return null;
  const { solution } = cache.section({ ...section, conductors: section.conductors.map((conductor) => ({ ...conductor, role: 'signal' })) });
  if ('refused' in solution) return null;
  return { height: stackupHeights(stackup).get(layer)!.middle, inductance: henriesPerMetre(solution.solved.inductance[0]), errorBar: solution.solved.inductanceError[0] };
}
