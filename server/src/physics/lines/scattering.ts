/**
 * What one end of coupled lines does to the waves that arrive there.
 *
 *   p_out = reflect p_in + admit sigma           alpha_i v_i + beta_i i_i = sigma_i,  v = Tv (p_in + p_out)
 *
 * Model     linear ends, one equation for each line (`network.ts`)
 * Method    i = Y (p_out - p_in) put into the equations: (alpha Tv + beta Y) p_out = sigma - (alpha Tv - beta Y) p_in
 * Source    Paul, Analysis of Multiconductor Transmission Lines, from memory
 * Range     passive ends: never singular, since the characteristic impedance matrix is positive definite
 */
import { luFactor, luSolve } from '../../numeric/lu';
import type { Modes } from './modes';

export interface Scattering {
  /** Row-major; modes by modes. */
  readonly reflect: Float64Array;
  /** Row-major; modes by lines. */
  readonly admit: Float64Array;
}

export function scatteringOf({ order, voltage, current }: Modes, alpha: Float64Array, beta: Float64Array): Scattering {
  const matrix = new Float64Array(order * order);
  // Right sides one after the other: `order` columns of the reflection, then `order` of the identity.
  const columns = new Float64Array(2 * order * order);
  for (let i = 0; i < order; i += 1) {
    for (let k = 0; k < order; k += 1) {
      const fromVoltage = alpha[i] * voltage[i * order + k];
      const fromCurrent = beta[i] * current[i * order + k];
      matrix[i * order + k] = fromVoltage + fromCurrent;
      columns[k * order + i] = fromCurrent - fromVoltage;
    }
    columns[(order + i) * order + i] = 1;
  }
  const exchanged = luFactor(matrix, order);
  if (exchanged === null) throw new Error(`the ends of ${order} lines have no answer: alpha ${alpha.join(' ')}, beta ${beta.join(' ')}`);
  luSolve(matrix, exchanged, columns, 2 * order);
  const reflect = new Float64Array(order * order);
  const admit = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) {
    for (let k = 0; k < order; k += 1) {
      reflect[i * order + k] = columns[k * order + i];
      admit[i * order + k] = columns[(order + k) * order + i];
    }
  }
  return { reflect, admit };
}
