/**
 * The block of two conductors: side by side where they are close, from node to node at once where they are far.
 *
 * Row-major, polynomials side after side, rows of the conductor in the higher layer. The result is scratch memory, good until
 * the next call.
 */
import type { ChargedConductor } from '../basis/chargedConductor';
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Side } from '../basis/side';
import { restValue, type Kernel } from '../kernel/layeredKernel';
import { farRatio } from './pairIntegral';
import { farPoints, writeSideBlock } from './sideBlock';

export function mutualBlock(upper: ChargedConductor, lower: ChargedConductor, kernel: Kernel): Float64Array {
  const rows = orderOf(upper);
  const columns = orderOf(lower);
  if (block.length < rows * columns) block = new Float64Array(2 * rows * columns);
  // All images of a point lie straight above or below it: none is nearer than this.
  const across = Math.max(leftOf(upper) - rightOf(lower), leftOf(lower) - rightOf(upper));
  if (across < farRatio * Math.max(longestOf(upper), longestOf(lower))) writeBySides(upper, lower, kernel, columns);
  else writeAtOnce(upper, lower, kernel, across, columns);
  return block;
}

let block = new Float64Array(1024);
const sideBlock = new Float64Array(polynomialLimit * polynomialLimit);

const orderOf = ({ sides }: ChargedConductor) => sides.reduce((sum, { order }) => sum + order, 0);
const longestOf = ({ sides }: ChargedConductor) => sides.reduce((longest, { length }) => Math.max(longest, length), 0);
const leftOf = ({ sides }: ChargedConductor) => sides.reduce((left, { x0 }) => Math.min(left, x0), Infinity);
const rightOf = ({ sides }: ChargedConductor) => sides.reduce((right, { x1 }) => Math.max(right, x1), -Infinity);

function writeBySides(upper: ChargedConductor, lower: ChargedConductor, kernel: Kernel, columns: number): void {
  let row = 0;
  for (const first of upper.sides) {
    let column = 0;
    for (const second of lower.sides) {
      writeSideBlock(first, second, kernel, sideBlock);
      for (let m = 0; m < first.order; m += 1) {
        for (let n = 0; n < second.order; n += 1) block[(row + m) * columns + column + n] = sideBlock[m * second.order + n];
      }
      column += second.order;
    }
    row += first.order;
  }
}

/** The nodes of all sides of a conductor, each side's rule as fine as the distance asks for. */
class NodeSet {
  readonly rules: PartRule[] = [];
  x = new Float64Array(64);
  y = new Float64Array(64);
  count = 0;

  place(sides: readonly Side[], distance: number): void {
    this.rules.length = 0;
    this.count = 0;
    for (const side of sides) {
      const rule = side.basis.whole(farPoints(distance / side.length));
      if (this.x.length < this.count + rule.count) this.grow();
      for (let i = 0; i < rule.count; i += 1) {
        this.x[this.count + i] = side.x0 + (side.x1 - side.x0) * rule.t[i];
        this.y[this.count + i] = side.y0 + (side.y1 - side.y0) * rule.t[i];
      }
      this.rules.push(rule);
      this.count += rule.count;
    }
  }

  private grow(): void {
    const [x, y] = [this.x, this.y];
    this.x = new Float64Array(2 * x.length);
    this.y = new Float64Array(2 * y.length);
    this.x.set(x);
    this.y.set(y);
  }
}

const firstNodes = new NodeSet();
const secondNodes = new NodeSet();
let values = new Float64Array(1024);
let half = new Float64Array(1024);

function writeAtOnce(upper: ChargedConductor, lower: ChargedConductor, kernel: Kernel, distance: number, columns: number): void {
  firstNodes.place(upper.sides, distance);
  secondNodes.place(lower.sides, distance);
  const size = firstNodes.count * Math.max(secondNodes.count, columns);
  if (values.length < size) {
    values = new Float64Array(2 * size);
    half = new Float64Array(2 * size);
  }
  writeValues(kernel);
  sumOverColumns(lower.sides, columns);
  sumOverRows(upper.sides, columns);
}

/** The whole kernel between all nodes. */
function writeValues({ direct, mirrors, rest }: Kernel): void {
  // A plain image in a plane makes one logarithm of a quotient with the charge itself.
  const plane = mirrors.find(({ factor }) => factor === -direct) ?? null;
  const others = mirrors.filter((mirror) => mirror !== plane);
  const [x, y] = [secondNodes.x, secondNodes.y];
  let at = 0;
  for (let i = 0; i < firstNodes.count; i += 1) {
    const xi = firstNodes.x[i];
    const yi = firstNodes.y[i];
    for (let j = 0; j < secondNodes.count; j += 1) {
      const dx = xi - x[j];
      const dy = yi - y[j];
      let square = dx * dx + dy * dy;
      if (plane !== null) {
        const up = yi + y[j] - 2 * plane.at;
        square /= dx * dx + up * up;
      }
      let sum = direct * Math.log(square);
      for (let m = 0; m < others.length; m += 1) {
        const up = yi + y[j] - 2 * others[m].at;
        sum += others[m].factor * Math.log(dx * dx + up * up);
      }
      values[at] = rest === null ? -0.5 * sum : restValue(rest, dx, yi, y[j]) - 0.5 * sum;
      at += 1;
    }
  }
}

/** half[i, n] = sum over j of values[i, j] w p_n; what a rule cannot tell from lower polynomials stays zero. */
function sumOverColumns(sides: readonly Side[], columns: number): void {
  const count = secondNodes.count;
  half.fill(0, 0, firstNodes.count * columns);
  for (let i = 0; i < firstNodes.count; i += 1) {
    let from = i * count;
    let to = i * columns;
    for (let s = 0; s < sides.length; s += 1) {
      const rule = secondNodes.rules[s];
      const order = Math.min(sides[s].order, rule.count);
      for (let j = 0; j < rule.count; j += 1) {
        const value = values[from + j];
        const at = j * polynomialLimit;
        for (let n = 0; n < order; n += 1) half[to + n] += value * rule.weighted[at + n];
      }
      from += rule.count;
      to += sides[s].order;
    }
  }
}

function sumOverRows(sides: readonly Side[], columns: number): void {
  let row = 0;
  let node = 0;
  for (let s = 0; s < sides.length; s += 1) {
    const rule = firstNodes.rules[s];
    const { order } = sides[s];
    block.fill(0, row * columns, (row + order) * columns);
    for (let i = 0; i < rule.count; i += 1) {
      const from = (node + i) * columns;
      for (let m = 0; m < Math.min(order, rule.count); m += 1) {
        const weight = rule.weighted[i * polynomialLimit + m];
        const to = (row + m) * columns;
        for (let n = 0; n < columns; n += 1) block[to + n] += weight * half[from + n];
      }
    }
    row += order;
    node += rule.count;
  }
}
