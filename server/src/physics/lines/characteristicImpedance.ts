/**
 * Impedance and delay of each line alone, all others at zero potential.
 *
 * Model     the others carry whatever current keeps them at zero, so a wave on one line sees C_ii and the inductance that
 *           the same structure in air has then, mu0 eps0 / C0_ii: not L_ii, which is with the others open
 * Formula   Z = sqrt(mu0 eps0 / (C_ii C0_ii)),  delay = sqrt(mu0 eps0 C_ii / C0_ii)
 * Symbols   C, C0 Maxwell capacitances with and without dielectric (F/m); Z ohm; delay s/m
 * Source    quasi-TEM line theory: L of a structure is mu0 eps0 / C of it in air; textbook
 * Range     C_ii, C0_ii > 0
 */
import { mu0, epsilon0 } from '../../units/constants';
import { ohms, secondsPerMetre, type DelayPerLength, type Resistance } from '../../units/quantity';

export interface LineAlone {
  readonly impedance: Resistance;
  readonly delay: DelayPerLength;
}

export interface CapacitanceMatrices {
  readonly order: number;
  readonly capacitance: Float64Array;
  readonly capacitanceInAir: Float64Array;
}

export function characteristicImpedance({ order, capacitance, capacitanceInAir }: CapacitanceMatrices): readonly LineAlone[] {
  return Array.from({ length: order }, (_, line) => {
    const own = capacitance[line * (order + 1)];
    const inAir = capacitanceInAir[line * (order + 1)];
    const slowness = Math.sqrt(mu0 * epsilon0);
    return {
      impedance: ohms(slowness / (Math.sqrt(own) * Math.sqrt(inAir))),
      delay: secondsPerMetre(slowness * Math.sqrt(own / inAir)),
    };
  });
}
