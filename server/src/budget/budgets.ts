/**
 * The budget of each receiver: every contribution with where it arises, their total, the margin to what is
 * tolerated, and the verdict. A budget that lacks something has no margin, and is over or unknown,
 * never within.
 */
import type { Given, Project } from '../board/model';
import { decibels, type Decibels, type Voltage } from '../units/quantity';
import { contributionsOf } from './contributions';
import type { Heard } from './heard';
import { ownNoise } from './ownNoise';
import type { Pickup } from './radiated/pickups';
import { radiatedNoise } from './radiated/radiatedNoise';
import type { Receiver } from './receivers';
import type { Budget, Contribution, Unaccounted, Verdict } from './results';
import type { Roles } from './roles';
import type { SolveCache } from './solveCache';
import { totalOf } from './totals';
import { unreadFor } from './unread';

export interface Channels {
  readonly heard: readonly Heard[];
  readonly lacking: readonly { readonly receiver: Receiver; readonly unaccounted: Unaccounted }[];
}

interface Solving {
  readonly cache: SolveCache;
  /** Where fields from outside reach the receivers. */
  readonly pickups: readonly Pickup[];
}

/** In the order of the text: files as they are used, then places. */
export function budgetsOf(project: Project, roles: Roles, receivers: readonly Receiver[], channels: Channels & Solving): readonly Budget[] {
  const heard = byReceiver(channels.heard, (each) => each);
  const lacking = byReceiver(channels.lacking, ({ unaccounted }) => unaccounted);
  const pickups = byReceiver(channels.pickups, (each) => each);
  const budgets = receivers.flatMap((receiver) => receiverBudgets(project, roles, receiver, { cache: channels.cache, pickups: pickups.get(receiver) ?? [], heard: heard.get(receiver) ?? [], lacking: lacking.get(receiver) ?? [] }));
  const files = new Map(project.files.map((path, index) => [path, index]));
  const rank = ({ subject: { place } }: Budget) => files.get(place.path) ?? files.size;
  return budgets.sort((a, b) => rank(a) - rank(b) || a.subject.place.span.start - b.subject.place.span.start);
}

function byReceiver<Each extends { readonly receiver: Receiver }, Value>(all: readonly Each[], valueOf: (each: Each) => Value): ReadonlyMap<Receiver, readonly Value[]> {
  const found = new Map<Receiver, Value[]>();
  for (const each of all) {
    const known = found.get(each.receiver);
    if (known === undefined) found.set(each.receiver, [valueOf(each)]);
    else known.push(valueOf(each));
  }
  return found;
}

interface ReceiverChannels extends Solving {
  readonly heard: readonly Heard[];
  readonly lacking: readonly Unaccounted[];
}

function receiverBudgets(project: Project, roles: Roles, receiver: Receiver, { cache, pickups, heard, lacking }: ReceiverChannels): readonly Budget[] {
  const unread = unreadFor(project, receiver);
  return (['peak', 'rms'] as const).flatMap((measure) => {
    const tolerates = measure === 'peak' ? receiver.toleratesPeak : receiver.toleratesRms;
    if (tolerates === null) return [];
    const counted = contributionsOf(heard, measure);
    const own = ownNoise({ project, roles, cache }, receiver, measure);
    const fields = radiatedNoise(project.ambients, pickups, receiver, measure, cache);
    return [budgetOf(project, receiver, {
      measure,
      tolerates,
      contributions: [...counted.contributions, ...fields.contributions, ...own.contributions],
      unaccounted: once([...lacking, ...unread, ...counted.lacking, ...fields.lacking, ...own.lacking]),
    })];
  });
}

interface Content {
  readonly measure: 'peak' | 'rms';
  readonly tolerates: Given<Voltage>;
  readonly contributions: readonly Contribution[];
  readonly unaccounted: readonly Unaccounted[];
}

function budgetOf(project: Project, { subject, kind }: Receiver, { measure, tolerates, contributions, unaccounted }: Content): Budget {
  const combine = measure === 'rms' ? 'rss' : project.board.combine;
  const sorted = [...contributions].sort(largestFirst);
  const complete = unaccounted.length === 0;
  const known = complete || 0 < sorted.length;
  const { total, errorBar } = totalOf(sorted, combine);
  const marginDb = complete ? marginBetween(tolerates.value, total) : null;
  return {
    subject,
    kind,
    measure,
    tolerates: tolerates.value,
    toleratesPlace: tolerates.place,
    combine,
    total: known ? total : null,
    bounds: null,
    errorBar: known ? errorBar : null,
    movedBy: [],
    marginDb,
    verdict: verdictOf({ complete, total, tolerates: tolerates.value, marginDb, headroom: project.board.headroom?.value ?? decibels(0) }),
    complete,
    unaccounted,
    contributions: sorted,
  };
}

function marginBetween(tolerates: Voltage, total: Voltage): Decibels | null {
  const margin = 20 * Math.log10(tolerates / total);
  return Number.isFinite(margin) ? decibels(margin) : null;
}

function verdictOf(state: { complete: boolean; total: Voltage; tolerates: Voltage; marginDb: Decibels | null; headroom: Decibels }): Verdict {
  if (state.tolerates < state.total) return 'over';
  if (!state.complete) return 'unknown';
  return state.marginDb !== null && state.marginDb < state.headroom ? 'low' : 'pass';
}

function largestFirst(a: Contribution, b: Contribution): number {
  return b.value - a.value || byName(a.from, b.from) || byName(a.where, b.where) || byName(a.channel, b.channel);
}

/** Code units, not a locale: the same everywhere. */
function byName(a: string | null, b: string | null): number {
  return (a ?? '') < (b ?? '') ? -1 : (b ?? '') < (a ?? '') ? 1 : 0;
}

/** One clause is said once, however many traces or edges it is true of. */
function once(clauses: readonly Unaccounted[]): readonly Unaccounted[] {
  return [...new Map(clauses.map((clause) => [clause.what, clause])).values()];
}
