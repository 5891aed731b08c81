/** What of a loop or of two cannot be computed, and where loops are beyond their model: in words, with the range. */
import type { Loop } from '../../board/model';
import type { ContourRefusal } from '../../physics/loops/contour';
import { largestOver, type MutualInductance } from '../../physics/loops/mutualInductance';
import type { SelfInductance } from '../../physics/loops/selfInductance';
import { inText } from '../../units/inText';
import type { Roles } from '../roles';
import type { ModelLimit } from '../results';
import { highestFrequency } from '../sources';
import { contourOf } from './boardLoop';
import type { LoopInductances } from './loopInductances';

type Reason = ContourRefusal['reason'] | (Extract<SelfInductance, { refused: unknown }>['refused'] | Extract<MutualInductance, { refused: unknown }>['refused'])['reason'];

const words: Readonly<Record<Reason, string>> = {
  'not-a-number': 'a coordinate is not a number',
  'no-size': 'its path encloses nothing',
  'out-of-range': 'it is smaller than 0.1 pm or larger than 10 000 km',
  'too-many-points': 'its path has more than 1000 points',
  'folds-back': 'its path runs back on itself',
  'meets-itself': 'its path meets itself',
  'crosses-plane': 'it crosses a plane that it lies over',
  'lies-in-plane': 'it lies in a plane',
  'joins-two-planes': 'it reaches from one plane to another',
  'no-conductor': 'its conductor has no size',
  'too-wide': 'its conductor is too wide for it',
  'touches-plane': 'its conductor touches a plane',
  touching: 'their conductors touch',
};

/** Why two loops have no mutual inductance. */
export function refusalInWords(found: MutualInductance | null, inductances: LoopInductances, ...loops: readonly [Loop, Loop]): string {
  if (found !== null && 'refused' in found) {
    const { refused } = found;
    return 'contour' in refused ? `of loop ${loops[refused.contour === 'first' ? 0 : 1].name}, ${words[refused.reason]}` : words[refused.reason];
  }
  const without = loops.find((loop) => contourOf(inductances.of(loop)) === null)!;
  return `of loop ${without.name}, ${contourFaultInWords(inductances, without)}`;
}

function contourFaultInWords(inductances: LoopInductances, loop: Loop): string | null {
  const { contour } = inductances.of(loop);
  return 'refused' in contour ? words[contour.refused.reason] : null;
}

export function loopLimits(loop: Loop, roles: Roles, inductances: LoopInductances): readonly ModelLimit[] {
  const said = (message: string): ModelLimit => ({ subject: { kind: 'loop', name: loop.name }, place: loop.place, message });
  const fault = contourFaultInWords(inductances, loop);
  if (fault !== null) return [said(`loop ${loop.name} has no numbers: ${fault}`)];
  const limits: ModelLimit[] = [];
  const { own, contour } = inductances.of(loop);
  if (own !== null && 'refused' in own) limits.push(said(`loop ${loop.name} has no inductance: ${words[own.refused.reason]}`));
  const highest = Math.max(0, ...loop.carries.flatMap(({ net, current }) => [...(roles.get(net)?.sources ?? []).map(({ signal }) => signal), { ...net, current: current ?? net.current }]).flatMap((signal) => highestFrequency(signal) ?? []));
  const share = 'contour' in contour && 0 < highest ? largestOver(contour.contour, highest as Parameters<typeof largestOver>[1]) : 0;
  if (tenth < share) limits.push(said(`loop ${loop.name} is ${inText(share, 'fraction')} of the wavelength at ${inText(highest, 'frequency')}, the highest that it carries: a loop up to a tenth has one current all around`));
  return limits;
}

const tenth = 0.1;
