/**
 * The largest value of a smooth function over a range of frequencies: of a small circuit, whose resonances are damped by the
 * resistances that stand at its ends.
 *
 * Method    64 points a decade, then golden section around the largest
 * Accuracy  1e-3 for resonances of a quality below 30; the answers of `circuitTransfer.ts` beyond that are not what a board has
 */
import { hertz, type Frequency } from '../units/quantity';

export interface WorstAt {
  readonly magnitude: number;
  readonly frequency: Frequency;
}

export function worstOver({ from, to }: { readonly from: Frequency; readonly to: Frequency }, magnitude: (frequency: Frequency) => number): WorstAt {
  if (from === to) return { magnitude: magnitude(from), frequency: from };
  const lowest = Math.max(from, 1e-9 * to);
  const steps = Math.max(2, Math.min(mostSteps, Math.ceil(perDecade * Math.log10(to / lowest))));
  const at = (step: number) => hertz(step === 0 ? from : step === steps ? to : lowest * (to / lowest) ** (step / steps));
  let best = 0;
  const values = Array.from({ length: steps + 1 }, (_, step) => magnitude(at(step)));
  values.forEach((value, step) => {
    if (values[best]! < value) best = step;
  });
  const refined = golden(magnitude, at(Math.max(0, best - 1)), at(Math.min(steps, best + 1)));
  return refined.magnitude < values[best]! ? { magnitude: values[best]!, frequency: at(best) } : refined;
}

const perDecade = 64;
const mostSteps = 600;

function golden(magnitude: (frequency: Frequency) => number, from: number, to: number): WorstAt {
  const share = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from, to];
  let best: WorstAt = { magnitude: -Infinity, frequency: hertz(from) };
  const look = (frequency: number) => {
    const value = magnitude(hertz(frequency));
    if (best.magnitude < value) best = { magnitude: value, frequency: hertz(frequency) };
    return value;
  };
  let [one, other] = [high - share * (high - low), low + share * (high - low)];
  let [atOne, atOther] = [look(one), look(other)];
  for (let n = 0; n < 20; n += 1) {
    if (atOne < atOther) {
      low = one;
      [one, atOne] = [other, atOther];
      other = low + share * (high - low);
      atOther = look(other);
    } else {
      high = other;
      [other, atOther] = [one, atOne];
      one = high - share * (high - low);
      atOne = look(one);
    }
  }
  return best;
}
