/**
 * What is read of coupled lines under a sine: a voltage somewhere, or a sum of some with their signs.
 *
 * Method    the terms' own rows only: of seventeen lines a receiver reads one or two
 * Symbols   as in `transferSystem.ts`
 */
import type { ComplexNumbers } from '../../numeric/complexLu';
import type { Place } from './transfer';
import type { TransferSystem } from './transferSystem';

/** A difference of two lines is two terms. */
export type Reading = readonly ReadingTerm[];

export interface ReadingTerm {
  readonly line: number;
  readonly place: Place;
  readonly factor: number;
}

export function magnitudeOf(reading: Reading, voltages: Readonly<Record<Place, ComplexNumbers>>): number {
  let real = 0;
  let imaginary = 0;
  for (const { line, place, factor } of reading) {
    real += factor * voltages[place].real[line];
    imaginary += factor * voltages[place].imaginary[line];
  }
  return Math.hypot(real, imaginary);
}

/** The same from the unknowns, without the voltages of all lines. */
export function magnitudesRead({ network: { order, modes, ends } }: TransferSystem, readings: readonly Reading[], { real, imaginary }: ComplexNumbers, omega: number): Float64Array {
  const cosines = modes.delays.map((delay) => Math.cos((omega * delay) / 2));
  const sines = modes.delays.map((delay) => Math.sin((omega * delay) / 2));
  return Float64Array.from(readings, (reading) => {
    let re = 0;
    let im = 0;
    for (const { line, place, factor } of reading) {
      const side = place === 'left' || place === 'leftTermination' ? 0 : 1;
      const sign = side === 0 ? 1 : -1;
      const angle = place === 'left' || place === 'right' ? 0 : omega * ends[side].leadDelay[line];
      const along = Math.cos(angle);
      const transverse = ends[side].leadImpedance[line] * Math.sin(angle);
      for (let k = 0; k < order; k += 1) {
        const voltage = along * modes.voltage[line * order + k];
        const current = transverse * modes.current[line * order + k];
        const [c, s, w, wIm] = [cosines[k], sines[k], sign * real[order + k], sign * imaginary[order + k]];
        // u = cos v + j Z sin i
        re += factor * (voltage * (c * real[k] - s * wIm) - current * (c * wIm + s * real[k]));
        im += factor * (voltage * (c * imaginary[k] + s * w) + current * (c * w - s * imaginary[k]));
      }
    }
    return Math.hypot(re, im);
  });
}
