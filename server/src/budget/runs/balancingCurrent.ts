/**
 * The inductance of a run for edges so slow that its guards and returns no longer carry the current that
 * keeps flux out of them.
 *
 *    corner = R' / (2 pi L')      above it a guard's current balances: L with the guard reduced out;
 *                                 below it resistance decides: over a plane a guard carries nothing, and
 *                                 without planes joined returns share the current as their resistances do
 *
 * Model     the two limits; between them the truth lies between, so the larger noise of both counts
 * Formula   over a plane: L of the traces with the guards currentless, those rows of the full L; without planes
 *           A^T L A, where A gives each further return its share -g_k / sum(g) of every trace's current
 * Symbols   R', L' of a guard alone (ohm/m, H/m); g the conductance of a return
 * Source    Ott, shield cut-off frequency, and Paul, from memory; 0.4 to 0.8 MHz for 0.25 mm of 35 µm copper
 * Range     resistance at dc: at the corner the skin effect adds less than 2 % to copper up to 100 µm
 */
import type { Section, SectionConductor } from '../../physics/section/section';
import { copperResistivity, mu0 } from '../../units/constants';
import type { Frequency } from '../../units/quantity';
import type { RunPart } from './runParts';
import type { SolveCache } from '../solveCache';

/** H/m, in the order of the part's traces; null where the guards and returns balance at this frequency. */
export function slowInductance(part: RunPart, knee: Frequency, cache: SolveCache): Float64Array | null {
  const references = indicesOf(part.section, 'reference');
  const plane = part.section.planeAbove || part.section.planeBelow;
  // One return without planes has all of the current at any frequency.
  if (references.length < (plane ? 1 : 2)) return null;
  const possible = references.some((index) => knee < safety * cornerAbove(part.section, part.section.conductors[index]));
  if (!possible) return null;
  const freed = plane ? references : references.slice(1);
  const section = withSignals(part.section, freed);
  const { solution } = cache.section(section);
  if ('refused' in solution) return null;
  const loops = loopInductances(section, freed, solution.solved);
  const resistance = (index: number) => resistancePerLength(section.conductors[index]) + (plane ? 0 : resistancePerLength(section.conductors[references[0]]));
  const below = freed.some((index, at) => knee < resistance(index) / (2 * Math.PI * loops.own[at]));
  if (!below) return null;
  return plane ? loops.ofTraces : sharedByResistance(section, references, loops.full);
}

function indicesOf(section: Section, role: SectionConductor['role']): readonly number[] {
  return section.conductors.flatMap((conductor, index) => (conductor.role === role ? [index] : []));
}

function withSignals(section: Section, freed: readonly number[]): Section {
  return { ...section, conductors: section.conductors.map((conductor, index) => (freed.includes(index) ? { ...conductor, role: 'signal' } : conductor)) };
}

function resistancePerLength({ width, height, undercut }: SectionConductor): number {
  return copperResistivity / ((width - undercut) * height);
}

/** Within this factor of the estimate the corner is worth a section of its own. */
const safety = 2;

/** At least the corner: a strip of this width has more inductance at this distance from a plane. */
function cornerAbove(section: Section, conductor: SectionConductor): number {
  const toPlaneAbove = section.layers.reduce((sum, layer) => sum + layer.thickness, 0) - conductor.y;
  const height = section.planeBelow ? Math.min(conductor.y + conductor.height, toPlaneAbove) : conductor.width;
  const inductance = (mu0 * height) / (conductor.width + 2 * height);
  return resistancePerLength(conductor) / (2 * Math.PI * inductance);
}

interface Loops {
  /** Among the section's signals, row-major: traces and freed references. */
  readonly full: { readonly order: number; readonly values: Float64Array; readonly signals: readonly number[] };
  readonly ofTraces: Float64Array;
  /** Of each freed reference alone. */
  readonly own: readonly number[];
}

function loopInductances(section: Section, freed: readonly number[], { order, inductance }: { order: number; inductance: Float64Array }): Loops {
  const signals = indicesOf(section, 'signal');
  const traces = signals.flatMap((index, at) => (freed.includes(index) ? [] : [at]));
  const ofTraces = Float64Array.from(traces.flatMap((i) => traces.map((j) => inductance[i * order + j])));
  const own = freed.map((index) => inductance[signals.indexOf(index) * (order + 1)]);
  return { full: { order, values: inductance, signals }, ofTraces, own };
}

function sharedByResistance(section: Section, references: readonly number[], { order, values, signals }: Loops['full']): Float64Array {
  const conductance = references.map((index) => 1 / resistancePerLength(section.conductors[index]));
  const all = conductance.reduce((sum, each) => sum + each, 0);
  // Currents of the loops when one trace carries 1 A: that trace 1, each further return its share back.
  const share = signals.map((index) => (references.includes(index) ? -conductance[references.indexOf(index)] / all : 0));
  const traces = signals.flatMap((index, at) => (references.includes(index) ? [] : [at]));
  const currents = traces.map((trace) => share.map((value, at) => (at === trace ? 1 : value)));
  const flux = (a: readonly number[], b: readonly number[]) => a.reduce((sum, left, i) => sum + left * b.reduce((inner, right, j) => inner + values[i * order + j] * right, 0), 0);
  return Float64Array.from(currents.flatMap((a) => currents.map((b) => flux(a, b))));
}
