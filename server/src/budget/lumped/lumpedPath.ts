/**
 * A way from a source to a receiver that is a small circuit: a link, a mutual inductance of loops, a shared return. Linear, so that
 * one description yields the peak of an edge, the size of a sine, and the rms of what repeats.
 */
import type { Place } from '../../board/model';
import type { Circuit, Drive } from '../../physics/circuit/circuit';
import type { Frequency } from '../../units/quantity';
import type { Receiver } from '../receivers';
import type { Channel } from '../results';
import type { Sine, Source, Swing } from '../sources';

export interface LumpedPath {
  readonly channel: Channel;
  /** Names of the links, loops or the return that it leads through. */
  readonly origins: readonly string[];
  readonly place: Place;
  readonly source: Source;
  readonly receiver: Receiver;
  /** Every way in which what nobody stated can be; the largest result counts. */
  readonly variants: readonly Variant[];
  readonly method: string;
  readonly assumptions: readonly string[];
  /** Of what the circuit's values are known to, relative. */
  readonly valueError: number;
}

export interface Variant {
  /** Resistances depend on frequency: of an edge, that of its knee. */
  readonly circuit: (frequency: Frequency) => Circuit;
  readonly feeds: readonly Feed[];
  readonly terms: readonly NodeTerm[];
}

/** What is read is the sum of voltages of nodes against others, each times its weight. */
export interface NodeTerm {
  readonly node: number;
  readonly against: number;
  readonly weight: number;
}

/** What one voltage or one current does to the circuit. All feeds of a path are in step. */
export interface Feed {
  readonly drive: Drive;
  readonly sign: 1 | -1;
  /** Its sign against the other feeds is not known: the larger result counts. */
  readonly eitherSign: boolean;
  readonly edges: { readonly rise: Swing<number> | null; readonly fall: Swing<number> | null };
  readonly sines: readonly Sine[];
}
