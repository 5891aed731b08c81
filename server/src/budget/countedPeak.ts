/**
 * What of a waveform at a receiver counts in its peak budget: what a filter ahead of it leaves, and of that only what
 * stands later than the moment from which it samples.
 */
import { peakAfter } from '../physics/lines/combine';
import type { Waveform } from '../physics/lines/lines';
import { peakInBand, type Band } from '../physics/noise/receiverBand';
import type { Time, Voltage } from '../units/quantity';

export interface Counting {
  readonly band: Band | null;
  /** Since the edge began. */
  readonly after: Time | null;
}

/** Signed; null where all of it counts. */
export function countedPeak(waveform: Waveform, { band, after }: Counting): Voltage | null {
  if (band !== null) return peakInBand(waveform, band, after).peak;
  return after === null ? null : peakAfter(waveform, after).value;
}
