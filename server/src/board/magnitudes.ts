/**
 * How large and how small a quantity may be before it is taken for a slip: wide enough for anything that
 * is built, and narrow enough that no model overflows on it. Zero is judged by each property itself.
 *
 * The limits are ours, not a standard's.
 */
import type { Dimension } from '../units/dimension';

export interface Magnitude {
  readonly least: number;
  readonly most: number;
  readonly inWords: string;
}

export const magnitudes: Readonly<Record<Dimension, Magnitude>> = {
  length: { least: 1e-12, most: 1e6, inWords: 'lengths from 1 pm to 1000 km' },
  area: { least: 1e-18, most: 1e6, inWords: 'areas from 1e-12 mm² to 1 km²' },
  time: { least: 1e-18, most: 1e9, inWords: 'times from 1e-18 s to 1e9 s' },
  frequency: { least: 1e-9, most: 1e15, inWords: 'frequencies from 1e-9 Hz to 1000 THz' },
  voltage: { least: 1e-15, most: 1e9, inWords: 'voltages from 1 fV to 1 GV' },
  current: { least: 1e-15, most: 1e9, inWords: 'currents from 1 fA to 1 GA' },
  resistance: { least: 1e-12, most: 1e18, inWords: 'resistances from 1e-12 Ω to 1e18 Ω' },
  capacitance: { least: 1e-24, most: 1e6, inWords: 'capacitances from 1e-24 F to 1 MF' },
  inductance: { least: 1e-18, most: 1e6, inWords: 'inductances from 1e-18 H to 1 MH' },
  temperature: { least: 0, most: 1e4, inWords: 'temperatures up to 10 000 K' },
  level: { least: 0, most: 1000, inWords: 'levels of up to 1000 dB' },
  fraction: { least: 1e-12, most: 1e3, inWords: 'up to 100 000 %' },
  angle: { least: 0, most: 2 * Math.PI * 1000, inWords: 'up to a thousand turns' },
  field: { least: 1e-15, most: 1e9, inWords: 'fields from 1 fV/m to 1 GV/m' },
  'voltage-noise': { least: 1e-18, most: 1e3, inWords: 'noise from 1e-18 V/√Hz to 1 kV/√Hz' },
  'current-noise': { least: 1e-24, most: 1e3, inWords: 'noise from 1e-24 A/√Hz to 1 kA/√Hz' },
  number: { least: 1e-12, most: 1e6, inWords: 'numbers up to a million' },
};

/** Widths, gaps and thicknesses of a cross-section: the solver works with their ratios. */
export const sectionMagnitude: Magnitude = { least: 1e-9, most: 1, inWords: 'from 1 nm to 1 m in a cross-section' };
