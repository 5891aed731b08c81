/**
 * What belongs in a receiver's budget and has no number: sources that this version reads but does not
 * compute, and text that could not be read. Each is one clause that says what, and where it stands; a
 * budget with any of them has no margin and is never reported as within.
 *
 * What is missing inside a run is said by the run itself (`runResult.ts`); here is the rest.
 */
import type { Loop, Net, Pair, Place, Project } from '../board/model';
import type { Unaccounted } from './results';
import { isSource, type Roles } from './roles';

/** For a net that listens. */
export function notYetCounted(project: Project, roles: Roles, net: Net): readonly Unaccounted[] {
  const outside = [...loopsInto(project, net), ...ambientsOnto(project, net)];
  return [
    ...linksInto(project, roles, net),
    ...outside,
    ...returnsInto(project, roles, net),
    ...(0 < outside.length ? shieldsOver(project, net) : []),
    ...ownNoise(net),
    ...unread(project, net.name),
  ];
}

/** For a pair that listens: all of it. */
export function notYetCountedPair(project: Project, pair: Pair): readonly Unaccounted[] {
  return [absent(`what pair ${pair.name} picks up`, pair.place), ...unread(project, pair.name)];
}

export function absent(what: string, place: Place | null): Unaccounted {
  return { what: `${what} is not yet counted`, place };
}

function linksInto(project: Project, roles: Roles, net: Net): readonly Unaccounted[] {
  const ofOther = (from: Net, to: Net) => to === net && from !== net && roles.get(from)?.drives === true;
  return project.links
    .filter(({ from, to }) => ofOther(from, to) || ofOther(to, from))
    .map((link) => absent(`link ${link.name}`, link.place));
}

/** Every loop that carries another net's current couples into every loop that senses this one. */
function loopsInto(project: Project, net: Net): readonly Unaccounted[] {
  if (!project.loops.some((loop) => senses(loop, net))) return [];
  return project.loops.filter((loop) => loop.carries.some((carried) => carried.net !== net)).map((loop) => absent(`loop ${loop.name}`, loop.place));
}

function senses(loop: Loop, net: Net): boolean {
  return loop.senses.some(({ signal }) => signal === net);
}

/** An ambient field acts on each loop that senses the net and on each of its traces in a run. */
function ambientsOnto(project: Project, net: Net): readonly Unaccounted[] {
  const inRun = project.runs.some((run) => run.rows.some((row) => row.conductors.some((conductor) => conductor.kind === 'trace' && conductor.net === net)));
  if (!inRun && !project.loops.some((loop) => senses(loop, net))) return [];
  return project.ambients.map((ambient) => absent(`ambient ${ambient.name}`, ambient.place));
}

function returnsInto(project: Project, roles: Roles, net: Net): readonly Unaccounted[] {
  const refers = project.returns.filter((part) => part.refers.some(({ signal }) => signal === net));
  return refers
    .filter((part) => part.carries.some((carried) => carried.net !== net && roles.get(carried.net)?.drives === true))
    .map((part) => absent(`return ${part.name}`, part.place));
}

/** A shield acts on what loops and fields bring: without those there is nothing that it would change. */
function shieldsOver(project: Project, net: Net): readonly Unaccounted[] {
  return project.shields.filter((shield) => shield.covers.some(({ subject }) => subject === net)).map((shield) => absent(`shield ${shield.name}`, shield.place));
}

function ownNoise(net: Net): readonly Unaccounted[] {
  const found: Unaccounted[] = [];
  if (net.noise !== null) found.push(absent('the noise of its input', net.noise.place));
  if (net.contact !== null) found.push(absent('the contact noise of its resistors', net.contact.place));
  if (net.samples !== null) found.push(absent('when it samples', net.samples.place));
  return found;
}

function unread(project: Project, name: string): readonly Unaccounted[] {
  return project.gaps
    .filter(({ affects }) => affects === null || affects.includes(name))
    .map(({ what, place }) => ({ what: `${what} could not be read`, place }));
}

/** What a source in a run would add beyond its edge: a clause for each. */
export function uncountedSourcesOf(net: Net, pair: Pair | null, run: string): readonly Unaccounted[] {
  const found: Unaccounted[] = [];
  if (pair !== null && isSource(pair)) found.push(absent(`pair ${pair.name} in run ${run}`, pair.place));
  if (net.sine !== null) found.push(absent(`the sine of ${net.name} in run ${run}`, net.sine.place));
  if (net.current !== null) found.push(absent(`the current of ${net.name} in run ${run}`, net.current.place));
  return found;
}
