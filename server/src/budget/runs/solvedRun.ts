/**
 * What of a run rests on nothing but its numbers and names: its matrices, the noise that its nets put on each other,
 * and where it is beyond a model. Kept under its key, and bound to the text as that now stands: it holds no place
 * and no object of the board, but indices of the run's conductors, counted through its rows.
 */
import type { Run, RunConductor } from '../../board/model';
import type { SectionRefusal } from '../../physics/section/section';
import { looseGuards } from './looseGuards';
import { partLimits, refusalLimits, runLimits } from './modelLimits';
import { pastGuards } from './pastGuards';
import type { LooseGuard, RunResult } from '../results';
import { fastestEdge, partReceivers, partSources } from './partPlayers';
import type { Roles } from '../roles';
import { runMatrices, runTraces } from './runMatrices';
import { runParts, type RefusedPart, type RunPart } from './runParts';
import type { SolveCache } from '../solveCache';
import { repeatedNoise, type SpectraByReceiver } from './repeatedNoise';
import { sineNoise, type SinesByReceiver } from './sineNoise';
import { worstNoise, type FoundByReceiver } from './worstNoise';

export interface SolvedRun {
  readonly whole: Pick<RunResult, 'matrices' | 'refusal' | 'impedance' | 'delay'>;
  readonly parts: readonly SolvedPart[];
  readonly refused: readonly { readonly at: readonly number[]; readonly refusal: SectionRefusal }[];
  readonly windowed: boolean;
  readonly loose: readonly (Omit<LooseGuard, 'guard'> & { readonly at: number })[];
  /** Each a sentence with its range. */
  readonly limits: readonly string[];
}

interface SolvedPart extends Omit<HeardPart, 'conductors' | 'traces'> {
  readonly at: readonly number[];
}

/** A part with what each of its sources, in the order of `partSources`, puts on those that listen. */
export interface HeardPart extends RunPart {
  readonly noise: readonly SourceNoise[];
}

/** What one source puts on every receiver of the part. */
export interface SourceNoise {
  readonly edges: FoundByReceiver;
  readonly sines: SinesByReceiver;
  readonly spectra: SpectraByReceiver;
}

export function solvedRun(run: Run, roles: Roles, cache: SolveCache): SolvedRun {
  const solved = runParts(run, cache);
  const parts = solved.parts.map((part): HeardPart => {
    const receivers = partReceivers(part, roles);
    const context = { roles, length: run.length.value, cache, guardsOf: run };
    return { ...part, noise: partSources(part, roles).map((source) => ({ edges: worstNoise(part, source, receivers, context), sines: sineNoise(part, source, receivers, context), spectra: repeatedNoise(part, source, receivers, context) })) };
  });
  const indices = new Map(conductorsOf(run).map((conductor, index) => [conductor, index]));
  const at = (conductor: RunConductor) => indices.get(conductor) as number;
  const loose = new Map(parts.flatMap((part) => {
    const found = looseGuards(run, part, fastestEdge(part, roles));
    const past = found.length === 0 ? null : pastGuards(part, roles, { roles, length: run.length.value, cache, guardsOf: null });
    return found.map((each) => [each.guard, { ...each, past }] as const);
  }));
  return {
    whole: wholeOf(run, parts, solved.refused),
    parts: parts.map(({ section, id, conductors, matrices, alone, read, noise }) => ({ section, id, matrices, alone, read, noise, at: conductors.map(at) })),
    refused: solved.refused.map(({ conductors, refusal }) => ({ at: conductors.map(at), refusal })),
    windowed: solved.windowed,
    loose: [...loose.values()].map(({ guard, ...rest }) => ({ at: at(guard), ...rest })),
    limits: [...new Set([...runLimits(run, solved), ...parts.flatMap((part) => partLimits(run, part, roles)), ...solved.refused.flatMap((part) => refusalLimits(run, part))])],
  };
}

const solutions = new WeakMap<Run, SolvedRun>();

/** What a run was found to be when it was evaluated: the same object for the same numbers and names, while it is kept. */
export function solutionOf(run: Run): SolvedRun | undefined {
  return solutions.get(run);
}

export function keepSolution(run: Run, solved: SolvedRun): SolvedRun {
  solutions.set(run, solved);
  return solved;
}

export interface BoundRun {
  readonly parts: readonly HeardPart[];
  readonly refused: readonly RefusedPart[];
  readonly loose: RunResult['looseGuards'];
}

/** The same, of a run with the same numbers and names, wherever it stands. */
export function boundTo(run: Run, { parts, refused, loose }: SolvedRun): BoundRun {
  const all = conductorsOf(run);
  const bound = (at: readonly number[]) => at.map((index) => all[index]);
  return {
    parts: parts.map(({ at, ...part }) => {
      const conductors = bound(at);
      return { ...part, conductors, traces: conductors.filter((conductor) => conductor.kind === 'trace') };
    }),
    refused: refused.map(({ at, refusal }) => ({ conductors: bound(at), refusal })),
    loose: loose.flatMap(({ at, ...rest }) => {
      const guard = all[at];
      return guard.kind === 'guard' ? [{ guard, ...rest }] : [];
    }),
  };
}

function conductorsOf({ rows }: Run): readonly RunConductor[] {
  return rows.length === 1 ? rows[0].conductors : rows.flatMap(({ conductors }) => conductors);
}

function wholeOf(run: Run, parts: readonly RunPart[], refused: readonly RefusedPart[]): SolvedRun['whole'] {
  const traces = runTraces(run);
  const refusal: SectionRefusal | null = refused.find((part) => part.refusal.reason !== 'no-signal')?.refusal ?? refused[0]?.refusal ?? null;
  const alone = new Map(parts.flatMap((part) => part.read.map((index) => [part.traces[index], part.alone[index]] as const)));
  const all = traces.flatMap((trace) => alone.get(trace) ?? []);
  if (traces.length === 0 || all.length < traces.length) return { matrices: null, refusal, impedance: [], delay: [] };
  return { matrices: runMatrices(traces, parts), refusal: null, impedance: all.map(({ impedance }) => impedance), delay: all.map(({ delay }) => delay) };
}
