/** Where fields go beyond their model: bands far below them, and contours too long for one voltage around them. */
import type { Ambient } from '../../board/model';
import { largestOver } from '../../physics/loops/mutualInductance';
import { inText } from '../../units/inText';
import { bandOf } from '../receivers';
import type { ModelLimit } from '../results';
import type { Pickup } from './pickups';

export function fieldLimits(ambients: readonly Ambient[], pickups: readonly Pickup[]): readonly ModelLimit[] {
  const found = new Map<string, ModelLimit>();
  const say = (limit: ModelLimit) => found.set(limit.message, limit);
  for (const { name, to } of ambients) {
    for (const { receiver, kind, name: where, contour, place } of pickups) {
      const { subject } = receiver;
      const band = bandOf(receiver);
      if (band !== null && farAbove * band.to < to.value) {
        say({ subject: { kind: subject.kind, name: subject.name }, place: subject.place, message: `field ${name} reaches ${inText(to.value, 'frequency')}, more than ten times the band of ${subject.name}: what its filter leaves is listed, but semiconductor junctions rectify what lies so far outside, and that is not in the model` });
      }
      const share = largestOver(contour, to.value);
      if (tenth < share) say({ subject: { kind, name: where }, place, message: `${kind} ${where} is ${inText(share, 'fraction')} of the wavelength at ${inText(to.value, 'frequency')}, where field ${name} ends: the field’s voltage is exact, what the ends make of it is that of a short circuit, up to a tenth` });
    }
  }
  return [...found.values()];
}

const farAbove = 10;
const tenth = 0.1;
