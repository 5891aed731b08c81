/**
 * The solved cross-sections of a run: what the lines are computed with. A part is a set of traces that are
 * solved together: one part holds the whole run, unless a plane separates its rows, or there are more
 * conductors than are solved at once; then each receiver has a part of its own, with its nearest
 * neighbours on each side.
 */
import type { Run, RunConductor } from '../../board/model';
import type { LineAlone } from '../../physics/lines/characteristicImpedance';
import type { Section, SectionMatrices, SectionRefusal } from '../../physics/section/section';
import { canonicalSection } from './canonicalSection';
import { runSections, type RunSection } from './runSection';
import type { SolveCache } from '../solveCache';

export type Trace = RunConductor & { readonly kind: 'trace' };

export interface RunPart {
  readonly section: Section;
  /** Of the section: what its lines are kept under. */
  readonly id: number;
  /** Behind the section's conductors, in their order. */
  readonly conductors: readonly RunConductor[];
  /** Those of them that are traces: the order of the matrices. */
  readonly traces: readonly Trace[];
  readonly matrices: SectionMatrices;
  readonly alone: readonly LineAlone[];
  /** Indices of the traces whose noise is read here. */
  readonly read: readonly number[];
}

export interface RefusedPart {
  readonly conductors: readonly RunConductor[];
  readonly refusal: SectionRefusal;
}

export interface RunParts {
  readonly parts: readonly RunPart[];
  readonly refused: readonly RefusedPart[];
  /** A plane lies between rows of the run. */
  readonly separated: boolean;
  /** Sections were cut down to each receiver's neighbours. */
  readonly windowed: boolean;
  readonly undersidePlanar: boolean;
}

/** Sections of more conductors are solved once for each receiver, with this many neighbours on each side. */
export const conductorsAtOnce = 16;
export const neighboursEachSide = 8;

export function runParts(run: Run, cache: SolveCache): RunParts {
  const sections = runSections(run);
  const parts: RunPart[] = [];
  const refused: RefusedPart[] = [];
  const keep = (outcome: RunPart | RefusedPart) => ('refusal' in outcome ? refused.push(outcome) : parts.push(outcome));
  for (const whole of sections) {
    if (whole.conductors.length <= conductorsAtOnce) keep(solvedPart(whole, null, cache));
    else for (const [index, conductor] of whole.conductors.entries()) if (conductor.kind === 'trace') keep(solvedPart(neighbourhood(whole, index), conductor, cache));
  }
  return { parts, refused, separated: 1 < sections.length, windowed: sections.some(({ conductors }) => conductorsAtOnce < conductors.length), undersidePlanar: sections.some(({ undersidePlanar }) => undersidePlanar) };
}

function solvedPart({ section, conductors }: Pick<RunSection, 'section' | 'conductors'>, receiver: Trace | null, cache: SolveCache): RunPart | RefusedPart {
  const { id, solution, alone } = cache.section(section);
  if ('refused' in solution) return { conductors, refusal: solution.refused };
  const traces = conductors.filter((conductor) => conductor.kind === 'trace');
  const read = receiver === null ? traces.map((_, index) => index) : [traces.indexOf(receiver)];
  return { section, id, conductors, traces, matrices: solution.solved, alone, read };
}

/** A conductor with its nearest on each side, by the middles of all rows from left to right. */
function neighbourhood({ section, conductors }: RunSection, centre: number): Pick<RunSection, 'section' | 'conductors'> {
  const middle = (index: number) => section.conductors[index].x + section.conductors[index].width / 2;
  const order = conductors.map((_, index) => index).sort((a, b) => middle(a) - middle(b) || a - b);
  const at = order.indexOf(centre);
  const near = order.slice(Math.max(0, at - neighboursEachSide), at + neighboursEachSide + 1).sort((a, b) => a - b);
  const cut = { ...section, conductors: near.map((index) => section.conductors[index]) };
  return { section: canonicalSection(cut), conductors: near.map((index) => conductors[index]) };
}
