/**
 * The largest of what a filter leaves, over a range of frequencies: of a transfer that is known by its largest value in any
 * range, and of the receiver's first-order band, which rises up to one frequency and falls beyond it.
 *
 * Method    bisection of the range: the part that could hold the largest product is halved until no part could hold a larger one
 * Accuracy  1e-3 of the product, never below the truth by more
 */
import { bandGain, bandPeak, type Band } from '../physics/noise/receiverBand';
import { hertz, type Frequency } from '../units/quantity';

export interface WorstAt {
  readonly magnitude: number;
  readonly frequency: Frequency;
}

export interface FrequencyRange {
  readonly from: Frequency;
  readonly to: Frequency;
}

export function worstInBand(range: FrequencyRange, band: Band, worstOver: (range: FrequencyRange) => WorstAt): WorstAt {
  const middle = bandPeak(band);
  const parts: Part[] = [];
  let best: WorstAt = { magnitude: 0, frequency: range.from };
  const look = (part: FrequencyRange) => {
    const { magnitude, frequency } = worstOver(part);
    const most = magnitude * bandGain(band, hertz(Math.min(part.to, Math.max(part.from, middle))));
    const seen = magnitude * bandGain(band, frequency);
    if (best.magnitude < seen) best = { magnitude: seen, frequency };
    parts.push({ ...part, most });
  };
  look(range);
  for (let halved = 0; halved < mostHalved; halved += 1) {
    const next = parts.reduce((a, b) => (a.most < b.most ? b : a));
    if (next.most <= best.magnitude * (1 + accuracy) || !(next.from < next.to)) break;
    parts.splice(parts.indexOf(next), 1);
    const half = hertz(0 < next.from ? Math.sqrt(next.from * next.to) : next.to / 8);
    look({ from: next.from, to: half });
    look({ from: half, to: next.to });
  }
  // Where halving ended early, the bound counts.
  return { magnitude: Math.max(best.magnitude, ...parts.map(({ most }) => most / (1 + accuracy))), frequency: best.frequency };
}

interface Part extends FrequencyRange {
  /** No product in it is larger. */
  readonly most: number;
}

const accuracy = 1e-3;
const mostHalved = 60;
