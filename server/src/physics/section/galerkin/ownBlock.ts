/**
 * The block of one conductor on itself, kept with the kernel: an edit of a gap moves conductors but leaves these, and so
 * most of the near integrals, as they are.
 *
 * Row-major, side after side, all polynomials of a side together. Computed at the origin, so that it is the same to the
 * last digit wherever the conductor lies.
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { ChargedConductor } from '../basis/chargedConductor';
import type { Kernel } from '../kernel/layeredKernel';
import { keptShape } from './keptShapes';
import { writeSideBlock } from './sideBlock';

export function ownBlock({ shape, atOrigin }: ChargedConductor, kernel: Kernel): Float64Array {
  const kept = keptShape(shape, kernel);
  return (kept.ownBlock ??= blockAtOrigin(atOrigin(), kernel));
}

const block = new Float64Array(polynomialLimit * polynomialLimit);

function blockAtOrigin(sides: ReturnType<ChargedConductor['atOrigin']>, kernel: Kernel): Float64Array {
  const order = sides.reduce((sum, side) => sum + side.order, 0);
  const matrix = new Float64Array(order * order);
  let row = 0;
  for (let s = 0; s < sides.length; s += 1) {
    let column = 0;
    for (let t = 0; t <= s; t += 1) {
      const [rows, columns] = [sides[s].order, sides[t].order];
      writeSideBlock(sides[s], sides[t], kernel, block);
      for (let m = 0; m < rows; m += 1) {
        for (let n = 0; n < columns; n += 1) matrix[(row + m) * order + column + n] = matrix[(column + n) * order + row + m] = block[m * columns + n];
      }
      column += columns;
    }
    row += sides[s].order;
  }
  return matrix;
}
