/** Where in the text one party of a coupling lies: its traces in a run, its line in a loop or a return, the link, the field. */
import type { Net, Pair, Place, Project, Run } from '../../board/model';
import type { Contribution } from '../../budget/results';

export interface Row {
  /** `trace VALVE_PWM 0.25 mm` */
  readonly whole: Place;
  /** The name in it. */
  readonly name: Place;
}

export interface Lying {
  readonly kind: 'net' | 'pair' | 'ambient';
  readonly name: string;
}

/** In the order of the contributions, each once. */
export function rowsIn(project: Project, contributions: readonly Contribution[], party: Lying): readonly Row[] {
  const rows = contributions.flatMap((contribution) => rowsOf(project, contribution, party));
  return [...new Map(rows.map((row) => [`${row.whole.span.start} ${row.whole.path}`, row])).values()];
}

function rowsOf(project: Project, { channel, where, place }: Contribution, party: Lying): readonly Row[] {
  const signal = party.kind === 'net' ? project.nets.get(party.name) : party.kind === 'pair' ? project.pairs.get(party.name) : undefined;
  const found = signal === undefined || where === null ? [] : placesOf(project, { channel, where }, signal);
  return 0 < found.length ? found : place === null ? [] : [row(place)];
}

function placesOf(project: Project, { channel, where }: { readonly channel: Contribution['channel']; readonly where: string }, signal: Net | Pair): readonly Row[] {
  const nets = signal.kind === 'net' ? [signal] : [signal.plus, signal.minus];
  const isIts = (other: Net | Pair) => other === signal || nets.some((net) => net === other);
  switch (channel) {
    case 'coupled': return tracesOf(runsOf(project).get(where), isIts);
    case 'loop': {
      // Several loops that one current leads through are one way: their names stand in a row.
      const names = new Set([where, ...where.split(', ')]);
      const carrying = project.loops.filter(({ name }) => names.has(name)).flatMap(({ carries }) => carries.filter(({ net }) => isIts(net)));
      return (0 < carrying.length ? carrying : project.loops.flatMap(({ senses }) => senses.filter(({ signal: other }) => isIts(other)))).map(({ place }) => row(place));
    }
    case 'shared return': return project.returns.filter(({ name }) => name === where).flatMap(({ carries, refers }) => [...carries.filter(({ net }) => isIts(net)), ...refers.filter(({ signal: other }) => isIts(other))].map(({ place }) => row(place)));
    default: return [];
  }
}

function tracesOf(run: Run | undefined, isIts: (net: Net) => boolean): readonly Row[] {
  return (run?.rows ?? []).flatMap(({ conductors }) => conductors.flatMap((conductor) => (conductor.kind === 'trace' && isIts(conductor.net) ? [{ whole: conductor.whole, name: conductor.place }] : [])));
}

/** A board has thousands of runs, and is asked for each contribution. */
const runs = new WeakMap<Project, ReadonlyMap<string, Run>>();

function runsOf(project: Project): ReadonlyMap<string, Run> {
  const known = runs.get(project);
  if (known !== undefined) return known;
  const byName = new Map(project.runs.map((run) => [run.name, run]));
  runs.set(project, byName);
  return byName;
}

const row = (place: Place): Row => ({ whole: place, name: place });
