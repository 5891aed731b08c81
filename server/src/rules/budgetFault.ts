/**
 * What the rules on budgets have in common: the fault they yield, and the words for what a receiver
 * has, where that comes from and what would lower it.
 */
import type { Place, Project } from '../board/model';
import type { Budget, Channel, Contribution } from '../budget/results';
import { inText } from '../units/inText';
import type { Fault, RelatedPlace, Subject } from './rule';
import { traceOf } from './gapsBetween';

export interface BudgetFault extends Fault {
  readonly budget: Budget;
  readonly largest: Contribution | null;
  /** What total would be wanted: what is tolerated, less the headroom. */
  readonly wanted: number;
}

export function budgetFault(project: Project, budget: Budget): BudgetFault {
  return {
    at: budget.subject.place,
    subject: subjectOf(budget),
    names: budget.kind === 'common' ? ['common', budget.measure] : [budget.measure],
    related: relatedPlaces(project, budget),
    ...(budget.total === null ? {} : { value: budget.total }),
    limit: budget.tolerates,
    unit: 'V',
    budget,
    largest: budget.contributions[0] ?? null,
    wanted: budget.tolerates / 10 ** ((project.board.headroom?.value ?? 0) / 20),
  };
}

export function subjectOf({ subject }: Budget): Subject {
  return { kind: subject.kind, name: subject.name };
}

/** `RX_IN`, `pair AIN`, `the mean of pair AIN`. */
export function receiverInText({ kind, subject }: Budget): string {
  switch (kind) {
    case 'net': return subject.name;
    case 'pair': return `pair ${subject.name}`;
    case 'common': return `the mean of pair ${subject.name}`;
  }
}

/** `5.30 mV`, `2.00 µV rms`: a peak is what a number without a word means. */
export function voltageInText(value: number, { measure }: Budget): string {
  return `${inText(value, 'voltage')}${measure === 'rms' ? ' rms' : ''}`;
}

/** Its part of the total, as the budget's own sum makes it up. */
export function shareOf(contribution: Contribution, { total, measure, combine }: Budget): number {
  if (total === null || !(0 < total)) return 0;
  const ratio = Math.min(1, contribution.value / total);
  return measure === 'rms' || combine === 'rss' ? ratio * ratio : ratio;
}

/** `VALVE_PWM in run valve-past-rx makes 98 % of it`; the largest contribution where none dominates. */
export function causeInText({ budget, largest }: BudgetFault): string {
  if (largest === null) return 'no single cause';
  const share = shareOf(largest, budget);
  const others = budget.contributions.length - 1;
  if (others === 0 || 0.995 <= share) return `${originInText(largest)} makes all of it`;
  const percent = `${Math.round(share * 100)} %`;
  return share <= 0.5 ? `${budget.contributions.length} causes, the largest is ${originInText(largest)} with ${percent}` : `${originInText(largest)} makes ${percent} of it`;
}

/** `Widen the gap, shorten the run, or put a stitched guard between`. */
export function remedyInText(largest: Contribution | null): string {
  if (largest === null) return 'Quieten its sources';
  // A sine has no edge to slow.
  return largest.channel === 'link' && !largest.cause.startsWith('sine of ') ? `${remedies.link}, or slow the edge` : remedies[largest.channel];
}

/** `34.2 dB too much`; with a headroom, both what is over and what it takes to have that as well. */
export function excessInText({ budget, wanted }: BudgetFault): string {
  const over = (limit: number) => inText(20 * Math.log10((budget.total ?? limit) / limit), 'level');
  return wanted < budget.tolerates ? `${over(budget.tolerates)} too much, ${over(wanted)} with the headroom` : `${over(wanted)} too much`;
}

/** The places that the project holds: a built-in family's `tolerates` stands in no file. */
export function placesInFiles(project: Project, related: readonly { readonly place: Place | null; readonly message: string }[]): RelatedPlace[] {
  return related.flatMap(({ place, message }) => (place !== null && project.files.includes(place.path) ? [{ place, message }] : []));
}

function originInText({ channel, from, where }: Contribution): string {
  if (channel === 'radiated') return `field ${from} around ${where}`;
  const place = where === null ? '' : ` in ${placeWords[channel]} ${where}`;
  return from === null ? `its own ${channel} noise` : `${from}${place}`;
}

export const placeWords: Readonly<Record<Channel, string>> = {
  coupled: 'run', link: 'link', loop: 'loop', 'shared return': 'return', radiated: 'the contour of', thermal: 'net', amplifier: 'net', flicker: 'net', contact: 'net',
};

const remedies: Readonly<Record<Channel, string>> = {
  coupled: 'Widen the gap, shorten the run, or put a stitched guard between',
  link: 'Lower its capacitance or its mutual inductance',
  loop: 'Make the loops smaller, part them, or lay them over a plane',
  'shared return': 'Give it a return of its own',
  radiated: 'Make its loop smaller, or shield it',
  thermal: 'Lower its source resistance, narrow its band, or give it more capacitance',
  amplifier: 'Take a quieter input stage, lower its source resistance, or narrow its band',
  flicker: 'Take a quieter input stage, or begin its band higher',
  contact: 'Take quieter resistors, put less dc voltage across them, or begin its band higher',
};

/** What is tolerated, and both sides of the largest couplings. */
function relatedPlaces(project: Project, budget: Budget): RelatedPlace[] {
  const tolerated = { place: budget.toleratesPlace, message: `${receiverInText(budget)} tolerates ${voltageInText(budget.tolerates, budget)}` };
  const origins = budget.contributions.slice(0, shownOrigins).map((contribution) => ({
    place: aggressorPlace(contribution),
    message: `${originInText(contribution)} puts ${voltageInText(contribution.value, budget)} on it`,
  }));
  return placesInFiles(project, [tolerated, ...origins]);
}

const shownOrigins = 3;

function aggressorPlace({ coupling, place }: Contribution): Place | null {
  const trace = coupling === null ? null : traceOf(coupling.run, coupling.aggressor);
  return trace?.whole ?? place;
}
