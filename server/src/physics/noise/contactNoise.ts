/**
 * Contact noise (also: excess or current noise) of resistors that carry a direct current.
 *
 *   Formula   vn = 10^(NI/20) µV/V · V · sqrt(log10(f2 / f1))
 *   Symbols   NI noise index dB: rms in one decade of frequency, in µV for each volt of dc across, 0 dB = 1 µV/V; V dc volts across
 *   Model     its density falls as 1/f, so every decade of the band has the same mean square
 *   Source    noise index: IEC 60195, from memory
 *   Range     0 < from < to      Accuracy  rounding; test/physics/noise/contactNoise.test.ts
 */
import { volts, type Decibels, type Voltage } from '../../units/quantity';
import type { Band } from './receiverBand';

export interface CarriesCurrent {
  readonly index: Decibels;
  readonly across: Voltage;
}

/** Volts rms; Infinity for a band from 0 Hz. */
export function contactNoise({ index, across }: CarriesCurrent, { from, to }: Band): Voltage {
  if (across === 0) return volts(0);
  // From the band's width: a narrow one keeps its digits.
  const decades = from === 0 ? Infinity : Math.log1p((to - from) / from) / Math.LN10;
  return volts(microvolt * 10 ** (index / 20) * Math.abs(across) * Math.sqrt(decades));
}

/** What 0 dB is, for each volt. */
const microvolt = 1e-6;
