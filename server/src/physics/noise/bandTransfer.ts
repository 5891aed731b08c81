/**
 * What a receiver's first-order band leaves of a sine, as a ratio of magnitudes.
 *
 *    u --[ low pass f2 ]--[ high pass f1 ]-- z       Formula   (f/f1) / sqrt(1 + (f/f1)²) / sqrt(1 + (f/f2)²)
 *
 * Model     that of `receiverBand.ts`, in the steady state       Source    linear circuit theory
 * Range     0 <= f1 < f2; without high pass where f1 is 0        Accuracy  rounding
 */
import { ratio, type Frequency, type Ratio } from '../../units/quantity';
import type { Band } from './receiverBand';

export function bandTransfer(frequency: Frequency, { from, to }: Band): Ratio {
  // From the corner's side: neither a sine far below it nor one far above loses digits.
  const high = from === 0 ? 1 : frequency / Math.hypot(frequency, from);
  return ratio(high * (to / Math.hypot(frequency, to)));
}
