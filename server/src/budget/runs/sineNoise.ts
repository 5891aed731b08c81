/**
 * What a sine of a source in a part of a run puts on those that listen there: the largest of its range of frequencies, of the
 * directions in which it and they are driven, and of what is assumed for sources that nobody stated. For one volt, or one ampere.
 */
import type { CoupledLines } from '../../physics/lines/lines';
import { currentAsVoltage } from '../../physics/lines/currentAsVoltage';
import { electricalLength } from '../../physics/lines/electricalLength';
import { couplingShares } from '../../physics/lines/shares';
import { prepareTransfer, type Drive, type Place, type PreparedTransfer } from '../../physics/lines/transfer';
import { bandTransfer } from '../../physics/noise/bandTransfer';
import type { Reading } from '../../physics/lines/reading';
import { worstTransfer, type FrequencyRange, type WorstReading, type WorstTransfer } from '../../physics/lines/worstTransfer';
import { amperes, hertz, seconds, volts, type Frequency, type Voltage } from '../../units/quantity';
import { bandOf } from '../receivers';
import { sinesOf, type Sine } from '../sources';
import { arrangementsFor, type Arrangement } from './arrangements';
import { slowInductance } from './balancingCurrent';
import { carriedError } from './carriedError';
import { listeners, type PartReceiver, type PartSource } from './partPlayers';
import type { RunPart } from './runParts';
import { lineKeyOf, sideOf } from './solvedLine';
import type { NoiseContext } from './worstNoise';

export interface FoundSine {
  readonly sine: Sine;
  readonly arrangement: Arrangement;
  readonly guards: 'ideal' | 'balance' | 'idle';
  readonly model: ReturnType<typeof electricalLength>;
  readonly frequency: Frequency;
  /** Magnitudes, for an amplitude of one. */
  readonly nearEnd: Voltage;
  readonly farEnd: Voltage;
  readonly atReceiver: Voltage;
  /** What the filter of a peak budget leaves; null where there is none. */
  readonly counted: Voltage | null;
  /** The largest within the band of an rms budget, as an amplitude. */
  readonly withinBand: Voltage;
  readonly capacitivePart: Voltage;
  readonly inductivePart: Voltage;
  /** Relative. */
  readonly errorBar: number;
  /** Nothing damps a resonance in its range, or the range has more than can be followed: losses decide. */
  readonly unresolved: boolean;
}

/** By the index of the part's receiver, in the order of the source's sines. */
export type SinesByReceiver = ReadonlyMap<number, readonly FoundSine[]>;

export function sineNoise(part: RunPart, player: PartSource, receivers: readonly PartReceiver[], { roles, length, cache }: NoiseContext): SinesByReceiver {
  const sines = sinesOf(player.source.signal);
  const heard = sines.length === 0 ? [] : listeners(receivers, player);
  const worst = new Map<number, FoundSine[]>();
  if (heard.length === 0) return worst;
  const moving = player.lines.map(({ index }) => index);
  sines.forEach((sine, nth) => {
    const slowed = slowInductance(part, sine.from, cache);
    for (const arrangement of arrangementsFor(part, roles, moving, length)) {
      for (const inductance of slowed === null ? [part.matrices.inductance] : [part.matrices.inductance, slowed]) {
        const guards = inductance === slowed ? 'idle' : slowed === null ? 'ideal' : 'balance';
        const key = ['sine', sine.drive, sine.from, sine.to, lineKeyOf({ part, slow: inductance === slowed, length, arrangement, moving: player.lines }), ...heard.map((index) => readingKey(receivers[index]))].join(' ');
        const solved = cache.line(key, () => ({ readings: solve({ part, inductance, arrangement, player, sine, length }, heard.map((index) => receivers[index])) }));
        solved.readings.forEach((found, at) => {
          const all = worst.get(heard[at]) ?? [];
          worst.set(heard[at], all);
          if (all[nth] === undefined || sizeOf(all[nth]) < sizeOf({ ...found, counted: found.counted })) all[nth] = { ...found, sine, arrangement, guards };
        });
      }
    }
  });
  return worst;
}

function readingKey(player: PartReceiver): string {
  const band = bandOf(player.receiver);
  return ['reads', player.receiver.leak, player.receiver.toleratesPeak !== null, band?.from, band?.to, ...player.terms.flatMap(({ index, weight }) => [index, weight])].join(' ');
}

function sizeOf({ counted, atReceiver, withinBand }: Pick<FoundSine, 'counted' | 'atReceiver' | 'withinBand'>): number {
  return Math.max(counted ?? atReceiver, withinBand);
}

interface SineRequest {
  readonly part: RunPart;
  readonly inductance: Float64Array;
  readonly arrangement: Arrangement;
  readonly player: PartSource;
  readonly sine: Sine;
  readonly length: NoiseContext['length'];
}

type Solved = Omit<FoundSine, 'sine' | 'arrangement' | 'guards'>;

function solve(request: SineRequest, receivers: readonly PartReceiver[]): readonly Solved[] {
  const { part, inductance, arrangement, player, sine, length } = request;
  const { order, capacitance } = part.matrices;
  const { left, right, leftAcross, rightAcross } = arrangement;
  const lines: CoupledLines = { order, inductance, capacitance, length, left, right, leftAcross, rightAcross };
  const prepared = prepareTransfer(lines);
  const drives = player.lines.map(({ index, sign }): Drive => ({ line: index, end: sideOf(arrangement, index, sine.drive === 'voltage' ? 'source' : 'load'), kind: sine.drive, amplitude: sign }));
  const range = { from: sine.from, to: sine.to };
  return receivers.map((receiver) => received(request, receiver, { lines, prepared, drives, range }));
}

interface Prepared {
  readonly lines: CoupledLines;
  readonly prepared: PreparedTransfer;
  readonly drives: readonly Drive[];
  readonly range: FrequencyRange;
}

function received({ part, arrangement, player }: SineRequest, { receiver, terms }: PartReceiver, { lines, prepared, drives, range }: Prepared): Solved {
  const nearSide = sideOf(arrangement, player.lines[0]!.index, 'source');
  const reading = (place: (index: number) => Place, leak = 0): Reading => terms.map(({ index, weight }) => ({ line: index, place: place(index), factor: weight + leak / terms.length }));
  const load = (index: number): Place => `${sideOf(arrangement, index, 'load')}Termination`;
  const leaks = receiver.leak === 0 || terms.length < 2 ? [0] : [receiver.leak, -receiver.leak];
  const atLoad = leaks.map((leak) => reading(load, leak));
  const over = (within: FrequencyRange, readings: readonly Reading[]): WorstTransfer => worstTransfer(prepared, drives, within, readings);
  const whole = over(range, [reading(() => nearSide), reading(() => (nearSide === 'left' ? 'right' : 'left')), ...atLoad]);
  const [near, far, ...loads] = whole.readings;
  const at = largest(loads);
  const band = bandOf(receiver);
  const counted = receiver.toleratesPeak === null || band === null ? null : largest(over({ ...range, weight: (frequency) => bandTransfer(frequency, band) }, atLoad).readings);
  const inside = receiver.toleratesRms === null || band === null ? null : { from: hertz(Math.max(band.from, range.from)), to: hertz(Math.min(band.to, range.to)) };
  const parts = sharesAt(lines, { arrangement, terms, drives }, at.frequency);
  const relative = Math.max(...player.lines.flatMap(({ index: aggressor }) => terms.map(({ index: victim }) => carriedError(part.matrices, { aggressor, victim, peak: 1, capacitive: parts.capacitive / (at.magnitude || 1), inductive: parts.inductive / (at.magnitude || 1) }))));
  return {
    model: electricalLength(seconds(prepared.system.network.modes.delays[lines.order - 1]), seconds(0.35 / at.frequency)),
    frequency: at.frequency,
    nearEnd: near!.magnitude,
    farEnd: far!.magnitude,
    atReceiver: at.magnitude,
    counted: counted === null ? null : volts(counted.magnitude),
    withinBand: volts(inside === null || inside.to < inside.from ? 0 : largest(over(inside, atLoad).readings).magnitude),
    capacitivePart: volts(parts.capacitive),
    inductivePart: volts(parts.inductive),
    errorBar: relative + transferError,
    unresolved: whole.undamped || !whole.resolved,
  };
}

/** Of the search for the worst frequency: `worstTransfer.ts`, with room for the modes' rounding. */
const transferError = 1e-5;

function largest(readings: readonly WorstReading[]): WorstReading {
  return readings.reduce((a, b) => (a.magnitude < b.magnitude ? b : a));
}

/** The short-line split at the slope that the sine has where it is steepest. */
function sharesAt(lines: CoupledLines, { arrangement, terms, drives }: { arrangement: Arrangement; terms: PartReceiver['terms']; drives: readonly Drive[] }, frequency: Frequency) {
  const duration = seconds(1 / (2 * Math.PI * frequency));
  let [capacitive, inductive] = [0, 0];
  for (const { line, end, kind, amplitude } of drives) {
    const driven = kind === 'voltage' ? { lines, ramp: { line, end, amplitude: volts(1), duration } } : currentAsVoltage(lines, { line, end, amplitude: amperes(1), duration });
    for (const { index, weight } of terms) {
      const shares = couplingShares(driven.lines, driven.ramp, index);
      const { capacitive: byField, inductive: byFlux } = sideOf(arrangement, index, 'load') === end ? shares.near : shares.far;
      capacitive += amplitude * weight * byField;
      inductive += amplitude * weight * byFlux;
    }
  }
  return { capacitive, inductive };
}
