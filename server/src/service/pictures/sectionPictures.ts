/** The cross-sections of a run as they are computed, the right way up, for whoever shows pictures. */
import type { Run, RunConductor, RunRow } from '../../board/model';
import { upsideDown } from '../../budget/runs/canonicalSection';
import { runSections, type RunSection } from '../../budget/runs/runSection';
import { crossSection, type SectionPart } from '../../pictures/crossSection';
import type { Picture } from '../../pictures/picture';

/** One for each part that no plane separates; of the conductors, where they are given, only those parts that hold one of them. */
export function sectionPictures(run: Run, conductors: readonly RunConductor[] | null = null): readonly Picture[] {
  const sections = runSections(run).filter((part) => conductors === null || part.conductors.some((conductor) => conductors.includes(conductor)));
  return sections.map((part) => sectionPicture(run, part));
}

function sectionPicture(run: Run, { section, conductors, turnedOver }: RunSection): Picture {
  const { layers, film, conductors: shapes } = turnedOver ? upsideDown(section) : section;
  const rows = run.rows.filter((row) => row.conductors.some((conductor) => conductors.includes(conductor)));
  return crossSection({
    name: run.name,
    layers,
    film,
    ...planesAround(run, rows),
    conductors: shapes.map(({ x, y, width, height, undercut }, index) => ({ x, y, width, height, undercut, ...partOf(rows, conductors[index]) })),
  });
}

function partOf(rows: readonly RunRow[], conductor: RunConductor): Pick<SectionPart, 'name' | 'kind' | 'tied' | 'written'> {
  const row = rows.find(({ conductors }) => conductors.includes(conductor));
  const gap = row?.gaps[row.conductors.indexOf(conductor)]?.value ?? null;
  const written = { width: conductor.width.value, gap };
  if (conductor.kind === 'trace') return { name: conductor.net.name, kind: 'trace', tied: null, written };
  return { name: conductor.name, kind: conductor.kind, tied: conductor.kind === 'guard' ? (conductor.stitched?.value ?? null) : null, written };
}

/** The nearest ones that are not cut away. */
function planesAround({ stackup, without }: Run, rows: readonly RunRow[]): { readonly planeAbove: string | null; readonly planeBelow: string | null } {
  const at = rows.map(({ layer }) => stackup.rows.indexOf(layer));
  const planes = stackup.rows.flatMap((row, index) => (row.kind === 'plane' && !without.includes(row.name) ? [{ name: row.name, index }] : []));
  return {
    planeAbove: planes.findLast(({ index }) => index < Math.min(...at))?.name ?? null,
    planeBelow: planes.find(({ index }) => Math.max(...at) < index)?.name ?? null,
  };
}
