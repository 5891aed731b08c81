/**
 * Thermal noise of a reading of a network: of a node, of the difference of two, of their mean.
 *
 *   Model     every resistance warm, at one temperature; the noise of each is unrelated to that of any other
 *   Method    over a band: the sum over the resistances, closed where a part has one pole (`thermalNoise.ts`), else by quadrature.
 *             Without a band: equipartition, less what nothing dissipates
 *   Formula   vn² = integral of the sum over R of (4 k T / R) |u_R(f)|² df,  u_R the transfer from a current across R,
 *             which equals 4 k T Re Z, Z what 1 A between the reading's ends meets; as a sum of squares it keeps its digits far above
 *             the corner, where Re Z is small beside Im Z.  All frequencies: k T w' C⁻¹ w, w the reading's weights
 *   Source    Nyquist 1928 and its generalisation to networks (each resistance by itself); equipartition; k exact, SI 2019
 *   Range     h f much below k T: 6 THz at room temperature
 *   Accuracy  closed forms: rounding; quadrature: its error bar; test/physics/noise/networkThermalNoise.test.ts
 */
import { luFactor, luSolve } from '../../numeric/lu';
import { boltzmann } from '../../units/constants';
import { farads, ohms, type Temperature } from '../../units/quantity';
import { densityOverBand, type MeanSquare } from './densityOverBand';
import { joinedNodes, mergedAcross, nodalMatrix, readingResponse, unrelatedParts, type NetworkReading } from './noiseNetwork';
import { closedForm, noiseVoltage, type NoiseVoltage } from './noiseVoltage';
import type { Band } from './receiverBand';
import { thermalNoise } from './thermalNoise';

export interface Warmth {
  readonly temperature: Temperature;
  /** Null: all frequencies, which only capacitances limit. */
  readonly band: Band | null;
}

/** Null where neither band nor capacitance limits it. */
export function networkThermalNoise(reading: NetworkReading, { temperature, band }: Warmth): NoiseVoltage | null {
  if (band !== null) return noiseVoltage(unrelatedParts(reading).map((part) => partInBand(part, temperature, band)));
  const perCapacitance = dissipatedElastance(reading);
  return perCapacitance === null ? null : noiseVoltage([closedForm(boltzmann * temperature * perCapacitance)]);
}

function partInBand(part: NetworkReading, temperature: Temperature, band: Band): MeanSquare {
  const [conductance, capacitance] = part.shunts.reduce(([g, c], shunt) => [g + 1 / shunt.resistance, c + shunt.capacitance], [0, 0]);
  if (part.nodes === 1) {
    const rms = thermalNoise({ resistance: ohms(1 / conductance), capacitance: farads(capacitance), temperature, band });
    return closedForm(((rms ?? 0) * part.weights[0]!) ** 2);
  }
  const response = readingResponse(part);
  const warm = part.shunts.filter(({ resistance }) => resistance < Infinity);
  return densityOverBand(band, (frequency) => {
    const transfer = response(frequency);
    if (transfer === null) return Infinity;
    const { real, imaginary } = transfer;
    const squareAcross = (a: number, b: number) => ((real[a - 1] ?? 0) - (real[b - 1] ?? 0)) ** 2 + ((imaginary[a - 1] ?? 0) - (imaginary[b - 1] ?? 0)) ** 2;
    return warm.reduce((sum, { node, to, resistance }) => sum + ((4 * boltzmann * temperature) / resistance) * squareAcross(node, to), 0);
  });
}

/** 1/F: `k T` times it is the mean square. Charge that no resistance moves is not in it. */
function dissipatedElastance(reading: NetworkReading): number | null {
  const whole = mergedAcross(reading, ({ resistance }) => resistance === 0);
  const all = elastance(whole);
  if (all === null) return null;
  // With every resistance a short circuit, what is left is what none of them reaches.
  const kept = elastance(mergedAcross(whole, ({ resistance }) => resistance < Infinity));
  return kept === null ? null : Math.max(0, all - kept);
}

/** Weights times inverse capacitance times weights; null where the reading holds a node that no capacitance ties to ground. */
function elastance(reading: NetworkReading): number | null {
  const { nodes, shunts, weights } = reading;
  const roots = joinedNodes(reading, ({ capacitance }) => 0 < capacitance);
  const sums = new Array<number>(nodes + 1).fill(0);
  weights.forEach((weight, at) => (sums[roots[at + 1]!]! += weight));
  const size = weights.reduce((sum, weight) => sum + Math.abs(weight), 0);
  if (sums.some((sum, root) => root !== 0 && 1e-12 * size < Math.abs(sum))) return null;
  // What is tied to no ground is counted from one of its own nodes: the weights of such a part cancel.
  const free = roots.flatMap((root, node) => (root === node ? [] : [node - 1]));
  const matrix = nodalMatrix(nodes, shunts, ({ capacitance }) => capacitance);
  const reduced = Float64Array.from(free.flatMap((row) => free.map((column) => matrix[row * nodes + column]!)));
  const answer = Float64Array.from(free, (node) => weights[node]!);
  const exchanged = luFactor(reduced, free.length);
  if (exchanged === null) return null;
  luSolve(reduced, exchanged, answer);
  return free.reduce((sum, node, at) => sum + weights[node]! * answer[at]!, 0);
}
