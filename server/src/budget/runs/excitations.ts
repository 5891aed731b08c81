/**
 * What a run is computed with: which nets move and how, in which directions, and what each line then ends in.
 *
 *   left end                                 right end        a trace is laid source to load from left to
 *   source -[ lead ]-- run -- [ lead ]- load                  right unless it is `reversed`; a net that is
 *                                                             `both ways` is also driven from its load end
 */
import type { Net } from '../../board/model';
import { rampDuration } from '../../physics/lines/knee';
import type { Termination } from '../../physics/lines/lines';
import { seconds, type Length, type Time } from '../../units/quantity';
import { hasUnstatedSource, loadEnd, sourceEnd, type UnstatedSource } from '../ends';
import type { RunPart, Trace } from './runParts';
import type { Role, Roles } from '../roles';

export interface Edge {
  readonly kind: 'rise' | 'fall';
  /** 10–90 % */
  readonly rise: Time;
  /** 0–100 % */
  readonly duration: Time;
}

/** A falling edge as fast as the rising one is its mirror image, and adds nothing. */
export function edgesOf(net: Net): readonly Edge[] {
  const rise = net.rise?.value ?? null;
  const fall = net.fall?.value ?? rise;
  const edges: Edge[] = [];
  if (rise !== null && 0 < rise) edges.push({ kind: 'rise', rise, duration: rampDuration(rise) });
  if (fall !== null && 0 < fall && fall !== rise) edges.push({ kind: 'fall', rise: fall, duration: rampDuration(fall) });
  return edges;
}

/** One way in which the ends of a run's lines can stand. */
export interface Arrangement {
  readonly left: readonly Termination[];
  readonly right: readonly Termination[];
  /** Of trace i: its driver, or what listens for it, is at the left. */
  readonly sourceAtLeft: readonly boolean[];
}

/** Every arrangement in which this aggressor has to be computed: its directions, the others', and the unstated sources. */
export function arrangementsFor(part: RunPart, roles: Roles, aggressor: number, length: Length): readonly Arrangement[] {
  const others = part.traces.filter((trace) => trace.net !== part.traces[aggressor].net);
  const unstated: readonly UnstatedSource[] = others.some((trace) => hasUnstatedSource(roleOf(roles, trace))) ? ['short', 'open'] : ['none'];
  const own = part.traces[aggressor].net.bothWays ? [false, true] : [false];
  // All others at once: every pair of directions of an aggressor and a receiver is among the four.
  const theirs = others.some((trace) => trace.net.bothWays) ? [false, true] : [false];
  return unstated.flatMap((source) => own.flatMap((turned) => theirs.map((othersTurned) => arrangement(part, roles, { aggressor, turned, othersTurned, unstated: source, length }))));
}

interface Choice {
  readonly aggressor: number;
  readonly turned: boolean;
  readonly othersTurned: boolean;
  readonly unstated: UnstatedSource;
  readonly length: Length;
}

function arrangement(part: RunPart, roles: Roles, choice: Choice): Arrangement {
  const left: Termination[] = [];
  const right: Termination[] = [];
  const sourceAtLeft: boolean[] = [];
  part.traces.forEach((trace, index) => {
    const role = roleOf(roles, trace);
    const { impedance, delay } = part.alone[index];
    const condition = { moves: index === choice.aggressor, unstated: choice.unstated, characteristic: impedance };
    const turned = trace.net.bothWays && (trace.net === part.traces[choice.aggressor].net ? choice.turned : choice.othersTurned);
    const leads = leadsOf(trace, choice.length);
    const at = (lead: number) => (0 < lead ? { impedance, delay: seconds(lead * delay) } : null);
    // Leads lie where the copper is; a net driven from its other end swaps what ends it, not where it lies.
    const ends = [sourceEnd(role, condition), loadEnd(role, condition)];
    const first = { ...ends[turned ? 1 : 0], lead: at(leads.before) };
    const second = { ...ends[turned ? 0 : 1], lead: at(leads.after) };
    left.push(trace.reversed ? second : first);
    right.push(trace.reversed ? first : second);
    sourceAtLeft.push(trace.reversed === turned);
  });
  return { left, right, sourceAtLeft };
}

/** Of a net's routed length, what lies between its source and the run, and beyond the run. */
export function leadsOf(trace: Trace, length: Length): { readonly before: number; readonly after: number } {
  const outside = Math.max(0, (trace.net.length?.value ?? 0) - length);
  if (trace.after === null) return { before: outside / 2, after: outside / 2 };
  return { before: trace.after.value, after: Math.max(0, outside - trace.after.value) };
}

export function roleOf(roles: Roles, trace: Trace): Role {
  const role = roles.get(trace.net);
  if (role === undefined) throw new Error(`net ${trace.net.name} of a run is not a net of its project`);
  return role;
}
