/**
 * What one line of a part of a run puts on the receivers in it, for a swing of one volt: the worst of its edges, of
 * the directions in which it and they are driven, and of what is assumed for sources that nobody stated.
 */
import type { Net } from '../../board/model';
import { electricalLength } from '../../physics/lines/electricalLength';
import { kneeFrequency } from '../../physics/lines/knee';
import { slowInductance } from './balancingCurrent';
import { carriedError } from './carriedError';
import { arrangementsFor, edgesOf, type Arrangement, type Edge } from './excitations';
import { isReceiver, type Roles } from '../roles';
import type { RunPart, Trace } from './runParts';
import { solvedLine, type ReceivedNoise } from './solvedLine';
import type { SolveCache } from '../solveCache';
import type { Length } from '../../units/quantity';

/** One way to compute a coupling, and what came of it. */
export interface Found {
  readonly edge: Edge;
  readonly arrangement: Arrangement;
  /** Where the edge is too slow for them: whether they carry their balancing current all the same. */
  readonly guards: 'ideal' | 'balance' | 'idle';
  readonly model: ReturnType<typeof electricalLength>;
  /** For one volt of a rising edge. */
  readonly noise: ReceivedNoise;
  /** Of the peak at the receiver, by the cross-section's error bars. */
  readonly carried: number;
}

/** By the index of the receiving trace. */
export type FoundByReceiver = ReadonlyMap<number, Found>;

export function worstNoise(part: RunPart, aggressor: number, { roles, length, cache }: { roles: Roles; length: Length; cache: SolveCache }): FoundByReceiver {
  const { net } = part.traces[aggressor];
  const receivers = receiversOf(part, part.traces[aggressor]);
  const worst = new Map<number, Omit<Found, 'carried'>>();
  if (receivers.length === 0 || net.swing === null) return new Map();
  const read = receivers.map((index) => ({ index, band: bandOf(part.traces[index].net) }));
  for (const edge of edgesOf(net)) {
    const slowed = slowInductance(part, kneeFrequency(edge.rise), cache);
    for (const arrangement of arrangementsFor(part, roles, aggressor, length)) {
      for (const inductance of slowed === null ? [part.matrices.inductance] : [part.matrices.inductance, slowed]) {
        const guards = inductance === slowed ? 'idle' : slowed === null ? 'ideal' : 'balance';
        const request = { part, inductance, slow: inductance === slowed, length, arrangement, aggressor, duration: edge.duration, repeats: net.repeats?.frequency.value ?? null, receivers: read };
        const { delay, receivers: noises } = solvedLine(request, cache);
        noises.forEach((noise, at) => {
          const known = worst.get(receivers[at]);
          if (known === undefined || counted(known.noise) < counted(noise)) worst.set(receivers[at], { edge, arrangement, guards, model: electricalLength(delay, edge.rise), noise });
        });
      }
    }
  }
  return new Map([...worst].map(([victim, found]) => [victim, { ...found, carried: carriedTo(part, { aggressor, victim }, found.noise) }]));
}

export function isFiniteNoise({ noise }: Pick<Found, 'noise'>): boolean {
  return [noise.nearEnd, noise.farEnd, noise.atReceiver, noise.inBand ?? 0, noise.errorBar].every(Number.isFinite);
}

/** A net is no aggressor to itself, however many of its traces lie in the run. */
export function receiversOf({ read, traces }: Pick<RunPart, 'read' | 'traces'>, aggressor: Trace): readonly number[] {
  return read.filter((index) => isReceiver(traces[index].net) && traces[index].net !== aggressor.net);
}

/** Only a peak budget is filtered by its band here; an rms budget has its own way to count. */
function bandOf(net: Net) {
  return net.band === null || net.toleratesPeak === null ? null : { from: net.band.from.value, to: net.band.to.value };
}

function counted({ inBand, atReceiver }: ReceivedNoise): number {
  return Math.abs(inBand ?? atReceiver);
}

function carriedTo({ matrices }: RunPart, pair: { aggressor: number; victim: number }, noise: ReceivedNoise): number {
  return carriedError(matrices, { ...pair, peak: noise.atReceiver, capacitive: noise.capacitivePart, inductive: noise.inductivePart });
}
