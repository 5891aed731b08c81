/**
 * The blocks of a film's system that belong to two sides or panels: potentials on sides, and polarisation on panels.
 */
import { polynomialLimit, writePolynomials } from '../basis/orthonormalJacobi';
import type { Side } from '../basis/side';
import { segmentDistance } from '../galerkin/segmentDistance';
import { writeSideBlock } from '../galerkin/sideBlock';
import type { Kernel } from '../kernel/layeredKernel';
import { acrossGap, addFluxBlock } from './fluxBlock';
import { plainBasis } from './fluxProduct';
import { keptBlock, type Shape } from './keptBlocks';
import { writePotentialBlock } from './potentialBlock';

/** Sides, then panels, with their shapes. */
export interface Faces {
  readonly all: readonly Side[];
  readonly shapes: readonly Shape[];
}

/** Of whichever was written last, row by row of the first side's polynomials. */
export const block = new Float64Array(polynomialLimit * polynomialLimit);

/** Into `block`: of the first side's potentials, or of the flux through it, from the second's charge. */
export function writeBlock(kind: 'potential' | 'flux', kernel: Kernel, { all, shapes }: Faces, first: number, second: number): void {
  const reach = nearRatio * Math.max(all[first].length, all[second].length);
  const near = acrossGap(all[first], all[second]) < reach && segmentDistance(all[first], all[second]) < reach;
  if (near) block.set(keptBlock({ kind, kernel, first: shapes[first], second: shapes[second], apart: all[second].x0 - all[first].x0 }, (a, b) => computed(kind, kernel, a, b)));
  else compute(kind, kernel, all[first], all[second]);
}

/** Pairs nearer than this part of the longer one cost enough to be worth keeping. */
const nearRatio = 1.5;

function compute(kind: 'potential' | 'flux', kernel: Kernel, first: Side, second: Side): void {
  // Two conductors may be as near as they like, and are no more than a few pairs.
  if (kind === 'potential' && 0 <= first.conductor && 0 <= second.conductor) writeSideBlock(first, second, kernel, block);
  else if (kind === 'potential') writePotentialBlock(first, second, kernel, block);
  else {
    block.fill(0, 0, first.order * second.order);
    addFluxBlock(kernel, first, second, 1, block);
  }
}

function computed(kind: 'potential' | 'flux', kernel: Kernel, first: Side, second: Side): Float64Array {
  compute(kind, kernel, first, second);
  return block.slice(0, first.order * second.order);
}

/** Into `block`: the rows of panel `p` from the charge of side or panel `t`; `strength` is kappa times e. */
export function writePolarisation(kernel: Kernel, faces: Faces, p: number, t: number, strength: number): void {
  writeBlock('flux', kernel, faces, p, t);
  const panel = faces.all[p];
  for (let at = 0; at < panel.order * faces.all[t].order; at += 1) block[at] *= -strength;
  if (p === t) addOwnCharge(panel);
}

/** pi s, tested with the Legendre polynomials. */
function addOwnCharge({ basis, order }: Side): void {
  const rule = basis.whole(order);
  const legendre = plainBasis();
  const values = new Float64Array(order);
  for (let g = 0; g < rule.count; g += 1) {
    writePolynomials(legendre.recurrence, 2 * rule.t[g] - 1, Math.PI, values, 0, order);
    for (let n = 0; n < order; n += 1) {
      for (let m = 0; m < order; m += 1) block[n * order + m] += values[n] * rule.weighted[g * polynomialLimit + m];
    }
  }
}
