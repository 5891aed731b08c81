/**
 * The harmonics of a train of trapezoidal pulses.
 *
 *        ______________            Formula   c_n = S / (j 2 pi n) (sinc(n Tr/P) - exp(-j 2 pi n d) sinc(n Tf/P)),  n >= 1
 *       /              \           Symbols   S swing; P period; d duty, of the time above half the swing; Tr, Tf the edges' whole
 *   ___/                \____ P              durations (0-100 %); sinc x = sin(pi x)/(pi x); v(t) = sum over all n of
 *      Tr               Tf                   c_n exp(j 2 pi n t/P), t = 0 at the middle of the rise
 *
 * Model     linear edges; the train has gone on for ever
 * Method    each edge's rate of change is a rectangle, whose transform is a sinc
 * Source    Fourier series of a trapezoid: Paul, Introduction to Electromagnetic Compatibility, chapter on spectra, from memory
 * Range     edges that end before the next begins; else `overlapping` is true and the sum of the ramps, which never reaches the
 *           whole swing, is what is expanded
 * Accuracy  rounding; harmonics of a duty of exactly a half keep their zeros
 */
import { hertz, volts, type Frequency, type Ratio, type Time, type Voltage } from '../../units/quantity';

export interface PulseTrain {
  readonly swing: Voltage;
  /** 0-100 % */
  readonly rise: Time;
  /** 0-100 % */
  readonly fall: Time;
  readonly repeats: Frequency;
  readonly duty: Ratio;
}

export interface Harmonics {
  readonly fundamental: Frequency;
  /** c_n at index n - 1. */
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
  /** Rms of all harmonics beyond those listed, of the source: an upper bound. */
  readonly beyond: Voltage;
  readonly overlapping: boolean;
}

export const mostHarmonics = 20_000;

/** Those up to a frequency, and never more than `most`. */
export function harmonicsOf(train: PulseTrain, upTo: Frequency, most = mostHarmonics): Harmonics {
  const { swing, rise, fall, repeats, duty } = train;
  if (!(0 < repeats && repeats < Infinity) || !(0 <= duty && duty <= 1) || !(0 <= rise) || !(0 <= fall) || !Number.isFinite(swing)) {
    throw new Error(`pulses of ${swing} V, edges of ${rise} s and ${fall} s, ${repeats} Hz, duty ${duty}`);
  }
  // A harmonic that is meant to lie on the limit does, whatever the division rounds to.
  const count = Math.max(0, Math.min(most, Math.floor((upTo / repeats) * (1 + 4 * Number.EPSILON))));
  const real = new Float64Array(count);
  const imaginary = new Float64Array(count);
  for (let n = 1; n <= count; n += 1) {
    const up = sinc(n * rise * repeats);
    const down = sinc(n * fall * repeats);
    // Of whole turns only the rest: a duty of a half gives 1 or -1 to the last digit.
    const turn = (n * duty) % 1;
    const scale = swing / (2 * Math.PI * n);
    imaginary[n - 1] = -scale * (up - cosineOfTurns(turn) * down);
    real[n - 1] = scale * sineOfTurns(turn) * down;
  }
  const overlapping = Math.min(duty, 1 - duty) < ((rise + fall) * repeats * (1 - 1e-12)) / 2;
  return { fundamental: hertz(repeats), real, imaginary, beyond: volts(rmsBeyond(train, count)), overlapping };
}

/** Rms of every harmonic, at index n - 1. */
export function harmonicRms({ real, imaginary }: Harmonics): Float64Array {
  return real.map((value, at) => Math.SQRT2 * Math.hypot(value, imaginary[at]));
}

/**
 * |c_n| <= S/(2 pi n) min(2, (1/Tr + 1/Tf) P/(pi n)), and the sums of 1/n² and 1/n⁴ beyond N are below 1/N and 1/(3 N³); whatever is
 * left out, it is no more than the whole train swings.
 */
function rmsBeyond({ swing, rise, fall, repeats }: PulseTrain, count: number): number {
  if (count === 0) return Math.abs(swing) / 2;
  const corner = (1 / rise + 1 / fall) / (Math.PI * repeats);
  const flat = 4 / count;
  const rolled = corner < Infinity ? corner ** 2 / (3 * count ** 3) : Infinity;
  return Math.min(Math.abs(swing) / 2, (Math.abs(swing) / (2 * Math.PI)) * Math.sqrt(2 * Math.min(flat, rolled)));
}

function sinc(x: number): number {
  return x === 0 ? 1 : sineOfTurns((x / 2) % 1) / (Math.PI * x);
}

/** sin(2 pi x), exactly 0 at halves, for 0 <= x < 1. */
function sineOfTurns(x: number): number {
  return x === 0 || x === 0.5 ? 0 : Math.sin(2 * Math.PI * x);
}

function cosineOfTurns(x: number): number {
  return x === 0.25 || x === 0.75 ? 0 : Math.cos(2 * Math.PI * x);
}
