/**
 * What a changed run would put on given receivers: the model's own evaluation, of the runs that matter
 * to them only, so that a search costs what it changes.
 */
import type { Net, Pair, Project, Run } from '../board/model';
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
  return trialOfProject(context, withRuns(context.project, changes), budgets);
}

/** The same of a board that is changed in any other way: its loops, its nets. */
export function trialOfProject(context: FixContext, project: Project, budgets: readonly Budget[]): Trial {
  const evaluation = context.evaluateProject(concerning(project, budgets));
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

/** The runs that the receivers lie in, the nets in those, and those of every other way: nothing else puts anything on them. */
function concerning(project: Project, budgets: readonly Budget[]): Project {
  const receivers = new Set(budgets.flatMap(({ subject }) => (subject.kind === 'net' ? [subject.name] : [subject.plus?.name, subject.minus?.name])));
  const runs = project.runs.filter((run) => netsOf(run).some(({ name }) => receivers.has(name)));
  const concerned = new Set([...runs.flatMap(netsOf), ...netsOutsideRuns(project)]);
  return {
    ...project,
    runs,
    nets: new Map([...project.nets].filter(([name, net]) => concerned.has(net) || receivers.has(name))),
  };
}

function withRuns(project: Project, changes: readonly Change[]): Project {
  return { ...project, runs: project.runs.map((run) => changes.find(({ before }) => before === run)?.after ?? run) };
}

function netsOf(run: Run): readonly Net[] {
  return run.rows.flatMap(({ conductors }) => conductors.flatMap((conductor) => (conductor.kind === 'trace' ? [conductor.net] : [])));
}

function netsOutsideRuns({ pairs, loops, returns, links }: Project): readonly Net[] {
  const ofPair = ({ plus, minus }: Pair) => [plus, minus].filter((net) => net !== null);
  const of = (signal: Net | Pair) => (signal.kind === 'net' ? [signal] : ofPair(signal));
  return [
    ...[...pairs.values()].flatMap(ofPair),
    ...loops.flatMap(({ carries, senses }) => [...carries.map(({ net }) => net), ...senses.flatMap(({ signal }) => of(signal))]),
    ...returns.flatMap(({ carries, refers }) => [...carries.map(({ net }) => net), ...refers.flatMap(({ signal }) => of(signal))]),
    ...links.flatMap(({ from, to }) => [from, to]),
  ];
}
