/**
 * What the physics says of a project: every number the editor or the command line shows comes from
 * here. Values are SI and nominal; `errorBar` is numerical and relative unless said otherwise.
 */
import type { EmissionLimit, Loop, Net, Pair, Place, Project, Run, RunConductor, SharedReturn, Shield } from '../board/model';
import type { Area, Decibels, DelayPerLength, FieldStrength, Frequency, Inductance, Length, Resistance, Time, Voltage } from '../units/quantity';
import type { SectionMatrices, SectionRefusal } from '../physics/section/section';
import type { Heard } from './heard';
import type { Waveform } from '../physics/lines/lines';

export interface Evaluation {
  readonly project: Project;
  readonly runs: readonly RunResult[];
  /** In the order of the text. */
  readonly loops: readonly LoopResult[];
  readonly returns: readonly ReturnResult[];
  readonly shields: readonly ShieldResult[];
  /** What every source puts on every receiver, by every way. */
  readonly heard: readonly Heard[];
  /** In the order of the text. */
  readonly budgets: readonly Budget[];
  /** Geometry, speed or frequency beyond a model's stated range. */
  readonly limits: readonly ModelLimit[];
  /** What was assumed for ends that are not stated, for each net or pair that it touches. */
  readonly assumedEnds: readonly AssumedEnd[];
  readonly work: WorkDone;
}

/** Counted, so that a test can say that an edit cost only what it changed. */
export interface WorkDone {
  readonly sectionsSolved: number;
  readonly linesSolved: number;
  /** Small circuits: links, loops and shared returns. */
  readonly circuitsSolved: number;
  /** Of loops, their own and mutual ones. */
  readonly inductancesSolved: number;
}

export interface RunResult {
  readonly run: Run;
  /** The traces, left to right, rows top to bottom: the order of the matrices. */
  readonly traces: readonly (RunConductor & { readonly kind: 'trace' })[];
  readonly matrices: SectionMatrices | null;
  /** Why there are no matrices. */
  readonly refusal: SectionRefusal | null;
  /** Of each trace alone, the others at zero potential; empty without matrices. */
  readonly impedance: readonly Resistance[];
  readonly delay: readonly DelayPerLength[];
  readonly couplings: readonly Coupling[];
  /** Guards of which the ties are too far apart for the fastest edge of the run. */
  readonly looseGuards: readonly LooseGuard[];
}

/** Null is what has no value: a contour that is none, a loop without conductor. */
export interface LoopResult {
  readonly loop: Loop;
  readonly area: Area | null;
  readonly perimeter: Length | null;
  readonly inductance: Inductance | null;
  readonly inductanceError: Inductance | null;
  /** For every limit that the board states and that something repeated or a sine in the loop falls into: the worst. */
  readonly emission: readonly EmissionResult[];
  /** With every other loop, made when it is asked for. */
  readonly mutual: readonly MutualResult[];
}

export interface EmissionResult {
  readonly limit: EmissionLimit;
  readonly frequency: Frequency;
  readonly field: FieldStrength;
  readonly marginDb: Decibels | null;
}

export interface ShieldResult {
  readonly shield: Shield;
  /** The highest of the fields from outside and of what moves under it or beside it; null where nothing does. */
  readonly frequency: Frequency | null;
  /** Against a plane wave, at that frequency. */
  readonly effectivenessDb: Decibels | null;
}

export interface MutualResult {
  readonly other: Loop;
  readonly inductance: Inductance;
  readonly errorBar: Inductance;
}

export interface ReturnResult {
  readonly shared: SharedReturn;
  /** At dc. */
  readonly resistance: Resistance;
  readonly inductance: Inductance;
  /** Relative. */
  readonly errorBar: number;
  readonly assumptions: readonly string[];
}

export interface LooseGuard {
  readonly guard: RunConductor & { readonly kind: 'guard' };
  /** Distance between its ties as stated: the stitching, or the length of the run. */
  readonly spacing: Length;
  /** A twentieth of the wavelength at the knee frequency of the fastest edge in the run. */
  readonly largest: Length;
  /** The largest noise that passes its run's loose guards; null where it was not computed with guards as lines. */
  readonly past: PastGuard | null;
}

/** Peaks of one source at one receiver: with guards as they are tied, and as if their ties held. */
export interface PastGuard {
  readonly receiver: string;
  readonly asTied: Voltage;
  readonly stitched: Voltage;
}

/** What one aggressor puts on one victim of a run: the worst of its edges and directions. */
export interface Coupling {
  readonly run: Run;
  readonly aggressor: Net | Pair;
  readonly victim: Net | Pair;
  /** What is read of the victim: a net; of a pair, the difference or the mean. */
  readonly kind: Budget['kind'];
  readonly edge: 'rise' | 'fall' | 'sine';
  readonly model: 'lumped' | 'line';
  /** Signed peaks: at the victim's near and far end of the run, and at its load end. */
  readonly nearEnd: Voltage;
  readonly farEnd: Voltage;
  readonly atReceiver: Voltage;
  /** What the victim's `band` and its moment of sampling leave of the receiver's peak, signed; null where it states none, or tolerates no peak. */
  readonly counted: Voltage | null;
  /** Of a sine: the worst in its range. Its voltages are magnitudes. */
  readonly frequency: Frequency | null;
  /** Null of a sine. */
  readonly peakTime: Time | null;
  readonly widthHalf: Time | null;
  /** Shares of the receiver's peak by the short-line model, signed. */
  readonly capacitivePart: Voltage;
  readonly inductivePart: Voltage;
  /** Absolute, V: of the receiver's peak as it counts in the budget. */
  readonly errorBar: Voltage;
  /** Over the stated tolerances; null until they are carried through. */
  readonly bounds: readonly [Voltage, Voltage] | null;
  /** At the victim's receiver, for pictures; null of a sine. */
  readonly waveform: Waveform | null;
  /** At the victim's ends of the run, and up to when they and that at the receiver were computed. */
  readonly endWaveforms: { readonly near: Waveform; readonly far: Waveform; readonly until: Time } | null;
  readonly assumptions: readonly string[];
}

export type Channel = 'coupled' | 'link' | 'loop' | 'shared return' | 'radiated' | 'thermal' | 'amplifier' | 'flicker' | 'contact';

export interface Contribution {
  readonly channel: Channel;
  /** The aggressor, or null where the noise is the circuit's own. */
  readonly from: string | null;
  /** Contributions of one cause add as magnitudes; causes know nothing of each other. */
  readonly cause: string;
  /** Name of the run, loop, return or link in which it arises. */
  readonly where: string | null;
  readonly place: Place | null;
  /** Nets of one group switch together: their peaks add. */
  readonly group: string | null;
  /** Magnitude, V, peak or rms as the budget's measure. */
  readonly value: Voltage;
  readonly unfiltered: Voltage | null;
  readonly errorBar: Voltage;
  readonly bounds: readonly [Voltage, Voltage] | null;
  readonly method: string;
  readonly assumptions: readonly string[];
  readonly coupling: Coupling | null;
  /** In an rms budget, of what repeats: harmonics of one cause add as magnitudes, each frequency by itself. */
  readonly spectrum: Spectrum | null;
}

/** Volts rms of harmonics of one fundamental, from the one numbered `first`. */
export interface Spectrum {
  readonly fundamental: Frequency;
  readonly first: number;
  readonly rms: Float64Array;
}

export type Verdict = 'pass' | 'low' | 'over' | 'unknown';

export interface Budget {
  readonly subject: Net | Pair;
  readonly kind: 'net' | 'pair' | 'common';
  readonly tolerates: Voltage;
  readonly toleratesPlace: Place;
  readonly measure: 'peak' | 'rms';
  readonly combine: 'worst' | 'rss';
  /** Null where nothing of it could be computed. */
  readonly total: Voltage | null;
  readonly bounds: readonly [Voltage, Voltage] | null;
  readonly errorBar: Voltage | null;
  /** What of the stated tolerances moves the total, and by how much either way; the most first. Empty until they are carried through. */
  readonly movedBy: readonly { readonly what: string; readonly place: Place; readonly share: number; readonly moves: Voltage }[];
  /** Null where incomplete or where the total is zero. */
  readonly marginDb: Decibels | null;
  readonly verdict: Verdict;
  readonly complete: boolean;
  /** What belongs in the budget and is not counted: `the width of TX in run alley could not be read`. */
  readonly unaccounted: readonly Unaccounted[];
  /** Largest first, then by name. */
  readonly contributions: readonly Contribution[];
}

export interface Unaccounted {
  readonly what: string;
  readonly place: Place | null;
}

export interface ModelLimit {
  /** The net or run that it concerns. */
  readonly subject: { readonly kind: string; readonly name: string };
  readonly place: Place;
  /** What is beyond which range: one sentence, with the range. */
  readonly message: string;
}

export interface AssumedEnd {
  readonly net: Net;
  readonly missing: 'source' | 'load';
  /** What was computed with instead: one phrase. */
  readonly assumed: string;
}
