/** What was heard, as contributions to a peak or an rms budget, and what of it has no rms. */
import { volts } from '../units/quantity';
import { rmsOf, type Heard, type HeardPart, type HeardSine } from './heard';
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
  const { edge, sines, source: { signal } } = heard;
  const found: Contribution[] = [];
  if (edge !== null) found.push(contribution(heard, edge, { value: edge.value, unfiltered: edge.unfiltered, errorBar: edge.errorBar, cause: edgeCause(heard), group: signal.switchesWith, spectrum: null }));
  for (const sine of sines) found.push(contribution(heard, sine, { value: sine.value, unfiltered: sine.unfiltered, errorBar: sine.errorBar, cause: sineCause(heard), group: null, spectrum: null }));
  return found;
}

function rmsPartsOf(heard: Heard): readonly Contribution[] {
  const { spectrum, sines, source: { signal } } = heard;
  const found: Contribution[] = [];
  if (spectrum !== null) found.push(contribution(heard, spectrum, { value: volts(rmsOf(spectrum.spectrum)), unfiltered: null, errorBar: spectrum.errorBar, cause: edgeCause(heard), group: signal.switchesWith, spectrum: spectrum.spectrum }));
  for (const sine of sines) found.push(contribution(heard, sine, { value: sine.rms, unfiltered: outOfBand(sine), errorBar: volts(sine.errorBar / Math.SQRT2), cause: sineCause(heard), group: null, spectrum: null }));
  return found;
}

/** What the sharp band keeps out is listed with what it would be. */
function outOfBand({ rms, value, unfiltered }: HeardSine) {
  const whole = (unfiltered ?? value) / Math.SQRT2;
  return rms < whole ? volts(whole) : null;
}

type Counts = Pick<Contribution, 'value' | 'unfiltered' | 'errorBar' | 'cause' | 'group' | 'spectrum'>;

function contribution({ channel, source, origins, place }: Heard, part: HeardPart, { value, unfiltered, errorBar, cause, group, spectrum }: Counts): Contribution {
  return {
    channel, from: source.signal.name, cause, where: origins.length === 1 ? origins[0]! : origins.join(', '), place, group, value, unfiltered, errorBar, bounds: null, method: part.method,
    // Words are made when they are asked for: a spread would make them all.
    get assumptions() { return part.assumptions; },
    coupling: part.coupling, spectrum,
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
