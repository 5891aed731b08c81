/**
 * The budget of each receiver: every contribution with where it arises, their total, the margin to what is
 * tolerated, and the verdict. A budget that lacks something has no margin, and is over or unknown,
 * never within.
 */
import type { Given, Net, Pair, Place, Project } from '../board/model';
import { decibels, volts, type Decibels, type Voltage } from '../units/quantity';
import { notYetCounted, notYetCountedPair } from './notYetCounted';
import type { Budget, Contribution, Coupling, Unaccounted, Verdict } from './results';
import type { Roles } from './roles';
import type { RunOutcome } from './runs/runOutcome';
import { thermalContribution } from './thermalContribution';
import { totalOf } from './totals';

/** In the order of the text: files as they are used, then places. */
export function budgetsOf(project: Project, roles: Roles, outcomes: readonly RunOutcome[]): readonly Budget[] {
  const onNet = new Map<Net, NetChannels>();
  for (const outcome of outcomes) gather(outcome, onNet);
  const budgets = [
    ...[...project.nets.values()].flatMap((net) => netBudgets(project, roles, net, onNet.get(net) ?? nothing)),
    ...[...project.pairs.values()].flatMap((pair) => pairBudgets(project, pair)),
  ];
  const files = new Map(project.files.map((path, index) => [path, index]));
  const rank = ({ subject: { place } }: Budget) => files.get(place.path) ?? files.size;
  return budgets.sort((a, b) => rank(a) - rank(b) || a.subject.place.span.start - b.subject.place.span.start);
}

interface NetChannels {
  readonly couplings: Coupling[];
  readonly lacking: Unaccounted[];
}

const nothing: NetChannels = { couplings: [], lacking: [] };

function gather({ result, lacking }: RunOutcome, onNet: Map<Net, NetChannels>): void {
  const of = (net: Net) => {
    const known = onNet.get(net) ?? { couplings: [], lacking: [] };
    onNet.set(net, known);
    return known;
  };
  for (const coupling of result.couplings) of(coupling.victim).couplings.push(coupling);
  for (const { victim, unaccounted } of lacking) of(victim).lacking.push(unaccounted);
}

function netBudgets(project: Project, roles: Roles, net: Net, channels: NetChannels): readonly Budget[] {
  const budgets: Budget[] = [];
  const lacking = () => once([...channels.lacking, ...notYetCounted(project, roles, net)]);
  if (net.toleratesPeak !== null) {
    const thermal = thermalContribution(project, roles, net);
    const contributions = [...channels.couplings.map(coupledContribution), ...(thermal === null ? [] : [thermal])];
    budgets.push(budgetOf(project, { subject: net, kind: 'net', measure: 'peak' }, { tolerates: net.toleratesPeak, contributions, unaccounted: lacking() }));
  }
  if (net.toleratesRms !== null) {
    const unaccounted = [{ what: `what ${net.name} has as rms is not yet counted`, place: net.toleratesRms.place }, ...lacking()];
    budgets.push(budgetOf(project, { subject: net, kind: 'net', measure: 'rms' }, { tolerates: net.toleratesRms, contributions: [], unaccounted }));
  }
  return budgets;
}

function pairBudgets(project: Project, pair: Pair): readonly Budget[] {
  const budgets: Budget[] = [];
  const add = (kind: 'pair' | 'common', measure: 'peak' | 'rms', tolerates: Given<Voltage> | null) => {
    if (tolerates !== null) budgets.push(budgetOf(project, { subject: pair, kind, measure }, { tolerates, contributions: [], unaccounted: once(notYetCountedPair(project, pair)) }));
  };
  add('pair', 'peak', pair.toleratesPeak);
  add('pair', 'rms', pair.toleratesRms);
  if (pair.commonTolerates !== null) add('common', pair.commonTolerates.measure, pair.commonTolerates.voltage);
  return budgets;
}

interface Content {
  readonly tolerates: Given<Voltage>;
  readonly contributions: readonly Contribution[];
  readonly unaccounted: readonly Unaccounted[];
}

function budgetOf(project: Project, head: Pick<Budget, 'subject' | 'kind' | 'measure'>, { tolerates, contributions, unaccounted }: Content): Budget {
  const combine = head.measure === 'rms' ? 'rss' : project.board.combine;
  const sorted = [...contributions].sort(largestFirst);
  const complete = unaccounted.length === 0;
  const known = complete || 0 < sorted.length;
  const { total, errorBar } = totalOf(sorted, combine);
  const marginDb = complete ? marginBetween(tolerates.value, total) : null;
  return {
    ...head,
    tolerates: tolerates.value,
    toleratesPlace: tolerates.place,
    combine,
    total: known ? total : null,
    bounds: null,
    errorBar: known ? errorBar : null,
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

function coupledContribution(coupling: Coupling): Contribution {
  const { run, aggressor, inBand, atReceiver } = coupling;
  return {
    channel: 'coupled',
    from: aggressor.name,
    where: run.name,
    get place() { return victimPlace(coupling); },
    group: aggressor.switchesWith,
    value: volts(Math.abs(inBand ?? atReceiver)),
    unfiltered: inBand === null ? null : volts(Math.abs(atReceiver)),
    errorBar: coupling.errorBar,
    bounds: coupling.bounds,
    method: coupling.model === 'lumped' ? 'coupled lines, short enough to act as a lumped circuit' : 'coupled lines',
    get assumptions() { return coupling.assumptions; },
    coupling,
  };
}

function victimPlace({ run, victim }: Coupling): Place {
  for (const row of run.rows) for (const conductor of row.conductors) if (conductor.kind === 'trace' && conductor.net === victim) return conductor.whole;
  return run.place;
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
