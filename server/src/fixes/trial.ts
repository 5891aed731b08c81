/**
 * What a changed run would put on given receivers: the model's own evaluation, of the runs that matter
 * to them only, so that a search costs what it changes.
 */
import type { Net, Project, Run } from '../board/model';
import type { Budget, Contribution, Evaluation } from '../budget/results';
import type { FixContext } from './fix';

export interface Change {
  readonly before: Run;
  readonly after: Run;
}

export interface Trial {
  readonly evaluation: Evaluation;
  /** In the order of the budgets asked for; null where one is gone. */
  readonly budgets: readonly (Budget | null)[];
}

export function trial(context: FixContext, changes: readonly Change[], budgets: readonly Budget[]): Trial {
  const evaluation = context.evaluateProject(changed(context.project, changes, budgets));
  return { evaluation, budgets: budgets.map((budget) => sameBudget(evaluation, budget)) };
}

export function sameBudget({ budgets }: Evaluation, { subject, kind, measure }: Budget): Budget | null {
  return budgets.find((other) => other.subject.name === subject.name && other.kind === kind && other.measure === measure) ?? null;
}

/**
 * Logarithm of the total over what is wanted of it: the worst of the receivers; NaN where one has no total. `corners`: of each receiver,
 * how much more than the total stands at its worst corner of the tolerances; with that it has to be within budget as well.
 */
export function excessOf(budgets: readonly (Budget | null)[], { board }: Project, corners: readonly number[] = []): number {
  const headroom = 10 ** ((board.headroom?.value ?? 0) / 20);
  return Math.max(...budgets.map((budget, at) => (budget === null || budget.total === null ? NaN : Math.log((budget.total * Math.max(headroom, corners[at] ?? 1)) / budget.tolerates))));
}

/** What one aggressor puts on a receiver in one run, V; 0 where it does not. */
export function partOf(budget: Budget | null, { from, where }: Contribution): number {
  return budget?.contributions.find((other) => other.from === from && other.where === where)?.value ?? 0;
}

/** The runs that the receivers lie in, and the nets in those: nothing else puts anything on them. */
function changed(project: Project, changes: readonly Change[], budgets: readonly Budget[]): Project {
  const receivers = new Set(budgets.flatMap(({ subject }) => (subject.kind === 'net' ? [subject.name] : [subject.plus?.name, subject.minus?.name])));
  const runs = project.runs.filter((run) => netsOf(run).some(({ name }) => receivers.has(name)));
  const concerned = new Set(runs.flatMap(netsOf));
  return {
    ...project,
    runs: runs.map((run) => changes.find(({ before }) => before === run)?.after ?? run),
    nets: new Map([...project.nets].filter(([name, net]) => concerned.has(net) || receivers.has(name))),
  };
}

function netsOf(run: Run): readonly Net[] {
  return run.rows.flatMap(({ conductors }) => conductors.flatMap((conductor) => (conductor.kind === 'trace' ? [conductor.net] : [])));
}
