/**
 * What a repeated waveform puts on a receiver, as rms over a band: each harmonic through the transfer at its frequency.
 *
 *   |V_n| rms  |   |            Formula   rms² = sum over from <= n f0 <= to of (|H(n f0)| sqrt 2 |c_n|)²
 *              | | | | .        Symbols   c_n of `harmonics.ts`, H the transfer from the source to the receiver, f0 the repetition rate
 *   -----------[-------]-- f    Model     steady state; the band is sharp
 *
 * Source    Parseval's theorem
 * Range     any band; harmonics in it that the series does not list are bounded by its `beyond` times the largest transfer there
 * Accuracy  that of the transfer, and `error` for what is not listed
 */
import { volts, type Voltage } from '../../units/quantity';
import { harmonicRms, type Harmonics } from './harmonics';
import type { Band } from './receiverBand';

export interface HarmonicsInBand {
  readonly first: number;
  /** Below `first` where there is none. */
  readonly last: number;
  /** All harmonics in the band are listed. */
  readonly complete: boolean;
}

export interface HarmonicNoise {
  readonly rms: Voltage;
  /** Upper bound of what the harmonics that are not listed add to it. */
  readonly error: Voltage;
  /** Number of the harmonic at index 0 of `magnitudes`. */
  readonly first: number;
  /** Rms of every harmonic in the band, V. */
  readonly magnitudes: Float64Array;
}

/** A harmonic that is meant to lie on the band's end does, whatever the division rounds to. */
export function harmonicsInBand({ fundamental, real }: Harmonics, band: Band): HarmonicsInBand {
  const first = Math.max(1, Math.ceil((band.from / fundamental) * (1 - 4 * Number.EPSILON)));
  const lastInBand = Math.floor((band.to / fundamental) * (1 + 4 * Number.EPSILON));
  return { first, last: Math.min(lastInBand, real.length), complete: lastInBand <= Math.max(first - 1, real.length) };
}

/** `magnitudes`: |H| at the harmonics in the band; `largestBeyond`: of those in the band that are not listed. */
export function rmsThroughTransfer(harmonics: Harmonics, magnitudes: Float64Array, band: Band, largestBeyond: number): HarmonicNoise {
  const { first, last, complete } = harmonicsInBand(harmonics, band);
  if (magnitudes.length !== Math.max(0, last - first + 1)) throw new Error(`${magnitudes.length} magnitudes for harmonics ${first} to ${last}`);
  const own = harmonicRms(harmonics);
  const received = magnitudes.map((size, at) => size * own[first - 1 + at]);
  const rms = rootOfSquares(received);
  const rest = complete ? 0 : harmonics.beyond * largestBeyond;
  return { rms: volts(rms), error: volts(Math.hypot(rms, rest) - rms), first, magnitudes: received };
}

/** Nets that switch together, all of one fundamental: their harmonics add as magnitudes, before squaring. */
export function addedInGroup(parts: readonly Pick<HarmonicNoise, 'first' | 'magnitudes'>[]): Pick<HarmonicNoise, 'first' | 'magnitudes' | 'rms'> {
  const counted = parts.filter(({ magnitudes }) => magnitudes.length !== 0);
  if (counted.length === 0) return { first: 1, magnitudes: new Float64Array(0), rms: volts(0) };
  const first = Math.min(...counted.map((part) => part.first));
  const end = Math.max(...counted.map((part) => part.first + part.magnitudes.length));
  const sums = new Float64Array(end - first);
  for (const { first: from, magnitudes } of counted) magnitudes.forEach((value, at) => (sums[from - first + at] += value));
  return { first, magnitudes: sums, rms: volts(rootOfSquares(sums)) };
}

/** In units of the largest, so that squares of what is tiny do not vanish. */
export function rootOfSquares(values: Float64Array): number {
  let largest = 0;
  for (const value of values) largest = Math.max(largest, Math.abs(value));
  if (largest === 0 || largest === Infinity) return largest;
  let sum = 0;
  for (const value of values) sum += (value / largest) ** 2;
  return largest * Math.sqrt(sum);
}
