/**
 * The equations of one group by itself, and those between two groups that touch.
 */
import { luInOrder } from '../../../numeric/luInOrder';
import type { ChargedConductor } from '../basis/chargedConductor';
import { ownBlock } from '../galerkin/ownBlock';
import type { Kernel } from '../kernel/layeredKernel';
import { block, writeBlock, writePolarisation, type Faces } from './filmBlocks';
import { grain, movedSide, type FilmGroup } from './filmGroups';

export interface GroupContext {
  readonly kernel: Kernel;
  readonly conductors: readonly ChargedConductor[];
  /** kappa times the film's permittivity. */
  readonly strength: number;
}

/** Rows of `first` from charges of `second`, whose foot is `apart` grains to the right of its own; row-major. */
export function groupBlock(first: FilmGroup, second: FilmGroup, apart: number, { kernel, strength, conductors }: GroupContext): Float64Array {
  const other = first === second ? [] : second.sides.map((side) => movedSide(side, apart * grain));
  const faces: Faces = { all: [...first.sides, ...other], shapes: first === second ? first.shapes : [...first.shapes, ...second.shapes] };
  const offset = first === second ? 0 : first.sides.length;
  const matrix = new Float64Array(first.unknowns * second.unknowns);
  if (first === second) placeOwn(first, ownBlock(conductors[first.conductor], kernel), matrix);
  for (let s = 0; s < first.sides.length; s += 1) {
    for (let t = 0; t < second.sides.length; t += 1) {
      if (first === second && s < first.own && t < second.own) continue;
      if (s < first.own) writeBlock('potential', kernel, faces, s, offset + t);
      else writePolarisation(kernel, faces, s, offset + t, strength);
      const [rows, columns] = [first.sides[s].order, second.sides[t].order];
      for (let m = 0; m < rows; m += 1) {
        const to = first.rows[first.starts[s] + m] * second.unknowns;
        for (let n = 0; n < columns; n += 1) matrix[to + second.rows[second.starts[t] + n]] = block[m * columns + n];
      }
    }
  }
  return matrix;
}

function placeOwn({ rows, unknowns }: FilmGroup, own: Float64Array, matrix: Float64Array): void {
  const order = Math.sqrt(own.length);
  for (let m = 0; m < order; m += 1) for (let n = 0; n < order; n += 1) matrix[rows[m] * unknowns + rows[n]] = own[m * order + n];
}

/** Of the group by itself; null where a pivot vanishes. */
export function groupFactors(group: FilmGroup, context: GroupContext): Float64Array | null {
  const matrix = groupBlock(group, group, 0, context);
  return luInOrder(matrix, group.unknowns) ? matrix : null;
}
