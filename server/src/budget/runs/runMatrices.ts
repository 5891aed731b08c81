/**
 * The matrices of a run as one: of all its traces, left to right, rows top to bottom. Traces of two parts
 * do not couple. Where each receiver has a part of its own, a mutual is the mean of what the two
 * neighbourhoods say, and nothing beyond them.
 */
import type { Run } from '../../board/model';
import type { SectionMatrices } from '../../physics/section/section';
import type { RunPart, Trace } from './runParts';

export function runTraces(run: Run): readonly Trace[] {
  return run.rows.flatMap((row) => row.conductors).filter((conductor) => conductor.kind === 'trace');
}

export function runMatrices(traces: readonly Trace[], parts: readonly RunPart[]): SectionMatrices {
  if (parts.length === 1 && parts[0].read.length === traces.length) return parts[0].matrices;
  const order = traces.length;
  const at = new Map(traces.map((trace, index) => [trace, index]));
  const names = ['capacitance', 'capacitanceInAir', 'inductance', 'capacitanceError', 'inductanceError'] as const;
  const whole = Object.fromEntries(names.map((name) => [name, new Float64Array(order * order)])) as Record<(typeof names)[number], Float64Array>;
  const said = new Uint8Array(order * order);
  for (const part of parts) {
    const place = part.traces.map((trace) => at.get(trace) as number);
    for (const row of part.read) {
      for (let column = 0; column < place.length; column += 1) {
        const [i, j] = [place[row], place[column]];
        for (const name of names) add(whole[name], order, [i, j], part.matrices[name][row * place.length + column]);
        said[i * order + j] += 1;
        said[j * order + i] += 1;
      }
    }
  }
  for (const name of names) for (let entry = 0; entry < said.length; entry += 1) whole[name][entry] /= Math.max(1, said[entry]);
  return { order, ...whole, unknowns: parts.reduce((sum, { matrices }) => sum + matrices.unknowns, 0) };
}

/** To an entry and its mirror; a diagonal entry is its own, and counted twice like the others. */
function add(matrix: Float64Array, order: number, [i, j]: readonly [number, number], value: number): void {
  matrix[i * order + j] += value;
  matrix[j * order + i] += value;
}
