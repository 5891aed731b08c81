/**
 * What the repeated edges of a source put on receivers: the harmonics of its voltage and of the current that it draws in step,
 * each through the transfer at its frequency. The current's sign is not known: the larger result of both counts.
 *
 *    voltage  ___/~~~\___      both begin at one moment, so the middles of their edges are half the
 *    current  ___/~~~~\__      difference of their durations apart
 */
import { harmonicsOf, type Harmonics, type PulseTrain } from '../physics/noise/harmonics';
import { harmonicsInBand, rootOfSquares } from '../physics/noise/rmsThroughTransfer';
import type { Band } from '../physics/noise/receiverBand';
import { hertz, ratio, volts, type Frequency, type Voltage } from '../units/quantity';
import type { Signal } from '../board/model';
import type { Spectrum } from './results';
import { edgesOf } from './sources';

export interface Complex {
  readonly re: number;
  readonly im: number;
}

/** Of every reading: volts for one volt of the source, and for one ampere drawn. */
export interface TransferAt {
  readonly voltage: readonly Complex[];
  readonly current: readonly Complex[];
}

export interface FoundSpectrum {
  readonly spectrum: Spectrum;
  /** For what lies in the band and was not followed. */
  readonly errorBar: Voltage;
}

/** Of the harmonics that are followed one by one; what lies beyond is bounded. */
const mostFollowed = 4096;

/**
 * `largestIn`: of a range, for every reading, the largest transfer, asked for only where there are more harmonics than can be followed.
 * Null where nothing repeats.
 */
export function repeatedSpectra(signal: Signal, band: Band, count: number, transferAt: (frequency: Frequency) => TransferAt, largestIn: (range: Band) => readonly { readonly voltage: number; readonly current: number }[]): readonly FoundSpectrum[] | null {
  const trains = trainsOf(signal);
  if (trains === null) return null;
  const voltage = trains.voltage && harmonicsOf(trains.voltage, band.to, mostFollowed);
  const current = trains.current && harmonicsOf(trains.current, band.to, mostFollowed);
  const listed = (voltage ?? current)!;
  const { first, last, complete } = harmonicsInBand(listed, band);
  const later = trains.voltage === null || trains.current === null ? 0 : (trains.current.rise - trains.voltage.rise) / 2;
  const signs = voltage === null || current === null ? [1] : [1, -1];
  const rms = signs.map(() => Array.from({ length: count }, () => new Float64Array(Math.max(0, last - first + 1))));
  for (let n = first; n <= last; n += 1) {
    const transfer = transferAt(hertz(n * listed.fundamental));
    signs.forEach((sign, which) => {
      for (let reading = 0; reading < count; reading += 1) {
        const byVoltage = product(voltage, n, transfer.voltage[reading]);
        const byCurrent = turned(product(current, n, transfer.current[reading]), -2 * Math.PI * n * listed.fundamental * later);
        rms[which]![reading]![n - first] = Math.SQRT2 * Math.hypot(byVoltage.re + sign * byCurrent.re, byVoltage.im + sign * byCurrent.im);
      }
    });
  }
  const beyond = complete ? [] : largestIn({ from: hertz(Math.max(band.from, (last + 1) * listed.fundamental)), to: band.to });
  return Array.from({ length: count }, (_, reading) => {
    const larger = rms.map((each) => each[reading]!).reduce((a, b) => (rootOfSquares(a) < rootOfSquares(b) ? b : a));
    const rest = complete ? 0 : (voltage?.beyond ?? 0) * beyond[reading]!.voltage + (current?.beyond ?? 0) * beyond[reading]!.current;
    const whole = rootOfSquares(larger);
    return { spectrum: { fundamental: listed.fundamental, first, rms: larger }, errorBar: volts(Math.hypot(whole, rest) - whole) };
  });
}

/** Null where it does not repeat. */
function trainsOf(signal: Signal): { readonly voltage: PulseTrain | null; readonly current: PulseTrain | null } | null {
  const { repeats } = signal;
  const edges = edgesOf(signal);
  const [rise, fall] = [edges[0], edges[edges.length - 1]];
  if (repeats === null || rise === undefined || fall === undefined) return null;
  const train = (up: { readonly amplitude: number; readonly duration: PulseTrain['rise'] } | null, down: typeof up): PulseTrain | null =>
    up === null || down === null ? null : { swing: volts(up.amplitude), rise: up.duration, fall: down.duration, repeats: repeats.frequency.value, duty: repeats.duty?.value ?? ratio(0.5) };
  const trains = { voltage: train(rise.voltage, fall.voltage), current: train(rise.current, fall.current) };
  return trains.voltage === null && trains.current === null ? null : trains;
}

function product(harmonics: Harmonics | null, n: number, transfer: Complex | undefined): Complex {
  if (harmonics === null || transfer === undefined) return { re: 0, im: 0 };
  const [re, im] = [harmonics.real[n - 1]!, harmonics.imaginary[n - 1]!];
  return { re: re * transfer.re - im * transfer.im, im: re * transfer.im + im * transfer.re };
}

function turned({ re, im }: Complex, angle: number): Complex {
  const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
  return { re: re * cosine - im * sine, im: re * sine + im * cosine };
}
