/**
 * The whole kernel between the nodes of two conductors that are far apart.
 *
 * Method    one logarithm of a quotient for the charge and its plain image in a plane; between two planes their closed form
 *           with exponentials and sines of single nodes, so that a pair costs products and one logarithm
 * Formula   sinh²(q dx) + sin²(q (y ± y')) = (cosh 2q dx - cos 2q(y ± y')) / 2,  cosh 2q dx = (u/v + v/u)/2,  u = e^(2qx)
 * Range     no cancellation is guarded against: only for conductors that lie apart
 */
import { remainderValue, restValue, type Kernel, type KernelRest, type Mirror } from '../kernel/layeredKernel';
import type { NodeSet } from './nodeSet';

/** Row by row of the first nodes. */
export function writeKernelValues({ direct, mirrors, rest }: Kernel, first: NodeSet, second: NodeSet, values: Float64Array): void {
  const wide = rest !== null && rest.planes !== null && !fits(rest.planes, first, second);
  // Beyond the range of the exponentials: the plain sum of all parts, of which little is left.
  if (rest === null || rest.planes === null || wide) writeImages(direct, mirrors, first, second, values);
  else writePlanes(direct, mirrors, rest.planes, first, second, values);
  if (rest === null || (rest.families.length === 0 && !wide)) return;
  let at = 0;
  for (let i = 0; i < first.count; i += 1) {
    for (let j = 0; j < second.count; j += 1) {
      const dx = first.x[i] - second.x[j];
      values[at] += wide ? restValue(rest, dx, first.y[i], second.y[j]) : remainderValue(rest.families, dx, first.y[i], second.y[j]);
      at += 1;
    }
  }
}

type Planes = NonNullable<KernelRest['planes']>;

const steepness = ({ low, high }: Planes) => Math.PI / (2 * (high - low));

/** Whether e^(2q dx) is a number for every pair. */
function fits(planes: Planes, first: NodeSet, second: NodeSet): boolean {
  let left = Infinity;
  let right = -Infinity;
  for (const { x, count } of [first, second]) {
    for (let i = 0; i < count; i += 1) {
      left = Math.min(left, x[i]);
      right = Math.max(right, x[i]);
    }
  }
  return 2 * steepness(planes) * (right - left) < 600;
}

/** The charge and its mirrors. */
function writeImages(direct: number, mirrors: readonly Mirror[], first: NodeSet, second: NodeSet, values: Float64Array): void {
  const plane = mirrors.find(({ factor }) => factor === -direct) ?? null;
  const others = mirrors.filter((mirror) => mirror !== plane);
  let at = 0;
  for (let i = 0; i < first.count; i += 1) {
    for (let j = 0; j < second.count; j += 1) {
      const dx = first.x[i] - second.x[j];
      const dy = first.y[i] - second.y[j];
      const sum = first.y[i] + second.y[j];
      let square = dx * dx + dy * dy;
      if (plane !== null) square /= dx * dx + (sum - 2 * plane.at) ** 2;
      values[at] = -0.5 * direct * Math.log(square) + mirrored(others, dx, sum);
      at += 1;
    }
  }
}

/** The charge, its images between the planes, and its mirrors in interfaces. */
function writePlanes(direct: number, mirrors: readonly Mirror[], planes: Planes, first: NodeSet, second: NodeSet, values: Float64Array): void {
  const q = steepness(planes);
  const centre = first.x[0];
  first.placeWaves(q, centre, planes.low);
  second.placeWaves(q, centre, planes.low);
  const half = planes.factor / 2;
  // The closed form holds the charge as often as its images.
  const left = direct - planes.factor;
  let at = 0;
  for (let i = 0; i < first.count; i += 1) {
    const growth = first.growing[i];
    for (let j = 0; j < second.count; j += 1) {
      const quotient = growth / second.growing[j];
      const open = 0.5 * (quotient + 1 / quotient) - first.cosine[i] * second.cosine[j];
      const product = first.sine[i] * second.sine[j];
      let value = half * Math.log((open + product) / (open - product));
      if (left !== 0 || 0 < mirrors.length) {
        const dx = first.x[i] - second.x[j];
        const dy = first.y[i] - second.y[j];
        value += mirrored(mirrors, dx, first.y[i] + second.y[j]) - 0.5 * left * Math.log(dx * dx + dy * dy);
      }
      values[at] = value;
      at += 1;
    }
  }
}

function mirrored(mirrors: readonly Mirror[], dx: number, sum: number): number {
  let value = 0;
  for (let m = 0; m < mirrors.length; m += 1) {
    const up = sum - 2 * mirrors[m].at;
    value -= 0.5 * mirrors[m].factor * Math.log(dx * dx + up * up);
  }
  return value;
}
