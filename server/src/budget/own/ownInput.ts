/**
 * Noise of what a receiver listens through (`noise`): white as `amplifier`, what rises towards low frequencies as `flicker`.
 *
 * A pair's voltage noise stands between its inputs, as one of a differential amplifier is stated; half of its mean square is taken to
 * arise in each, which also says what the mean has of it. A pair that states no noise listens through the inputs of its nets.
 */
import type { Net, Pair } from '../../board/model';
import { inputNoise, type NoisyInput } from '../../physics/noise/inputNoise';
import type { Band } from '../../physics/noise/receiverBand';
import { inText } from '../../units/inText';
import { currentNoiseDensity, hertz, voltageNoiseDensity } from '../../units/quantity';
import type { Receiver } from '../receivers';
import type { Unaccounted } from '../results';
import type { SolveCache } from '../solveCache';
import { keptNoise } from './keptNoise';
import type { OwnCircuits } from './ownCircuits';
import { largestNoise, type OwnChannel, type OwnNoise } from './ownContribution';

export interface OwnCounted {
  readonly noises: readonly OwnNoise[];
  readonly lacking: readonly Unaccounted[];
}

export function ownInput(receiver: Receiver, circuits: OwnCircuits, { band, cache }: { readonly band: Band | null; readonly cache: SolveCache }): OwnCounted {
  const stating = statingNoise(receiver);
  if (stating.length === 0) return { noises: [], lacking: [] };
  if (band === null) return { noises: [], lacking: [{ what: `the noise of its input is not counted: ${receiver.subject.name} has no \`band\``, place: stating[0]!.noise.place }] };
  const endless = band.from === 0 ? stating.filter(({ noise: { corner } }) => corner !== null && 0 < corner.value) : [];
  const inputs = noisyInputs(receiver, stating).map((input) => (0 < endless.length ? { ...input, corner: hertz(0) } : input));
  const largest = keptNoise(circuits, ['input', inputs, band], cache, () => {
    const found = circuits.readings.map((reading) => inputNoise(reading, inputs, band));
    return { white: largestNoise(found.map(({ white }) => white)), flicker: largestNoise(found.map(({ flicker }) => flicker)) };
  });
  const words = [...circuits.assumptions, ...assumedOf(receiver, stating)];
  const white = counted(receiver, { channel: 'amplifier', noise: largest.white, words, band });
  const flicker = counted(receiver, { channel: 'flicker', noise: largest.flicker, words, band });
  return {
    noises: [...white.noises, ...flicker.noises],
    lacking: [
      ...white.lacking, ...flicker.lacking,
      ...endless.slice(0, 1).map(({ noise }) => ({ what: `the flicker noise of its input is not counted: it has no end towards 0 Hz, where the band of ${receiver.subject.name} begins`, place: noise.place })),
    ],
  };
}

type Noise = NonNullable<Net['noise']>;

/** Nets or the pair that state one: the pair's own comes before those of its nets. */
interface Stating {
  readonly signal: Net | Pair;
  readonly noise: Noise;
}

function statingNoise({ subject, terms }: Receiver): readonly Stating[] {
  const own = subject.noise === null ? [] : [{ signal: subject, noise: subject.noise }];
  return 0 < own.length ? own : terms.flatMap(({ net }) => (net.noise === null ? [] : [{ signal: net, noise: net.noise }]));
}

function noisyInputs({ subject, terms }: Receiver, stating: readonly Stating[]): readonly NoisyInput[] {
  return stating.flatMap(({ signal, noise: { voltage, current, corner } }) => {
    const inputs = terms.flatMap(({ net }, at) => (signal === subject || signal === net ? [at + 1] : []));
    return inputs.map((node): NoisyInput => ({
      node,
      voltage: voltageNoiseDensity(voltage.value / Math.sqrt(inputs.length)),
      current: current?.value ?? currentNoiseDensity(0),
      corner: corner?.value ?? hertz(0),
    }));
  });
}

function assumedOf({ subject, kind }: Receiver, stating: readonly Stating[]): readonly string[] {
  const current = stating.some(({ noise }) => noise.current !== null) ? ['the current noises of its two inputs are unrelated, and each as stated'] : [];
  if (kind === 'net') return [];
  if (stating[0]!.signal !== subject) return ['it states no `noise`: each of its nets has that of its own input', ...current];
  return [kind === 'pair' ? 'the stated voltage noise stands between its two inputs' : 'the stated voltage noise stands between its two inputs, and half of its mean square arises in each', ...current];
}

interface Kind {
  readonly channel: OwnChannel;
  readonly noise: OwnNoise['noise'] | null;
  readonly words: readonly string[];
  readonly band: Band;
}

function counted({ subject }: Receiver, { channel, noise, words, band }: Kind): OwnCounted {
  if (noise === null || noise.rms === 0) return { noises: [], lacking: [] };
  if (!(noise.rms < Infinity)) return { noises: [], lacking: [{ what: `the current noise of its input is not counted: at ${inText(band.from, 'frequency')}, where its band begins, no resistance holds ${subject.name}`, place: subject.noise?.place ?? null }] };
  const method = channel === 'amplifier' ? 'voltage and current noise of its input over the band' : 'noise of its input that rises below the corner, over the band';
  return { noises: [{ channel, noise, method, assumptions: words }], lacking: [] };
}
