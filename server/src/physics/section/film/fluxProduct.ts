/**
 * The flux block of a far pair, from the source's nodes to the target's: logarithms that were kept, and tables.
 */
import { polynomialLimit } from '../basis/orthonormalJacobi';
import type { PartRule } from '../basis/partRule';
import type { Side } from '../basis/side';
import { sideBasis, type SideBasis } from '../basis/sideBasis';
import type { Family } from '../kernel/layeredKernel';

/** -grad of the logarithms kept and of each family, times the target's length along its normal. */
export function addProduct(target: Side, source: Side, targetRule: PartRule, sourceRule: PartRule, families: readonly Family[], scale: number, block: Float64Array): void {
  const rows = target.order;
  const columns = source.order;
  // The normal is (-up, across) / length.
  const across = target.x1 - target.x0;
  const up = target.y1 - target.y0;
  const sourceAcross = source.x1 - source.x0;
  const sourceUp = source.y1 - source.y0;
  for (let g = 0; g < targetRule.count; g += 1) {
    const x = target.x0 + across * targetRule.t[g];
    const y = target.y0 + up * targetRule.t[g];
    for (let m = 0; m < columns; m += 1) row[m] = 0;
    for (let f = 0; f < sourceRule.count; f += 1) {
      const dx = x - source.x0 - sourceAcross * sourceRule.t[f];
      const ySource = source.y0 + sourceUp * sourceRule.t[f];
      let sum = 0;
      for (let i = 0; i < farLines; i += 1) {
        const dy = y - farSigns[i] * ySource - farShifts[i];
        sum += (farFactors[i] * (across * dy - up * dx)) / (dx * dx + dy * dy);
      }
      for (let i = 0; i < families.length; i += 1) {
        const family = families[i];
        sum -= scale * family.table.slope(family.observer * y + family.source * ySource + family.offset, dx < 0 ? -dx : dx, across * family.observer, dx < 0 ? up : -up);
      }
      const at = f * polynomialLimit;
      for (let m = 0; m < columns; m += 1) row[m] += sum * sourceRule.weighted[at + m];
    }
    const at = g * polynomialLimit;
    for (let n = 0; n < rows; n += 1) {
      const weight = targetRule.weighted[at + n];
      for (let m = 0; m < columns; m += 1) block[n * columns + m] += weight * row[m];
    }
  }
}

const row = new Float64Array(polynomialLimit);

/** Nodes that leave 1e-5 of an entry: the Gauss error is that of Bernstein's ellipse through the nearest singularity. */
export function farPoints(relative: number, order: number): number {
  const ellipse = Math.log(2 * relative + Math.sqrt(4 * relative * relative + 1));
  return Math.max(Math.ceil(order / 2) + 1, Math.ceil(6 / ellipse + order / 4));
}

let plain: SideBasis | null = null;
/** The Legendre polynomials that fluxes are tested with. */
export const plainBasis = () => (plain ??= sideBasis(0, 0));

/** Logarithms that are far from the target, kept for addProduct: their factors and where they put the source. */
const farFactors = new Float64Array(8);
const farSigns = new Float64Array(8);
const farShifts = new Float64Array(8);
let farLines = 0;

export function forgetLines(): void {
  farLines = 0;
}

/** At most eight: a kernel has a direct part and three mirrors. */
export function keepLine(factor: number, sign: number, shift: number): void {
  farFactors[farLines] = factor;
  farSigns[farLines] = sign;
  farShifts[farLines] = shift;
  farLines += 1;
}
