/**
 * A solved run as the text now stands: what each net that moves puts on each that listens, and what could not
 * be had, with their names and places.
 */
import type { Run } from '../../board/model';
import { coupledPart, type Lacking } from './coupledRun';
import { roleOf } from './arrangements';
import { refusalInText } from './refusalInText';
import type { Heard } from '../heard';
import type { ModelLimit, RunResult } from '../results';
import { hears, type Role, type Roles } from '../roles';
import { runTraces } from './runMatrices';
import type { RefusedPart } from './runParts';
import { boundTo, type SolvedRun } from './solvedRun';

export interface RunOutcome {
  readonly result: RunResult;
  readonly heard: readonly Heard[];
  readonly lacking: readonly Lacking[];
  readonly limits: readonly ModelLimit[];
  /** Nets whose ends took part in a coupling. */
  readonly coupled: readonly Role[];
}

export function runOutcome(run: Run, roles: Roles, solved: SolvedRun): RunOutcome {
  const { parts, refused, loose } = boundTo(run, solved);
  const outcomes = parts.map((part) => coupledPart({ run, part, roles, windowed: solved.windowed }));
  return {
    result: { run, traces: runTraces(run), ...solved.whole, couplings: outcomes.flatMap(({ couplings }) => couplings), looseGuards: loose },
    heard: outcomes.flatMap(({ heard }) => heard),
    lacking: [...outcomes.flatMap(({ lacking }) => lacking), ...refused.flatMap((part) => lackingOf(run, roles, part))],
    limits: solved.limits.map((message) => ({ subject: { kind: 'run', name: run.name }, place: run.place, message })),
    coupled: outcomes.flatMap(({ coupled }) => coupled),
  };
}

/** What a receiver would have got in a part of a run that could not be solved. */
function lackingOf(run: Run, roles: Roles, { conductors, refusal }: RefusedPart): readonly Lacking[] {
  const there = conductors.flatMap((conductor) => (conductor.kind === 'trace' ? [roleOf(roles, conductor)] : []));
  const receivers = new Set(there.flatMap(({ receivers: all }) => all));
  return [...receivers]
    .filter((receiver) => there.some(({ sources }) => sources.some((source) => hears(receiver, source))))
    .map((receiver) => ({ receiver, unaccounted: { what: `run ${run.name} is not counted: ${refusalInText(refusal, conductors)}`, place: run.place } }));
}
