/** What of a run stands at a point of a file: one of its conductors, one of its gaps, or its length. */
import type { Given, Place, Project, Run, RunConductor } from '../../board/model';
import type { Length } from '../../units/quantity';

export type RunPoint = { readonly run: Run; readonly place: Place } & (
  | { readonly on: 'conductor'; readonly conductor: RunConductor }
  | { readonly on: 'gap'; readonly gap: Given<Length>; /** Counted row by row. */ readonly index: number }
  | { readonly on: 'length' });

export function runPointAt({ runs }: Project, path: string, offset: number): RunPoint | null {
  const here = (place: Place) => place.path === path && place.span.start <= offset && offset <= place.span.end;
  for (const run of runs) {
    if (!here(run.whole)) continue;
    if (here(run.length.place)) return { run, on: 'length', place: run.length.place };
    const gaps = run.rows.flatMap((row) => row.gaps);
    const index = gaps.findIndex(({ place }) => here(place));
    if (0 <= index) return { run, on: 'gap', gap: gaps[index], index, place: gaps[index].place };
    for (const conductor of run.rows.flatMap((row) => row.conductors)) {
      if (here(conductor.place) || here(conductor.width.place)) return { run, on: 'conductor', conductor, place: here(conductor.place) ? conductor.place : conductor.width.place };
    }
  }
  return null;
}
