/**
 * The field that a loop emits against the limits of its board: the worst harmonic, or sine, of what repeats in it, for every limit.
 *
 * Formula   rms of a harmonic sqrt(2) |c_n| through the loop's circuit; times bandwidth/repeats where several fall into the receiver's
 *           bandwidth and add in step; times 2 for the ground's reflection up to 1 GHz
 * Source    bandwidths: CISPR 16-1-1 (9 kHz below 30 MHz, 120 kHz to 1 GHz, 1 MHz above), from memory; reflection: common practice of
 *           measuring over a ground plane
 * Range     each loop alone, in free space but for the reflection. Currents on attached cables are not in it
 */
import type { EmissionLimit, Loop, Project } from '../../board/model';
import type { Circuit, Drive } from '../../physics/circuit/circuit';
import { circuitTransfer } from '../../physics/circuit/circuitTransfer';
import { smallLoopEmission } from '../../physics/fields/smallLoopEmission';
import { harmonicRms, harmonicsOf } from '../../physics/noise/harmonics';
import { harmonicsInBand } from '../../physics/noise/rmsThroughTransfer';
import type { FieldSource } from '../../physics/shields/sheet';
import { amperes, decibels, henries, hertz, metres, ohms, ratio, volts, voltsPerMetre, type Frequency } from '../../units/quantity';
import { loadEnd, sourceEnd } from '../ends';
import { currentFeed, voltageFeed } from '../lumped/feeds';
import type { Feed } from '../lumped/lumpedPath';
import type { EmissionResult } from '../results';
import type { Role, Roles } from '../roles';
import { shieldsOver, throughShields, underLoop } from '../shields/shielding';
import type { LoopInductances } from './loopInductances';

export function emissionOf(project: Project, loop: Loop, roles: Roles, inductances: LoopInductances): readonly EmissionResult[] {
  const { measures } = inductances.of(loop);
  if (measures === null || project.board.emissionLimits.length === 0) return [];
  const own = inductances.of(loop).own;
  const currents = loop.carries.flatMap((carried) => currentsOf(roles, carried, own !== null && 'inductance' in own ? own.inductance : 0));
  if (currents.length === 0) return [];
  const shields = shieldsOver(project, underLoop(loop));
  // Nobody states how far off the sheet is. Its loop's radius is the least that this can well be: a sheet further off reflects more.
  const near: FieldSource = { kind: 'magnetic', distance: metres(Math.sqrt(measures.area / Math.PI)) };
  return project.board.emissionLimits.flatMap((limit) => {
    const fields = currents.flatMap((current) => current.linesIn(limit)).map(({ frequency, rms, repeats }) => {
      const { electric } = smallLoopEmission({ current: amperes(rms), area: measures.area, frequency, distance: limit.distance.value });
      const through = throughShields(shields, near, frequency);
      return { frequency, field: voltsPerMetre(electric * through * reflection(frequency) * inStep(frequency, repeats)) };
    });
    if (fields.length === 0) return [];
    const worst = fields.reduce((a, b) => (a.field < b.field ? b : a));
    const margin = 20 * Math.log10(limit.field.value / worst.field);
    return [{ limit, ...worst, marginDb: Number.isFinite(margin) ? decibels(margin) : null }];
  });
}

interface Line {
  readonly frequency: Frequency;
  /** Ampere. */
  readonly rms: number;
  /** Null of a sine, which is one line by itself. */
  readonly repeats: Frequency | null;
}

interface LoopCurrent {
  readonly linesIn: (limit: EmissionLimit) => readonly Line[];
}

/** What a net drives through the loop: stated, or that of the series circuit of its ends and the loop. */
function currentsOf(roles: Roles, { net, current }: Loop['carries'][number], inductance: number): readonly LoopCurrent[] {
  const role = roles.get(net)!;
  const signals = role.sources.length === 0 ? [net] : role.sources.map(({ signal }) => signal);
  return signals.map((signal): LoopCurrent => {
    const stated = current ?? signal.current;
    // A feed is only asked what moves, not where.
    const feed = stated === null ? voltageFeed(signal, noDrive, 1) : currentFeed(signal, noDrive, 1, { current: stated });
    const through = stated === null ? seriesCurrent(role, inductance) : () => 1;
    return { linesIn: ({ from, to }) => linesOf(feed, signal.repeats, { from: from.value, to: to.value }).map((line) => ({ ...line, rms: line.rms * through(line.frequency) })) };
  });
}

const noDrive: Drive = { kind: 'voltage', branch: 0 };

/** Amperes through the loop for one volt of its driver: what arrives at the load, through the load's admittance. */
function seriesCurrent(role: Role, inductance: number): (frequency: Frequency) => number {
  const stated = loadEnd(role, { moves: true, unstated: 'none', characteristic: ohms(NaN) });
  const load = { resistance: ohms(Math.max(stated.resistance, shortest)), capacitance: stated.capacitance };
  const source = sourceEnd(role, { moves: true, unstated: 'none', characteristic: ohms(NaN) });
  const circuit: Circuit = {
    nodes: 2,
    shunts: [{ node: 1, to: 0, resistance: ohms(Infinity), capacitance: source.capacitance }, { node: 2, to: 0, ...load }],
    branches: [{ from: 0, to: 1, resistance: source.resistance, inductance: henries(0) }, { from: 1, to: 2, resistance: ohms(0), inductance: henries(inductance) }],
    mutuals: [],
  };
  const transfer = circuitTransfer(circuit);
  return (frequency) => {
    const nodes = transfer({ kind: 'voltage', branch: 0 }, frequency);
    return nodes === null ? 0 : Math.hypot(nodes[1]!.re, nodes[1]!.im) * Math.hypot(1 / load.resistance, 2 * Math.PI * frequency * load.capacitance);
  };
}

/** Of a load that is a short circuit: its voltage would be nothing to read a current from. */
const shortest = 1e-6;

function linesOf({ edges: { rise, fall }, sines }: Feed, repeats: Loop['carries'][number]['net']['repeats'], range: { readonly from: Frequency; readonly to: Frequency }): readonly Line[] {
  const tones = sines.filter(({ from, to }) => from <= range.to && range.from <= to).flatMap(({ amplitude, from, to }) => within(Math.max(from, range.from), Math.min(to, range.to)).map((frequency): Line => ({ frequency: hertz(frequency), rms: amplitude / Math.SQRT2, repeats: null })));
  if (rise === null || fall === null || repeats === null) return tones;
  const harmonics = harmonicsOf({ swing: volts(rise.amplitude), rise: rise.duration, fall: fall.duration, repeats: repeats.frequency.value, duty: repeats.duty?.value ?? ratio(0.5) }, range.to);
  const { first, last } = harmonicsInBand(harmonics, range);
  const rms = harmonicRms(harmonics);
  return [...tones, ...Array.from({ length: Math.max(0, last - first + 1) }, (_, at): Line => ({ frequency: hertz((first + at) * harmonics.fundamental), rms: rms[first + at - 1]!, repeats: repeats.frequency.value }))];
}

/** Where the circuit resonates within the range, its current is largest between the ends. */
function within(from: number, to: number): readonly number[] {
  const steps = from < to ? Math.ceil(perDecade * Math.log10(to / from)) : 0;
  return [...Array.from({ length: steps }, (_, step) => from * (to / from) ** (step / steps)), to];
}

const perDecade = 48;

function reflection(frequency: Frequency): number {
  return frequency <= reflectedUpTo ? 2 : 1;
}

const reflectedUpTo = 1e9;

/** Lines that fall into the receiver's bandwidth together add in step. */
function inStep(frequency: Frequency, repeats: Frequency | null): number {
  if (repeats === null) return 1;
  const bandwidth = frequency < 30e6 ? 9e3 : frequency <= 1e9 ? 120e3 : 1e6;
  return Math.max(1, bandwidth / repeats);
}
