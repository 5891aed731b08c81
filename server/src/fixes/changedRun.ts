/** A run with another gap, another length or one more guard: the model's own change, without the text. */
import type { Given, Place, Project, Run, RunConductor, RunRow } from '../board/model';
import type { Length } from '../units/quantity';

export interface GapPlace {
  readonly row: number;
  readonly gap: number;
}

/** All gaps of a `spaced` range are one value, and change together. */
export function withGap(run: Run, { row, gap }: GapPlace, value: Length): Run {
  const { place } = run.rows[row]!.gaps[gap]!;
  const gaps = (old: readonly Given<Length>[]) => old.map((given) => (isSame(given.place, place) ? { ...given, value } : given));
  return withRow(run, row, (old) => ({ ...old, gaps: gaps(old.gaps) }));
}

export function withLength(run: Run, value: Length): Run {
  return { ...run, length: { ...run.length, value } };
}

export interface NewGuard {
  readonly name: string;
  readonly width: Length;
  readonly stitched: Length | null;
  readonly left: Length;
  readonly right: Length;
}

/** In the middle of a gap, which becomes two. */
export function withGuard(run: Run, { row, gap }: GapPlace, { name, width, stitched, left, right }: NewGuard): Run {
  return withRow(run, row, (old) => {
    const { place } = old.gaps[gap]!;
    const given = (value: Length): Given<Length> => ({ value, tolerance: 0, place });
    const guard: RunConductor = { kind: 'guard', name, width: given(width), stitched: stitched === null ? null : given(stitched), place, whole: place };
    return {
      ...old,
      conductors: old.conductors.toSpliced(gap + 1, 0, guard),
      gaps: old.gaps.toSpliced(gap, 1, given(left), given(right)),
    };
  });
}

export function withRun(project: Project, before: Run, after: Run): Project {
  return { ...project, runs: project.runs.map((run) => (run === before ? after : run)) };
}

export function isSame(a: Place, b: Place): boolean {
  return a.path === b.path && a.span.start === b.span.start && a.span.end === b.span.end;
}

function withRow(run: Run, index: number, change: (row: RunRow) => RunRow): Run {
  return { ...run, rows: run.rows.map((row, at) => (at === index ? change(row) : row)) };
}
