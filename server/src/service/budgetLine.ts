/** A budget in one line, the number first: `1.84 mV of 2.00 mV · 0.7 dB left`. */
import type { Budget } from '../budget/results';
import { receiverInText, voltageInText } from '../rules/budgetFault';
import { inText } from '../units/inText';

export function budgetLine(budget: Budget): string {
  const { total, tolerates, subject, kind } = budget;
  const whole = kind === 'common' ? ` as ${receiverInText(budget).replace(` of pair ${subject.name}`, '')}` : '';
  if (total === null) return `no total of ${voltageInText(tolerates, budget)}${whole} · something could not be computed`;
  return `${inText(total, 'voltage')} of ${voltageInText(tolerates, budget)}${whole} · ${marginInWords(budget)}`;
}

function marginInWords({ marginDb, total, tolerates, complete, unaccounted }: Budget): string {
  if (marginDb !== null) return marginDb < 0 ? `${inText(-marginDb, 'level')} too much` : `${inText(marginDb, 'level')} left`;
  if (complete) return 'nothing reaches it';
  const over = tolerates < (total ?? 0) ? `${inText(20 * Math.log10((total ?? 0) / tolerates), 'level')} too much, and ` : '';
  return `${over}${unaccounted.length} not counted`;
}
