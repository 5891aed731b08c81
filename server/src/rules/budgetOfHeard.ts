/** The budgets that something heard counts in, and as how much. */
import type { Heard } from '../budget/heard';
import { largestPeak, rmsOf } from '../budget/heard';
import type { Budget, Evaluation } from '../budget/results';

export function budgetOfHeard({ budgets }: Evaluation, heard: Heard): readonly { readonly budget: Budget; readonly value: number }[] {
  const { receiver: { subject, kind }, sines, spectrum } = heard;
  return budgets.filter((budget) => budget.subject === subject && budget.kind === kind).map((budget) => ({
    budget,
    value: budget.measure === 'peak' ? largestPeak(heard) : Math.hypot(spectrum === null ? 0 : rmsOf(spectrum.spectrum), ...sines.map(({ rms }) => rms)),
  }));
}
