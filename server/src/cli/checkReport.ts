/** What a check found, as the published JSON says it. */
import type { Place } from '../board/model';
import { largestPeak, type Heard } from '../budget/heard';
import type { Budget, Coupling, LoopResult, RunResult } from '../budget/results';
import type { Finding } from '../rules/rule';
import type { CheckedFile } from './checkedFiles';
import type { CheckReport, FileReport, Summary } from './checkSchema';
import { linesOf, type Lines } from './positions';

/** What of a checked file goes into its report. */
type Reported = Pick<CheckedFile, 'path' | 'analysis' | 'text' | 'known'>;

export function checkReport(checked: readonly Reported[], tool: string): CheckReport {
  const files = checked.map(fileReport);
  return { version: 1, tool, units: 'SI', summary: summaryOf(files), files };
}

function summaryOf(files: readonly FileReport[]): Summary {
  const findings = files.flatMap((file) => file.findings);
  const count = (severity: string) => findings.filter((finding) => finding.severity === severity && finding.waived === null).length;
  let worst: Summary['worst'] = null;
  for (const file of files) {
    for (const { net, marginDb } of file.budgets) {
      if (marginDb !== null && (worst === null || marginDb < worst.marginDb)) worst = { file: file.path, budget: net, marginDb };
    }
  }
  return { errors: count('error'), warnings: count('warning'), information: count('information'), hints: count('hint'), waived: findings.filter((finding) => finding.waived !== null).length, worst };
}

type Placed = (place: Place) => { readonly path: string; readonly range: ReturnType<Lines['range']> };

function fileReport({ path, analysis, text, known: inBaseline }: Reported): FileReport {
  const { project, evaluation, findings } = analysis;
  const lines = new Map<string, Lines>();
  const placed: Placed = (place) => {
    const known = lines.get(place.path) ?? linesOf(text(place.path));
    lines.set(place.path, known);
    return { path: place.path, range: known.range(place.span) };
  };
  const named = (thing: { readonly name: string; readonly place: Place }) => ({ name: thing.name, ...placed(thing.place) });
  return {
    path,
    uses: project.files.filter((file) => file !== path),
    complete: project.complete,
    findings: findings.map((finding) => findingReport(inBaseline.has(finding) ? { ...finding, waived: 'in the baseline' } : finding, placed)),
    runs: evaluation.runs.map((result) => runReport(result, named)),
    loops: evaluation.loops.map((result) => loopReport(result, evaluation.heard, named)),
    returns: evaluation.returns.map(({ shared, resistance, inductance }) => ({ ...named(shared), resistance: finite(resistance), inductance: finite(inductance), drops: dropsOver(evaluation.heard, shared.name) })),
    links: project.links.map((link) => ({ ...named(link), induced: inducedBy(evaluation.heard, link.name) })),
    shields: evaluation.shields.map(({ shield, frequency, effectivenessDb }) => ({ ...named(shield), frequency: finite(frequency), effectivenessDb: finite(effectivenessDb) })),
    budgets: evaluation.budgets.map((budget) => budgetReport(budget, placed)),
  };
}

function findingReport(finding: Finding, placed: Placed): FileReport['findings'][number] {
  const { rule, severity, message, subject, key, value, limit, unit, waived, related } = finding;
  return {
    rule, severity, message, ...placed(finding.at),
    subject: subject === null ? null : { kind: subject.kind, name: subject.name },
    key, value: finite(value), limit: finite(limit), unit, waived,
    related: related.map((each) => ({ ...placed(each.place), message: each.message })),
  };
}

type Named = (thing: { readonly name: string; readonly place: Place }) => { name: string; path: string; range: ReturnType<Lines['range']> };

function runReport(result: RunResult, named: Named): FileReport['runs'][number] {
  const { run, traces, matrices } = result;
  const rows = (entries: Float64Array) => traces.map((_, row) => Array.from(entries.subarray(row * traces.length, (row + 1) * traces.length)));
  return {
    ...named(run),
    length: run.length.value,
    conductors: traces.map((trace) => trace.net.name),
    capacitance: matrices === null ? null : rows(matrices.capacitance),
    capacitanceInAir: matrices === null ? null : rows(matrices.capacitanceInAir),
    inductance: matrices === null ? null : rows(matrices.inductance),
    impedance: [...result.impedance],
    delay: [...result.delay],
    errorBar: matrices === null ? null : finite(largest(matrices.capacitanceError, largest(matrices.inductanceError, 0))),
    couplings: result.couplings.map(couplingReport),
  };
}

function couplingReport(coupling: Coupling): FileReport['runs'][number]['couplings'][number] {
  const { aggressor, victim, kind, edge, model, frequency, nearEnd, farEnd, atReceiver, peakTime, widthHalf, capacitivePart, inductivePart, errorBar, bounds } = coupling;
  return { aggressor: aggressor.name, victim: victim.name, kind, edge, frequency, model, nearEnd, farEnd, atReceiver, peakTime, widthHalf, capacitivePart, inductivePart, errorBar, bounds: pairOf(bounds) };
}

function budgetReport(budget: Budget, placed: Placed): FileReport['budgets'][number] {
  const { subject, kind, tolerates, measure, combine, total, bounds, errorBar, marginDb, verdict, complete, unaccounted, contributions } = budget;
  return {
    net: subject.name, kind, ...placed(budget.toleratesPlace), tolerates, measure, combine,
    total: finite(total), bounds: pairOf(bounds), errorBar: finite(errorBar), marginDb: finite(marginDb), verdict, complete,
    unaccounted: unaccounted.map(({ what }) => what),
    contributions: contributions.map(({ channel, from, where, group, value, unfiltered, method, assumptions, ...each }) => ({ channel, from, where, group, value, unfiltered: finite(unfiltered), bounds: pairOf(each.bounds), method, assumptions: [...assumptions] })),
  };
}

function loopReport({ loop, area, perimeter, inductance, emission, mutual }: LoopResult, heard: readonly Heard[], named: Named): FileReport['loops'][number] {
  const induced = (other: string) => Math.max(...heard.filter(({ channel, origins, receiver: { subject, terms } }) => channel === 'loop' && origins.includes(loop.name) && sensedBy(other, subject.name, terms)).map(largestPeak), -Infinity);
  const sensedBy = (name: string, subject: string, terms: Heard['receiver']['terms']) => mutual.some(({ other: { name: its, senses } }) => its === name && senses.some(({ signal }) => signal.name === subject || terms.some(({ net }) => net === signal)));
  return { ...named(loop), area: finite(area), perimeter: finite(perimeter), inductance: finite(inductance), emission: emission.map(({ limit, frequency, field, marginDb }) => ({ frequency, distance: limit.distance.value, field, limit: limit.field.value, marginDb: finite(marginDb) })), mutual: mutual.map(({ other, ...each }) => ({ with: other.name, inductance: each.inductance, induced: finite(induced(other.name)) })) };
}

/** Of each net, the largest of what it puts on those that refer to the return. */
function dropsOver(heard: readonly Heard[], name: string): FileReport['returns'][number]['drops'] {
  const peaks = new Map<string, number>();
  for (const each of heard) {
    if (each.channel !== 'shared return' || !each.origins.includes(name)) continue;
    const { name: net } = each.source.signal;
    peaks.set(net, Math.max(peaks.get(net) ?? 0, largestPeak(each)));
  }
  return [...peaks].map(([net, peak]) => ({ net, peak }));
}

function inducedBy(heard: readonly Heard[], link: string): FileReport['links'][number]['induced'] {
  return heard.filter(({ channel, origins }) => channel === 'link' && origins.includes(link)).map((each) => ({ aggressor: each.source.signal.name, victim: each.receiver.subject.name, peak: largestPeak(each) }));
}

/** JSON has no infinity: what has no finite value has none. */
function finite(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}

function pairOf(bounds: readonly [number, number] | null): [number, number] | null {
  return bounds === null ? null : [bounds[0], bounds[1]];
}

function largest(entries: Float64Array, least: number): number {
  return entries.reduce((most, entry) => Math.max(most, entry), least);
}
