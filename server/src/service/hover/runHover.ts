/** A run, and what of it stands at a point: a trace, a guard or return, a gap, its length. */
import type { Net, Pair, RunConductor } from '../../board/model';
import type { Coupling, Evaluation, RunResult } from '../../budget/results';
import { refusalInText } from '../../budget/runs/refusalInText';
import type { FixContext } from '../../fixes/fix';
import { sufficientGap, sufficientLength, type Sufficient } from '../../fixes/sufficient';
import { gapsBetween } from '../../rules/gapsBetween';
import { errorInText, inText } from '../../units/inText';
import { assumptionsOf, couplingTable } from './couplingTable';
import { escaped, escapedLines, paragraphs, table } from './markdown';
import { couplingPicture } from '../pictures/couplingPicture';
import { gapPicture } from '../pictures/gapPicture';
import { sectionPictures } from '../pictures/sectionPictures';
import { drawn, type Pictures } from './pictures';
import { sufficientInWords } from './sufficientInWords';
import type { RunPoint } from './runPoint';

export function runHover(result: RunResult, pictures: Pictures): string {
  const { run, couplings } = result;
  return paragraphs(
    run.documentation === null ? null : escapedLines(run.documentation),
    `**run ${escaped(run.name)}**: ${inText(run.length.value, 'length')}${delayInWords(result)}`,
    ...sectionsOf(result, pictures, null),
    couplings.length === 0 ? nothingCouples(result) : couplingTable(couplings),
    result.matrices === null ? null : linesTable(result),
    assumptionsOf(couplings),
  );
}

export function runPointHover(result: RunResult, point: RunPoint, { evaluation, context, pictures }: PointContext): string {
  switch (point.on) {
    case 'length': return lengthHover(result, sufficientLength(context(), result.run), pictures);
    case 'gap': return gapHover(result, point, { context: context(), pictures });
    case 'conductor': return point.conductor.kind === 'trace' ? traceHover(result, point.conductor, { evaluation, pictures }) : guardHover(result, point.conductor, pictures);
  }
}

export interface PointContext {
  readonly evaluation: Evaluation;
  /** Asked for only where a search answers. */
  readonly context: () => FixContext;
  readonly pictures: Pictures;
}

function lengthHover(result: RunResult, sufficient: Sufficient | null, pictures: Pictures): string {
  return paragraphs(sufficient === null ? null : sufficientInWords('length', sufficient), runHover(result, pictures));
}

/** A run between several planes has more; its first two say how it is meant. */
const sectionsShown = 2;

function sectionsOf({ run }: RunResult, pictures: Pictures, conductors: readonly RunConductor[] | null): readonly (string | null)[] {
  return pictures.until === null ? [] : sectionPictures(run, conductors).slice(0, sectionsShown).map((picture) => drawn(pictures, () => picture));
}

/** All traces of one row where it names a range. */
function traceHover(result: RunResult, { place }: RunConductor & { readonly kind: 'trace' }, { evaluation, pictures }: Pick<PointContext, 'evaluation' | 'pictures'>): string {
  const traces = result.traces.filter((trace) => trace.place === place || (trace.place.path === place.path && trace.place.span.start === place.span.start));
  const nets = new Set(traces.map(({ net }) => net));
  const concerns = (signal: Net | Pair) => (signal.kind === 'net' ? nets.has(signal) : [signal.plus, signal.minus].some((net) => net !== null && nets.has(net)));
  const onto = result.couplings.filter(({ victim }) => concerns(victim));
  const from = result.couplings.filter(({ aggressor }) => concerns(aggressor));
  const lines = traces.slice(0, 4).map((trace) => {
    const index = result.traces.indexOf(trace);
    const line = result.impedance[index] === undefined ? '' : `, ${inText(result.impedance[index], 'resistance')}, ${inText(result.delay[index] * result.run.length.value, 'time')} from end to end`;
    return `**${escaped(trace.net.name)}** in run ${escaped(result.run.name)}: ${inText(trace.width.value, 'length')} wide${line}${trace.reversed ? ', laid against the others' : ''}`;
  });
  return paragraphs(
    largestInWords(onto),
    largestOf([...onto, ...from]).map((coupling) => drawn(pictures, () => couplingPicture(evaluation, coupling))).join(''),
    [...lines, ...(lines.length < traces.length ? [`and ${traces.length - lines.length} more`] : [])].join('  \n'),
    onto.length === 0 ? null : `Put on it here:\n\n${couplingTable(onto)}`,
    from.length === 0 ? null : `Put by it here:\n\n${couplingTable(from)}`,
    onto.length + from.length === 0 ? nothingCouples(result) : null,
    ...sectionsOf(result, pictures, traces),
    assumptionsOf([...onto, ...from]),
  );
}

/** The number first, ahead of the table that it stands in. */
function largestInWords(onto: readonly Coupling[]): string | null {
  const [largest] = largestOf(onto);
  if (largest === undefined) return null;
  return `**${inText(Math.abs(largest.counted ?? largest.atReceiver), 'voltage')}** of ${escaped(largest.aggressor.name)} at the receiver of ${escaped(largest.victim.name)}${onto.length === 1 ? '' : `, the most that ${onto.length} couplings put on it here`}.`;
}

function largestOf(couplings: readonly Coupling[]): readonly Coupling[] {
  const size = ({ counted, atReceiver }: Coupling) => Math.abs(counted ?? atReceiver);
  return couplings.length === 0 ? [] : [couplings.reduce((most, each) => (size(most) < size(each) ? each : most))];
}

function guardHover(result: RunResult, conductor: Exclude<RunConductor, { kind: 'trace' }>, pictures: Pictures): string {
  const { run, looseGuards } = result;
  const head = `**${conductor.kind} ${escaped(conductor.name)}** in run ${escaped(run.name)}: ${inText(conductor.width.value, 'length')} wide`;
  if (conductor.kind === 'return') return paragraphs(head, 'It carries the current back; several are joined at both ends of the run.', ...sectionsOf(result, pictures, [conductor]));
  const loose = looseGuards.find(({ guard }) => guard === conductor);
  const tied = conductor.stitched === null ? `tied at its two ends, ${inText(run.length.value, 'length')} apart` : `tied every ${inText(conductor.stitched.value, 'length')}`;
  return paragraphs(head, loose === undefined ? `It is ${tied}, and counts as tied everywhere.` : `It is ${tied}; at most ${inText(loose.largest, 'length')} hold at the fastest edge here. ${loose.past === null ? 'Its noise is computed as if they held, and is not to be trusted until they do.' : `It is computed as one more line, shorted through its vias at each tie: ${inText(loose.past.asTied, 'voltage')} on ${escaped(loose.past.receiver)}, and ${inText(loose.past.stitched, 'voltage')} with ties that hold.`}`, ...sectionsOf(result, pictures, [conductor]));
}

function gapHover(result: RunResult, { gap, index }: RunPoint & { readonly on: 'gap' }, { context, pictures }: { readonly context: FixContext; readonly pictures: Pictures }): string {
  const { run, couplings } = result;
  const across = couplings.filter(({ aggressor, victim }) => {
    const between = gapsBetween(run, aggressor, victim);
    return between !== null && gapIndices(result, between).includes(index);
  });
  const sufficient = sufficientGap(context, run, index);
  return paragraphs(
    `**${inText(gap.value, 'length')}**${neighboursOf(result, index)}${sufficient === null ? '' : `. ${sufficientInWords('gap', sufficient)}`}`,
    drawn(pictures, () => gapPicture(context, { run, index, sufficient }, pictures)),
    across.length === 0 ? 'Nothing that is computed couples across it.' : couplingTable(across),
  );
}

function gapIndices({ run }: RunResult, { row, gaps }: { readonly row: number; readonly gaps: readonly number[] }): readonly number[] {
  const first = run.rows.slice(0, row).reduce((count, each) => count + each.gaps.length, 0);
  return gaps.map((gap) => first + gap);
}

function neighboursOf({ run }: RunResult, index: number): string {
  let first = 0;
  for (const { conductors, gaps } of run.rows) {
    if (index < first + gaps.length) return ` between ${conductors.slice(index - first, index - first + 2).map((each) => escaped(each.kind === 'trace' ? each.net.name : each.name)).join(' and ')}`;
    first += gaps.length;
  }
  return '';
}

function nothingCouples({ refusal, run, matrices }: RunResult): string {
  if (matrices === null && refusal !== null) return `It has no numbers: ${escaped(refusalInText(refusal, run.rows.flatMap((row) => row.conductors)))}.`;
  return 'No source with an edge lies beside a receiver here: nothing is computed but the lines themselves.';
}

function delayInWords({ delay, run }: RunResult): string {
  return delay.length === 0 ? '' : `, ${inText(Math.max(...delay) * run.length.value, 'time')} from end to end`;
}

const linesShown = 8;

/** Of each trace alone, the others at zero potential. */
function linesTable({ traces, impedance, delay, matrices }: RunResult): string {
  const order = traces.length;
  const rows = traces.slice(0, linesShown).map(({ net }, index) => [
    escaped(net.name), inText(impedance[index], 'resistance'), `${inText(delay[index] * 1e-3, 'time')}/mm`,
    `${inText(matrices!.capacitance[index * (order + 1)] * 1e-3, 'capacitance')}/mm`, `${inText(matrices!.inductance[index * (order + 1)] * 1e-3, 'inductance')}/mm`,
  ]);
  const error = Math.max(...matrices!.capacitanceError.filter(Number.isFinite), ...matrices!.inductanceError.filter(Number.isFinite));
  return paragraphs(table(['line', 'impedance', 'delay', 'C', 'L'], rows), `${linesShown < order ? `and ${order - linesShown} more lines. ` : ''}C and L are solved to ${errorInText(error, 1, 'number')}.`);
}
