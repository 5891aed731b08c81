/**
 * A noise density summed over a sharp band: the mean square of a voltage.
 *
 *   S(f) |‾‾‾\               Model     S in V²/Hz, as smooth over a decade as a circuit of resistances and capacitances makes it
 *        |[   \____ ]        Method    adaptive Gauss rule over ln f, begun in every decade by itself; from 0 Hz, what lies below
 *        +-------------- f             1e-12 of the upper end is summed over f
 *                            Formula   integral of S df = integral of f S d(ln f)
 *                            Symbols   f Hz, the answer V²
 * Source    quadrature: Davis & Rabinowitz, Methods of Numerical Integration
 * Range     0 <= from <= to; a resonance narrower than a thirtieth of its frequency can be stepped over
 * Accuracy  `error`, an estimate far above the true error where S is smooth; test/physics/noise/densityOverBand.test.ts
 */
import { adaptiveGauss } from '../../numeric/adaptiveGauss';
import { hertz, type Frequency } from '../../units/quantity';
import type { Band } from './receiverBand';

export interface MeanSquare {
  /** V² */
  readonly value: number;
  readonly error: number;
}

export function densityOverBand({ from, to }: Band, density: (frequency: Frequency) => number): MeanSquare {
  if (!(from < to)) return { value: 0, error: 0 };
  const lowest = from === 0 ? shareSummedOverFrequency * to : from;
  // Counted from the lowest, and from the band's width: a narrow band keeps its digits.
  const whole = Math.log1p((to - lowest) / lowest);
  const decades = Math.ceil(whole / Math.LN10);
  const ends = Array.from({ length: decades + 1 }, (_, at) => (at / decades) * whole);
  const overLogarithm = (x: number) => {
    const frequency = lowest * Math.exp(x);
    return frequency * density(hertz(frequency));
  };
  // A scale to which the tolerance is relative: a few points in every decade are enough for that.
  const rough = ends.reduce((sum, end) => sum + Math.abs(overLogarithm(end)), 0);
  const tolerance = (relativeTolerance * rough) / (decades + 1);
  const parts = ends.slice(1).map((end, at) => adaptiveGauss(overLogarithm, ends[at]!, end, tolerance));
  if (from === 0) parts.push(adaptiveGauss((frequency) => density(hertz(frequency)), 0, lowest, tolerance));
  return parts.reduce((sum, { value, error }) => ({ value: sum.value + value, error: sum.error + error + rounding * Math.abs(value) }), { value: 0, error: 0 });
}

const shareSummedOverFrequency = 1e-12;
const relativeTolerance = 1e-9;
const rounding = 1e-13;
