/**
 * What is read of coupled lines under a sine: a voltage somewhere, or a sum of some with their signs.
 *
 * Method    the terms' own rows only: of seventeen lines a receiver reads one or two
 * Symbols   as in `transferSystem.ts`
 */
import type { ComplexNumbers } from '../../numeric/complexLu';
import type { Place } from './transfer';
import { complexNumbers, type TransferSystem } from './transferSystem';

/** A difference of two lines is two terms. */
export type Reading = readonly ReadingTerm[];

export interface ReadingTerm {
  readonly line: number;
  readonly place: Place;
  readonly factor: number;
}

/** Of the readings, from the voltages of all lines. */
export function phasorsOf(readings: readonly Reading[], voltages: Readonly<Record<Place, ComplexNumbers>>): ComplexNumbers {
  const phasors = complexNumbers(readings.length);
  readings.forEach((reading, at) => {
    for (const { line, place, factor } of reading) {
      phasors.real[at] += factor * voltages[place].real[line];
      phasors.imaginary[at] += factor * voltages[place].imaginary[line];
    }
  });
  return phasors;
}

export function magnitudeOf(reading: Reading, voltages: Readonly<Record<Place, ComplexNumbers>>): number {
  const { real: [real], imaginary: [imaginary] } = phasorsOf([reading], voltages);
  return Math.hypot(real, imaginary);
}

/** The phasor of each reading from the unknowns, without the voltages of all lines. */
export function phasorsRead({ network: { order, modes, ends } }: TransferSystem, readings: readonly Reading[], { real, imaginary }: ComplexNumbers, omega: number): ComplexNumbers {
  const cosines = modes.delays.map((delay) => Math.cos((omega * delay) / 2));
  const sines = modes.delays.map((delay) => Math.sin((omega * delay) / 2));
  const phasors = complexNumbers(readings.length);
  readings.forEach((reading, at) => {
    for (const { line, place, factor } of reading) {
      const side = place === 'left' || place === 'leftTermination' ? 0 : 1;
      const sign = side === 0 ? 1 : -1;
      const angle = place === 'left' || place === 'right' ? 0 : omega * ends[side].leadDelay[line];
      const along = factor * Math.cos(angle);
      const transverse = factor * ends[side].leadImpedance[line] * Math.sin(angle);
      for (let k = 0; k < order; k += 1) {
        const voltage = along * modes.voltage[line * order + k];
        const current = transverse * modes.current[line * order + k];
        const [c, s, w, wIm] = [cosines[k], sines[k], sign * real[order + k], sign * imaginary[order + k]];
        // u = cos v + j Z sin i
        phasors.real[at] += voltage * (c * real[k] - s * wIm) - current * (c * wIm + s * real[k]);
        phasors.imaginary[at] += voltage * (c * imaginary[k] + s * w) + current * (c * w - s * imaginary[k]);
      }
    }
  });
  return phasors;
}

export function magnitudesRead(system: TransferSystem, readings: readonly Reading[], unknowns: ComplexNumbers, omega: number): Float64Array {
  const { real, imaginary } = phasorsRead(system, readings, unknowns, omega);
  return real.map((value, at) => Math.hypot(value, imaginary[at]));
}
