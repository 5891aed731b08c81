/**
 * How long a response is looked at. Lossless lines between a low source and open ends beat, and the peak of
 * their victim grows with the window: a stated window is part of the result.
 *
 *   0        T                                    T + 20 one-way delays
 *   |--edge--|--------------------------------------|        at most half a period of what repeats
 *
 * Formula   window = min(T + 20 tau, 1 / (2 f))
 * Symbols   T 0-100 % of the edge; tau the slowest mode's one-way delay, with its leads; f the repetition rate
 * Source    convention of this project; every case of reference/coupled-lines.json has its peak inside
 */
import { seconds, type Time, type Frequency } from '../../units/quantity';
import type { CoupledLines, Waveform } from './lines';
import type { Modes } from './modes';

export interface Observation {
  /** 0-100 % of the edge. */
  readonly duration: Time;
  /** One way, of the slowest mode with its leads: `oneWayDelay`. */
  readonly delay: Time;
  /** Null where the edge does not repeat, or nobody said how often. */
  readonly repeats: Frequency | null;
}

export function observationWindow({ duration, delay, repeats }: Observation): Time {
  const whole = duration + passesWatched * delay;
  return seconds(repeats !== null && 0 < repeats ? Math.min(whole, 1 / (2 * repeats)) : whole);
}

const passesWatched = 20;

/** From termination to termination: the slowest mode and the longest pair of leads. */
export function oneWayDelay(modes: Modes, { left, right }: Pick<CoupledLines, 'left' | 'right'>): Time {
  const leads = left.map((end, line) => (end.lead?.delay ?? 0) + (right[line].lead?.delay ?? 0));
  return seconds(modes.delays[modes.order - 1] + Math.max(0, ...leads));
}

/**
 * Whether the largest value lies in the last quarter of what follows the edge and is more than a hundredth above all that
 * came before: what it would grow to, losses decide, and they are not in the model. What the end of a slow edge
 * itself calls up on a short line is past by then.
 */
export function stillGrowing({ times, values }: Waveform, window: Time, duration: Time = seconds(0)): boolean {
  const lastQuarter = duration + 0.75 * (window - duration);
  let earlier = 0;
  let late = 0;
  for (let i = 0; i < times.length; i += 1) {
    if (times[i] < lastQuarter) earlier = Math.max(earlier, Math.abs(values[i]));
    else late = Math.max(late, Math.abs(values[i]));
  }
  return 1.01 * earlier < late;
}
