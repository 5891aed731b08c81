/**
 * The gaps of a run that lie between an aggressor and its victim: where the coupling crosses, and
 * where distance would lower it.
 */
import type { Net, Run, RunConductor } from '../board/model';

export interface GapsBetween {
  readonly row: number;
  /** Indices into the row's gaps, the one beside the victim first. */
  readonly gaps: readonly number[];
}

/** Null where the two do not lie in one row. Of several traces of one net, the nearest to each other. */
export function gapsBetween(run: Run, aggressor: Net, victim: Net): GapsBetween | null {
  let nearest: GapsBetween | null = null;
  run.rows.forEach(({ conductors }, row) => {
    for (const from of tracesOf(conductors, aggressor)) {
      for (const to of tracesOf(conductors, victim)) {
        const gaps = Array.from({ length: Math.abs(to - from) }, (_, i) => (from < to ? to - 1 - i : to + i));
        if (nearest === null || gaps.length < nearest.gaps.length) nearest = { row, gaps };
      }
    }
  });
  return nearest;
}

/** The trace of a net in a run, whichever row it lies in. */
export function traceOf(run: Run, net: Net): RunConductor | null {
  for (const { conductors } of run.rows) {
    const [index] = tracesOf(conductors, net);
    if (index !== undefined) return conductors[index]!;
  }
  return null;
}

function tracesOf(conductors: readonly RunConductor[], net: Net): readonly number[] {
  return conductors.flatMap((conductor, index) => (conductor.kind === 'trace' && conductor.net.name === net.name ? [index] : []));
}
