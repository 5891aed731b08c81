/**
 * What a small circuit answers to a sine: complex voltages of its nodes for one volt, or one ampere, of a drive.
 *
 * Formula   (j w mass - stiffness) x = forcing (`circuit.ts`), solved as a real system of twice the order
 * Source    circuit theory      Accuracy  rounding times the condition of the matrix
 */
import { luFactor, luSolve } from '../../numeric/lu';
import type { Frequency } from '../../units/quantity';
import { circuitMatrices, drivenRow, type Circuit, type CircuitMatrices, type Drive } from './circuit';

export interface Phasor {
  readonly re: number;
  readonly im: number;
}

/** Of every node, from node 1. Null where a resonance without loss, or a node that nothing holds, leaves no answer. */
export type CircuitTransfer = (drive: Drive, frequency: Frequency) => readonly Phasor[] | null;

export function circuitTransfer(circuit: Circuit): CircuitTransfer {
  const matrices = circuitMatrices(circuit);
  return (drive, frequency) => solved(circuit, matrices, drivenRow(circuit, drive), 2 * Math.PI * frequency);
}

function solved({ nodes }: Circuit, { order, mass, stiffness }: CircuitMatrices, driven: number, angular: number): readonly Phasor[] | null {
  const size = 2 * order;
  const matrix = new Float64Array(size * size);
  const answer = new Float64Array(size);
  for (let i = 0; i < order; i += 1) {
    // Each row in units of its own largest entry: volts and amperes are decades apart.
    let scale = 0;
    for (let j = 0; j < order; j += 1) scale = Math.max(scale, Math.abs(stiffness[i * order + j]), angular * Math.abs(mass[i * order + j]));
    if (scale === 0) return null;
    for (let j = 0; j < order; j += 1) {
      const real = -stiffness[i * order + j] / scale;
      const imaginary = (angular * mass[i * order + j]) / scale;
      matrix[i * size + j] = real;
      matrix[i * size + order + j] = -imaginary;
      matrix[(order + i) * size + j] = imaginary;
      matrix[(order + i) * size + order + j] = real;
    }
    if (i === driven) answer[i] = 1 / scale;
  }
  const exchanged = luFactor(matrix, size);
  if (exchanged === null) return null;
  luSolve(matrix, exchanged, answer);
  const voltages = Array.from({ length: nodes }, (_, node): Phasor => ({ re: answer[node], im: answer[order + node] }));
  return voltages.every(({ re, im }) => Number.isFinite(re) && Number.isFinite(im)) ? voltages : null;
}
