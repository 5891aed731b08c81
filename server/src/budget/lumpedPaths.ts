/**
 * Every way that is a small circuit, heard: a fault, or numbers beyond what doubles hold, in one leaves the others
 * standing, and is said in the budget that lacks it.
 */
import type { Project } from '../board/model';
import type { Channels } from './budgets';
import type { Heard } from './heard';
import { linkPaths } from './links/linkPaths';
import type { LoopInductances } from './loops/loopInductances';
import { loopPaths } from './loops/loopPaths';
import { hearLumped } from './lumped/hearLumped';
import type { LumpedPath } from './lumped/lumpedPath';
import type { Receiver } from './receivers';
import { returnPaths } from './returns/returnPaths';
import { runReturnPaths } from './returns/runReturnPaths';
import type { Roles } from './roles';
import type { SolveCache } from './solveCache';
import { timelessOf } from './sources';

export function heardOverCircuits(project: Project, roles: Roles, receivers: readonly Receiver[], { cache, inductances }: { readonly cache: SolveCache; readonly inductances: LoopInductances }): Channels {
  const loops = loopPaths(project, roles, receivers, inductances);
  const paths = [...linkPaths(project, roles), ...loops.paths, ...returnPaths(project, roles, receivers, cache), ...runReturnPaths(project, roles, cache)];
  const heard: Heard[] = [];
  const lacking: Channels['lacking'][number][] = [...loops.lacking];
  for (const path of paths) {
    for (const what of [...timeless(path), ...hear(path, cache, heard)]) lacking.push({ receiver: path.receiver, unaccounted: { what, place: path.place } });
  }
  return { heard, lacking };
}

/** Appends what is heard; answers why nothing could be. */
function hear(path: LumpedPath, cache: SolveCache, heard: Heard[]): readonly string[] {
  try {
    const found = hearLumped(path, cache);
    const values = [...(found.edge === null ? [] : [found.edge.value, found.edge.errorBar]), ...found.sines.flatMap(({ value, rms }) => [value, rms])];
    if (!values.every(Number.isFinite)) return [`what ${path.source.signal.name} puts on it by ${inWords(path)} is beyond what can be computed`];
    heard.push(found);
    return [];
  } catch (error) {
    return [`${inWords(path)} is not counted: its computation failed (${error instanceof Error ? error.message : String(error)})`];
  }
}

function timeless(path: LumpedPath): readonly string[] {
  const { signal } = path.source;
  return timelessOf(signal).map(({ what, why }) => `the ${what} of ${signal.name} by ${inWords(path)} is not counted: ${why}`);
}

function inWords({ channel, origins }: LumpedPath): string {
  return `${channel === 'shared return' ? 'return' : channel} ${origins.join(', ')}`;
}
