/**
 * A part of a run with its loose guards as conductors of their own, tied to the reference through their vias: what
 * `physics/lines/tiedLines.ts` solves in place of guards at zero potential.
 *
 * Ties are spread evenly: both ends, and as many between as the stated distance asks for. Guards whose ties hold stay at zero potential.
 */
import type { Run, RunConductor } from '../../board/model';
import type { PreparedLines } from '../../physics/lines/lineResponse';
import type { CoupledLines } from '../../physics/lines/lines';
import { lineNetwork } from '../../physics/lines/network';
import { mostTies, tiedResponse, type Tie } from '../../physics/lines/tiedLines';
import { viaInductance } from '../../physics/returns/viaImpedance';
import type { Section } from '../../physics/section/section';
import { farads, kelvins, metres, ohms, type Inductance, type Length, type Time } from '../../units/quantity';
import type { SolveCache } from '../solveCache';
import { looseGuards } from './looseGuards';
import type { RunPart } from './runParts';

export interface GuardLines {
  /** Of the section: what its lines are kept under. */
  readonly id: number;
  /** Traces in the order of the part's, then the guards. */
  readonly order: number;
  readonly inductance: Float64Array;
  readonly capacitance: Float64Array;
  readonly ties: readonly Tie[];
  readonly names: readonly string[];
  /** Of the longest via. */
  readonly via: Inductance;
}

/** Assumed of every tie: nobody states the drill of a guard's vias. Common practice, no source. */
export const assumedDrill = metres(0.3e-3);

/** For an edge of this 10–90 %; null where every guard holds, and where the ties are too many to be solved one by one. */
export function guardLines(run: Run, part: RunPart, rise: Time, cache: SolveCache): GuardLines | null {
  const loose = looseGuards(run, part, rise).map(({ guard }) => guard as RunConductor);
  if (loose.length === 0) return null;
  const { section, conductors } = part;
  const isLoose = (index: number) => loose.includes(conductors[index]!);
  const { id, solution } = cache.section({ ...section, conductors: section.conductors.map((one, index) => (isLoose(index) ? { ...one, role: 'signal' } : one)) });
  if ('refused' in solution) return null;
  const lines = conductors.flatMap((conductor, index) => (conductor.kind === 'trace' || isLoose(index) ? [index] : []));
  const guards = lines.filter(isLoose);
  const sorted = [...lines.filter((index) => !isLoose(index)), ...guards].map((index) => lines.indexOf(index));
  const order = lines.length;
  const permuted = (matrix: Float64Array) => Float64Array.from(matrix, (_, at) => matrix[sorted[Math.floor(at / order)]! * order + sorted[at % order]!]!);
  const vias = guards.map((index) => viaInductance({ count: 1, drill: assumedDrill, length: toPlane(section, index), temperature: kelvins(298) }));
  const ties = guards.flatMap((index, nth) => tiesOf(conductors[index]!, run.length.value).map((at): Tie => ({ line: part.traces.length + nth, at, inductance: vias[nth]! })));
  if (mostTies < ties.length) return null;
  const { solved } = solution;
  return { id, order, inductance: permuted(solved.inductance), capacitance: permuted(solved.capacitance), ties, names: [...new Set(loose.flatMap((guard) => (guard.kind === 'guard' ? [guard.name] : [])))], via: vias.reduce((most, via) => (most < via ? via : most)) };
}

/** The part's lines with these ends: answers for its traces alone. */
export function preparedWithGuards(lines: CoupledLines, guards: GuardLines): PreparedLines {
  const { order, inductance, capacitance, ties } = guards;
  // Their ties at 0 and 1 end them.
  const beside = Array.from({ length: order - lines.order }, () => ({ resistance: ohms(Infinity), capacitance: farads(0), lead: null }));
  const all: CoupledLines = { order, inductance, capacitance, length: lines.length, left: [...lines.left, ...beside], right: [...lines.right, ...beside] };
  return {
    lines,
    modes: lineNetwork(lines).modes,
    response: (ramp, window) => {
      const answer = tiedResponse({ lines: all, ties }, ramp, window);
      const traces = <Value>(of: readonly Value[]) => of.slice(0, lines.order);
      return { ...answer, left: traces(answer.left), right: traces(answer.right), leftTermination: traces(answer.leftTermination), rightTermination: traces(answer.rightTermination), errorBar: traces(answer.errorBar) };
    },
  };
}

function tiesOf(guard: RunConductor, length: Length): readonly number[] {
  const spacing = guard.kind === 'guard' ? (guard.stitched?.value ?? Infinity) : Infinity;
  const pieces = Math.max(1, Math.ceil((length / spacing) * (1 - 1e-9)));
  // More than are solved one by one in any case.
  return pieces < 2 * mostTies ? Array.from({ length: pieces + 1 }, (_, n) => n / pieces) : new Array<number>(mostTies + 1).fill(0);
}

/** From the copper to the nearest plane. */
function toPlane({ conductors, layers, planeAbove, planeBelow }: Section, index: number): Length {
  const { y, height } = conductors[index]!;
  const total = layers.reduce((sum, { thickness }) => sum + thickness, 0);
  return metres(Math.max(1e-6, Math.min(planeBelow ? y : Infinity, planeAbove ? total - y - height : Infinity)));
}
