/**
 * Charges of conductors anywhere, even one above another, from the system of all polynomials of all sides.
 *
 *   A Q = V     A  Galerkin matrix of the sides, symmetric positive definite        Method  A = L L^T,  L Y = B,
 *               B  ones in the net-charge row of every side of a conductor                  C = Y^T Y
 *
 * With the highest polynomials of every side ordered last, the leading rows of Y are those of the system without them:
 * C of the lower degree is the same sum cut short. Two are left out together, one even and one odd: a charge that is nearly
 * symmetric hardly takes the odd one, and the difference to one degree less was seen to miss errors four times its size.
 *
 * Source    Harrington 1968 for the moment method; Weeks 1970
 */
import { cholesky, forwardSubstitute } from '../../../numeric/cholesky';
import type { ChargedConductor } from '../basis/chargedConductor';
import type { ChargeProblem, ChargeSolution } from './chargeSolution';
import { innerProducts, neutral } from './conductorProducts';
import { layOut, type Layout } from './layout';
import { mutualBlock } from './mutualBlock';
import { ownBlock } from './ownBlock';

/** Null where the matrix is not positive definite: some integral was not accurate enough. */
export function sidesSolution({ conductors, signals, kernel, constant }: ChargeProblem): ChargeSolution | null {
  const layout = layOut(conductors);
  const { unknowns, coarse, charges } = layout;
  const matrix = assembled(conductors, layout, kernel);
  if (constant !== null) addConstant(charges, constant, matrix, unknowns);
  if (!cholesky(matrix, unknowns)) return null;
  const count = signals.length + (constant === null ? 0 : 1);
  const right = new Float64Array(count * unknowns);
  signals.forEach((conductor, index) => {
    for (const row of charges[conductor]) right[index * unknowns + row] = 1;
  });
  if (constant !== null) for (const rows of charges) for (const row of rows) right[signals.length * unknowns + row] = 1;
  forwardSubstitute(matrix, unknowns, right, count);
  const finish = (to: number) => {
    const products = innerProducts(right, unknowns, to, count);
    return constant === null ? products : neutral(products, count);
  };
  return { order: signals.length, fine: finish(unknowns), coarse: finish(coarse), unknowns };
}

let memory = new Float64Array(4096);

/** The lower triangle; what lies above it is whatever was there before. */
function assembled(conductors: readonly ChargedConductor[], { unknowns, rows }: Layout, kernel: ChargeProblem['kernel']): Float64Array {
  if (memory.length < unknowns * unknowns) memory = new Float64Array(unknowns * unknowns);
  conductors.forEach((conductor, index) => {
    const { layer } = conductor.sides[0];
    placeBlock(ownBlock(conductor, kernel(layer, layer)), rows[index], rows[index], unknowns);
    for (let other = 0; other < index; other += 1) {
      // The kernel wants the conductor in the higher layer first.
      const [above, below] = layer < conductors[other].sides[0].layer ? [other, index] : [index, other];
      const between = kernel(conductors[below].sides[0].layer, conductors[above].sides[0].layer);
      placeBlock(mutualBlock(conductors[above], conductors[below], between), rows[above], rows[below], unknowns);
    }
  });
  return memory;
}

function placeBlock(block: Float64Array, rows: Int32Array, columns: Int32Array, unknowns: number): void {
  let at = 0;
  for (let a = 0; a < rows.length; a += 1) {
    const row = rows[a];
    for (let b = 0; b < columns.length; b += 1) {
      const column = columns[b];
      memory[column < row ? row * unknowns + column : column * unknowns + row] = block[at];
      at += 1;
    }
  }
}

/** Only net charges feel it. */
function addConstant(charges: readonly Int32Array[], constant: number, matrix: Float64Array, unknowns: number): void {
  const rows = charges.flatMap((own) => [...own]);
  for (const row of rows) for (const column of rows) if (column <= row) matrix[row * unknowns + column] += constant;
}
