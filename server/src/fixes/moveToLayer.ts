/** Moves the run that disturbs a receiver most to another copper layer: nearer to its planes, or between two, the field stays closer. */
import type { CopperRow, Run } from '../board/model';
import type { BudgetFault } from '../rules/budgetFault';
import type { Finding } from '../rules/rule';
import { insulationMatters } from '../rules/touchLimits';
import type { NameValue } from '../syntax/tree';
import { writtenName } from '../syntax/writtenName';
import type { FixContext, Proposal } from './fix';
import { statementAt } from './statementAt';
import { trial } from './trial';

/** The layer on which the receiver gets least. */
export function movedToLayer({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  const run = largest?.coupling?.run;
  const written = run === undefined ? null : layerIn(context, run);
  if (run === undefined || written === null || hasInsulation(context, run)) return [];
  const others = run.stackup.rows.filter((row): row is CopperRow => row.kind === 'copper' && row !== run.rows[0].layer);
  const tried = others.flatMap((layer) => {
    const total = trial(context, [{ before: run, after: { ...run, rows: [{ ...run.rows[0], layer }] } }], [budget]).budgets[0]?.total ?? null;
    return total === null ? [] : [{ layer, total }];
  });
  if (tried.length === 0) return [];
  const { layer } = tried.reduce((best, other) => (other.total < best.total ? other : best));
  return [{ words: `Move run ${run.name} to ${layer.name}`, edits: [{ path: run.place.path, span: written.span, newText: writtenName(layer.name) }], moves: throughTheBoard }];
}

/** Each net takes two vias more: that comes after a change of its own layer, and before one of the signal, m. */
const throughTheBoard = 0.5;

/** Null where the layers of a run stand with its rows: the others of the run are there for a reason. */
function layerIn(context: FixContext, run: Run): NameValue | null {
  if (run.rows.length !== 1) return null;
  const statement = statementAt(context.text(run.place.path), run.place.span);
  return statement?.values.find((value): value is NameValue => value.kind === 'name' && value.role === 'layer') ?? null;
}

/** A layer brings a trace nearer to what lies above and below, and nobody but a qualified person may. */
function hasInsulation({ project }: FixContext, { rows }: Run): boolean {
  return rows.some(({ conductors }) => conductors.some((each) => each.kind === 'trace' && insulationMatters(each.net, project)));
}
