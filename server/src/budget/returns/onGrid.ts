/**
 * A resistance that is solved at eight frequencies a decade and read between them: of thousands of harmonics each would cost a
 * field solution otherwise.
 *
 * Method    straight between neighbours in log R over log f      Accuracy  0.3 % of a skin effect that sets in
 */
import { hertz, type Frequency } from '../../units/quantity';

export function onGrid(solvedAt: (frequency: Frequency) => number): (frequency: Frequency) => number {
  return (frequency) => {
    if (frequency <= lowest) return solvedAt(hertz(0));
    const place = perDecade * Math.log10(frequency);
    const below = Math.floor(place);
    const [one, other] = [below, below + 1].map((step) => Math.log(solvedAt(hertz(10 ** (step / perDecade)))));
    return Math.exp(one! + (place - below) * (other! - one!));
  };
}

const perDecade = 8;
/** The depth is 2 mm there. */
const lowest = 1e3;
