/**
 * Where a run goes beyond what its models were made for: one sentence each, with the range.
 */
import type { Run } from '../../board/model';
import { kneeFrequency } from '../../physics/lines/knee';
import { copperResistivity, mu0 } from '../../units/constants';
import { inText } from '../../units/inText';
import type { Time } from '../../units/quantity';
import type { Roles } from '../roles';
import { refusalInText } from './refusalInText';
import { conductorsAtOnce, neighboursEachSide, type RefusedPart, type RunPart, type RunParts } from './runParts';
import { fastestEdge, partReceivers, partSources } from './partPlayers';
import type { HeardPart } from './solvedRun';
import { isFiniteNoise } from './worstNoise';

export function runLimits(run: Run, { separated, windowed, undersidePlanar }: Pick<RunParts, 'separated' | 'windowed' | 'undersidePlanar'>): readonly string[] {
  const found: string[] = [];
  if (separated) found.push(`a plane lies between rows of run ${run.name}: they are computed apart, and nothing couples through a plane; cut it away with \`without\` where it ends`);
  if (windowed) found.push(`run ${run.name} has more than ${conductorsAtOnce} conductors in one section: each receiver is computed with its ${neighboursEachSide} nearest on each side, and the rest is left out`);
  if (undersidePlanar) found.push(`mask follows the copper on both faces of run ${run.name}: that on the underside counts as planar, which makes its couplings a few per cent too large`);
  return found;
}

/** `no-reference` has a rule of its own, and a row of guards alone has nothing to compute. */
export function refusalLimits(run: Run, { refusal, conductors }: RefusedPart): readonly string[] {
  if (refusal.reason === 'no-reference' || refusal.reason === 'no-signal') return [];
  return [`run ${run.name} has no numbers: ${refusalInText(refusal, conductors)}`];
}

export function partLimits(run: Run, part: HeardPart, roles: Roles): readonly string[] {
  return [...accuracyLimits(run, part), ...sizeLimits(run, part, fastestEdge(part, roles)), ...noiseLimits(run, part, roles)];
}

function accuracyLimits(run: Run, { matrices }: RunPart): readonly string[] {
  const bars = [...matrices.capacitanceError, ...matrices.inductanceError].filter(Number.isFinite);
  const worst = Math.max(...bars);
  return coarse < worst ? [`the capacitances and inductances of run ${run.name} are known to ${inText(worst, 'fraction')} only: its cross-section is beyond what is solved to ${inText(coarse, 'fraction')}`] : [];
}

/** Relative, of any entry of the matrices. */
const coarse = 0.05;

function sizeLimits(run: Run, part: RunPart, fastest: Time | null): readonly string[] {
  if (fastest === null) return [];
  const knee = kneeFrequency(fastest);
  const across = sizeAcross(part);
  const tenth = 1 / (10 * knee * Math.max(...part.alone.map(({ delay }) => delay)));
  if (across < tenth) return [];
  return [`run ${run.name} is ${inText(across, 'length')} across: more than ${inText(tenth, 'length')}, a tenth of the wavelength at the knee of its fastest edge (${inText(knee, 'frequency')}), up to which lines have one voltage and one current at each place`];
}

/** Over the outermost conductors, or from the plane to the highest of them. */
function sizeAcross({ section: { conductors, planeBelow } }: RunPart): number {
  const right = Math.max(...conductors.map(({ x, width }) => x + width));
  const bottom = planeBelow ? 0 : Math.min(...conductors.map(({ y }) => y));
  return Math.max(right, Math.max(...conductors.map(({ y, height }) => y + height)) - bottom);
}

function noiseLimits(run: Run, part: HeardPart, roles: Roles): readonly string[] {
  const [sources, receivers] = [partSources(part, roles), partReceivers(part, roles)];
  const said = (source: number, receiver: number) => `what ${sources[source]!.source.signal.name} puts on ${receivers[receiver]!.receiver.subject.name} in run ${run.name}`;
  const more = (count: number) => (count === 1 ? '' : ` (and ${count - 1} more)`);
  const byEdges = part.noise.flatMap(({ edges }, source) => [...edges].flatMap(([receiver, found]) => (isFiniteNoise(found) ? [{ source, receiver, found }] : [])));
  const growing = byEdges.filter(({ found }) => found.noise.growing);
  const limits: string[] = [];
  if (0 < growing.length) limits.push(`${said(growing[0]!.source, growing[0]!.receiver)}${more(growing.length)} still grows 20 delays of the run after the edge: losses decide its peak, and they are not in the model`);
  const resonant = part.noise.flatMap(({ sines }, source) => [...sines].flatMap(([receiver, all]) => all.filter(({ unresolved }) => unresolved).map(() => ({ source, receiver }))));
  if (0 < resonant.length) limits.push(`${said(resonant[0]!.source, resonant[0]!.receiver)}${more(resonant.length)} has a resonance in the range of its sine that nothing damps: losses decide how high it is, and they are not in the model`);
  const neglected = byEdges.filter(({ found }) => found.model === 'line').map(({ found }) => internalInductance(part, found.edge.rise));
  const largest = Math.max(0, ...neglected);
  if (worthSaying < largest) limits.push(`the inductance inside the copper of run ${run.name} is left out: up to ${inText(largest, 'fraction')} of a trace's own at the knee of its edges, said from ${inText(worthSaying, 'fraction')}`);
  return limits;
}

const worthSaying = 0.05;

/** Of the largest share: skin depth at the knee on the trace's perimeter, at most what a round wire of dc current has. */
function internalInductance({ section, matrices }: RunPart, rise: Time): number {
  const depth = Math.sqrt(copperResistivity / (Math.PI * kneeFrequency(rise) * mu0));
  const signals = section.conductors.filter(({ role }) => role === 'signal');
  return Math.max(...signals.map(({ width, height }, index) => {
    const inside = Math.min((mu0 * depth) / (4 * (width + height)), mu0 / (8 * Math.PI));
    return inside / matrices.inductance[index * (matrices.order + 1)];
  }));
}
