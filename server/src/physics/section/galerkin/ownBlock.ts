/**
 * The block of one conductor on itself, kept with the kernel: an edit of a gap moves conductors but leaves these, and so
 * most of the near integrals, as they are.
 *
 * Row-major, side after side, all polynomials of a side together. Computed at the origin, so that it is the same to the
 * last digit wherever the conductor lies. A conductor is its own mirror image: of two pairs of sides that are each other's, one
 * is computed.
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { ChargedConductor } from '../basis/chargedConductor';
import type { Kernel } from '../kernel/layeredKernel';
import { mirrorImages } from '../basis/mirrorImages';
import { keptShape } from './keptShapes';
import { writeSideBlock } from './sideBlock';

export function ownBlock({ shape, atOrigin }: ChargedConductor, kernel: Kernel): Float64Array {
  const kept = keptShape(shape, kernel);
  return (kept.ownBlock ??= blockAtOrigin(atOrigin(), kernel));
}

const block = new Float64Array(polynomialLimit * polynomialLimit);

function blockAtOrigin(sides: ReturnType<ChargedConductor['atOrigin']>, kernel: Kernel): Float64Array {
  const starts = new Int32Array(sides.length);
  let order = 0;
  sides.forEach((side, s) => {
    starts[s] = order;
    order += side.order;
  });
  const matrix = new Float64Array(order * order);
  const place = (s: number, t: number, parity: 1 | -1) => {
    const [rows, columns] = [sides[s].order, sides[t].order];
    for (let m = 0; m < rows; m += 1) {
      for (let n = 0; n < columns; n += 1) {
        const value = (m + n) % 2 === 0 ? block[m * columns + n] : parity * block[m * columns + n];
        matrix[(starts[s] + m) * order + starts[t] + n] = matrix[(starts[t] + n) * order + starts[s] + m] = value;
      }
    }
  };
  const images = mirrorImages(sides);
  const done = new Uint8Array(sides.length * sides.length);
  for (let s = 0; s < sides.length; s += 1) {
    for (let t = 0; t <= s; t += 1) {
      if (done[s * sides.length + t] === 1) continue;
      writeSideBlock(sides[s], sides[t], kernel, block);
      place(s, t, 1);
      if (images === null) continue;
      // The mirrored sides run backwards: p_m changes its sign with its parity.
      const [u, v] = [images[s], images[t]];
      place(u, v, -1);
      done[u * sides.length + v] = done[v * sides.length + u] = 1;
    }
  }
  return matrix;
}
