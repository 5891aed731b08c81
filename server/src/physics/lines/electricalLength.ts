/**
 * Whether a run is so short that its two ends move together: then people may think of it as one capacitance and one
 * mutual inductance. A label only: what is computed is always the line.
 *
 * Formula   lumped where delay < rise / 6: shorter than a sixth of the edge's spatial extent
 * Symbols   delay of the slowest mode over the run; rise 10-90 %
 * Source    Johnson & Graham, High-Speed Digital Design, 1993, chapter 1 (length of an edge), from memory
 */
import type { Time } from '../../units/quantity';

export function electricalLength(delay: Time, rise: Time): 'lumped' | 'line' {
  return 6 * delay < rise ? 'lumped' : 'line';
}
