/**
 * The resolved board: what a project means, immutable, in SI, every value with its place in the text.
 *
 * Invariants. Names are unique and resolved: a net that a run mentions is an object of `nets`, never
 * a word to look up. A value that was not stated is null; defaults and assumptions are made by
 * whoever uses the value (`budget/`), which can then say so. A value that could not be read, or
 * cannot be, is `unreadable`: null in its property and listed in `gaps`, so that a budget which would
 * have needed it knows that it is incomplete. Nothing here depends on the order of declarations, but
 * for stackup rows and the rows of a run. Deliberately absent: findings' texts, physics, protocol.
 */
import type { Area, Angle, Capacitance, Current, CurrentNoiseDensity, Decibels, FieldStrength, Frequency, Inductance, Length, Ratio, Resistance, Temperature, Time, Voltage, VoltageNoiseDensity } from '../units/quantity';
import type { Span } from '../syntax/tree';

/** Where in which file; `path` is the key under which the project holds the file. */
export interface Place {
  readonly path: string;
  readonly span: Span;
}

/** A value as stated. */
export interface Given<Q> {
  readonly value: Q;
  /** Half the width of its band, same unit; 0 where none is stated. */
  readonly tolerance: number;
  /** The quantity itself, unit included: what a fix replaces and a finding underlines. */
  readonly place: Place;
}

export interface Project {
  /** The file that was asked for, and those it uses, directly or not, each once. */
  readonly root: string;
  readonly files: readonly string[];
  readonly board: BoardSettings;
  readonly stackups: readonly Stackup[];
  readonly families: ReadonlyMap<string, Family>;
  readonly nets: ReadonlyMap<string, Net>;
  readonly pairs: ReadonlyMap<string, Pair>;
  readonly runs: readonly Run[];
  readonly loops: readonly Loop[];
  readonly returns: readonly SharedReturn[];
  readonly links: readonly Link[];
  readonly shields: readonly Shield[];
  readonly ambients: readonly Ambient[];
  readonly waivers: readonly Waiver[];
  /** Every `use` of every file. */
  readonly includes: readonly Include[];
  /** What is declared and where it is referred to, by set and name. */
  readonly names: ReadonlyMap<NameSet, ReadonlyMap<string, NameRecord>>;
  /** No `use`, declaration head or property of any file was unreadable. */
  readonly complete: boolean;
  readonly gaps: readonly Gap[];
  readonly errors: readonly BoardError[];
}

export interface Include {
  /** The string after `use`. */
  readonly place: Place;
  /** Key of the file that it names; null where the path leads nowhere. */
  readonly path: string | null;
}

/**
 * Names of one set are unique; the same word in two sets is two things, as a net GND over a plane GND.
 * Nets, pairs and loops share a set, since a shield or a return refers to either by name alone.
 * `conductor` holds the names of guards and of returns in a row, which are declared nowhere.
 */
export type NameSet = 'board' | 'stackup' | 'layer' | 'family' | 'signal' | 'group' | 'run' | 'return' | 'link' | 'shield' | 'ambient' | 'conductor';

export interface NameRecord {
  readonly set: NameSet;
  readonly name: string;
  readonly kind: 'board' | 'stackup' | 'copper' | 'plane' | 'family' | 'net' | 'pair' | 'loop' | 'group' | 'run' | 'return' | 'link' | 'shield' | 'ambient' | 'conductor';
  /** More than one where the name is declared twice; none for built-in families, groups and conductors. */
  readonly declarations: readonly Place[];
  readonly uses: readonly Place[];
  /** Where a waiver names it: no use, but a reference. */
  readonly waivers: readonly Place[];
  /** It also stands in a line that could not be read, so it may be used there. */
  readonly inUnreadable: boolean;
}

/** Something that is written but could not be read. */
export interface Gap {
  /** Names of nets and pairs whose budgets may lack something for it; null: every budget of the project. */
  readonly affects: readonly string[] | null;
  /** `the width of TX in run alley`, to be followed by "could not be read". */
  readonly what: string;
  readonly place: Place;
}

/** A finding about names, values or `use`, made while resolving. Its texts are final. */
export interface BoardError {
  readonly rule: 'syntax' | 'unit' | 'unknown-name' | 'duplicate-name' | 'missing-value' | 'bad-value' | 'include';
  readonly place: Place;
  readonly message: string;
  readonly related: readonly { readonly place: Place; readonly message: string }[];
  readonly corrections: readonly { readonly title: string; readonly place: Place; readonly newText: string }[];
}

export interface Declared {
  readonly name: string;
  /** The name in its declaration. */
  readonly place: Place;
  /** The whole declaration. */
  readonly whole: Place;
  readonly documentation: string | null;
}

export interface BoardSettings {
  readonly name: string | null;
  readonly place: Place | null;
  readonly temperature: Given<Temperature> | null;
  readonly headroom: Given<Decibels> | null;
  readonly combine: 'worst' | 'rss';
  readonly clearance: Given<Length> | null;
  readonly emissionLimits: readonly EmissionLimit[];
}

export interface EmissionLimit {
  readonly field: Given<FieldStrength>;
  readonly distance: Given<Length>;
  readonly from: Given<Frequency>;
  readonly to: Given<Frequency>;
  readonly place: Place;
}

export interface Stackup {
  readonly name: string | null;
  readonly place: Place;
  /** From top to bottom, as written. */
  readonly rows: readonly StackupRow[];
}

export type StackupRow = MaskRow | DielectricRow | CopperRow | PlaneRow;

interface StackupRowBase {
  readonly thickness: Given<Length>;
  readonly place: Place;
  readonly documentation: string | null;
}
export interface MaskRow extends StackupRowBase {
  readonly kind: 'mask';
  readonly er: Given<number>;
  readonly flat: boolean;
}
export interface DielectricRow extends StackupRowBase {
  readonly kind: 'dielectric' | 'core' | 'prepreg';
  readonly er: Given<number>;
}
export interface CopperRow extends StackupRowBase {
  readonly kind: 'copper';
  readonly name: string;
  readonly undercut: Given<Length> | null;
}
export interface PlaneRow extends StackupRowBase {
  readonly kind: 'plane';
  readonly name: string;
}

/** One end of a net: a resistance, a capacitance, or both in parallel. */
export interface End {
  readonly resistance: Given<Resistance> | null;
  readonly capacitance: Given<Capacitance> | null;
  readonly place: Place;
}

export interface Family extends Declared {
  readonly builtIn: boolean;
  /** The family that it `is`. */
  readonly is: string | null;
}

/** What `net` and `pair` have in common, families already applied: a property of a family stands here with its place in the family. */
export interface Signal extends Declared {
  /** `low` is 0 V where one level was stated; `swing` of an edge is high − low, always positive. */
  readonly swing: { readonly low: Voltage; readonly high: Voltage; readonly value: Voltage; readonly tolerance: number; readonly place: Place } | null;
  readonly rise: Given<Time> | null;
  readonly fall: Given<Time> | null;
  readonly source: End | null;
  readonly load: End | null;
  readonly sine: { readonly amplitude: Given<Voltage>; readonly measure: 'rms' | 'peak'; readonly from: Given<Frequency>; readonly to: Given<Frequency> | null; readonly place: Place } | null;
  readonly current: SignalCurrent | null;
  readonly repeats: { readonly frequency: Given<Frequency>; readonly duty: Given<Ratio> | null; readonly place: Place } | null;
  readonly once: boolean;
  readonly bothWays: boolean;
  readonly switchesWith: string | null;
  /** A magnitude: `-48 V dc` is as dangerous as 48 V. */
  readonly working: { readonly voltage: Given<Voltage>; readonly measure: 'dc' | 'rms' | 'peak'; readonly place: Place } | null;
  readonly toleratesPeak: Given<Voltage> | null;
  readonly toleratesRms: Given<Voltage> | null;
  readonly band: { readonly from: Given<Frequency>; readonly to: Given<Frequency>; readonly place: Place } | null;
  readonly noise: { readonly voltage: Given<VoltageNoiseDensity>; readonly current: Given<CurrentNoiseDensity> | null; readonly corner: Given<Frequency> | null; readonly place: Place } | null;
  readonly contact: { readonly index: Given<Decibels>; readonly across: Given<Voltage>; readonly place: Place } | null;
  readonly samples: { readonly delay: Given<Time>; readonly group: string; readonly place: Place } | null;
  readonly length: Given<Length> | null;
  readonly family: string | null;
}

export type SignalCurrent =
  | { readonly form: 'ramp'; readonly amplitude: Given<Current>; readonly rise: Given<Time> | null; readonly place: Place }
  | { readonly form: 'sine'; readonly amplitude: Given<Current>; readonly measure: 'rms' | 'peak'; readonly from: Given<Frequency>; readonly to: Given<Frequency> | null; readonly place: Place };

export interface Net extends Signal {
  readonly kind: 'net';
}

export interface Pair extends Signal {
  readonly kind: 'pair';
  readonly plus: Net | null;
  readonly minus: Net | null;
  readonly across: End | null;
  readonly commonTolerates: { readonly voltage: Given<Voltage>; readonly measure: 'peak' | 'rms' } | null;
  readonly rejects: Given<Decibels> | null;
}

export interface Run extends Declared {
  readonly length: Given<Length>;
  readonly stackup: Stackup;
  /** In the order of the text. Every gap of every row is present; a run of which one is not readable is not in `runs` but in `gaps`. */
  readonly rows: readonly RunRow[];
  /** Names of the planes that are cut away. */
  readonly without: readonly string[];
}

export interface RunRow {
  /** A `copper` row of the run's stackup. */
  readonly layer: CopperRow;
  readonly shift: Given<Length> | null;
  /** From left to right, ranges expanded. */
  readonly conductors: readonly RunConductor[];
  /** Between neighbours: one less than conductors. The gaps of a `spaced` range share one place. */
  readonly gaps: readonly Given<Length>[];
}

export type RunConductor =
  | { readonly kind: 'trace'; readonly net: Net; readonly width: Given<Length>; readonly reversed: boolean; readonly after: Given<Length> | null; readonly place: Place; readonly whole: Place }
  | { readonly kind: 'guard'; readonly name: string; readonly width: Given<Length>; readonly stitched: Given<Length> | null; readonly place: Place; readonly whole: Place }
  | { readonly kind: 'return'; readonly name: string; readonly width: Given<Length>; readonly place: Place; readonly whole: Place };

export interface Loop extends Declared {
  readonly layer: CopperRow | PlaneRow | null;
  readonly stackup: Stackup | null;
  readonly carries: readonly { readonly net: Net; readonly current: SignalCurrent | null; readonly place: Place }[];
  readonly senses: readonly { readonly signal: Net | Pair; readonly place: Place }[];
  readonly shape: LoopShape | null;
  readonly conductor: { readonly form: 'strip' | 'wire'; readonly width: Given<Length> } | null;
  readonly over: readonly PlaneRow[];
  readonly turns: readonly { readonly angle: Given<Angle>; readonly axis: 'x' | 'y' | 'z' }[];
  readonly areaLimit: Given<Area> | null;
  readonly inductanceLimit: Given<Inductance> | null;
}

export interface LoopPoint {
  readonly x: Given<Length>;
  readonly y: Given<Length>;
  readonly z: Given<Length> | null;
}

export type LoopShape =
  | { readonly form: 'rectangle'; readonly width: Given<Length>; readonly height: Given<Length>; readonly at: LoopPoint | null; readonly place: Place }
  | { readonly form: 'circle'; readonly diameter: Given<Length>; readonly at: LoopPoint | null; readonly place: Place }
  | { readonly form: 'path'; readonly points: readonly LoopPoint[]; readonly place: Place }
  | { readonly form: 'trace'; readonly length: Given<Length>; readonly above: PlaneRow; readonly at: LoopPoint | null; readonly place: Place };

export interface SharedReturn extends Declared {
  readonly pieces: readonly ReturnPiece[];
  readonly over: PlaneRow | null;
  readonly carries: readonly { readonly net: Net; readonly place: Place }[];
  readonly refers: readonly { readonly signal: Net | Pair; readonly place: Place }[];
}

export type ReturnPiece =
  | { readonly form: 'strip'; readonly length: Given<Length>; readonly width: Given<Length>; readonly layer: CopperRow; readonly stackup: Stackup; readonly place: Place }
  | { readonly form: 'via'; readonly count: number; readonly drill: Given<Length> | null; readonly length: Given<Length> | null; readonly place: Place }
  | { readonly form: 'measured'; readonly resistance: Given<Resistance>; readonly inductance: Given<Inductance> | null; readonly place: Place };

export interface Link extends Declared {
  readonly from: Net;
  readonly to: Net;
  readonly capacitance: Given<Capacitance> | null;
  readonly mutual: Given<Inductance> | null;
}

export interface Shield extends Declared {
  readonly covers: readonly { readonly subject: Net | Pair | Loop; readonly place: Place }[];
  readonly sheet: { readonly material: string; readonly thickness: Given<Length> } | null;
  readonly slot: Given<Length> | null;
  readonly grounded: boolean | null;
}

export interface Ambient extends Declared {
  readonly field: Given<FieldStrength>;
  readonly from: Given<Frequency>;
  readonly to: Given<Frequency>;
  readonly modulated: Given<Ratio> | null;
}

export interface Waiver {
  readonly rule: string;
  /** The rule's name: rules are known above this room, which cannot say whether it is one. */
  readonly rulePlace: Place;
  /** Names: one after `on`, or all that the declaration around it declares: `net D[0..3] { waive … }`. */
  readonly subjects: readonly string[];
  readonly reason: string;
  readonly place: Place;
}
