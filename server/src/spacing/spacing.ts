/**
 * What layout needs before it starts: for each noisy and each sensitive net on each layer, how long they may run side by side at a
 * given gap, and which gap a given length needs. Every number is seen to meet the budget, in a run of its own that holds nothing
 * but the two nets, with what else already reaches the receiver.
 */
import type { CopperRow, Net, Project, Stackup } from '../board/model';
import type { Budget, Contribution, Evaluation } from '../budget/results';
import { isSource } from '../budget/sources';
import type { SolveCache } from '../budget/solveCache';
import { totalOf } from '../budget/totals';
import { insulationMatters } from '../rules/touchLimits';
import { metres, volts, type Length, type Voltage } from '../units/quantity';
import { putBeside, type SideBySide } from './candidate';
import { longestRun, smallestGap, type Found } from './solveDistance';

export interface SpacingOptions {
  readonly gaps: readonly Length[];
  readonly lengths: readonly Length[];
  /** For both nets; null takes what the runs of the board use. */
  readonly width: Length | null;
  /** What the runs of the board already put on a receiver is taken off its budget as well. */
  readonly placed: boolean;
  readonly only: { readonly layer: string | null; readonly from: string | null; readonly to: string | null };
}

export interface SpacingRow {
  readonly layer: CopperRow;
  /** Names of nets that are alike in all that counts here. */
  readonly from: readonly string[];
  readonly to: readonly string[];
  readonly budget: Budget;
  readonly widths: readonly [Length, Length];
  /** What is left of the budget for this one source, V; with the headroom taken off, and what comes from elsewhere. */
  readonly room: Voltage;
  /** One for each of the gaps asked for. */
  readonly longest: readonly Found[];
  /** One for each of the lengths asked for. */
  readonly smallest: readonly Found[];
}

/** Why a pair of nets has no numbers. */
export interface LeftOut {
  readonly names: readonly string[];
  readonly why: 'insulation' | 'incomplete';
}

export interface Spacing {
  readonly rows: readonly SpacingRow[];
  readonly leftOut: readonly LeftOut[];
}

/** Yields before each row, so that whoever waits can be told how far it is. */
export function* spacingOf({ project, budgets, runs }: Evaluation, cache: SolveCache, options: SpacingOptions): Generator<{ readonly done: number; readonly of: number }, Spacing> {
  const listening = budgets.filter((budget): budget is Budget & { subject: Net } => budget.kind === 'net' && fits(options.only.to, budget.subject.name));
  const insulated = new Set([...project.nets.values()].filter((net) => insulationMatters(net, project)));
  const sources = [...project.nets.values()].filter((net) => isSource(net) && !insulated.has(net) && fits(options.only.from, net.name));
  const incomplete = listening.filter(({ complete, subject }) => !complete && !insulated.has(subject));
  const usable = listening.filter(({ complete, subject }) => complete && !insulated.has(subject));
  const width = widthOf(runs.map(({ run }) => run));
  const pairs = new Set([...project.pairs.values()].flatMap(({ plus, minus }) => [plus, minus]));
  const key = (net: Net) => (pairs.has(net) ? net.name : electricalKey(net));
  const sourcesAlike = alike(sources, (net) => `${key(net)} ${width(net)}`);
  const budgetsAlike = alike(usable, (budget) => `${key(budget.subject)} ${width(budget.subject)} ${upperEnd(elsewhereOf(budget, options, null), budget)} ${budget.measure}${options.placed ? budget.subject.name : ''}`);
  const wanted = layersOf(project, options.only.layer).flatMap((on) => budgetsAlike.flatMap((receivers) => sourcesAlike.flatMap((noisy) => {
    const pair = receivers.flatMap((budget) => noisy.filter((net) => net !== budget.subject).map((net) => ({ from: net, budget })))[0];
    return pair === undefined ? [] : [{ ...on, ...pair, names: { from: noisy.map(({ name }) => name), to: receivers.map(({ subject }) => subject.name) } }];
  })));
  const rows: SpacingRow[] = [];
  for (const { budget, names, ...beside } of wanted) {
    yield { done: rows.length, of: wanted.length };
    const widths = [options.width ?? width(beside.from), options.width ?? width(budget.subject)] as const;
    rows.push({ ...rowOf(project, cache, { ...beside, to: budget.subject, widths, budget, options }), ...names });
  }
  const leftOut: LeftOut[] = [{ names: [...insulated].filter((net) => isSource(net) || listening.some(({ subject }) => subject === net)).map(({ name }) => name), why: 'insulation' }, { names: [...new Set(incomplete.map(({ subject }) => subject.name))], why: 'incomplete' }];
  return { rows, leftOut: leftOut.filter(({ names }) => 0 < names.length) };
}

/** All that is said of a net, but for where it is said, and its name. */
const electricalKey = (net: Net) => JSON.stringify(net, (key, value: unknown) => (['name', 'place', 'whole', 'documentation', 'family', 'group', 'switches', 'tolerance'].includes(key) ? undefined : value));

function alike<Thing>(things: readonly Thing[], key: (thing: Thing) => string): readonly (readonly Thing[])[] {
  const found = new Map<string, Thing[]>();
  for (const thing of things) found.set(key(thing), [...(found.get(key(thing)) ?? []), thing]);
  return [...found.values()];
}

/** What is there whatever the runs are; what the runs of other sources make as well, where those are placed. */
function elsewhereOf({ contributions }: Budget, { placed }: SpacingOptions, from: string | null): readonly Contribution[] {
  return contributions.filter((each) => each.channel !== 'coupled' || (placed && each.from !== from));
}

const fits = (wanted: string | null, name: string) => wanted === null || wanted === name;

function layersOf({ stackups }: Project, only: string | null): readonly { readonly stackup: Stackup; readonly layer: CopperRow }[] {
  return stackups.flatMap((stackup) => stackup.rows.filter((row): row is CopperRow => row.kind === 'copper' && fits(only, row.name)).map((layer) => ({ stackup, layer })));
}

/** A net's own width where it runs, else one that is common on the board. */
function widthOf(runs: Evaluation['runs'][number]['run'][]): (net: Net) => Length {
  const traces = runs.flatMap(({ rows }) => rows.flatMap(({ conductors }) => conductors.flatMap((each) => (each.kind === 'trace' ? [each] : []))));
  const sorted = traces.map((trace) => trace.width.value).sort((a, b) => a - b);
  const common = sorted[sorted.length >> 1] ?? metres(0.15e-3);
  return (net) => traces.find((trace) => trace.net === net)?.width.value ?? common;
}

function rowOf(project: Project, cache: SolveCache, { budget, options, ...beside }: SideBySide & { readonly budget: Budget; readonly options: SpacingOptions }): Omit<SpacingRow, 'from' | 'to'> {
  const elsewhere = elsewhereOf(budget, options, beside.from.name);
  const allowed = budget.tolerates / 10 ** ((project.board.headroom?.value ?? 0) / 20);
  /** Logarithm of what there is over what is wanted, error bars and all; NaN where it has no number. */
  const inDirection = (gap: number, length: number, reversed: boolean) => {
    const put = putBeside(project, cache, budget, { ...beside, gap, length, reversed });
    return put === null ? NaN : Math.log(upperEnd([...elsewhere, ...put], budget) / allowed);
  };
  // One direction is the worse nearly everywhere: the search takes that, and what it finds is seen to do in both.
  const isWorseReversed = inDirection(options.gaps[0] ?? 0.2e-3, usual, false) < inDirection(options.gaps[0] ?? 0.2e-3, usual, true);
  const excess: Excess = { near: (gap, length) => inDirection(gap, length, isWorseReversed), sure: (gap, length) => Math.max(inDirection(gap, length, false), inDirection(gap, length, true)) };
  const isHopeless = allowed < upperEnd(elsewhere, budget);
  const none: Found = { kind: 'none' };
  const longestPossible = Math.min(...[beside.from, beside.to].map(({ length }) => length?.value ?? Infinity), longestCounted);
  const { layer, widths } = beside;
  const isSteady = beside.from.sine === null;
  return {
    layer, widths, budget,
    room: volts(roomBeside(upperEnd(elsewhere, budget), allowed, budget.combine)),
    longest: options.gaps.map((gap) => (isHopeless ? none : longestRun({ near: (length) => excess.near(gap, length), sure: (length) => excess.sure(gap, length) }, longestPossible, isSteady))),
    smallest: options.lengths.map((length) => (isHopeless ? none : smallestGap({ near: (gap) => excess.near(gap, length), sure: (gap) => excess.sure(gap, length) }, clearanceOf(project)))),
  };
}

interface Excess {
  readonly near: (gap: number, length: number) => number;
  readonly sure: (gap: number, length: number) => number;
}

/** A length of run that is nothing special, m. */
const usual = 10e-3;

/** As far as a board goes, m. */
const longestCounted = 1;

function upperEnd(contributions: readonly Contribution[], { combine }: Budget): number {
  const { total, errorBar } = totalOf(contributions, combine);
  return total + errorBar;
}

function roomBeside(taken: number, allowed: number, combine: Budget['combine']): number {
  if (allowed <= taken) return 0;
  return combine === 'worst' ? allowed - taken : Math.sqrt(allowed ** 2 - taken ** 2);
}

/** What the fabricator makes; the language's default where the board states none, m. */
export function clearanceOf({ board }: Project): number {
  return board.clearance?.value ?? 0.1e-3;
}
