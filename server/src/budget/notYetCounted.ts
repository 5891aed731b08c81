/**
 * What belongs in a receiver's budget and has no number: ways that this version reads but does not compute, and text that
 * could not be read. Each is one clause that says what, and where it stands; a budget with any of them has no
 * margin and is never reported as within.
 *
 * What is missing inside a run is said by the run itself (`runs/coupledRun.ts`); here is the rest.
 */
import type { Loop, Net, Pair, Place, Project } from '../board/model';
import type { Receiver } from './receivers';
import type { Unaccounted } from './results';

export function lackingOutside(project: Project, receiver: Receiver): readonly Unaccounted[] {
  const heard = heardBy(receiver);
  return [
    // A shield acts on what loops and fields bring: without those there is nothing that it would change.
    ...(reachedByFields(project, heard) || project.loops.some((loop) => senses(loop, heard)) ? shieldsOver(project, heard) : []),
    ...unread(project, heard),
  ];
}

/** The receiver itself and, of a pair, its nets. */
type HeardBy = ReadonlySet<Net | Pair>;

function heardBy({ subject, terms }: Receiver): HeardBy {
  return new Set<Net | Pair>([subject, ...terms.map(({ net }) => net)]);
}

export function absent(what: string, place: Place | null): Unaccounted {
  return { what: `${what} is not yet counted`, place };
}

function senses(loop: Loop, heard: HeardBy): boolean {
  return loop.senses.some(({ signal }) => heard.has(signal));
}

/** An ambient field acts on each loop that senses the net and on each of its traces in a run. */
function reachedByFields({ ambients, runs, loops }: Project, heard: HeardBy): boolean {
  const inRun = () => runs.some((run) => run.rows.some((row) => row.conductors.some((conductor) => conductor.kind === 'trace' && heard.has(conductor.net))));
  return 0 < ambients.length && (inRun() || loops.some((loop) => senses(loop, heard)));
}

function shieldsOver(project: Project, heard: HeardBy): readonly Unaccounted[] {
  const covers = (subject: Net | Pair | Loop) => ('kind' in subject ? heard.has(subject) : senses(subject, heard));
  return project.shields.filter((shield) => shield.covers.some(({ subject }) => covers(subject))).map((shield) => absent(`shield ${shield.name}`, shield.place));
}

function unread(project: Project, heard: HeardBy): readonly Unaccounted[] {
  const names = [...heard].map(({ name }) => name);
  return project.gaps
    .filter(({ affects }) => affects === null || names.some((name) => affects.includes(name)))
    .map(({ what, place }) => ({ what: `${what} could not be read`, place }));
}
