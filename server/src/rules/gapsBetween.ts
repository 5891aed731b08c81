/**
 * The gaps of a run that lie between an aggressor and its victim: where the coupling crosses, and
 * where distance would lower it.
 */
import type { Net, Pair, Run, RunConductor } from '../board/model';

export interface GapsBetween {
  readonly row: number;
  /** Indices into the row's gaps, the one beside the victim first. */
  readonly gaps: readonly number[];
}

/** Null where the two do not lie in one row. Of several traces, and of the nets of a pair, the nearest to each other. */
export function gapsBetween(run: Run, aggressor: Net | Pair, victim: Net | Pair): GapsBetween | null {
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

/** The first trace of a net, or of a pair's nets, in a run, whichever row it lies in. */
export function traceOf(run: Run, signal: Net | Pair): RunConductor | null {
  for (const { conductors } of run.rows) {
    const [index] = tracesOf(conductors, signal);
    if (index !== undefined) return conductors[index]!;
  }
  return null;
}

function tracesOf(conductors: readonly RunConductor[], signal: Net | Pair): readonly number[] {
  const names = signal.kind === 'net' ? [signal.name] : [signal.plus?.name, signal.minus?.name];
  return conductors.flatMap((conductor, index) => (conductor.kind === 'trace' && names.includes(conductor.net.name) ? [index] : []));
}
