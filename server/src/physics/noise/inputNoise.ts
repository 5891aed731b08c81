/**
 * Noise of what listens: an amplifier's voltage noise, and its current noise through what the network puts at its input.
 *
 *    network --+--( en )-- amplifier     Model     en, in unrelated to each other and between inputs; above the corner white, below it
 *              |                                   rising as 1/f (flicker); the band is sharp
 *             in                         Formula   vn² = integral of (w² en² + in² |u|²)(1 + fc / f) df
 *              |                         Symbols   en V/√Hz, in A/√Hz, fc corner Hz, w weight of the input in what is read, u the transfer from a
 *    ground ---+                                   current into it (ohm): the impedance of the node, where it is a single one
 *    Method    the white and the 1/f part by themselves; closed where a part of the network has one pole, else quadrature
 *    Source    two-generator model of a noisy two-port: Rothe & Dahlke, Proc. IRE 44 (1956); 1/f corner: textbook; both from memory
 *    Range     0 <= from < to; with a corner 0 < from
 *    Accuracy  closed forms: rounding; quadrature: its error bar; test/physics/noise/inputNoise.test.ts
 */
import type { CurrentNoiseDensity, Frequency, VoltageNoiseDensity } from '../../units/quantity';
import { densityOverBand, type MeanSquare } from './densityOverBand';
import { joinedNodes, readingResponse, unrelatedParts, type Merged, type NetworkReading } from './noiseNetwork';
import { closedForm, noiseVoltage, type NoiseVoltage } from './noiseVoltage';
import type { Band } from './receiverBand';

export interface NoisyInput {
  readonly node: number;
  readonly voltage: VoltageNoiseDensity;
  readonly current: CurrentNoiseDensity;
  /** 0 where its noise is white down to 0 Hz. */
  readonly corner: Frequency;
}

export interface InputNoise {
  readonly white: NoiseVoltage;
  readonly flicker: NoiseVoltage;
}

export function inputNoise(reading: NetworkReading, inputs: readonly NoisyInput[], band: Band): InputNoise {
  const parts = unrelatedParts(reading);
  const weightOf = ({ node }: NoisyInput) => reading.weights[node - 1]!;
  const voltageSquare = (input: NoisyInput, bandSum: number): readonly MeanSquare[] =>
    0 < input.voltage && weightOf(input) !== 0 ? [closedForm((weightOf(input) * input.voltage) ** 2 * bandSum)] : [];
  const currentSquare = (input: NoisyInput, over: Over): readonly MeanSquare[] =>
    0 < input.current ? parts.filter(({ nodeAt }) => nodeAt[input.node] !== 0).map((part) => scaled(transferSquare(part, part.nodeAt[input.node]!, { band, over }), input.current ** 2)) : [];
  return {
    white: noiseVoltage(inputs.flatMap((input) => [...voltageSquare(input, band.to - band.from), ...currentSquare(input, 'f')])),
    flicker: noiseVoltage(inputs.filter(({ corner }) => 0 < corner).flatMap((input) =>
      [...voltageSquare(input, logarithmOver(band)), ...currentSquare(input, 'ln f')].map((square) => scaled(square, input.corner)))),
  };
}

/** From the band's width: a narrow one keeps its digits. */
function logarithmOver({ from, to }: Band): number {
  return from === 0 ? Infinity : Math.log1p((to - from) / from);
}

/** Summed over frequency, or over its logarithm: |u|² / f. */
type Over = 'f' | 'ln f';

function scaled({ value, error }: MeanSquare, factor: number): MeanSquare {
  return { value: factor * value, error: factor * error };
}

function transferSquare(part: Merged, node: number, { band, over }: { readonly band: Band; readonly over: Over }): MeanSquare {
  if (part.nodes === 1) return closedForm(part.weights[0]! ** 2 * (over === 'f' ? impedanceSquare(nodeOf(part), band) : impedanceSquareOverLogarithm(nodeOf(part), band)));
  if (band.from === 0 && growsTowardsZero(part, node)) return { value: Infinity, error: 0 };
  const response = readingResponse(part);
  return densityOverBand(band, (frequency) => {
    const transfer = response(frequency);
    return transfer === null ? Infinity : (transfer.real[node - 1]! ** 2 + transfer.imaginary[node - 1]! ** 2) / (over === 'f' ? 1 : frequency);
  });
}

/** No resistance leads the current to ground, and the reading sees the charge that gathers. */
function growsTowardsZero(part: Merged, node: number): boolean {
  const roots = joinedNodes(part, ({ resistance }) => resistance < Infinity);
  const kept = new Map<number, number>();
  part.weights.forEach((weight, at) => kept.set(roots[at + 1]!, (kept.get(roots[at + 1]!) ?? 0) + weight));
  return roots[node] !== 0 && [...kept].some(([root, weight]) => root !== 0 && weight !== 0);
}

interface Node {
  readonly conductance: number;
  readonly capacitance: number;
}

function nodeOf({ shunts }: NetworkReading): Node {
  return shunts.reduce((sum, { resistance, capacitance }) => ({ conductance: sum.conductance + 1 / resistance, capacitance: sum.capacitance + capacitance }), { conductance: 0, capacitance: 0 });
}

/** Integral of df / (G² + y²), y = 2 pi f C. */
function impedanceSquare({ conductance, capacitance }: Node, { from, to }: Band): number {
  const [y1, y2] = [2 * Math.PI * from * capacitance, 2 * Math.PI * to * capacitance];
  const product = conductance * conductance + y1 * y2;
  const swept = conductance * (y2 - y1);
  // The difference of two arctangents as one; where it is none, the limit: a narrow band, no capacitance, or no resistance.
  return (to - from) * (swept === 0 ? 1 / product : Math.atan2(swept, product) / swept);
}

/** Integral of df / (f (G² + y²)). */
function impedanceSquareOverLogarithm({ conductance, capacitance }: Node, { from, to }: Band): number {
  const square = conductance * conductance;
  const perSquare = ((to - from) * (to + from)) / (from * from * (square + (2 * Math.PI * to * capacitance) ** 2));
  // The difference of two logarithms as one, which stays finite as G vanishes.
  const argument = square * perSquare;
  return 0.5 * perSquare * (argument === 0 ? 1 : Math.log1p(argument) / argument);
}
