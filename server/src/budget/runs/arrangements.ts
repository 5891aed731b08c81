/**
 * What a run is computed with: which nets move and how, in which directions, and what each line then ends in.
 *
 *   left end                                 right end        a trace is laid source to load from left to
 *   source -[ lead ]-- run -- [ lead ]- load                  right unless it is `reversed`; a net that is
 *                                                             `both ways` is also driven from its load end
 */
import type { Net } from '../../board/model';
import type { Across, Termination } from '../../physics/lines/lines';
import { farads, ohms, seconds, type Length } from '../../units/quantity';
import { hasUnstatedSource, loadEnd, sourceEnd, type UnstatedSource } from '../ends';
import type { Role, Roles } from '../roles';
import type { RunPart, Trace } from './runParts';

/** One way in which the ends of a run's lines can stand. */
export interface Arrangement {
  readonly left: readonly Termination[];
  readonly right: readonly Termination[];
  /** Between the nets of a pair, at their receiving ends. */
  readonly leftAcross: readonly Across[];
  readonly rightAcross: readonly Across[];
  /** Of trace i: its driver, or what listens for it, is at the left. */
  readonly sourceAtLeft: readonly boolean[];
}

/** Every arrangement in which what moves these lines has to be computed: its directions, the others', and the unstated sources. */
export function arrangementsFor(part: RunPart, roles: Roles, moving: readonly number[], length: Length): readonly Arrangement[] {
  const movingNets = new Set(moving.map((index) => part.traces[index].net));
  const others = part.traces.filter(({ net }) => !movingNets.has(net)).map((trace) => roleOf(roles, trace));
  const unstated: readonly UnstatedSource[] = others.some(hasUnstatedSource) ? ['short', 'open'] : ['none'];
  const own = moving.some((index) => roleOf(roles, part.traces[index]).bothWays) ? [false, true] : [false];
  // All others at once: every pair of directions of a source and a receiver is among the four.
  const theirs = others.some(({ bothWays }) => bothWays) ? [false, true] : [false];
  return unstated.flatMap((source) => own.flatMap((turned) => theirs.map((othersTurned) => arrangement(part, roles, { moving, movingNets, turned, othersTurned, unstated: source, length }))));
}

interface Choice {
  readonly moving: readonly number[];
  readonly movingNets: ReadonlySet<Net>;
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
    const condition = { moves: choice.moving.includes(index), unstated: choice.unstated, characteristic: impedance };
    const turned = role.bothWays && (choice.movingNets.has(trace.net) ? choice.turned : choice.othersTurned);
    const leads = leadsOf(trace, role, choice.length);
    const at = (lead: number) => (0 < lead ? { impedance, delay: seconds(lead * delay) } : null);
    // Leads lie where the copper is; a net driven from its other end swaps what ends it, not where it lies.
    const ends = [sourceEnd(role, condition), loadEnd(role, condition)];
    const first = { ...ends[turned ? 1 : 0], lead: at(leads.before) };
    const second = { ...ends[turned ? 0 : 1], lead: at(leads.after) };
    left.push(trace.reversed ? second : first);
    right.push(trace.reversed ? first : second);
    sourceAtLeft.push(trace.reversed === turned);
  });
  const across = acrossPairs(part.traces, roles);
  // Where the nets of a pair are laid against each other, no resistor of one end joins them: each listens at its own.
  const listensAt = (atLeft: boolean) => across.filter(({ first, second }) => sourceAtLeft[first] === !atLeft && sourceAtLeft[second] === !atLeft);
  return { left, right, leftAcross: listensAt(true), rightAcross: listensAt(false), sourceAtLeft };
}

function acrossPairs(traces: readonly Trace[], roles: Roles): readonly Across[] {
  return traces.flatMap(({ net }, first): readonly Across[] => {
    const pair = roles.get(net)?.pair ?? null;
    if (pair === null || pair.across === null || pair.plus !== net) return [];
    const nth = traces.slice(0, first).filter((other) => other.net === net).length;
    const second = traces.flatMap((other, index) => (other.net === pair.minus ? [index] : []))[nth];
    const { resistance, capacitance } = pair.across;
    return second === undefined ? [] : [{ first, second, resistance: resistance?.value ?? ohms(Infinity), capacitance: capacitance?.value ?? farads(0) }];
  });
}

/** Of a net's routed length, what lies between its source and the run, and beyond the run. */
export function leadsOf(trace: Trace, role: Role, length: Length): { readonly before: number; readonly after: number } {
  const outside = Math.max(0, role.length - length);
  if (trace.after === null) return { before: outside / 2, after: outside / 2 };
  return { before: trace.after.value, after: Math.max(0, outside - trace.after.value) };
}

export function roleOf(roles: Roles, trace: Trace): Role {
  const role = roles.get(trace.net);
  if (role === undefined) throw new Error(`net ${trace.net.name} of a run is not a net of its project`);
  return role;
}
