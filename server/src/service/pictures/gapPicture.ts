/**
 * The worst receiver's noise against one gap of a run. Each point is an evaluation of the board with that gap, from what is solved
 * already: a millisecond or many. They are computed as time allows, kept for as long as nothing changed, and drawn when all are there.
 */
import type { Run } from '../../board/model';
import type { Budget, Evaluation } from '../../budget/results';
import { withGap, type GapPlace } from '../../fixes/changedRun';
import type { FixContext } from '../../fixes/fix';
import { placeOf, receiversAcross, type Sufficient } from '../../fixes/sufficient';
import { trial } from '../../fixes/trial';
import { noiseAgainstGap } from '../../pictures/noiseAgainstGap';
import type { Picture } from '../../pictures/picture';
import { receiverInText } from '../../rules/budgetFault';
import { metres } from '../../units/quantity';
import type { Pictures } from '../hover/pictures';

export interface GapOfRun {
  readonly run: Run;
  /** Counted row by row. */
  readonly index: number;
  /** What would just do, where that is known. */
  readonly sufficient: Sufficient | null;
}

/** Null where nothing crosses the gap, or not all is computed yet: the rest is then left with `pictures.later`. */
export function gapPicture(context: FixContext, gap: GapOfRun, { until, later }: Pictures): Picture | null {
  const curve = curveOf(context, gap);
  if (curve === null) return null;
  for (let [now, longest] = [Date.now(), 0]; !isDone(curve) && now + longest < (until ?? 0); ) {
    step(context, curve);
    const after = Date.now();
    [now, longest] = [after, Math.max(longest, after - now)];
  }
  if (!isDone(curve)) {
    later?.(() => step(context, curve));
    return null;
  }
  return pictureOf(context, gap, curve);
}

interface Curve {
  readonly run: Run;
  readonly place: GapPlace;
  readonly budget: Budget;
  /** Rising. */
  readonly gaps: readonly number[];
  /** In the order of the gaps, as far as they are computed. */
  readonly noise: (number | null)[];
}

const known = new WeakMap<Evaluation, Map<string, Curve | null>>();

function curveOf({ project, evaluation }: FixContext, { run, index, sufficient }: GapOfRun): Curve | null {
  const curves = known.get(evaluation) ?? new Map<string, Curve | null>();
  known.set(evaluation, curves);
  const key = `${run.name} ${index}`;
  const found = curves.get(key);
  if (found !== undefined) return found;
  const place = placeOf(run, index);
  const budgets = place === null ? [] : receiversAcross(evaluation, run, place).filter(({ total }) => total !== null && 0 < total);
  const budget = budgets.reduce<Budget | null>((worst, each) => (worst === null || worst.total! / worst.tolerates < each.total! / each.tolerates ? each : worst), null);
  const curve = place === null || budget === null ? null : { run, place, budget, noise: [], gaps: gapsFrom(run.rows[place.row].gaps[place.gap].value, project.board.clearance?.value ?? null, sufficient?.enough === true ? sufficient.value : null) };
  curves.set(key, curve);
  return curve;
}

const pointsDrawn = 12;

/** From below the clearance to well beyond the gap that does; the gap as it is, is one of them. */
function gapsFrom(present: number, clearance: number | null, enough: number | null): readonly number[] {
  const from = Math.min(present / 2, clearance ?? present, enough ?? present);
  const to = Math.min(20e-3, Math.max(3 * present, 1.4 * (enough ?? 0)));
  const even = Array.from({ length: pointsDrawn }, (_, index) => from * (Math.max(to, 2 * present) / from) ** (index / (pointsDrawn - 1)));
  return [...even.filter((gap) => 0.02 < Math.abs(gap / present - 1)), present].sort((a, b) => a - b);
}

/** One more point; false once there is nothing left to do. */
function step(context: FixContext, { run, place, budget, gaps, noise }: Curve): boolean {
  if (noise.length === gaps.length) return false;
  const gap = gaps[noise.length];
  const isPresent = gap === run.rows[place.row].gaps[place.gap].value;
  noise.push(isPresent ? budget.total : trial(context, [{ before: run, after: withGap(run, place, metres(gap)) }], [budget]).budgets[0]?.total ?? null);
  return noise.length < gaps.length;
}

function isDone({ gaps, noise }: Curve): boolean {
  return noise.length === gaps.length;
}

function pictureOf({ project }: FixContext, { sufficient }: GapOfRun, { run, place, budget, gaps, noise }: Curve): Picture | null {
  const headroom = project.board.headroom?.value ?? 0;
  return noiseAgainstGap({
    receiver: receiverInText(budget),
    measure: budget.measure,
    points: gaps.flatMap((gap, index) => (noise[index] === null ? [] : [{ gap, noise: noise[index]! }])),
    present: { gap: run.rows[place.row].gaps[place.gap].value, noise: budget.total! },
    clearance: project.board.clearance?.value ?? null,
    tolerates: budget.tolerates,
    wanted: headroom === 0 ? null : budget.tolerates / 10 ** (headroom / 20),
    enough: sufficient !== null && sufficient.enough && !sufficient.atReach ? sufficient.value : null,
  });
}
