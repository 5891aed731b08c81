/**
 * Everything that is computed of one run: its matrices, what each net that moves puts on each that listens,
 * and what could not be had.
 */
import type { Run } from '../board/model';
import type { SectionRefusal } from '../physics/section/section';
import { seconds, type Time } from '../units/quantity';
import { coupledPart, type Lacking, type SolvedCoupling } from './coupledRun';
import { edgesOf, roleOf } from './excitations';
import { looseGuards } from './looseGuards';
import { couplingLimits, partLimits, refusalLimits, runLimits } from './modelLimits';
import { refusalInText } from './refusalInText';
import type { LooseGuard, ModelLimit, RunResult } from './results';
import { isReceiver, type Role, type Roles } from './roles';
import { runMatrices, runTraces } from './runMatrices';
import { runParts, type RefusedPart, type RunPart } from './runParts';
import type { SolveCache } from './solveCache';

export interface RunOutcome {
  readonly result: RunResult;
  readonly lacking: readonly Lacking[];
  readonly limits: readonly ModelLimit[];
  /** Nets whose ends took part in a coupling. */
  readonly coupled: readonly Role[];
}

export function runOutcome(run: Run, roles: Roles, cache: SolveCache): RunOutcome {
  const solved = runParts(run, cache);
  const outcomes = solved.parts.map((part) => partOutcome({ run, part, roles, windowed: solved.windowed }, cache));
  const couplings = outcomes.flatMap((outcome) => outcome.couplings);
  return {
    result: {
      run,
      ...matricesOf(run, solved.parts, solved.refused),
      couplings: couplings.map(({ coupling }) => coupling),
      looseGuards: [...new Map(outcomes.flatMap(({ loose }) => loose).map((each) => [each.guard, each])).values()],
    },
    lacking: [...outcomes.flatMap(({ lacking }) => lacking), ...solved.refused.flatMap((part) => lackingOf(run, roles, part))],
    limits: once([...runLimits(run, solved), ...outcomes.flatMap(({ limits }) => limits), ...solved.refused.flatMap((part) => refusalLimits(run, part))]),
    coupled: outcomes.flatMap(({ coupled }) => coupled),
  };
}

interface PartOutcome {
  readonly couplings: readonly SolvedCoupling[];
  readonly lacking: readonly Lacking[];
  readonly coupled: readonly Role[];
  readonly loose: readonly LooseGuard[];
  readonly limits: readonly ModelLimit[];
}

function partOutcome(context: Parameters<typeof coupledPart>[0], cache: SolveCache): PartOutcome {
  const { run, part } = context;
  const fastest = fastestEdge(part);
  const coupled = coupledPart(context, cache);
  return { ...coupled, loose: looseGuards(run, part, fastest), limits: [...partLimits(run, part, fastest), ...couplingLimits(run, part, coupled.couplings)] };
}

/** 10–90 % */
function fastestEdge({ traces }: RunPart): Time | null {
  const edges = traces.filter(({ net }) => net.swing !== null).flatMap(({ net }) => edgesOf(net).map(({ rise }) => rise));
  return edges.length === 0 ? null : seconds(Math.min(...edges));
}

function matricesOf(run: Run, parts: readonly RunPart[], refused: readonly RefusedPart[]): Pick<RunResult, 'traces' | 'matrices' | 'refusal' | 'impedance' | 'delay'> {
  const traces = runTraces(run);
  const refusal: SectionRefusal | null = refused.find((part) => part.refusal.reason !== 'no-signal')?.refusal ?? refused[0]?.refusal ?? null;
  const alone = new Map(parts.flatMap((part) => part.read.map((index) => [part.traces[index], part.alone[index]] as const)));
  const all = traces.flatMap((trace) => alone.get(trace) ?? []);
  if (traces.length === 0 || all.length < traces.length) return { traces, matrices: null, refusal, impedance: [], delay: [] };
  return { traces, matrices: runMatrices(traces, parts), refusal: null, impedance: all.map(({ impedance }) => impedance), delay: all.map(({ delay }) => delay) };
}

/** What a receiver would have got in a part of a run that could not be solved. */
function lackingOf(run: Run, roles: Roles, { conductors, refusal }: RefusedPart): readonly Lacking[] {
  const traces = conductors.filter((conductor) => conductor.kind === 'trace');
  return traces
    .filter(({ net }) => isReceiver(net) && traces.some((other) => other.net !== net && roleOf(roles, other).drives))
    .map(({ net }) => ({ victim: net, unaccounted: { what: `run ${run.name} is not counted: ${refusalInText(refusal, conductors)}`, place: run.place } }));
}

function once(limits: readonly ModelLimit[]): readonly ModelLimit[] {
  return [...new Map(limits.map((each) => [each.message, each])).values()];
}
