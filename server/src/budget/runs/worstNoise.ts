/**
 * What one source in a part of a run puts on those that listen there: the worst of its edges, of the directions in
 * which it and they are driven, and of what is assumed for sources that nobody stated.
 */
import type { Run } from '../../board/model';
import { electricalLength } from '../../physics/lines/electricalLength';
import { kneeFrequency } from '../../physics/lines/knee';
import { volts, type Length } from '../../units/quantity';
import { bandOf, sampledAfter } from '../receivers';
import type { Roles } from '../roles';
import type { SolveCache } from '../solveCache';
import { edgesOf, type Edge } from '../sources';
import { arrangementsFor, type Arrangement } from './arrangements';
import { slowInductance } from './balancingCurrent';
import { carriedError } from './carriedError';
import { listeners, type PartReceiver, type PartSource } from './partPlayers';
import type { RunPart } from './runParts';
import { guardLines, type GuardLines } from './guardLines';
import { solvedLine, type Reading, type ReceivedNoise } from './solvedLine';

/** One way to compute a coupling, and what came of it. */
export interface Found {
  readonly edge: Edge;
  readonly arrangement: Arrangement;
  /** Where the edge is too slow for them: whether they carry their balancing current all the same. */
  readonly guards: 'ideal' | 'balance' | 'idle';
  readonly model: ReturnType<typeof electricalLength>;
  /** Guards that were solved as lines, because their ties do not hold at this edge. */
  readonly tied: Pick<GuardLines, 'names' | 'via'> | null;
  /** For a rising edge; for one volt of it where the voltage alone moves. */
  readonly noise: ReceivedNoise;
  /** Of the peak at the receiver, by the cross-section's error bars. */
  readonly carried: number;
}

/** By the index of the part's receiver. */
export type FoundByReceiver = ReadonlyMap<number, Found>;

export interface NoiseContext {
  readonly roles: Roles;
  readonly length: Length;
  readonly cache: SolveCache;
  /** Guards whose ties do not hold are solved as lines of this run; null: all count as if they held. */
  readonly guardsOf: Run | null;
}

export function worstNoise(part: RunPart, player: PartSource, receivers: readonly PartReceiver[], { roles, length, cache, guardsOf }: NoiseContext): FoundByReceiver {
  const { signal } = player.source;
  const heard = listeners(receivers, player);
  const worst = new Map<number, Omit<Found, 'carried'>>();
  if (heard.length === 0) return new Map();
  const readings = heard.map((index) => readingOf(receivers[index], player));
  const moving = player.lines.map(({ index }) => index);
  for (const edge of edgesOf(signal)) {
    const slowed = slowInductance(part, kneeFrequency(edge.rise), cache);
    const asLines = guardsOf === null ? null : guardLines(guardsOf, part, edge.rise, cache);
    // The voltage alone is solved for one volt, so that another swing finds it again.
    const voltage = edge.voltage !== null && edge.current === null ? { ...edge.voltage, amplitude: volts(1) } : edge.voltage;
    for (const arrangement of arrangementsFor(part, roles, moving, length)) {
      for (const inductance of slowed === null ? [part.matrices.inductance] : [part.matrices.inductance, slowed]) {
        const guards = inductance === slowed ? 'idle' : slowed === null ? 'ideal' : 'balance';
        const tied = inductance === slowed || !canBeTied(arrangement) ? null : asLines;
        const request = { part, tied, inductance, slow: inductance === slowed, length, arrangement, moving: player.lines, voltage, current: edge.current, repeats: signal.repeats?.frequency.value ?? null, readings };
        const { delay, readings: noises } = solvedLine(request, cache);
        noises.forEach((noise, at) => {
          const known = worst.get(heard[at]);
          if (known === undefined || countedOf(known.noise) < countedOf(noise)) worst.set(heard[at], { edge, arrangement, guards, tied: tied === null ? null : { names: tied.names, via: tied.via }, model: electricalLength(delay, edge.rise), noise });
        });
      }
    }
  }
  return new Map([...worst].map(([index, found]) => [index, { ...found, carried: carriedTo(part, player, receivers[index], found.noise) }]));
}

/** What joins two ends is not among what lines with ties are solved with. */
function canBeTied({ leftAcross, rightAcross }: Arrangement): boolean {
  return leftAcross.length + rightAcross.length === 0;
}

export function isFiniteNoise({ noise }: Pick<Found, 'noise'>): boolean {
  return [noise.nearEnd, noise.farEnd, noise.atReceiver, noise.counted ?? 0, noise.errorBar].every(Number.isFinite);
}

/** What the found noise is to be multiplied with: volts of the swing, and the sign of the edge, of which a fall is the mirror image. */
export function scaleOf({ kind, voltage, current }: Edge): number {
  return (kind === 'fall' ? -1 : 1) * (voltage !== null && current === null ? voltage.amplitude : 1);
}

function readingOf({ receiver, terms }: PartReceiver, { source: { signal } }: PartSource): Reading {
  return { terms, leak: receiver.leak, band: receiver.toleratesPeak === null ? null : bandOf(receiver), after: sampledAfter(receiver, signal) };
}

function countedOf({ counted, atReceiver }: ReceivedNoise): number {
  return Math.abs(counted ?? atReceiver);
}

function carriedTo({ matrices }: RunPart, { lines }: PartSource, { terms }: PartReceiver, { atReceiver, gross: { capacitive, inductive } }: ReceivedNoise): number {
  const several = 1 < lines.length + terms.length - 1;
  const peak = several ? Math.max(Math.abs(atReceiver), capacitive + inductive) : atReceiver;
  return Math.max(...lines.flatMap(({ index: aggressor }) => terms.map(({ index: victim }) => carriedError(matrices, { aggressor, victim, peak, capacitive, inductive }))));
}
