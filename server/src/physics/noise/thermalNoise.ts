/**
 * Thermal noise voltage of a node: a resistance with a capacitance across it.
 *
 *    o---+---+---o      Model     every resistance warm and in equilibrium at one temperature
 *        R   C   vn     Method    closed integral of 4 k T Re Z(f) over a sharp band
 *    o---+---+---o      Formula   vn² = 4 k T R (f2 - f1) · atan(d)/(x2 - x1),   x = 2 pi f R C,
 *                                 d = (x2 - x1)/(1 + x1 x2);   without a band k T / C
 *                       Symbols   R ohm, C F, T K, f1 and f2 the band's ends (Hz), vn V rms
 *                       Source    Nyquist 1928; k exact, SI 2019
 *                       Range     h f much below k T: 6 THz at room temperature
 *                       Accuracy  exact for the model; test/physics/noise/thermalNoise.test.ts
 */
import { boltzmann } from '../../units/constants';
import { volts, type Capacitance, type Frequency, type Resistance, type Temperature, type Voltage } from '../../units/quantity';

export interface WarmNode {
  /** Of everything across the node; Infinity where nothing dissipates, and nothing is noisy then. */
  readonly resistance: Resistance;
  readonly capacitance: Capacitance;
  readonly temperature: Temperature;
  /** Null: all frequencies, which only a capacitance limits. */
  readonly band: { readonly from: Frequency; readonly to: Frequency } | null;
}

/** In volts rms; null where neither band nor capacitance limits it. */
export function thermalNoise({ resistance, capacitance, temperature, band }: WarmNode): Voltage | null {
  const kT = boltzmann * temperature;
  if (resistance === 0 || resistance === Infinity) return volts(0);
  if (band === null) return 0 < capacitance ? volts(Math.sqrt(kT / capacitance)) : null;
  const x1 = 2 * Math.PI * band.from * resistance * capacitance;
  const x2 = 2 * Math.PI * band.to * resistance * capacitance;
  const difference = x2 - x1;
  // The difference of two arctangents as one: a narrow band far above the corner keeps its digits. 1 is the limit without a capacitance.
  const roll = difference === 0 ? 1 / (1 + x1 * x2) : Math.atan2(difference, 1 + x1 * x2) / difference;
  return volts(Math.sqrt(4 * kT * resistance * (band.to - band.from) * roll));
}
