/**
 * Where a run goes beyond what its models were made for: one sentence each, with the range.
 */
import type { Run } from '../board/model';
import { kneeFrequency } from '../physics/lines/knee';
import { copperResistivity, mu0 } from '../units/constants';
import { inText } from '../units/inText';
import type { Time } from '../units/quantity';
import type { SolvedCoupling } from './coupledRun';
import { refusalInText } from './refusalInText';
import type { ModelLimit } from './results';
import { conductorsAtOnce, neighboursEachSide, type RefusedPart, type RunPart, type RunParts } from './runParts';

export function runLimits(run: Run, { separated, windowed, undersidePlanar }: Pick<RunParts, 'separated' | 'windowed' | 'undersidePlanar'>): readonly ModelLimit[] {
  const found: ModelLimit[] = [];
  if (separated) found.push(limit(run, `a plane lies between rows of run ${run.name}: they are computed apart, and nothing couples through a plane; cut it away with \`without\` where it ends`));
  if (windowed) found.push(limit(run, `run ${run.name} has more than ${conductorsAtOnce} conductors in one section: each receiver is computed with its ${neighboursEachSide} nearest on each side, and the rest is left out`));
  if (undersidePlanar) found.push(limit(run, `mask follows the copper on both faces of run ${run.name}: that on the underside counts as planar, which makes its couplings a few per cent too large`));
  return found;
}

/** `no-reference` has a rule of its own, and a row of guards alone has nothing to compute. */
export function refusalLimits(run: Run, { refusal, conductors }: RefusedPart): readonly ModelLimit[] {
  if (refusal.reason === 'no-reference' || refusal.reason === 'no-signal') return [];
  return [limit(run, `run ${run.name} has no numbers: ${refusalInText(refusal, conductors)}`)];
}

/** `fastest`: the shortest 10–90 % time of what moves in the part. */
export function partLimits(run: Run, part: RunPart, fastest: Time | null): readonly ModelLimit[] {
  return [...accuracyLimits(run, part), ...sizeLimits(run, part, fastest)];
}

function accuracyLimits(run: Run, { matrices }: RunPart): readonly ModelLimit[] {
  const bars = [...matrices.capacitanceError, ...matrices.inductanceError].filter(Number.isFinite);
  const worst = Math.max(...bars);
  return coarse < worst ? [limit(run, `the capacitances and inductances of run ${run.name} are known to ${inText(worst, 'fraction')} only: its cross-section is beyond what is solved to ${inText(coarse, 'fraction')}`)] : [];
}

/** Relative, of any entry of the matrices. */
const coarse = 0.05;

function sizeLimits(run: Run, part: RunPart, fastest: Time | null): readonly ModelLimit[] {
  if (fastest === null) return [];
  const knee = kneeFrequency(fastest);
  const across = sizeAcross(part);
  const tenth = 1 / (10 * knee * Math.max(...part.alone.map(({ delay }) => delay)));
  if (across < tenth) return [];
  return [limit(run, `run ${run.name} is ${inText(across, 'length')} across: more than ${inText(tenth, 'length')}, a tenth of the wavelength at the knee of its fastest edge (${inText(knee, 'frequency')}), up to which lines have one voltage and one current at each place`)];
}

/** Over the outermost conductors, or from the plane to the highest of them. */
function sizeAcross({ section: { conductors, planeBelow } }: RunPart): number {
  const right = Math.max(...conductors.map(({ x, width }) => x + width));
  const bottom = planeBelow ? 0 : Math.min(...conductors.map(({ y }) => y));
  return Math.max(right, Math.max(...conductors.map(({ y, height }) => y + height)) - bottom);
}

export function couplingLimits(run: Run, part: RunPart, couplings: readonly SolvedCoupling[]): readonly ModelLimit[] {
  const growing = couplings.filter((each) => each.growing);
  const found: ModelLimit[] = [];
  if (0 < growing.length) {
    const [{ coupling }] = growing;
    found.push(limit(run, `what ${coupling.aggressor.name} puts on ${coupling.victim.name} in run ${run.name}${growing.length === 1 ? '' : ` (and ${growing.length - 1} more)`} still grows 20 delays of the run after the edge: losses decide its peak, and they are not in the model`));
  }
  const neglected = couplings.filter(({ coupling }) => coupling.model === 'line').map(({ rise }) => internalInductance(part, rise));
  const largest = Math.max(0, ...neglected);
  if (worthSaying < largest) found.push(limit(run, `the inductance inside the copper of run ${run.name} is left out: up to ${inText(largest, 'fraction')} of a trace's own at the knee of its edges, said from ${inText(worthSaying, 'fraction')}`));
  return found;
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

function limit(run: Run, message: string): ModelLimit {
  return { subject: { kind: 'run', name: run.name }, place: run.place, message };
}
