/**
 * What the physics says of a project: each run, then each receiver's budget. A pure function of the project;
 * the cache only spares what was solved before, and counts what was not.
 */
import type { Project, Run } from '../board/model';
import { budgetsOf } from './budgets';
import { heardOverCircuits } from './lumpedPaths';
import { assumptionsFor } from './ends';
import type { Heard } from './heard';
import { loopInductances } from './loops/loopInductances';
import { emissionLimits } from './loops/emissionLimits';
import { loopLimits } from './loops/loopLimits';
import { loopResult } from './loops/loopResult';
import { fieldLimits } from './radiated/fieldLimits';
import { pickupsOf } from './radiated/pickups';
import { receiversOf } from './receivers';
import { returnResult } from './returns/returnResult';
import { shieldResult } from './shields/shieldResult';
import { rolesOf, type Role, type Roles } from './roles';
import type { AssumedEnd, Evaluation } from './results';
import { runKeys } from './runs/runKey';
import { runOutcome, type RunOutcome } from './runs/runOutcome';
import { runTraces } from './runs/runMatrices';
import type { SolveCache } from './solveCache';
import { keepSolution, solvedRun, type SolvedRun } from './runs/solvedRun';

export function evaluate(project: Project, cache: SolveCache): Evaluation {
  const before = cache.work();
  const receivers = receiversOf(project);
  const roles = rolesOf(project, receivers);
  const keyOf = runKeys(roles, cache);
  const solved = (run: Run) => keepSolution(run, cache.run(keyOf(run), () => solvedRun(run, roles, cache)));
  const outcomes = project.runs.map((run) => guarded(run, roles, solved));
  const inductances = loopInductances(project, cache);
  const circuits = heardOverCircuits(project, roles, receivers, { cache, inductances });
  const channels = { heard: [...outcomes.flatMap(({ heard }) => heard), ...circuits.heard], lacking: [...outcomes.flatMap(({ lacking }) => lacking), ...circuits.lacking] };
  const pickups = project.ambients.length === 0 ? [] : pickupsOf(receivers, { project, roles, inductances, cache });
  const budgets = budgetsOf(project, roles, receivers, { ...channels, cache, pickups });
  const loops = project.loops.map((loop) => loopResult(project, loop, roles, inductances));
  const after = cache.work();
  return {
    project,
    runs: outcomes.map(({ result }) => result),
    heard: channels.heard,
    budgets,
    shields: project.shields.map((shield) => shieldResult(project, shield)),
    returns: project.returns.map((shared) => returnResult(project, shared, cache)),
    loops,
    limits: [...outcomes.flatMap(({ limits }) => limits), ...project.loops.flatMap((loop) => loopLimits(loop, roles, inductances)), ...loops.flatMap((each) => emissionLimits(each, inductances)), ...fieldLimits(project.ambients, pickups)],
    assumedEnds: assumedEnds([...outcomes.flatMap(({ coupled }) => coupled), ...circuits.heard.flatMap((heard) => rolesIn(heard, roles))]),
    work: { sectionsSolved: after.sectionsSolved - before.sectionsSolved, linesSolved: after.linesSolved - before.linesSolved, circuitsSolved: after.circuitsSolved - before.circuitsSolved, inductancesSolved: after.inductancesSolved - before.inductancesSolved },
  };
}

/** A bug, or numbers beyond what doubles hold, in one run leaves the others standing, and is said where it is. */
function guarded(run: Run, roles: Roles, solved: (run: Run) => SolvedRun): RunOutcome {
  try {
    return runOutcome(run, roles, solved(run));
  } catch (error) {
    const what = error instanceof Error ? error.message : String(error);
    const traces = runTraces(run);
    const unaccounted = { what: `run ${run.name} is not counted: its computation failed (${what})`, place: run.place };
    return {
      result: { run, traces, matrices: null, refusal: { reason: 'not-solved', what }, impedance: [], delay: [], couplings: [], looseGuards: [] },
      heard: [],
      lacking: [...new Set(traces.flatMap(({ net }) => roles.get(net)?.receivers ?? []))].map((receiver) => ({ receiver, unaccounted })),
      limits: [{ subject: { kind: 'run', name: run.name }, place: run.place, message: `run ${run.name} has no numbers: its computation failed (${what})` }],
      coupled: [],
    };
  }
}

/** Nets whose ends took part: a current that is stated is that current, whatever its net ends in. */
function rolesIn({ channel, source, receiver }: Heard, roles: Roles): readonly Role[] {
  const moving = channel !== 'link' && source.signal.current !== null ? [] : source.moves;
  return [...moving, ...receiver.terms].map(({ net }) => roles.get(net)!);
}

function assumedEnds(coupled: readonly Role[]): readonly AssumedEnd[] {
  return [...new Set(coupled)].flatMap((role) => assumptionsFor(role).map((assumption) => ({ net: role.net, ...assumption })));
}
