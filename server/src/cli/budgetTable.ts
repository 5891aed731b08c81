/** The budgets of a check as a table for a review: worst first, each with what makes it up. */
import type { Budget, Contribution } from '../budget/results';
import { inText } from '../units/inText';
import type { Paint } from './paint';
import { printable } from './printable';

/** Contributions below this share of the total are summed up in one line. */
const smallShare = 0.02;

export function budgetTable(budgets: readonly Budget[], paint: Paint): readonly string[] {
  if (budgets.length === 0) return ['  No receiver: nothing here tolerates a stated noise.'];
  const ordered = [...budgets].sort((a, b) => severity(a) - severity(b) || (a.marginDb ?? 0) - (b.marginDb ?? 0));
  const rows = ordered.map((budget) => ({ budget, cells: [nameOf(budget), `${budget.total === null ? '?' : inText(budget.total, 'voltage')} of ${inText(budget.tolerates, 'voltage')} ${budget.measure}`] }));
  const widths = [0, 1].map((column) => Math.max(...rows.map(({ cells }) => cells[column].length)));
  return rows.flatMap(({ budget, cells }) => [
    `  ${cells[0].padEnd(widths[0])}  ${cells[1].padEnd(widths[1])}  ${verdictInWords(budget, paint)}`,
    ...contributionLines(budget).map((line) => `  ${''.padEnd(widths[0])}    ${paint.faint(line)}`),
  ]);
}

const severities = { over: 0, unknown: 1, low: 2, pass: 3 } as const;
const severity = (budget: Budget) => severities[budget.verdict];

function nameOf({ subject, kind }: Budget): string {
  return printable(kind === 'common' ? `${subject.name} (mean)` : subject.name);
}

function verdictInWords({ verdict, total, tolerates, marginDb, bounds }: Budget, paint: Paint): string {
  // Of an incomplete budget what was counted can already be too much; that margin is one that no more counting can mend.
  const excess = total === null ? 0 : 20 * Math.log10(total / tolerates);
  switch (verdict) {
    case 'over': return paint.error(`over by ${inText(excess, 'level')}`);
    case 'low': return paint.warning(bounds !== null && tolerates < bounds[1] ? `low: ${inText(marginDb ?? 0, 'level')} to spare as drawn, over at a corner of the tolerances` : `low: ${inText(marginDb ?? 0, 'level')} to spare, less than the headroom`);
    case 'unknown': return paint.warning('incomplete: no margin');
    case 'pass': return marginDb === null ? 'within' : `within: ${inText(marginDb, 'level')} to spare`;
  }
}

function contributionLines({ contributions, total, unaccounted, errorBar, bounds, movedBy }: Budget): readonly string[] {
  const shown = contributions.filter(({ value }) => total === null || smallShare * total <= value);
  const rest = contributions.slice(shown.length);
  const lines = shown.map((each) => line(inText(each.value, 'voltage'), sourceOf(each)));
  if (rest.length === 1) lines.push(line(inText(rest[0].value, 'voltage'), sourceOf(rest[0])));
  if (1 < rest.length) lines.push(line(`≤ ${inText(Math.max(...rest.map(({ value }) => value)), 'voltage')}`, `each of ${rest.length} more`));
  if (total !== null && errorBar !== null && shownError * total < errorBar) lines.push(line(`± ${inText(errorBar, 'voltage')}`, 'numerical error'));
  const [most] = movedBy;
  if (bounds !== null && most !== undefined) lines.push(line(`≤ ${inText(bounds[1], 'voltage')}`, `over the tolerances, from ${inText(bounds[0], 'voltage')}; ${most.what} ± ${inText(most.share, 'fraction')} moves it most, by ± ${inText(most.moves, 'voltage')}`));
  return [...lines, ...unaccounted.map(({ what }) => line('?', what))];
}

/** Relative. Less is rounding, which nobody wants to read. */
const shownError = 1e-9;

const line = (amount: string, what: string) => `${amount.padStart(10)}  ${printable(what)}`;

const edges = { rise: 'rising', fall: 'falling', sine: 'sine' } as const;

function sourceOf({ channel, from, where, group, coupling }: Contribution): string {
  if (from === null) return `${channel} noise`;
  if (channel !== 'coupled') return `${channel === 'radiated' ? `field ${from} around` : `${from} by ${channel}`} ${where ?? ''}${group === null ? '' : `, group ${group}`}`;
  const edge = coupling === null ? '' : `, ${edges[coupling.edge]}`;
  return `${from} in ${where}${edge}${group === null ? '' : `, group ${group}`}`;
}
