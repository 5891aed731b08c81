/** What stands over a declaration, where it is wanted: over a receiver its total and margin, over a run the receiver that takes most in it. */
import type { Net, Pair, Place, Run } from '../board/model';
import type { Budget, Contribution, Evaluation } from '../budget/results';
import { totalOf } from '../budget/totals';
import { receiverInText, voltageInText } from '../rules/budgetFault';
import { budgetLine } from './budgetLine';
import { rowsIn } from './disturbances/rows';
import { percent } from './hover/markdown';
import type { Session } from './session';

export type LensKind = 'budgets' | 'runs';

export interface Lens {
  readonly kind: LensKind;
  /** The name in the declaration. */
  readonly place: Place;
  /** `1.84 mV of 2.00 mV · 0.7 dB left` */
  readonly title: string;
  /** Rows of those who disturb it, the worst first. */
  readonly disturbers: readonly Place[];
}

/** In the order of the text; what two boards say alike is said once, and with the board's name where they differ. */
export function lenses(session: Session, path: string, wants: (kind: LensKind) => boolean): readonly Lens[] {
  const found = new Map<string, Lens & { readonly root: string }>();
  for (const root of session.projectsOf(path)) {
    const { evaluation } = session.analyse(root);
    const own = [...(wants('budgets') ? budgetLenses(evaluation, path) : []), ...(wants('runs') ? runLenses(evaluation, path) : [])];
    for (const lens of own) {
      const key = `${lens.place.span.start} ${lens.title}`;
      if (!found.has(key)) found.set(key, { ...lens, root });
    }
  }
  const all = [...found.values()];
  const several = 1 < new Set(all.map(({ root }) => root)).size;
  return all.map(({ root, title, ...lens }) => ({ ...lens, title: several ? `${title} in ${root.slice(root.lastIndexOf('/') + 1)}` : title })).sort((a, b) => a.place.span.start - b.place.span.start);
}

function budgetLenses(evaluation: Evaluation, path: string): readonly Lens[] {
  // Nets of a range stand at one place: the worst speaks for them.
  const byPlace = new Map<string, Budget[]>();
  for (const budget of evaluation.budgets) {
    if (budget.subject.place.path !== path) continue;
    const key = `${budget.subject.place.span.start} ${budget.kind} ${budget.measure}`;
    const known = byPlace.get(key);
    if (known === undefined) byPlace.set(key, [budget]);
    else known.push(budget);
  }
  return [...byPlace.values()].map((budgets) => {
    const worst = budgets.reduce((one, other) => (badness(one) < badness(other) ? other : one));
    const title = budgets.length === 1 ? budgetLine(worst) : `${worst.subject.name}: ${budgetLine(worst)}, the worst of ${budgets.length}`;
    return { kind: 'budgets', place: worst.subject.place, title, disturbers: disturbersOf(evaluation, worst.contributions) };
  });
}

/** A budget without a margin is looked at first. */
function badness({ marginDb, total, tolerates }: Budget): number {
  return marginDb === null && total !== 0 ? Infinity : (total ?? 0) / tolerates;
}

function runLenses(evaluation: Evaluation, path: string): readonly Lens[] {
  const inRun = new Map<string, { budget: Budget; of: Contribution[] }[]>();
  for (const budget of evaluation.budgets) {
    const byRun = new Map<string, Contribution[]>();
    for (const contribution of budget.contributions) {
      if (contribution.channel !== 'coupled' || contribution.where === null) continue;
      const known = byRun.get(contribution.where);
      if (known === undefined) byRun.set(contribution.where, [contribution]);
      else known.push(contribution);
    }
    for (const [run, of] of byRun) inRun.set(run, [...(inRun.get(run) ?? []), { budget, of }]);
  }
  return evaluation.project.runs.filter(({ place }) => place.path === path).flatMap((run) => runLens(evaluation, run, inRun.get(run.name) ?? []));
}

function runLens(evaluation: Evaluation, { place }: Run, heard: readonly { readonly budget: Budget; readonly of: readonly Contribution[] }[]): readonly Lens[] {
  const shares = heard.map(({ budget, of }) => ({ budget, of, total: totalOf(of, budget.combine).total })).sort((a, b) => b.total / b.budget.tolerates - a.total / a.budget.tolerates);
  const [worst, ...others] = shares;
  if (worst === undefined) return [];
  const { budget, of, total } = worst;
  const title = `${voltageInText(total, budget)} on ${receiverInText(budget)} · ${percent(total / budget.tolerates)}${others.length === 0 ? '' : `, the worst of ${shares.length}`}`;
  return [{ kind: 'runs', place, title, disturbers: disturbersOf(evaluation, of) }];
}

function disturbersOf({ project }: Evaluation, contributions: readonly Contribution[]): readonly Place[] {
  const places = contributions.flatMap((contribution) => {
    if (contribution.from === null) return [];
    const source: Net | Pair | undefined = contribution.channel === 'radiated' ? undefined : (project.nets.get(contribution.from) ?? project.pairs.get(contribution.from));
    return rowsIn(project, [contribution], source ?? { kind: 'ambient', name: contribution.from }).map(({ name }) => name);
  });
  return [...new Map(places.map((place) => [`${place.span.start} ${place.path}`, place])).values()];
}
