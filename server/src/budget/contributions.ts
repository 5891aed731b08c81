/** What was heard, as contributions to a peak or an rms budget, and what of it has no rms. */
import { volts } from '../units/quantity';
import { rmsOf, type Heard, type HeardSine } from './heard';
import type { Contribution, Unaccounted } from './results';
import { edgesOf } from './sources';

export interface Counted {
  readonly contributions: readonly Contribution[];
  readonly lacking: readonly Unaccounted[];
}

export function contributionsOf(heard: readonly Heard[], measure: 'peak' | 'rms'): Counted {
  return {
    contributions: heard.flatMap((each) => (measure === 'peak' ? peaksOf(each) : rmsPartsOf(each))),
    lacking: measure === 'peak' ? [] : heard.flatMap(unknownRate),
  };
}

function peaksOf(heard: Heard): readonly Contribution[] {
  const { edge, sines } = heard;
  const byEdge = edge === null ? [] : [contribution(heard, { ...pick(edge), value: edge.value, unfiltered: edge.unfiltered, cause: edgeCause(heard), group: heard.source.signal.switchesWith, spectrum: null })];
  return [...byEdge, ...sines.map((sine) => contribution(heard, { ...pick(sine), value: sine.value, unfiltered: sine.unfiltered, cause: sineCause(heard), group: null, spectrum: null }))];
}

function rmsPartsOf(heard: Heard): readonly Contribution[] {
  const { spectrum, sines } = heard;
  const repeated = spectrum === null ? [] : [contribution(heard, { ...pick(spectrum), value: volts(rmsOf(spectrum.spectrum)), unfiltered: null, cause: edgeCause(heard), group: heard.source.signal.switchesWith, spectrum: spectrum.spectrum })];
  return [...repeated, ...sines.map((sine) => contribution(heard, { ...pick(sine), value: sine.rms, errorBar: volts(sine.errorBar / Math.SQRT2), unfiltered: outOfBand(sine), cause: sineCause(heard), group: null, spectrum: null }))];
}

/** What the sharp band keeps out is listed with what it would be. */
function outOfBand({ rms, value, unfiltered }: HeardSine) {
  const whole = (unfiltered ?? value) / Math.SQRT2;
  return rms < whole ? volts(whole) : null;
}

type Part = Pick<Contribution, 'value' | 'unfiltered' | 'errorBar' | 'method' | 'assumptions' | 'coupling' | 'cause' | 'group' | 'spectrum'>;

/** Words are made when they are asked for. */
function pick(part: Pick<Part, 'errorBar' | 'method' | 'assumptions' | 'coupling'>) {
  return { errorBar: part.errorBar, method: part.method, coupling: part.coupling, get assumptions() { return part.assumptions; } };
}

function contribution({ channel, source, origins, place }: Heard, part: Part): Contribution {
  return {
    channel, from: source.signal.name, cause: part.cause, where: origins.join(', '), place, group: part.group, value: part.value, unfiltered: part.unfiltered,
    errorBar: part.errorBar, bounds: null, method: part.method, get assumptions() { return part.assumptions; }, coupling: part.coupling, spectrum: part.spectrum,
  };
}

/** A group and a net may have one name; they are not one cause. */
function edgeCause({ source: { signal } }: Heard): string {
  return signal.switchesWith === null ? `${signal.kind} ${signal.name}` : `group ${signal.switchesWith}`;
}

/** Different sines know nothing of each other, nor of the edges of their own net. */
function sineCause({ source: { signal } }: Heard): string {
  return `sine of ${signal.kind} ${signal.name}`;
}

/** An edge that nobody said how often it comes has no rms value. */
function unknownRate({ source: { signal } }: Heard): readonly Unaccounted[] {
  if (signal.repeats !== null || signal.once || edgesOf(signal).length === 0) return [];
  return [{ what: `${signal.name} has no rms value: how often it repeats is not stated (\`repeats\`, or \`once\` for a single event)`, place: signal.place }];
}
