/** The couplings of a part of a run as the text now names and places them, and what its receivers lack. */
import type { Net, Run } from '../../board/model';
import { volts } from '../../units/quantity';
import { couplingAssumptions } from './couplingAssumptions';
import { roleOf } from './excitations';
import { absent, uncountedSourcesOf } from '../notYetCounted';
import type { Coupling, Unaccounted } from '../results';
import type { Role, Roles } from '../roles';
import type { RunPart, Trace } from './runParts';
import type { HeardPart } from './solvedRun';
import { isFiniteNoise, receiversOf, type Found } from './worstNoise';

export interface PartContext {
  readonly run: Run;
  readonly part: HeardPart;
  readonly roles: Roles;
  readonly windowed: boolean;
}

export interface CoupledPart {
  readonly couplings: readonly Coupling[];
  readonly lacking: readonly Lacking[];
  /** Nets whose ends took part. */
  readonly coupled: readonly Role[];
}

/** A receiver's budget lacks something that arises in this run. */
export interface Lacking {
  readonly victim: Net;
  readonly unaccounted: Unaccounted;
}

export function coupledPart(context: PartContext): CoupledPart {
  const { run, part, roles } = context;
  const couplings: Coupling[] = [];
  const lacking: Lacking[] = [];
  for (const [aggressor, trace] of part.traces.entries()) {
    const receivers = receiversOf(part, trace);
    if (receivers.length === 0) continue;
    const missing = [...uncountedSourcesOf(trace.net, roleOf(roles, trace).pair, run.name), ...withoutEdge(trace, run), ...returnResistance(part, trace, run)];
    for (const index of receivers) for (const unaccounted of missing) lacking.push({ victim: part.traces[index].net, unaccounted });
    for (const [index, found] of part.noise[aggressor]) {
      if (isFiniteNoise(found)) couplings.push(couplingOf(context, { aggressor, victim: index }, found));
      else lacking.push({ victim: part.traces[index].net, unaccounted: { what: `what ${trace.net.name} puts on it in run ${run.name} is beyond what can be computed`, place: trace.whole } });
    }
  }
  return { couplings, lacking, coupled: couplings.length === 0 ? [] : part.traces.map((trace) => roleOf(roles, trace)) };
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

function couplingOf(context: PartContext, pair: { aggressor: number; victim: number }, found: Found): Coupling {
  const { run, part } = context;
  const { edge, noise, model, carried } = found;
  const aggressor = part.traces[pair.aggressor].net;
  const swing = aggressor.swing?.value ?? 0;
  // A falling edge is the mirror image of a rising one as fast.
  const scale = edge.kind === 'fall' ? -swing : swing;
  const of = (value: number) => volts(scale * value);
  // A band takes from the error what it takes from the peak.
  const passed = noise.inBand === null || noise.atReceiver === 0 ? 1 : Math.abs(noise.inBand / noise.atReceiver);
  return {
    run,
    aggressor,
    victim: part.traces[pair.victim].net,
    edge: edge.kind,
    model,
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
}
