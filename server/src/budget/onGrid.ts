/**
 * What is solved at some frequencies and read between them: of thousands of harmonics each would cost a field solution otherwise.
 *
 * Method    straight between neighbours in log over log f
 * Accuracy  of a skin effect that sets in 0.3 % at eight a decade; of a field's voltage that turns over 1 % at sixteen
 */
import { hertz, type Frequency } from '../units/quantity';

export interface Grid {
  readonly perDecade: number;
  /** Below it nothing changes any more. */
  readonly lowest: number;
}

/** The depth of the current in copper is 2 mm at 1 kHz. */
export const skinGrid: Grid = { perDecade: 8, lowest: 1e3 };

export function onGrid(solvedAt: (frequency: Frequency) => number, { perDecade, lowest }: Grid): (frequency: Frequency) => number {
  return (frequency) => {
    if (frequency <= lowest) return solvedAt(hertz(0));
    const place = perDecade * Math.log10(frequency);
    const below = Math.floor(place);
    const [one, other] = [below, below + 1].map((step) => solvedAt(hertz(10 ** (step / perDecade))));
    if (!(0 < one! && 0 < other!)) return one! + (place - below) * (other! - one!);
    return Math.exp(Math.log(one!) + (place - below) * Math.log(other! / one!));
  };
}
