/**
 * What each net that moves in a part of a run puts on each receiver in it: the worst of its edges, of the
 * directions in which it and they are driven, and of what is assumed for sources that nobody stated.
 */
import type { Net, Run } from '../board/model';
import { electricalLength } from '../physics/lines/electricalLength';
import { kneeFrequency } from '../physics/lines/knee';
import { seconds, volts } from '../units/quantity';
import { slowInductance } from './balancingCurrent';
import { carriedError } from './carriedError';
import { couplingAssumptions } from './couplingAssumptions';
import { arrangementsFor, edgesOf, roleOf, type Arrangement, type Edge } from './excitations';
import { absent, uncountedSourcesOf } from './notYetCounted';
import type { Coupling, Unaccounted } from './results';
import { isReceiver, type Role, type Roles } from './roles';
import type { RunPart, Trace } from './runParts';
import { solvedLine, type ReceivedNoise } from './solvedLine';
import type { SolveCache } from './solveCache';

export interface PartContext {
  readonly run: Run;
  readonly part: RunPart;
  readonly roles: Roles;
  readonly windowed: boolean;
}

export interface CoupledPart {
  readonly couplings: readonly SolvedCoupling[];
  readonly lacking: readonly Lacking[];
  /** Nets whose ends took part. */
  readonly coupled: readonly Role[];
}

/** A receiver's budget lacks something that arises in this run. */
export interface Lacking {
  readonly victim: Net;
  readonly unaccounted: Unaccounted;
}

export interface SolvedCoupling {
  readonly coupling: Coupling;
  readonly rise: Edge['rise'];
  readonly growing: boolean;
}

export function coupledPart(context: PartContext, cache: SolveCache): CoupledPart {
  const { run, part, roles } = context;
  const couplings: SolvedCoupling[] = [];
  const lacking: Lacking[] = [];
  for (const [aggressor, trace] of part.traces.entries()) {
    const receivers = receiversOf(context, trace);
    if (receivers.length === 0) continue;
    const missing = [...uncountedSourcesOf(trace.net, roleOf(roles, trace).pair, run.name), ...withoutEdge(trace, run), ...returnResistance(part, trace, run)];
    for (const index of receivers) for (const unaccounted of missing) lacking.push({ victim: part.traces[index].net, unaccounted });
    if (trace.net.swing === null) continue;
    const worst = worstNoise(context, { aggressor, receivers }, cache);
    for (const [index, found] of worst) {
      if (isFiniteNoise(found)) couplings.push(solvedCoupling(context, { aggressor, victim: index }, found));
      else lacking.push({ victim: part.traces[index].net, unaccounted: { what: `what ${trace.net.name} puts on it in run ${run.name} is beyond what can be computed`, place: trace.whole } });
    }
  }
  return { couplings, lacking, coupled: couplings.length === 0 ? [] : part.traces.map((trace) => roleOf(roles, trace)) };
}

/** A net is no aggressor to itself, however many of its traces lie in the run. */
function receiversOf({ part }: PartContext, aggressor: Trace): readonly number[] {
  return part.read.filter((index) => isReceiver(part.traces[index].net) && part.traces[index].net !== aggressor.net);
}

function withoutEdge({ net, whole }: Trace, run: Run): readonly Unaccounted[] {
  if (net.swing === null) return [];
  // A `fall` alone says nothing of the rise; a rise alone is the fall as well.
  const [rise, fall] = [net.rise?.value ?? null, net.fall?.value ?? null];
  const missing = rise === null ? ['`rise`', 'it states none'] : rise === 0 ? ['`rise`', 'it is 0 s'] : fall === 0 ? ['`fall`', 'it is 0 s'] : null;
  return missing === null ? [] : [{ what: `the ${missing[0]} of ${net.name} in run ${run.name} is not counted: ${missing[1]}`, place: whole }];
}

/** Its inductance is in the run's matrices; what its resistance drops is a shared return's. */
function returnResistance({ section }: RunPart, { net }: Trace, run: Run): readonly Unaccounted[] {
  if (net.swing === null || section.planeAbove || section.planeBelow) return [];
  return [absent(`the resistance of the return in run ${run.name}`, run.place)];
}

interface Pairing {
  readonly aggressor: number;
  readonly receivers: readonly number[];
}

/** One way to compute a coupling, and what came of it. */
export interface Found {
  readonly edge: Edge;
  readonly arrangement: Arrangement;
  /** Where the edge is too slow for them: whether they carry their balancing current all the same. */
  readonly guards: 'ideal' | 'balance' | 'idle';
  readonly delay: number;
  /** For one volt of a rising edge. */
  readonly noise: ReceivedNoise;
}

function worstNoise(context: PartContext, { aggressor, receivers }: Pairing, cache: SolveCache): ReadonlyMap<number, Found> {
  const { run, part, roles } = context;
  const { net } = part.traces[aggressor];
  const length = run.length.value;
  const read = receivers.map((index) => ({ index, band: bandOf(part.traces[index].net) }));
  const worst = new Map<number, Found>();
  for (const edge of edgesOf(net)) {
    const slowed = slowInductance(part, kneeFrequency(edge.rise), cache);
    for (const arrangement of arrangementsFor(part, roles, aggressor, length)) {
      for (const inductance of slowed === null ? [part.matrices.inductance] : [part.matrices.inductance, slowed]) {
        const guards = inductance === slowed ? 'idle' : slowed === null ? 'ideal' : 'balance';
        const request = { part, inductance, slow: inductance === slowed, length, arrangement, aggressor, duration: edge.duration, repeats: net.repeats?.frequency.value ?? null, receivers: read };
        const { delay, receivers: noises } = solvedLine(request, cache);
        noises.forEach((noise, at) => {
          const known = worst.get(receivers[at]);
          if (known === undefined || counted(known.noise) < counted(noise)) worst.set(receivers[at], { edge, arrangement, guards, delay, noise });
        });
      }
    }
  }
  return worst;
}

/** Only a peak budget is filtered by its band here; an rms budget has its own way to count. */
function bandOf(net: Net) {
  return net.band === null || net.toleratesPeak === null ? null : { from: net.band.from.value, to: net.band.to.value };
}

function counted({ inBand, atReceiver }: ReceivedNoise): number {
  return Math.abs(inBand ?? atReceiver);
}

function isFiniteNoise({ noise }: Found): boolean {
  return [noise.nearEnd, noise.farEnd, noise.atReceiver, noise.inBand ?? 0, noise.errorBar].every(Number.isFinite);
}

function solvedCoupling(context: PartContext, pair: { aggressor: number; victim: number }, found: Found): SolvedCoupling {
  const { run, part } = context;
  const { edge, noise, delay } = found;
  const aggressor = part.traces[pair.aggressor].net;
  const swing = aggressor.swing?.value ?? 0;
  // A falling edge is the mirror image of a rising one as fast.
  const scale = edge.kind === 'fall' ? -swing : swing;
  const of = (value: number) => volts(scale * value);
  const carried = carriedError(part.matrices, { ...pair, peak: noise.atReceiver, capacitive: noise.capacitivePart, inductive: noise.inductivePart });
  // A band takes from the error what it takes from the peak.
  const passed = noise.inBand === null || noise.atReceiver === 0 ? 1 : Math.abs(noise.inBand / noise.atReceiver);
  const coupling: Coupling = {
    run,
    aggressor,
    victim: part.traces[pair.victim].net,
    edge: edge.kind,
    model: electricalLength(seconds(delay), edge.rise),
    nearEnd: of(noise.nearEnd),
    farEnd: of(noise.farEnd),
    atReceiver: of(noise.atReceiver),
    inBand: noise.inBand === null ? null : of(noise.inBand),
    peakTime: noise.peakTime,
    widthHalf: noise.widthHalf,
    capacitivePart: of(noise.capacitivePart),
    inductivePart: of(noise.inductivePart),
    errorBar: volts(Math.abs(scale) * passed * (noise.errorBar + carried)),
    bounds: null,
    // Pictures and words are made when they are asked for: a board has hundreds of couplings, and shows one.
    get waveform() { return { times: noise.waveform.times, values: noise.waveform.values.map((value) => scale * value) }; },
    get assumptions() { return couplingAssumptions(context, pair, found); },
  };
  return { coupling, rise: edge.rise, growing: noise.growing };
}
