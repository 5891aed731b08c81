/**
 * What stands in grey beside the numbers of a run: after a receiver's trace what it gets there, after a gap and after
 * the run's length the value that would just do.
 */
import type { Place, Run, RunConductor } from '../board/model';
import type { Budget, Contribution, Evaluation, RunResult } from '../budget/results';
import { totalOf } from '../budget/totals';
import type { FixContext } from '../fixes/fix';
import { sufficientGap, sufficientLength, type Sufficient } from '../fixes/sufficient';
import { traceOf } from '../rules/gapsBetween';
import type { Span } from '../syntax/tree';
import { inText } from '../units/inText';
import type { Hint } from './answers';
import { escaped, paragraphs, percent } from './hover/markdown';
import type { Session } from './session';

/** In the order of the text. */
export function hints(session: Session, path: string, span: Span): readonly Hint[] {
  const found = new Map<string, Hint>();
  for (const root of session.projectsOf(path)) {
    const inSight = session.project(root).runs.filter(({ whole }) => isIn(whole, path, span));
    if (inSight.length === 0) continue;
    const { evaluation } = session.analyse(root);
    const context = session.fixContext(root);
    for (const run of inSight) {
      const result = evaluation.runs.find((each) => each.run === run);
      const all = result === undefined ? [] : [...noiseHints(evaluation, result), ...gapHints(context, run), ...lengthHints(context, run)];
      // Two projects that hold the run say the same once; what they say differently stands side by side.
      for (const { place, hint } of all) if (isIn(place, path, span)) found.set(`${hint.offset} ${hint.parts.map(({ text }) => text).join('')}`, hint);
    }
  }
  return [...found.values()].sort((a, b) => a.offset - b.offset);
}

interface Placed {
  readonly place: Place;
  readonly hint: Hint;
}

function isIn(place: Place, path: string, span: Span): boolean {
  return place.path === path && place.span.start <= span.end && span.start <= place.span.end;
}

/** One for each row, of a range the worst; the share is that of what the receiver tolerates in all. */
function noiseHints({ budgets }: Evaluation, { run }: RunResult): readonly Placed[] {
  const worst = new Map<number, { readonly share: number; readonly placed: Placed }>();
  for (const conductor of run.rows.flatMap((row) => row.conductors)) {
    if (conductor.kind !== 'trace') continue;
    for (const budget of budgets) {
      if (budget.subject !== conductor.net || budget.kind !== 'net') continue;
      const here = budget.contributions.filter(({ coupling, where }) => coupling !== null && where === run.name);
      if (here.length === 0) continue;
      const { total } = totalOf(here, budget.combine);
      const share = total / budget.tolerates;
      const known = worst.get(conductor.whole.span.start);
      if (known === undefined || known.share < share) worst.set(conductor.whole.span.start, { share, placed: noiseHint(run, conductor, { budget, here, total, share }) });
    }
  }
  return [...worst.values()].map(({ placed }) => placed);
}

interface Noise {
  readonly budget: Budget;
  readonly here: readonly Contribution[];
  readonly total: number;
  readonly share: number;
}

function noiseHint(run: Run, { net, whole }: RunConductor & { readonly kind: 'trace' }, { budget, here, total, share }: Noise): Placed {
  const largest = here[0].coupling;
  const from = largest === null ? null : traceOf(run, largest.aggressor)?.whole ?? null;
  const tooltip = paragraphs(
    `${inText(total, 'voltage')} on **${escaped(net.name)}** in run ${escaped(run.name)}, ${percent(share)} of the ${inText(budget.tolerates, 'voltage')} that it tolerates.`,
    here.slice(0, 6).map(({ from: source, value }) => `- ${inText(value, 'voltage')} from ${escaped(source ?? '')}`).join('\n'),
    budget.total !== null && `${inText(budget.total, 'voltage')} over all its runs and channels${budget.complete ? '' : ', and something is not yet counted'}.`,
  );
  return {
    place: whole,
    hint: { kind: 'noise', offset: whole.span.end, parts: [{ text: `≈ ${inText(total, 'voltage')}`, target: from }, { text: ` · ${percent(share)}`, target: budget.toleratesPlace }], tooltip },
  };
}

function gapHints(context: FixContext, run: Run): readonly Placed[] {
  const placed: Placed[] = [];
  const seen = new Set<number>();
  run.rows.flatMap((row) => row.gaps).forEach(({ place }, index) => {
    // The gaps of a `spaced` range are one number in the text.
    if (seen.has(place.span.start)) return;
    seen.add(place.span.start);
    const sufficient = sufficientGap(context, run, index);
    if (sufficient !== null) placed.push({ place, hint: sufficientHint('gap', place, sufficient) });
  });
  return placed;
}

function lengthHints(context: FixContext, run: Run): readonly Placed[] {
  const sufficient = sufficientLength(context, run);
  return sufficient === null ? [] : [{ place: run.length.place, hint: sufficientHint('length', run.length.place, sufficient) }];
}

function sufficientHint(kind: 'gap' | 'length', place: Place, { written, enough, receivers }: Sufficient): Hint {
  const whom = receivers.map(escaped).join(', ');
  const [sign, bound, other] = kind === 'gap' ? ['≥', 'up to', 'a shorter run, a guard or another layer is'] : ['≤', 'down to', 'a wider gap, a guard or another layer is'];
  return {
    kind,
    offset: place.span.end,
    parts: [{ text: enough ? `${sign} ${written}` : `no ${kind} is enough`, target: null }],
    tooltip: enough ? `${written} would just do for ${whom}, with the headroom wanted.` : `No ${kind} ${bound} ${written} is enough for ${whom}: ${other}.`,
  };
}
