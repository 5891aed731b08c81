/**
 * What the resistance of a run's own `return` conductors drops: its inductance is in the run's matrices, its resistance is not. Several
 * are in parallel; every net of a run without planes returns through them, and measures against their far end.
 */
import type { Project, Run } from '../../board/model';
import { traceResistance } from '../../physics/resistance/traceResistance';
import { henries, ohms } from '../../units/quantity';
import { boardTemperature } from '../boardTemperature';
import type { LumpedPath } from '../lumped/lumpedPath';
import { hears, type Roles } from '../roles';
import type { SolveCache } from '../solveCache';
import { onGrid, skinGrid } from '../onGrid';
import { returnPath, type Shared } from './returnPaths';

export function runReturnPaths(project: Project, roles: Roles, cache: SolveCache): readonly LumpedPath[] {
  return project.runs.filter(hasNoPlane).flatMap((run) => {
    const traces = run.rows.flatMap(({ conductors }) => conductors).filter((conductor) => conductor.kind === 'trace');
    const carried = new Set(traces.map(({ net }) => net));
    const sources = new Set([...carried].flatMap((net) => roles.get(net)!.sources));
    const receivers = new Set([...carried].flatMap((net) => roles.get(net)!.receivers));
    if (sources.size === 0 || receivers.size === 0) return [];
    const shared = returnOf(run, project, cache);
    if (shared === null) return [];
    return [...sources].flatMap((source) => [...receivers].filter((receiver) => hears(receiver, source)).map((receiver) => (
      returnPath(shared, { source, receiver, lifted: receiver.terms.map(({ net }) => net).filter((net) => carried.has(net)), carried, roles })
    )));
  });
}

function hasNoPlane({ stackup, without }: Run): boolean {
  return !stackup.rows.some((row) => row.kind === 'plane' && !without.includes(row.name));
}

/** Guards of a run without planes are returns. */
function returnOf(run: Run, project: Project, cache: SolveCache): Shared | null {
  const temperature = boardTemperature(project);
  const conductors = run.rows.flatMap(({ layer, conductors: all }) => all.filter(({ kind }) => kind !== 'trace').map(({ width }) => ({ width: width.value, thickness: layer.thickness.value })));
  if (conductors.length === 0) return null;
  const perLength = conductors.map(({ width, thickness }) => onGrid((frequency) => cache.inductance(`resistance ${width} ${thickness} - ${temperature} ${frequency}`, () => traceResistance({ width, thickness, overPlane: null, temperature }, frequency)).perLength, skinGrid));
  return {
    name: run.name,
    place: run.place,
    resistance: (frequency) => ohms(run.length.value / perLength.reduce((sum, of) => sum + 1 / of(frequency), 0)),
    inductance: henries(0),
    errorBar: crowding,
    assumptions: ['the return conductors of the run share the current as their resistances do; how the traces beside them crowd it is left out'],
  };
}

/** What a trace close by does to where the current runs in its return, at most. */
const crowding = 0.3;
