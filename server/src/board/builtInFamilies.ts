/**
 * The built-in families: levels of published standards, from memory of them, so check the data sheet
 * where a budget is tight.
 *
 * `tolerates` is the dc noise margin: how far the level that a driver guarantees may be moved before the
 * receiver need no longer read it, on the side where that is less. The arithmetic stands beside each.
 * `swing` is the nominal supply with the tolerance of the standard's normal range, or, where the standard
 * gives a wide range of output levels, the largest of them. No standard gives a rise time, so none is
 * stated here: a net that is a source has to say its own.
 */
import { volts } from '../units/quantity';
import type { Place } from './model';
import type { SignalProperties } from './signalProperties';

export interface BuiltInFamily {
  readonly name: string;
  readonly of: 'net' | 'pair';
  readonly standard: string;
  /** What the standard says and how the margin follows, for hovers and the reference. */
  readonly arithmetic: string;
  /** Placed where the family is named. */
  properties(place: Place): SignalProperties;
}

export const builtInFamilies: readonly BuiltInFamily[] = [
  // Normal range, outputs at 100 µA: a CMOS receiver draws no dc.
  family({
    name: 'lvcmos33', of: 'net', standard: 'JESD8C.01', swing: 3.3, tolerance: 0.3, tolerates: 0.6,
    arithmetic: 'supply 3.0 V to 3.6 V; V_OL ≤ 0.2 V and V_OH ≥ VDD − 0.2 V at 100 µA; V_IL ≤ 0.8 V, V_IH ≥ 2.0 V: low 0.8 − 0.2 = 0.6 V, high 3.0 − 0.2 − 2.0 = 0.8 V',
  }),
  family({
    name: 'lvcmos25', of: 'net', standard: 'JESD8-5', swing: 2.5, tolerance: 0.2, tolerates: 0.4,
    arithmetic: 'supply 2.3 V to 2.7 V; V_OL ≤ 0.2 V and V_OH ≥ 2.1 V at 100 µA; V_IL ≤ 0.7 V, V_IH ≥ 1.7 V: low 0.7 − 0.2 = 0.5 V, high 2.1 − 1.7 = 0.4 V',
  }),
  // Its normal range states the outputs at 2 mA only, hence the small margin.
  family({
    name: 'lvcmos18', of: 'net', standard: 'JESD8-7', swing: 1.8, tolerance: 0.15, tolerates: 0.1275,
    arithmetic: 'supply 1.65 V to 1.95 V; V_OL ≤ 0.45 V and V_OH ≥ VDD − 0.45 V at 2 mA; V_IL ≤ 0.35 VDD, V_IH ≥ 0.65 VDD: at 1.65 V low 0.5775 − 0.45 = 0.1275 V, high 1.2 − 1.0725 = 0.1275 V',
  }),
  // No standard bounds the unloaded high level but the supply; bipolar outputs reach about 3.6 V.
  family({
    name: 'ttl', of: 'net', standard: 'TTL dc levels', swing: 5, tolerance: 0.25, tolerates: 0.4,
    arithmetic: 'supply 4.75 V to 5.25 V; V_OL ≤ 0.4 V, V_OH ≥ 2.4 V; V_IL ≤ 0.8 V, V_IH ≥ 2.0 V: low 0.8 − 0.4 = 0.4 V, high 2.4 − 2.0 = 0.4 V',
  }),
  // A difference that reverses from +V_OD to −V_OD moves each net by V_OD.
  family({
    name: 'lvds', of: 'pair', standard: 'TIA/EIA-644-A', swing: 0.454, tolerance: 0, tolerates: 0.147,
    arithmetic: 'V_OD 247 mV to 454 mV into 100 Ω, thresholds ± 100 mV: 247 − 100 = 147 mV of the difference; each net moves 454 mV at most',
  }),
  family({
    name: 'rs485', of: 'pair', standard: 'TIA/EIA-485-A', swing: 5, tolerance: 0, tolerates: 1.3,
    arithmetic: 'V_OD 1.5 V to 5 V into 54 Ω, thresholds ± 200 mV: 1.5 − 0.2 = 1.3 V of the difference; each net moves 5 V at most',
  }),
  // From recessive, 0 V, to dominant each net moves by half of the difference.
  family({
    name: 'can', of: 'pair', standard: 'ISO 11898-2', swing: 1.5, tolerance: 0, tolerates: 0.45,
    arithmetic: 'dominant 1.5 V to 3.0 V, read above 0.9 V: 1.5 − 0.9 = 0.6 V; recessive up to 0.05 V, read below 0.5 V: 0.5 − 0.05 = 0.45 V of the difference; each net moves 3.0 / 2 = 1.5 V at most',
  }),
];

interface Levels extends Omit<BuiltInFamily, 'properties'> {
  /** V: what each net moves, half the width of its band, and the margin. */
  readonly swing: number;
  readonly tolerance: number;
  readonly tolerates: number;
}

function family({ swing, tolerance, tolerates, ...rest }: Levels): BuiltInFamily {
  return {
    ...rest,
    properties: (place) => ({
      swing: { low: volts(0), high: volts(swing), value: volts(swing), tolerance, place },
      toleratesPeak: { value: volts(tolerates), tolerance: 0, place },
    }),
  };
}
