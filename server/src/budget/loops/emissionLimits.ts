/** Where a loop's emission goes beyond that of a small loop: too near to be seen as one point, or its worst line too high for one current. */
import { largestOver } from '../../physics/loops/mutualInductance';
import { inText } from '../../units/inText';
import type { LoopResult, ModelLimit } from '../results';
import { contourOf } from './boardLoop';
import type { LoopInductances } from './loopInductances';

export function emissionLimits({ loop, emission }: LoopResult, inductances: LoopInductances): readonly ModelLimit[] {
  const numbers = inductances.of(loop);
  const contour = contourOf(numbers);
  if (contour === null || numbers.measures === null) return [];
  const { extent } = numbers.measures;
  const said = (message: string): ModelLimit => ({ subject: { kind: 'loop', name: loop.name }, place: loop.place, message });
  const messages = emission.flatMap(({ limit, frequency }) => {
    const share = largestOver(contour, frequency);
    return [
      ...(tenth * limit.distance.value < extent ? [`loop ${loop.name} is ${inText(extent, 'length')} large, more than a tenth of the ${inText(limit.distance.value, 'length')} at which the board limits emission: a loop counts as one point there`] : []),
      ...(tenth < share ? [`loop ${loop.name} emits most at ${inText(frequency, 'frequency')}, where it is ${inText(share, 'fraction')} of the wavelength: a loop up to a tenth has one current all around`] : []),
    ];
  });
  return [...new Set(messages)].map(said);
}

const tenth = 0.1;
