/**
 * What makes noise on a board: a net that moves, or a pair, which moves its two nets in opposite directions at one moment. A source
 * is one cause: whatever it puts on a receiver, by its voltage and by its current, over one net or both, adds with its sign, in time.
 */
import type { Net, Pair, Project, Signal } from '../board/model';
import { kneeFrequency, rampDuration } from '../physics/lines/knee';
import type { Current, Frequency, Time, Voltage } from '../units/quantity';

export interface Source {
  readonly signal: Net | Pair;
  /** A net of a pair whose other net nobody stated stands alone. */
  readonly moves: readonly Move[];
}

export interface Move {
  readonly net: Net;
  readonly sign: 1 | -1;
}

export interface Edge {
  readonly kind: 'rise' | 'fall';
  /** 10–90 %, of the faster of what moves. */
  readonly rise: Time;
  readonly voltage: Swing<Voltage> | null;
  /** Drawn at the load end in step with the voltage; nobody states its sign. */
  readonly current: Swing<Current> | null;
}

export interface Swing<Q> {
  readonly amplitude: Q;
  /** 0–100 % */
  readonly duration: Time;
}

export interface Sine {
  readonly drive: 'voltage' | 'current';
  /** Volts or amperes, peak. */
  readonly amplitude: number;
  readonly from: Frequency;
  /** The same where it has one frequency. */
  readonly to: Frequency;
}

export function sourcesOf(project: Project): readonly Source[] {
  const ofNets = [...project.nets.values()].filter(isSource).map((net): Source => ({ signal: net, moves: [{ net, sign: 1 }] }));
  const ofPairs = [...project.pairs.values()].filter(isSource).map((pair): Source => ({ signal: pair, moves: movesOf(pair) }));
  return [...ofNets, ...ofPairs.filter(({ moves }) => 0 < moves.length)];
}

function movesOf({ plus, minus }: Pair): readonly Move[] {
  return [...(plus === null ? [] : [{ net: plus, sign: 1 } as const]), ...(minus === null || minus === plus ? [] : [{ net: minus, sign: -1 } as const])];
}

export function isSource(signal: Signal): boolean {
  return signal.swing !== null || signal.sine !== null || signal.current !== null;
}

/** A falling edge as fast as the rising one is its mirror image, and adds nothing. */
export function edgesOf({ swing, rise, fall, current }: Signal): readonly Edge[] {
  const times = { rise: rise?.value ?? null, fall: fall?.value ?? rise?.value ?? null };
  const ramp = current?.form === 'ramp' ? current : null;
  const edges = (['rise', 'fall'] as const).flatMap((kind): Edge[] => {
    const [voltageTime, currentTime] = [swing === null ? null : times[kind], ramp === null ? null : (ramp.rise?.value ?? times[kind])];
    const voltage = voltageTime === null || !(0 < voltageTime) ? null : { amplitude: swing!.value, duration: rampDuration(voltageTime) };
    const drawn = currentTime === null || !(0 < currentTime) ? null : { amplitude: ramp!.amplitude.value, duration: rampDuration(currentTime) };
    if (voltage === null && drawn === null) return [];
    const fastest = Math.min(voltage === null ? Infinity : voltageTime!, drawn === null ? Infinity : currentTime!) as Time;
    return [{ kind, rise: fastest, voltage, current: drawn }];
  });
  return edges.length === 2 && isMirrored(edges[0]!, edges[1]!) ? [edges[0]!] : edges;
}

function isMirrored(rise: Edge, fall: Edge): boolean {
  return rise.voltage?.duration === fall.voltage?.duration && rise.current?.duration === fall.current?.duration;
}

/** What a swing or a ramp of current lacks to move in, and why. */
export function timelessOf({ swing, rise, fall, current }: Signal): readonly { readonly what: string; readonly why: string }[] {
  const missing: { what: string; why: string }[] = [];
  const [up, down] = [rise?.value ?? null, fall?.value ?? null];
  if (swing !== null) {
    if (up === null) missing.push({ what: '`rise`', why: 'it states none' });
    else if (up === 0) missing.push({ what: '`rise`', why: 'it is 0 s' });
    else if (down === 0) missing.push({ what: '`fall`', why: 'it is 0 s' });
  }
  const ramp = current?.form === 'ramp' ? current : null;
  if (ramp !== null && swing === null && !(0 < (ramp.rise?.value ?? up ?? 0))) missing.push({ what: '`rise` of the current', why: 'it states none above 0 s' });
  return missing;
}

export function sinesOf({ sine, current }: Signal): readonly Sine[] {
  const found: Sine[] = [];
  if (sine !== null) found.push({ drive: 'voltage', amplitude: peakOf(sine), from: sine.from.value, to: sine.to?.value ?? sine.from.value });
  if (current?.form === 'sine') found.push({ drive: 'current', amplitude: peakOf(current), from: current.from.value, to: current.to?.value ?? current.from.value });
  return found;
}

function peakOf({ amplitude, measure }: { readonly amplitude: { readonly value: number }; readonly measure: 'rms' | 'peak' }): number {
  return measure === 'rms' ? Math.SQRT2 * amplitude.value : amplitude.value;
}

/** Of the fastest edge or the highest sine: up to where a model has to hold. Null where nothing moves. */
export function highestFrequency(signal: Signal): Frequency | null {
  const all = [...edgesOf(signal).map(({ rise }) => kneeFrequency(rise)), ...sinesOf(signal).map(({ to }) => to)];
  return all.length === 0 ? null : (Math.max(...all) as Frequency);
}
