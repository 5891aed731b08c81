/**
 * What one source puts on one receiver by one way: the currency between the channels, which compute it, and the budgets, which
 * add it up. Magnitudes; by its edges as a peak, by each of its sines, and by its repeated edges as a spectrum.
 */
import type { Place } from '../board/model';
import type { Frequency, Voltage } from '../units/quantity';
import type { Channel, Coupling, Spectrum } from './results';
import type { Receiver } from './receivers';
import type { Source } from './sources';

export interface Heard {
  readonly channel: Channel;
  readonly source: Source;
  readonly receiver: Receiver;
  /** Names of the run, the links, the loops or the return that it leads through, and where that stands in the text. */
  readonly origins: readonly string[];
  readonly place: Place;
  /** Null where it has no edge. */
  readonly edge: HeardPeak | null;
  readonly sines: readonly HeardSine[];
  /** In the receiver's band; null where it has no rms budget, or nothing repeats. */
  readonly spectrum: HeardSpectrum | null;
}

export interface HeardPart {
  readonly errorBar: Voltage;
  readonly method: string;
  readonly assumptions: readonly string[];
  /** Where a run's copper does it. */
  readonly coupling: Coupling | null;
}

export interface HeardPeak extends HeardPart {
  readonly value: Voltage;
  /** Before what the filter or the moment of sampling takes away; null where they take nothing. */
  readonly unfiltered: Voltage | null;
}

export interface HeardSine extends HeardPeak {
  /** Of the worst in its range. */
  readonly frequency: Frequency;
  /** In the receiver's band; 0 outside. */
  readonly rms: Voltage;
}

export interface HeardSpectrum extends HeardPart {
  readonly spectrum: Spectrum;
}

/** Of its edge and of its sines, as it counts. */
export function largestPeak({ edge, sines }: Heard): number {
  return Math.max(0, edge?.value ?? 0, ...sines.map(({ value }) => value));
}

export function rmsOf({ rms }: Spectrum): number {
  return rms.reduce((root, value) => Math.hypot(root, value), 0);
}
