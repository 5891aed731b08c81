/**
 * What repeated edges put on receivers: the harmonics of everything that a source moves, each through the transfer at its frequency.
 *
 *    voltage  ___/~~~\___      all begin at one moment, so the middles of their edges are half the
 *    current  ___/~~~~\__      difference of their durations apart
 */
import type { Signal } from '../board/model';
import type { ComplexNumbers } from '../numeric/complexLu';
import type { HarmonicNumbers } from '../physics/lines/transferAtHarmonics';
import { harmonicsOf, type Harmonics } from '../physics/noise/harmonics';
import { harmonicsInBand, rootOfSquares } from '../physics/noise/rmsThroughTransfer';
import type { Band } from '../physics/noise/receiverBand';
import { hertz, ratio, volts, type Voltage } from '../units/quantity';
import type { Spectrum } from './results';
import type { Swing } from './sources';

export interface RepeatedFeeds {
  readonly repeats: Signal['repeats'];
  /** Null of a feed that has no edges. */
  readonly trains: readonly ({ readonly rise: Swing<number> | null; readonly fall: Swing<number> | null } | null)[];
  /** Of every reading, the sign of each feed. */
  readonly signs: readonly (readonly number[])[];
}

export interface FeedTransfers {
  /** Of each feed, of each reading: volts for one unit of it, at every harmonic from `first` to `last`. */
  readonly at: (harmonics: HarmonicNumbers) => readonly (readonly ComplexNumbers[])[];
  /** Of each reading, of each feed, its largest magnitude in a range: asked for only where there are more harmonics than are followed. */
  readonly largestIn: (range: Band) => readonly (readonly number[])[];
}

export interface FoundSpectrum {
  readonly spectrum: Spectrum;
  /** For what lies in the band and was not followed. */
  readonly errorBar: Voltage;
}

/** Of the harmonics that are followed one by one; what lies beyond is bounded. */
export const mostFollowed = 4096;

/** Of each reading; null where nothing repeats. */
export function repeatedSpectra({ repeats, trains, signs }: RepeatedFeeds, band: Band, transfers: FeedTransfers): readonly FoundSpectrum[] | null {
  const feeds = trains.map((train) => (repeats === null || train === null || train.rise === null || train.fall === null ? null : feedOf(train.rise, train.fall, repeats, band)));
  const earliest = Math.min(...feeds.map((feed) => feed?.middle ?? Infinity));
  const listed = feeds.find((feed) => feed !== null);
  if (listed === undefined || listed === null) return null;
  const { fundamental } = listed.harmonics;
  const { first, last, complete } = harmonicsInBand(listed.harmonics, band);
  const rms = signs.map(() => new Float64Array(Math.max(0, last - first + 1)));
  const phasors = last < first ? [] : transfers.at({ fundamental, first, last });
  for (let n = first; n <= last; n += 1) {
    signs.forEach((sign, reading) => {
      let [re, im] = [0, 0];
      feeds.forEach((feed, at) => {
        if (feed === null) return;
        const turned = turn(feed.harmonics, n, -2 * Math.PI * n * fundamental * (feed.middle - earliest));
        const { real, imaginary } = phasors[at]![reading]!;
        const through = { re: real[n - first]!, im: imaginary[n - first]! };
        re += sign[at]! * (turned.re * through.re - turned.im * through.im);
        im += sign[at]! * (turned.re * through.im + turned.im * through.re);
      });
      rms[reading]![n - first] = Math.SQRT2 * Math.hypot(re, im);
    });
  }
  const beyond = complete ? null : transfers.largestIn({ from: hertz(Math.max(band.from, (last + 1) * fundamental)), to: band.to });
  return rms.map((values, reading) => {
    const rest = beyond === null ? 0 : feeds.reduce((sum, feed, at) => sum + (feed?.harmonics.beyond ?? 0) * beyond[reading]![at]!, 0);
    const whole = rootOfSquares(values);
    return { spectrum: { fundamental, first, rms: values }, errorBar: volts(Math.hypot(whole, rest) - whole) };
  });
}

interface RepeatedFeed {
  readonly harmonics: Harmonics;
  /** Of the rise, after its beginning, s. */
  readonly middle: number;
}

function feedOf(rise: Swing<number>, fall: Swing<number>, repeats: NonNullable<Signal['repeats']>, band: Band): RepeatedFeed {
  const train = { swing: volts(rise.amplitude), rise: rise.duration, fall: fall.duration, repeats: repeats.frequency.value, duty: repeats.duty?.value ?? ratio(0.5) };
  return { harmonics: harmonicsOf(train, band.to, mostFollowed), middle: rise.duration / 2 };
}

function turn({ real, imaginary }: Harmonics, n: number, angle: number): { readonly re: number; readonly im: number } {
  const [re, im] = [real[n - 1]!, imaginary[n - 1]!];
  if (angle === 0) return { re, im };
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
  return { re: re * cosine - im * sine, im: re * sine + im * cosine };
}
