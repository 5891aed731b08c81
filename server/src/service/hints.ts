/**
 * What stands in grey beside the numbers of a run: after a receiver's trace what it gets there, after a gap and after
 * the run's length the value that would just do; and what `wayHints.ts` says of loops, returns and links.
 */
import type { Net, Place, Run, RunConductor } from '../board/model';
import type { Budget, Contribution, Evaluation, RunResult } from '../budget/results';
import { totalOf } from '../budget/totals';
import type { FixContext } from '../fixes/fix';
import { sufficientGap, sufficientLength, type Sufficient } from '../fixes/sufficient';
import { receiverInText, voltageInText } from '../rules/budgetFault';
import { traceOf } from '../rules/gapsBetween';
import type { Span } from '../syntax/tree';
import { inText } from '../units/inText';
import type { Hint, HintKind } from './answers';
import { escaped, paragraphs, percent } from './hover/markdown';
import { sufficientInWords } from './hover/sufficientInWords';
import type { Session } from './session';
import { wayHints, type Placed } from './wayHints';

/** In the order of the text. */
export function hints(session: Session, path: string, span: Span): readonly Hint[] {
  return [...hintsOf(session, path, span)].filter((hint) => hint !== null).sort((a, b) => a.offset - b.offset);
}

/**
 * One by one, since each may take a search: whoever asks can do other work between two of them. Null stands for work
 * that gave none. They are those of the text as it is at the first; when it changes, there are no more.
 */
export function* hintsOf(session: Session, path: string, span: Span, wants: Wanted = () => true): Generator<Hint | null> {
  const said = new Set<string>();
  for (const root of session.projectsOf(path)) {
    const project = session.project(root);
    const inSight = new Set(project.runs.filter(({ whole }) => isIn(whole, path, span)));
    const waysInSight = [...project.loops, ...project.returns, ...project.links].some(({ whole }) => isIn(whole, path, span));
    if (inSight.size === 0 && !waysInSight) continue;
    const { evaluation } = session.analyse(root);
    for (const { place, hint } of waysInSight ? wayHints(evaluation, (whole) => isIn(whole, path, span), (of) => session.tree(of)) : []) {
      if (wants(hint.kind) && isIn(place, path, span)) yield once(said, hint);
    }
    const context = session.fixContext(root);
    for (const result of evaluation.runs) {
      if (!inSight.has(result.run)) continue;
      for (const placed of hintsOfRun(context, result, (kind, place) => wants(kind) && isIn(place, path, span))) {
        yield placed === null ? null : once(said, placed.hint);
        if (session.project(root) !== project) return;
      }
    }
  }
}

/** Two projects that hold a run say the same once; what they say differently stands side by side. */
function once(said: Set<string>, hint: Hint): Hint | null {
  const identity = `${hint.offset} ${hint.parts.map(({ text }) => text).join('')}`;
  if (said.has(identity)) return null;
  said.add(identity);
  return hint;
}

/** A kind that nobody sees is not searched for. */
type Wanted = (kind: HintKind) => boolean;
type WantedAt = (kind: HintKind, place: Place) => boolean;

function* hintsOfRun(context: FixContext, result: RunResult, wants: WantedAt): Generator<Placed | null> {
  const { run } = result;
  for (const noise of noiseHints(context.evaluation, result)) if (wants('noise', noise.place)) yield noise;
  yield* gapHints(context, run, wants);
  if (wants('length', run.length.place)) yield lengthHint(context, run);
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
      if (!isReadAt(budget, conductor.net)) continue;
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

/** Of a pair, what it makes of its two nets stands beside either. */
function isReadAt({ subject }: Budget, net: Net): boolean {
  return subject.kind === 'net' ? subject === net : subject.plus === net || subject.minus === net;
}

interface Noise {
  readonly budget: Budget;
  readonly here: readonly Contribution[];
  readonly total: number;
  readonly share: number;
}

/** Both parts point at a name: an editor that follows one asks what is declared there, and a keyword declares nothing. */
function noiseHint(run: Run, { whole }: RunConductor & { readonly kind: 'trace' }, { budget, here, total, share }: Noise): Placed {
  const largest = here[0].coupling;
  const from = largest === null ? null : traceOf(run, largest.aggressor)?.place ?? null;
  const tooltip = paragraphs(
    `${voltageInText(total, budget)} on **${escaped(receiverInText(budget))}** in run ${escaped(run.name)}, ${percent(share)} of the ${voltageInText(budget.tolerates, budget)} that it tolerates.`,
    here.slice(0, 6).map(({ from: source, value }) => `- ${inText(value, 'voltage')} from ${escaped(source ?? '')}`).join('\n'),
    budget.total !== null && `${inText(budget.total, 'voltage')} over all its runs and channels${budget.complete ? '' : ', and something of it could not be counted'}.`,
  );
  return {
    place: whole,
    hint: { kind: 'noise', offset: whole.span.end, parts: [{ text: `≈ ${inText(total, 'voltage')}`, target: from }, { text: ` · ${percent(share)}`, target: budget.subject.place }], tooltip },
  };
}

function* gapHints(context: FixContext, run: Run, wants: WantedAt): Generator<Placed | null> {
  const seen = new Set<number>();
  for (const [index, { place }] of run.rows.flatMap((row) => row.gaps).entries()) {
    // The gaps of a `spaced` range are one number in the text.
    if (seen.has(place.span.start) || !wants('gap', place)) continue;
    seen.add(place.span.start);
    const sufficient = sufficientGap(context, run, index);
    yield sufficient === null || sufficient.missedElsewhere ? null : { place, hint: sufficientHint('gap', place, sufficient) };
  }
}

/** None where the length does not matter: the end of the search is no limit of the board, and what comes from elsewhere is mended there. */
function lengthHint(context: FixContext, run: Run): Placed | null {
  const sufficient = sufficientLength(context, run);
  return sufficient === null || sufficient.atReach || sufficient.missedElsewhere ? null : { place: run.length.place, hint: sufficientHint('length', run.length.place, sufficient) };
}

function sufficientHint(kind: 'gap' | 'length', place: Place, sufficient: Sufficient): Hint {
  const sign = kind === 'gap' ? '≥' : '≤';
  return {
    kind,
    offset: place.span.end,
    parts: [{ text: sufficient.enough ? `${sign} ${sufficient.written}` : `no ${kind} is enough`, target: null }],
    tooltip: sufficientInWords(kind, sufficient),
  };
}
