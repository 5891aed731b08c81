/**
 * What a receiver hears over a lumped way: the peak of the worse edge, every sine at the worst frequency of its range, and
 * the rms of what repeats, each the largest of all that nobody stated.
 */
import { circuitTransfer, type Phasor } from '../../physics/circuit/circuitTransfer';
import { circuitWaveforms } from '../../physics/circuit/circuitWaveforms';
import type { Circuit } from '../../physics/circuit/circuit';
import { combinedWaveform, type CombinedTerm } from '../../physics/lines/combine';
import { kneeFrequency } from '../../physics/lines/knee';
import { peakOf } from '../../physics/lines/peak';
import { bandTransfer } from '../../physics/noise/bandTransfer';
import { hertz, seconds, volts, type Frequency, type Time } from '../../units/quantity';
import { countedPeak } from '../countedPeak';
import { rmsOf, type Heard, type HeardPeak, type HeardSine, type HeardSpectrum } from '../heard';
import { bandOf, sampledAfter } from '../receivers';
import { repeatedSpectra } from '../repeatedSpectrum';
import type { SolveCache } from '../solveCache';
import type { Sine } from '../sources';
import { worstOver, type WorstAt } from '../worstOver';
import type { Feed, LumpedPath, NodeTerm, Variant } from './lumpedPath';

export function hearLumped(path: LumpedPath, cache: SolveCache): Heard {
  const { channel, origins, place, source, receiver, method, assumptions } = path;
  const { edge, sines, spectrum } = cache.circuit(pathKey(path), () => solved(path));
  const words = { method, assumptions, coupling: null };
  return {
    channel, source, receiver, origins, place,
    edge: edge === null ? null : { ...edge, ...words },
    sines: sines.map((sine) => ({ ...sine, ...words })),
    spectrum: spectrum === null ? null : { ...spectrum, ...words },
  };
}

/** What a path rests on but for words and places, which `hearLumped` adds. */
export interface SolvedPath {
  readonly edge: Omit<HeardPeak, 'method' | 'assumptions' | 'coupling'> | null;
  readonly sines: readonly Omit<HeardSine, 'method' | 'assumptions' | 'coupling'>[];
  readonly spectrum: Omit<HeardSpectrum, 'method' | 'assumptions' | 'coupling'> | null;
}

function solved(path: LumpedPath): SolvedPath {
  const all = path.variants.map((variant) => ({ edge: heardEdge(path, variant), sines: heardSines(path, variant), spectrum: heardSpectrum(path, variant) }));
  const largest = <Found>(found: readonly (Found | null)[], sizeOf: (each: Found) => number): Found | null => found.reduce((a, b) => (b === null || (a !== null && sizeOf(b) <= sizeOf(a)) ? a : b), null);
  const sines = all[0]?.sines ?? [];
  return {
    edge: largest(all.map(({ edge }) => edge), ({ value }) => value),
    sines: sines.map((_, at) => largest(all.map((each) => each.sines[at]!), ({ value, rms }) => Math.max(value, rms))!),
    spectrum: largest(all.map(({ spectrum }) => spectrum), ({ spectrum }) => rmsOf(spectrum)),
  };
}

/** Everything that enters it, to the last digit. */
function pathKey({ source: { signal }, receiver, variants, valueError }: LumpedPath): string {
  const frequencies = frequenciesOf(variants.flatMap(({ feeds }) => feeds));
  const { leak, toleratesPeak, toleratesRms, subject: { band } } = receiver;
  return JSON.stringify([
    leak, toleratesPeak !== null, toleratesRms !== null, band?.from.value, band?.to.value, sampledAfter(receiver, signal), signal.repeats?.frequency.value, signal.repeats?.duty?.value, valueError,
    variants.map(({ circuit, feeds, terms }) => [frequencies.map((frequency) => written(circuit(frequency))), feeds, terms]),
  ]);
}

/** JSON has no infinity, and a resistance may be one. */
function written({ nodes, shunts, branches, mutuals }: Circuit) {
  return [nodes, shunts.map(({ node, to, resistance, capacitance }) => [node, to, String(resistance), capacitance]), branches, mutuals];
}

/** At which the circuit's resistances are asked for. */
function frequenciesOf(feeds: readonly Feed[]): readonly Frequency[] {
  return [...new Set(feeds.flatMap(({ edges, sines }) => [...(['rise', 'fall'] as const).flatMap((kind) => kneeOf(edges[kind]?.duration ?? null) ?? []), ...sines.flatMap(({ from, to }) => [from, to])]))];
}

/** 10-90 % of a linear ramp is 0.8 of it. */
function kneeOf(duration: Time | null): Frequency | null {
  return duration === null ? null : kneeFrequency(seconds(0.8 * duration));
}

/** All ways in which signs that are not known can fall: of feeds, and of the mean that leaks into a difference. */
function signsOf({ receiver }: LumpedPath, { feeds, terms }: Variant): readonly { readonly feeds: readonly number[]; readonly weights: readonly number[] }[] {
  const either = feeds.some(({ eitherSign }) => eitherSign) && feeds.some(({ eitherSign }) => !eitherSign) ? [1, -1] : [1];
  const leaks = receiver.leak === 0 || terms.length < 2 ? [0] : [receiver.leak, -receiver.leak];
  return either.flatMap((sign) => leaks.map((leak) => ({
    feeds: feeds.map((feed) => feed.sign * (feed.eitherSign ? sign : 1)),
    weights: terms.map(({ weight }) => weight + leak / terms.length),
  })));
}

function heardEdge(path: LumpedPath, variant: Variant): SolvedPath['edge'] {
  const { receiver, source: { signal }, valueError } = path;
  const { feeds, terms } = variant;
  const counting = { band: receiver.toleratesPeak === null ? null : bandOf(receiver), after: sampledAfter(receiver, signal) };
  const until = signal.repeats === null ? seconds(Infinity) : seconds(1 / (2 * signal.repeats.frequency.value));
  let worst: NonNullable<SolvedPath['edge']> | null = null;
  for (const kind of ['rise', 'fall'] as const) {
    const moving = feeds.flatMap((feed, at) => (feed.edges[kind] === null ? [] : [{ feed, at, swing: feed.edges[kind]! }]));
    if (moving.length === 0 || (kind === 'fall' && moving.every(({ feed, swing }) => feed.edges.rise?.duration === swing.duration))) continue;
    const knee = hertz(Math.max(...moving.map(({ swing }) => kneeOf(swing.duration)!)));
    const circuit = variant.circuit(knee);
    const answers = moving.map(({ feed: { drive }, at, swing }) => ({ at, ...circuitWaveforms(circuit, { drive, amplitude: swing.amplitude, duration: swing.duration }, until) }));
    for (const signs of signsOf(path, variant)) {
      const parts = answers.flatMap(({ at, nodes }) => terms.flatMap((term, which) => termWaveforms(term, nodes, signs.feeds[at]! * signs.weights[which]!)));
      const waveform = combinedWaveform(parts);
      const peak = Math.abs(peakOf(waveform).value);
      const counted = countedPeak(waveform, counting);
      const errors = answers.reduce((sum, { errorBar }) => sum + terms.reduce((inner, { node, against, weight }) => inner + Math.abs(weight) * ((errorBar[node - 1] ?? 0) + (errorBar[against - 1] ?? 0)), 0), 0);
      const value = counted === null ? peak : Math.abs(counted);
      const found = { value: volts(value), unfiltered: counted === null ? null : volts(peak), errorBar: volts((peak === 0 ? 0 : value / peak) * (errors + valueError * peak)) };
      if (worst === null || worst.value < found.value) worst = found;
    }
  }
  return worst;
}

/** Node 0 is ground, and stands still. */
function termWaveforms({ node, against }: NodeTerm, nodes: readonly CombinedTerm['waveform'][], factor: number): readonly CombinedTerm[] {
  return [{ node, factor }, { node: against, factor: -factor }].flatMap((each) => (each.node === 0 ? [] : [{ waveform: nodes[each.node - 1]!, factor: each.factor }]));
}

function heardSines(path: LumpedPath, variant: Variant): SolvedPath['sines'] {
  const { receiver, valueError } = path;
  const band = bandOf(receiver);
  return distinctRanges(variant.feeds).map((range) => {
    const amplitudes = variant.feeds.map(({ sines }) => sines.filter(({ from, to }) => from === range.from && to === range.to).reduce((sum, { amplitude }) => sum + amplitude, 0));
    const magnitude = (frequency: Frequency) => magnitudeAt(path, variant, frequency, amplitudes);
    const whole = worstOver(range, magnitude);
    const counted = receiver.toleratesPeak === null || band === null ? null : worstOver(range, (frequency) => magnitude(frequency) * bandTransfer(frequency, band));
    const inside = receiver.toleratesRms === null || band === null ? null : { from: hertz(Math.max(band.from, range.from)), to: hertz(Math.min(band.to, range.to)) };
    const within: WorstAt | null = inside === null || inside.to < inside.from ? null : worstOver(inside, magnitude);
    const value = counted?.magnitude ?? whole.magnitude;
    return {
      value: volts(value), unfiltered: counted === null ? null : volts(whole.magnitude), errorBar: volts((valueError + searchError) * value),
      frequency: whole.frequency, rms: volts((within?.magnitude ?? 0) / Math.SQRT2),
    };
  });
}

/** Of the search for the worst frequency. */
const searchError = 1e-3;

function distinctRanges(feeds: readonly Feed[]): readonly Pick<Sine, 'from' | 'to'>[] {
  return [...new Map(feeds.flatMap(({ sines }) => sines).map(({ from, to }) => [`${from} ${to}`, { from, to }])).values()];
}

function magnitudeAt(path: LumpedPath, variant: Variant, frequency: Frequency, amplitudes: readonly number[]): number {
  const readings = readAt(variant, frequency, variant.feeds.map((_, at) => amplitudes[at] !== 0));
  return Math.max(...signsOf(path, variant).map((signs) => {
    const sum = readings.reduce((all, perTerm, at) => perTerm.reduce((inner, { re, im }, which) => {
      const factor = amplitudes[at]! * signs.feeds[at]! * signs.weights[which]!;
      return { re: inner.re + factor * re, im: inner.im + factor * im };
    }, all), { re: 0, im: 0 });
    return Math.hypot(sum.re, sum.im);
  }));
}

/** For one volt or ampere of every feed that is asked for: each term against what it is read against. */
function readAt({ circuit, feeds, terms }: Variant, frequency: Frequency, asked: readonly boolean[]): readonly (readonly Phasor[])[] {
  const transfer = circuitTransfer(circuit(frequency));
  return feeds.map(({ drive }, at) => {
    // A resonance without loss has no answer: a millionth beside it has one.
    const nodes = asked[at] ? (transfer(drive, frequency) ?? transfer(drive, hertz(frequency * (1 + 1e-6)))) : null;
    const nodeAt = (node: number): Phasor => (node === 0 || nodes === null ? { re: 0, im: 0 } : nodes[node - 1]!);
    return terms.map(({ node, against }) => ({ re: nodeAt(node).re - nodeAt(against).re, im: nodeAt(node).im - nodeAt(against).im }));
  });
}

function heardSpectrum(path: LumpedPath, variant: Variant): SolvedPath['spectrum'] {
  const { receiver, source: { signal }, valueError } = path;
  const band = bandOf(receiver);
  if (receiver.toleratesRms === null || band === null) return null;
  const signs = signsOf(path, variant);
  const asked = variant.feeds.map(({ edges }) => edges.rise !== null);
  const trains = variant.feeds.map(({ edges }, at) => (asked[at] ? edges : null));
  const spectra = repeatedSpectra({ repeats: signal.repeats, trains, signs: signs.map(({ feeds }) => feeds) }, band, {
    at: ({ fundamental, first, last }) => {
      const phasors = variant.feeds.map(() => signs.map(() => ({ real: new Float64Array(last - first + 1), imaginary: new Float64Array(last - first + 1) })));
      for (let n = first; n <= last; n += 1) {
        readAt(variant, hertz(n * fundamental), asked).forEach((perTerm, feed) => signs.forEach(({ weights }, reading) => perTerm.forEach(({ re, im }, which) => {
          phasors[feed]![reading]!.real[n - first]! += weights[which]! * re;
          phasors[feed]![reading]!.imaginary[n - first]! += weights[which]! * im;
        })));
      }
      return phasors;
    },
    largestIn: (range) => signs.map(() => variant.feeds.map((_, at) => worstOver(range, (frequency) => magnitudeAt(path, variant, frequency, variant.feeds.map((__, other) => (other === at ? 1 : 0)))).magnitude)),
  });
  if (spectra === null) return null;
  const found = spectra.reduce((a, b) => (rmsOf(a.spectrum) < rmsOf(b.spectrum) ? b : a));
  return { spectrum: found.spectrum, errorBar: volts(found.errorBar + valueError * rmsOf(found.spectrum)) };
}
