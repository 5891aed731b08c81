/** Ties a floating shield to the reference: the word changes, and the board is told that the layout will. */
import type { Shield } from '../board/model';
import type { BudgetFault } from '../rules/budgetFault';
import { floatingShield } from '../rules/floatingShield';
import type { Finding } from '../rules/rule';
import { parse } from '../syntax/parse';
import type { Statement } from '../syntax/tree';
import type { Edit, Fix, FixContext, Proposal } from './fix';
import { judgedByFinding } from './judged';

export function groundedShield(finding: Finding, context: FixContext): readonly Fix[] {
  if (finding.rule !== floatingShield.name) return [];
  const { shield } = finding.fault as unknown as { readonly shield: Shield };
  const edit = grounding(shield, context);
  const fix = edit === null ? null : judgedByFinding(finding, context, `Ground shield ${shield.name}`, [edit]);
  return fix === null ? [] : [{ ...fix, preferred: true }];
}

/** For a receiver under a shield that floats while a field brings it most of its noise. */
export function shieldGrounded({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  if (largest?.channel !== 'radiated') return [];
  const { subject } = budget;
  const nets = subject.kind === 'net' ? [subject] : [subject, subject.plus, subject.minus];
  const over = context.project.shields.filter(({ grounded, covers }) => grounded === false && covers.some(({ subject: covered }) => ('kind' in covered ? nets.includes(covered) : covered.senses.some(({ signal }) => nets.includes(signal)))));
  return over.flatMap((shield): readonly Proposal[] => {
    const edit = grounding(shield, context);
    return edit === null ? [] : [{ words: `Ground shield ${shield.name}`, edits: [edit], moves: 0 }];
  });
}

function grounding({ whole: { path, span } }: Shield, context: FixContext): Edit | null {
  const floating = statementsIn(parse(context.text(path)).statements, span).find(({ keyword }) => keyword === 'floating');
  return floating === undefined ? null : { path, span: floating.keywordSpan, newText: 'grounded' };
}

function statementsIn(statements: readonly Statement[], { start, end }: { readonly start: number; readonly end: number }): readonly Statement[] {
  return statements.flatMap((statement) => (statement.span.end <= start || end <= statement.span.start ? [] : [statement, ...statementsIn(statement.block?.statements ?? [], { start, end })]));
}
