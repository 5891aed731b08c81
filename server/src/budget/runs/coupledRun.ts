/** The couplings of a part of a run as the text now names and places them, and what its receivers lack. */
import type { Place, Run } from '../../board/model';
import type { Waveform } from '../../physics/lines/lines';
import { seconds, volts } from '../../units/quantity';
import type { Heard } from '../heard';
import type { Receiver } from '../receivers';
import type { FoundSpectrum } from '../repeatedSpectrum';
import type { Coupling, Unaccounted } from '../results';
import type { Role, Roles } from '../roles';
import { timelessOf } from '../sources';
import { roleOf } from './arrangements';
import { couplingAssumptions, guardsInWords } from './couplingAssumptions';
import { listeners, partReceivers, partSources, type PartReceiver, type PartSource } from './partPlayers';
import type { FoundSine } from './sineNoise';
import type { HeardPart } from './solvedRun';
import { isFiniteNoise, scaleOf, type Found } from './worstNoise';

export interface PartContext {
  readonly run: Run;
  readonly part: HeardPart;
  readonly roles: Roles;
  readonly windowed: boolean;
}

export interface CoupledPart {
  readonly couplings: readonly Coupling[];
  readonly heard: readonly Heard[];
  readonly lacking: readonly Lacking[];
  /** Nets whose ends took part. */
  readonly coupled: readonly Role[];
}

/** A receiver's budget lacks something that arises in this run. */
export interface Lacking {
  readonly receiver: Receiver;
  readonly unaccounted: Unaccounted;
}

export function coupledPart(context: PartContext): CoupledPart {
  const { part, roles } = context;
  const receivers = partReceivers(part, roles);
  const heard: Heard[] = [];
  const lacking: Lacking[] = [];
  partSources(part, roles).forEach((source, nth) => {
    for (const index of listeners(receivers, source)) {
      const meeting = new Meeting(context, source, receivers[index]);
      const { edges, sines, spectra } = part.noise[nth];
      const found = meeting.heard({ edge: edges.get(index) ?? null, sines: sines.get(index) ?? [], spectrum: spectra.get(index) ?? null });
      heard.push(found);
      for (const unaccounted of meeting.lacking(edges.get(index) ?? null)) lacking.push({ receiver: receivers[index].receiver, unaccounted });
    }
  });
  const couplings = heard.flatMap(({ edge, sines }) => [...(edge === null ? [] : [edge]), ...sines].flatMap(({ coupling }) => coupling ?? []));
  return { couplings, heard, lacking, coupled: couplings.length === 0 ? [] : part.traces.map((trace) => roleOf(roles, trace)) };
}

/** One source and one receiver in one part of a run. */
class Meeting {
  constructor(private readonly context: PartContext, private readonly source: PartSource, private readonly receiver: PartReceiver) {}

  heard({ edge, sines, spectrum }: { edge: Found | null; sines: readonly FoundSine[]; spectrum: FoundSpectrum | null }): Heard {
    const { context: { run }, source: { source }, receiver: { receiver } } = this;
    const byEdge = edge === null || !isFiniteNoise(edge) ? null : this.edgeCoupling(edge);
    const place = this.place();
    return {
      channel: 'coupled', source, receiver, origins: [run.name], place,
      edge: byEdge === null ? null : {
        value: volts(Math.abs(byEdge.counted ?? byEdge.atReceiver)),
        unfiltered: byEdge.counted === null ? null : volts(Math.abs(byEdge.atReceiver)),
        errorBar: byEdge.errorBar,
        method: edge?.tied != null ? 'coupled lines, guards among them' : byEdge.model === 'lumped' ? 'coupled lines, short enough to act as a lumped circuit' : 'coupled lines',
        get assumptions() { return byEdge.assumptions; },
        coupling: byEdge,
      },
      sines: sines.map((found) => {
        const coupling = this.sineCoupling(found);
        return {
          value: volts(coupling.counted ?? coupling.atReceiver),
          unfiltered: coupling.counted === null ? null : coupling.atReceiver,
          errorBar: coupling.errorBar,
          method: found.sine.from === found.sine.to ? 'coupled lines at one frequency' : 'coupled lines at the worst frequency of the range',
          get assumptions() { return coupling.assumptions; },
          coupling,
          frequency: found.frequency,
          rms: volts((found.withinBand * found.sine.amplitude) / Math.SQRT2),
        };
      }),
      spectrum: spectrum === null ? null : {
        spectrum: spectrum.spectrum,
        errorBar: spectrum.errorBar,
        method: 'Fourier series of the repeated edges through coupled lines',
        get assumptions() { return byEdge?.assumptions ?? []; },
        coupling: byEdge,
      },
    };
  }

  lacking(edge: Found | null): readonly Unaccounted[] {
    const { context: { run }, source: { source: { signal } } } = this;
    const missing: Unaccounted[] = timelessOf(signal).map(({ what, why }) => ({ what: `the ${what} of ${signal.name} in run ${run.name} is not counted: ${why}`, place: this.sourcePlace() }));
    if (edge !== null && !isFiniteNoise(edge)) missing.push({ what: `what ${signal.name} puts on it in run ${run.name} is beyond what can be computed`, place: this.sourcePlace() });
    return missing;
  }

  private place(): Place {
    return this.context.part.traces[this.receiver.terms[0]!.index].whole;
  }

  private sourcePlace(): Place {
    return this.context.part.traces[this.source.lines[0]!.index].whole;
  }

  private edgeCoupling(found: Found): Coupling {
    const { context, source, receiver } = this;
    const { edge, noise, model, carried } = found;
    const scale = scaleOf(edge);
    const of = (value: number) => volts(scale * value);
    // A filter takes from the error what it takes from the peak.
    const passed = noise.counted === null || noise.atReceiver === 0 ? 1 : Math.abs(noise.counted / noise.atReceiver);
    return {
      run: context.run,
      aggressor: source.source.signal,
      victim: receiver.receiver.subject,
      kind: receiver.receiver.kind,
      edge: edge.kind,
      model,
      nearEnd: of(noise.nearEnd),
      farEnd: of(noise.farEnd),
      atReceiver: of(noise.atReceiver),
      counted: noise.counted === null ? null : of(noise.counted),
      frequency: null,
      peakTime: noise.peakTime,
      widthHalf: noise.widthHalf,
      get capacitivePart() { return of(noise.split().capacitive); },
      get inductivePart() { return of(noise.split().inductive); },
      errorBar: volts(Math.abs(scale) * passed * (noise.errorBar + carried)),
      bounds: null,
      // Pictures and words are made when they are asked for: a board has hundreds of couplings, and shows one.
      get waveform() { return scaled(noise.waveform, scale); },
      get endWaveforms() {
        const { near, far } = noise.ends();
        return { near: scaled(near, scale), far: scaled(far, scale), until: noise.until };
      },
      get assumptions() { return couplingAssumptions(context, { source, receiver }, { ...guardsInWords(found.guards, edge.rise), tied: found.tied, followed: noise.followed }); },
    };
  }

  private sineCoupling(found: FoundSine): Coupling {
    const { context, source, receiver } = this;
    const { amplitude } = found.sine;
    const of = (value: number) => volts(amplitude * value);
    return {
      run: context.run,
      aggressor: source.source.signal,
      victim: receiver.receiver.subject,
      kind: receiver.receiver.kind,
      edge: 'sine',
      model: found.model,
      nearEnd: of(found.nearEnd),
      farEnd: of(found.farEnd),
      atReceiver: of(found.atReceiver),
      counted: found.counted === null ? null : of(found.counted),
      frequency: found.frequency,
      peakTime: null,
      widthHalf: null,
      capacitivePart: of(found.capacitivePart),
      inductivePart: of(found.inductivePart),
      errorBar: volts(amplitude * found.errorBar * (found.counted ?? found.atReceiver)),
      bounds: null,
      waveform: null,
      endWaveforms: null,
      get assumptions() { return couplingAssumptions(context, { source, receiver }, { ...guardsInWords(found.guards, seconds(0.35 / found.frequency)), tied: null, followed: false }); },
    };
  }
}

function scaled({ times, values }: Waveform, scale: number): Waveform {
  return { times, values: values.map((value) => scale * value) };
}
