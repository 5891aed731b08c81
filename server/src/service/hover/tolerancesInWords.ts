/** What the stated tolerances do to a budget: its range, and what moves it most. */
import type { Budget } from '../../budget/results';
import { voltageInText } from '../../rules/budgetFault';
import { inText } from '../../units/inText';
import { escaped } from './markdown';

const shown = 3;

export function tolerancesInWords(budget: Budget): string | null {
  const { bounds, movedBy } = budget;
  if (bounds === null || movedBy.length === 0) return null;
  const most = movedBy.slice(0, shown).map(({ what, share, moves }) => `${escaped(what)} ± ${inText(share, 'fraction')} by ± ${inText(moves, 'voltage')}`);
  const rest = movedBy.length - most.length;
  return `Over the tolerances **${voltageInText(bounds[0], budget)} to ${voltageInText(bounds[1], budget)}**${budget.tolerates < bounds[1] && (budget.total ?? Infinity) <= budget.tolerates ? ', over at a corner' : ''}. What moves it: ${most.join('; ')}${rest === 0 ? '' : `; less by ${rest} more`}.`;
}
