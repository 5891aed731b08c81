/**
 * Charges of conductors that stand beside each other, none above another: each by what the others see of it (outsideView.ts), so
 * that a pair costs some hundred kernel values and a conductor some ten unknowns.
 *
 *   A = 1 + off-diagonal blocks  W K W^T,   K kernel values between the points of two views, W their charges' worth there
 */
import { cholesky, forwardSubstitute } from '../../../numeric/cholesky';
import { productTransposed } from '../../../numeric/productTransposed';
import type { ChargedConductor } from '../basis/chargedConductor';
import type { Kernel } from '../kernel/layeredKernel';
import type { ChargeProblem, ChargeSolution } from './chargeSolution';
import { innerProducts, neutral } from './conductorProducts';
import { stepsOfRootTwo } from './distancesBeside';
import { writeKernelValues } from './kernelValues';
import { keptPair } from './keptPairs';
import { keptShape, keptView } from './keptShapes';
import { NodeSet } from './nodeSet';
import { outsideView, type OutsideView } from './outsideView';

/** Null where a matrix is not positive definite. `distances`: how far each conductor's view has to clear it. */
export function rowSolution(problem: ChargeProblem, distances: Float64Array): ChargeSolution | null {
  const { conductors, constant } = problem;
  const views: OutsideView[] = [];
  const starts = new Int32Array(conductors.length);
  let order = 0;
  let unknowns = 0;
  for (let c = 0; c < conductors.length; c += 1) {
    const view = viewOf(conductors[c], problem, distances[c]);
    if (view === null) return null;
    views.push(view);
    starts[c] = order;
    order += view.charges;
    unknowns += view.unknowns;
  }
  const [fine, coarse] = assembled(problem, { views, starts, order });
  const fineRows = solved(fine, { views, starts, order }, problem.signals, constant, 'fineNet');
  const coarseRows = solved(coarse, { views, starts, order }, problem.signals, constant, 'coarseNet');
  if (fineRows === null || coarseRows === null) return null;
  return { order: problem.signals.length, fine: fineRows, coarse: coarseRows, unknowns };
}

function viewOf(conductor: ChargedConductor, { kernel, constant }: ChargeProblem, distance: number): OutsideView | null {
  const own = kernel(conductor.layer, conductor.layer);
  const farDistance = stepsOfRootTwo(conductor.reach);
  return keptView(keptShape(conductor.shape, own), distance, constant ?? 0, () => outsideView(conductor, { kernel: own, distance, farDistance, constant: constant ?? 0 }));
}

interface Row {
  readonly views: readonly OutsideView[];
  readonly starts: Int32Array;
  readonly order: number;
}

let matrices = [new Float64Array(1024), new Float64Array(1024)];

/** Of all polynomials, and of the shorter series. The lower triangles; what lies above is whatever was there before. */
function assembled({ conductors, kernel, constant }: ChargeProblem, { views, starts, order }: Row): readonly Float64Array[] {
  if (matrices[0].length < order * order) matrices = matrices.map(() => new Float64Array(order * order));
  for (let c = 0; c < views.length; c += 1) {
    for (const matrix of matrices) writeUnit(matrix, order, starts[c], views[c].charges);
    for (let other = 0; other < c; other += 1) {
      const [a, b] = [conductors[c].layer, conductors[other].layer];
      // The kernel wants the conductor in the higher layer first.
      const [upper, lower] = a < b ? [other, c] : [c, other];
      const gap = Math.max(conductors[c].left - conductors[other].right, conductors[other].left - conductors[c].right);
      const block = keptPair(views[upper], views[lower], conductors[upper].foot - conductors[lower].foot, (apart) =>
        pairBlock(views[upper], views[lower], { apart, gap, kernel: kernel(Math.min(a, b), Math.max(a, b)), constant: constant ?? 0 }));
      placeBlock(block, { order, row: starts[c], column: starts[other], transposed: upper !== c, rows: views[upper].charges, columns: views[lower].charges });
    }
  }
  return matrices;
}

function writeUnit(matrix: Float64Array, order: number, start: number, count: number): void {
  for (let i = 0; i < count; i += 1) {
    const row = (start + i) * order + start;
    matrix.fill(0, row, row + i);
    matrix[row + i] = 1;
  }
}

let values = new Float64Array(1024);
let half = new Float64Array(1024);
let product = new Float64Array(1024);
const upperNodes = new NodeSet();
const lowerNodes = new NodeSet();

interface Between {
  /** From foot to foot. */
  readonly apart: number;
  readonly gap: number;
  readonly kernel: Kernel;
  readonly constant: number;
}

/** Charges of the upper × charges of the lower, twice: of all polynomials, and of the shorter series. */
function pairBlock(upper: OutsideView, lower: OutsideView, { apart, gap, kernel, constant }: Between): Float64Array {
  const above = upper.farDistance <= gap ? upper.far() : upper.near;
  const below = lower.farDistance <= gap ? lower.far() : lower.near;
  upperNodes.placePoints(above.x, above.y, apart);
  lowerNodes.placePoints(below.x, below.y, 0);
  const [rows, columns] = [upper.charges, lower.charges];
  const needed = Math.max(above.points, 2 * columns) * Math.max(below.points, above.points);
  if (values.length < needed) [values, half, product] = [new Float64Array(needed), new Float64Array(needed), new Float64Array(Math.max(needed, rows * columns))];
  if (product.length < rows * columns) product = new Float64Array(rows * columns);
  writeKernelValues(kernel, upperNodes, lowerNodes, values);
  if (constant !== 0) for (let at = 0; at < above.points * below.points; at += 1) values[at] += constant;
  productTransposed(below.worth, 0, values, 0, { rows: 2 * columns, columns: above.points, length: below.points }, half);
  const block = new Float64Array(2 * rows * columns);
  for (let which = 0; which < 2; which += 1) {
    productTransposed(above.worth, which * rows * above.points, half, which * columns * above.points, { rows, columns, length: above.points }, product);
    for (let at = 0; at < rows * columns; at += 1) block[which * rows * columns + at] = product[at];
  }
  return block;
}

interface Place {
  readonly order: number;
  readonly row: number;
  readonly column: number;
  /** The rows of the matrix belong to the lower view. */
  readonly transposed: boolean;
  readonly rows: number;
  readonly columns: number;
}

function placeBlock(block: Float64Array, { order, row, column, transposed, rows, columns }: Place): void {
  let at = 0;
  for (let which = 0; which < 2; which += 1) {
    const matrix = matrices[which];
    for (let m = 0; m < rows; m += 1) {
      for (let n = 0; n < columns; n += 1, at += 1) matrix[transposed ? (row + n) * order + column + m : (row + m) * order + column + n] = block[at];
    }
  }
}

let right = new Float64Array(256);

function solved(matrix: Float64Array, { views, starts, order }: Row, signals: readonly number[], constant: number | null, net: 'fineNet' | 'coarseNet'): Float64Array | null {
  if (!cholesky(matrix, order)) return null;
  const count = signals.length + (constant === null ? 0 : 1);
  if (right.length < count * order) right = new Float64Array(count * order);
  right.fill(0, 0, count * order);
  signals.forEach((conductor, index) => { right[index * order + starts[conductor]] = views[conductor][net]; });
  if (constant !== null) views.forEach((view, c) => { right[signals.length * order + starts[c]] = view[net]; });
  forwardSubstitute(matrix, order, right, count);
  const products = innerProducts(right, order, order, count);
  return constant === null ? products : neutral(products, count);
}
