/**
 * Copper's resistivity with temperature, and how deep a current of some frequency reaches into it.
 *
 * Formula   rho = rho20 (1 + 0.00393 (T - 293.15 K));  depth = sqrt(rho / (pi f mu0))
 * Source    IEC 60028 (1925): 1.724e-8 ohm m at 20 °C and 0.00393 /K, annealed copper
 * Range     -40 °C to 150 °C. Plated copper is a few per cent worse, and not stated
 */
import { copperResistivity, mu0 } from '../../units/constants';
import { metres, type Frequency, type Length, type Temperature } from '../../units/quantity';

/** Ohm metre. */
export function copperAt(temperature: Temperature): number {
  return copperResistivity * (1 + temperatureCoefficient * (temperature - referenceTemperature));
}

const temperatureCoefficient = 0.00393;
const referenceTemperature = 293.15;

/** Infinity at 0 Hz. */
export function skinDepth(resistivity: number, frequency: Frequency): Length {
  return metres(Math.sqrt(resistivity / (Math.PI * frequency * mu0)));
}
