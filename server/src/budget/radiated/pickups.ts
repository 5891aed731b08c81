/**
 * Where a radio field reaches a receiver: each loop that senses it, and each of its traces in a run, with the plane or the
 * return that carries its current back. The field's voltage around that contour stands in series in the receiver's own circuit.
 *
 *   source --R--+--( e )--[ L ]--+-- load        C of a trace half at each end
 *              C/2              C/2
 */
import type { Loop, Net, Place, Project, Run, Shield } from '../../board/model';
import type { Circuit, Drive } from '../../physics/circuit/circuit';
import { loopContour, type Contour, type ContourPoint } from '../../physics/loops/contour';
import { farads, henries, metres, ohms, type Length } from '../../units/quantity';
import { assumptionsInWords, hasUnstatedSource } from '../ends';
import { contourOf } from '../loops/boardLoop';
import type { LoopInductances } from '../loops/loopInductances';
import type { NodeTerm } from '../lumped/lumpedPath';
import { Wiring, type WiredNet } from '../lumped/wiring';
import type { Receiver } from '../receivers';
import type { Roles } from '../roles';
import { runParts, type RunPart } from '../runs/runParts';
import { shieldsOver, underLoop } from '../shields/shielding';
import type { SolveCache } from '../solveCache';

export interface Pickup {
  readonly receiver: Receiver;
  readonly kind: 'loop' | 'run';
  readonly name: string;
  readonly place: Place;
  readonly contour: Contour;
  /** Of the plane that reflects; null without. */
  readonly plane: Length | null;
  readonly variants: readonly PickupCircuit[];
  /** Over the receiver or its loop. */
  readonly shields: readonly Shield[];
  readonly assumptions: readonly string[];
}

/** One way in which what nobody stated can be. */
export interface PickupCircuit {
  readonly circuit: Circuit;
  readonly drives: readonly { readonly drive: Drive; readonly share: number }[];
  readonly terms: readonly NodeTerm[];
}

export interface PickupContext {
  readonly project: Project;
  readonly roles: Roles;
  readonly inductances: LoopInductances;
  readonly cache: SolveCache;
}

export function pickupsOf(receivers: readonly Receiver[], context: PickupContext): readonly Pickup[] {
  const { project, cache } = context;
  const parts = project.runs.map((run) => ({ run, parts: runParts(run, cache).parts }));
  return receivers.flatMap((receiver) => [
    ...project.loops.flatMap((loop) => inLoop(receiver, loop, context)),
    ...parts.flatMap(({ run, parts: all }) => all.flatMap((part) => inRun(receiver, run, part, context))),
  ]);
}

/** Of each net of a receiver, how much of the voltage stands in its way, and what else lies there. */
interface InSeries {
  readonly share: number;
  readonly inductance: number;
  readonly capacitance: number;
}

function inLoop(receiver: Receiver, loop: Loop, { project, roles, inductances }: PickupContext): readonly Pickup[] {
  const numbers = inductances.of(loop);
  const contour = contourOf(numbers);
  if (contour === null || receiver.kind === 'common') return [];
  const own = numbers.own !== null && 'inductance' in numbers.own ? numbers.own.inductance : 0;
  const sensed = receiver.terms.flatMap(({ net }, at): readonly [Net, InSeries][] => {
    if (loop.senses.some(({ signal }) => signal === net)) return [[net, { share: 1, inductance: own, capacitance: 0 }]];
    // A pair's loop lies in the way of both its nets.
    if (receiver.subject.kind !== 'pair' || !loop.senses.some(({ signal }) => signal === receiver.subject)) return [];
    return [[net, { share: (at === 0 ? 1 : -1) / receiver.terms.length, inductance: own / receiver.terms.length, capacitance: 0 }]];
  });
  if (sensed.length === 0) return [];
  const level = contour.form === 'circle' ? contour.centre[2] : contour.points[2];
  const below = numbers.planes.filter((plane) => plane <= level);
  return [{ receiver, kind: 'loop', name: loop.name, place: loop.place, contour, plane: below.length === 0 ? null : metres(Math.max(...below)), shields: shieldsOver(project, [...underLoop(loop), receiver.subject, ...receiver.terms.map(({ net }) => net)]), ...circuitsOf(receiver, new Map(sensed), roles) }];
}

function inRun(receiver: Receiver, run: Run, part: RunPart, { project, roles }: PickupContext): readonly Pickup[] {
  const { section: { planeAbove, planeBelow } } = part;
  // Between two planes no field gets in.
  if (planeAbove && planeBelow) return [];
  const traces = receiver.terms.flatMap(({ net }) => {
    const at = part.traces.findIndex((trace) => trace.net === net);
    return at < 0 || !part.read.includes(at) ? [] : [{ net, at }];
  });
  const [first, second] = traces;
  if (first === undefined) return [];
  const difference = receiver.kind === 'pair' && second !== undefined;
  const ends = difference ? [placeOf(part, first.at), placeOf(part, second.at)] as const : [placeOf(part, first.at), returnOf(part, placeOf(part, first.at))] as const;
  if (ends[1] === null) return [];
  const length = run.length.value;
  const made = loopContour({ form: 'path', points: [point(0, ends[0]), point(length, ends[0]), point(length, ends[1]), point(0, ends[1])] });
  if (!('contour' in made)) return [];
  const { order, inductance, capacitance } = part.matrices;
  const inSeries = new Map(traces.map(({ net, at }, nth) => [net, {
    share: difference ? (nth === 0 ? 0.5 : -0.5) : 1,
    inductance: inductance[at * (order + 1)] * length,
    capacitance: capacitance[at * (order + 1)] * length,
  }]));
  return [{ receiver, kind: 'run', name: run.name, place: part.traces[first.at].whole, contour: made.contour, plane: planeAbove || planeBelow ? metres(0) : null, shields: shieldsOver(project, [receiver.subject, ...receiver.terms.map(({ net }) => net)]), ...circuitsOf(receiver, inSeries, roles) }];
}

interface Across {
  readonly x: number;
  readonly height: number;
}

function point(along: number, { x, height }: Across): ContourPoint {
  return { x: metres(along), y: metres(x), z: metres(height) };
}

/** The middle of a trace, its height over the plane that there is; without one, over the lowest layer. */
function placeOf({ section, conductors, traces }: RunPart, trace: number): Across {
  const { x, y, width, height } = section.conductors[conductors.indexOf(traces[trace])];
  const top = section.layers.reduce((sum, { thickness }) => sum + thickness, 0);
  return { x: x + width / 2, height: section.planeAbove ? top - y - height / 2 : y + height / 2 };
}

/** The image's plane straight below, or the nearest conductor that carries the current back. */
function returnOf({ section }: RunPart, { x, height }: Across): Across | null {
  if (section.planeAbove || section.planeBelow) return { x, height: 0 };
  const references = section.conductors.filter(({ role }) => role === 'reference').map((each) => ({ x: each.x + each.width / 2, height: each.y + each.height / 2 }));
  return references.length === 0 ? null : references.reduce((a, b) => (Math.hypot(b.x - x, b.height - height) < Math.hypot(a.x - x, a.height - height) ? b : a));
}

function circuitsOf({ terms }: Receiver, inSeries: ReadonlyMap<Net, InSeries>, roles: Roles): Pick<Pickup, 'variants' | 'assumptions'> {
  const unstated = terms.some(({ net }) => hasUnstatedSource(roles.get(net)!)) ? (['short', 'open'] as const) : (['none'] as const);
  const variants = unstated.map((assumed): PickupCircuit => {
    const wiring = new Wiring();
    const wired = new Map<Net, WiredNet>();
    const drives: { drive: Drive; share: number }[] = [];
    for (const { net } of terms) {
      const { share, inductance, capacitance } = inSeries.get(net) ?? { share: 0, inductance: 0, capacitance: 0 };
      const made = wiring.net(roles.get(net)!, { moves: false, unstated: assumed, series: [{ resistance: ohms(0), inductance: henries(inductance) }] });
      wired.set(net, made);
      if (0 < capacitance) for (const node of [made.source, made.load]) wiring.shunt(node, 0, { resistance: ohms(Infinity), capacitance: farads(capacitance / 2) });
      if (share !== 0) drives.push({ drive: { kind: 'voltage', branch: made.series[0]! }, share });
    }
    wiring.pairs(wired, roles);
    return { circuit: wiring.circuit(), drives, terms: terms.map(({ net, weight }) => ({ node: wired.get(net)!.load, against: 0, weight })) };
  });
  return { variants, assumptions: assumptionsInWords(terms.map(({ net }) => roles.get(net)!)) };
}
