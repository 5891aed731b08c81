/** A net or pair: what it does, its budget with what makes it up, and what it does to others. */
import type { End, Net, Pair, Project, Signal, SignalCurrent } from '../../board/model';
import type { Budget, Contribution } from '../../budget/results';
import { causeInText, budgetFault, excessInText, placeWords, receiverInText, remedyInText, shareOf, voltageInText } from '../../rules/budgetFault';
import { errorInText, inText } from '../../units/inText';
import type { Analysis } from '../session';
import { budgetPicture } from '../pictures/budgetPicture';
import { drawn, type Pictures } from './pictures';
import { tolerancesInWords } from './tolerancesInWords';
import { bar, escaped, escapedLines, paragraphs, percent, table } from './markdown';

export function signalHover({ project, evaluation }: Analysis, signal: Net | Pair, pictures: Pictures): string {
  const budgets = evaluation.budgets.filter(({ subject }) => subject === signal);
  return paragraphs(
    signal.documentation === null ? null : escapedLines(signal.documentation),
    ...budgets.map((budget) => budgetInWords(project, budget, pictures)),
    `**${escaped(signal.name)}**: ${roleInWords(signal, project)}`,
    signal.kind === 'net' ? disturbedBy(evaluation.budgets, signal) : null,
  );
}

function roleInWords(signal: Net | Pair, { pairs }: Project): string {
  const drives = sourceInWords(signal);
  const listens = signal.toleratesPeak !== null || signal.toleratesRms !== null || (signal.kind === 'pair' && signal.commonTolerates !== null);
  const pair = signal.kind === 'pair' ? undefined : [...pairs.values()].find(({ plus, minus }) => plus === signal || minus === signal);
  const alone = pair === undefined ? `a ${signal.kind} that neither drives nor listens` : 'a net of a pair';
  const role = drives === '' ? (listens ? 'a receiver' : alone) : listens ? `a source, ${drives}, and a receiver` : `a source, ${drives}`;
  const family = signal.family === null ? [] : [`of family ${escaped(signal.family)}`];
  return [role, ...family, ...netsInWords(signal), ...(pair === undefined ? [] : [`the ${pair.plus === signal ? 'plus' : 'minus'} of ${escaped(pair.name)}`]), ...endsInWords(signal, pair)].join(', ');
}

function netsInWords(signal: Net | Pair): readonly string[] {
  return signal.kind === 'pair' ? [`plus ${escaped(signal.plus?.name ?? '?')}`, `minus ${escaped(signal.minus?.name ?? '?')}`, ...(signal.across === null ? [] : [`${endInText(signal.across)} across`])] : [];
}

/** What a pair leaves to its nets, or a net to its pair, is not missing. */
function endsInWords(signal: Net | Pair, pair: Pair | undefined): readonly string[] {
  return (['source', 'load'] as const).flatMap((name) => {
    const end = signal[name];
    if (end !== null) return [`${name} ${endInText(end)}`];
    if (signal.kind === 'pair') return [];
    return [pair?.[name] == null ? `no ${name} stated` : `${name} of its pair`];
  });
}

function sourceInWords({ swing, rise, fall, sine, current, repeats, once }: Signal): string {
  const parts: string[] = [];
  const often = repeats === null ? (once ? ', once' : '') : `, repeated at ${inText(repeats.frequency.value, 'frequency')}`;
  const falls = fall === null || fall.value === rise?.value ? '' : `, falling in ${inText(fall.value, 'time')}`;
  if (swing !== null) parts.push(`${inText(swing.value, 'voltage')}${rise === null ? '' : ` in ${inText(rise.value, 'time')}`}${falls}${often}`);
  if (sine !== null) parts.push(`a sine of ${inText(sine.amplitude.value, 'voltage')} ${sine.measure}${frequencyInWords(sine)}`);
  if (current !== null) parts.push(`${currentInWords(current)} drawn at its load`);
  return parts.join(' and ');
}

export function currentInWords(current: SignalCurrent): string {
  const amount = inText(current.amplitude.value, 'current');
  if (current.form === 'sine') return `${amount} ${current.measure}${frequencyInWords(current)}`;
  return `${amount}${current.rise === null ? '' : ` in ${inText(current.rise.value, 'time')}`}`;
}

function frequencyInWords({ from, to }: Pick<NonNullable<Signal['sine']>, 'from' | 'to'>): string {
  return to === null ? ` at ${inText(from.value, 'frequency')}` : ` from ${inText(from.value, 'frequency')} to ${inText(to.value, 'frequency')}`;
}

export function endInText({ resistance, capacitance }: End): string {
  return [resistance === null ? null : inText(resistance.value, 'resistance'), capacitance === null ? null : inText(capacitance.value, 'capacitance')].filter((part) => part !== null).join(' ‖ ');
}

/** The number first, then what it looks like, the cause and the way out; what can be read at leisure below. */
function budgetInWords(project: Project, budget: Budget, pictures: Pictures): string {
  return paragraphs(
    totalInWords(project, budget),
    drawn(pictures, () => budgetPicture(project, budget)),
    wayOut(project, budget),
    tolerancesInWords(budget),
    budget.unaccounted.length === 0 ? null : `Not in it: ${budget.unaccounted.map(({ what }) => escaped(what)).join('; ')}`,
    budget.contributions.length === 0 ? null : contributionsTable(budget),
  );
}

function totalInWords(project: Project, budget: Budget): string {
  const tolerated = `${voltageInText(budget.tolerates, budget)} tolerated${ofWhat[budget.kind]}`;
  const name = `**${escaped(budget.subject.name)}**`;
  if (budget.total === null) return `${name}: no total of ${tolerated}`;
  const amount = `${name}: **${voltageInText(budget.total, budget)}**${barInText(budget)} of ${tolerated}`;
  return `${amount}: ${verdictInWords(project, budget)}`;
}

const ofWhat = { net: '', pair: ' of the difference', common: ' of the mean' } as const;

function verdictInWords({ board }: Project, { verdict, marginDb, total, tolerates }: Budget): string {
  const margin = marginDb ?? (total === null || total === 0 ? Infinity : 20 * Math.log10(tolerates / total));
  const headroom = board.headroom?.value ?? 0;
  switch (verdict) {
    case 'over': return `over by ${inText(-margin, 'level')}`;
    case 'low': return `${inText(margin, 'level')} of the ${inText(headroom, 'level')} wanted`;
    case 'pass': return margin === Infinity ? 'within budget' : `within budget by ${inText(margin, 'level')}`;
    case 'unknown': return 'so far, and no margin: the budget is incomplete';
  }
}

function barInText({ errorBar, total }: Budget): string {
  return errorBar === null || total === null || errorBar <= shownError * total ? '' : ` ${errorInText(errorBar, total, 'voltage')}`;
}

/** Relative. Less is rounding, which nobody wants to read. */
const shownError = 1e-9;

const rowsShown = 12;

function contributionsTable(budget: Budget): string {
  const shown = budget.contributions.slice(0, rowsShown);
  const rows = shown.map((contribution) => {
    const share = shareOf(contribution, budget);
    return [channelInWords(contribution), sourceOf(contribution), whereInWords(contribution), valueInWords(contribution, budget), `${bar(share)} ${percent(share)}`];
  });
  const rest = budget.contributions.length - shown.length;
  const sum = budget.measure === 'rms' || budget.combine === 'rss' ? 'Unrelated sources add as squares' : 'All peaks add';
  return paragraphs(table(['channel', 'from', 'where', 'value', 'share'], rows), `${rest === 0 ? '' : `and ${rest} more. `}${sum}.`);
}

/** An edge needs no word; what repeats or swings by itself adds in another way. */
function sourceOf({ from, cause, spectrum }: Contribution): string {
  if (from === null) return 'itself';
  return `${escaped(from)}${spectrum !== null ? ', repeated edges' : cause.startsWith('sine of ') ? ', sine' : ''}`;
}

function channelInWords({ channel, coupling }: Contribution): string {
  if (coupling === null) return channel;
  const [capacitive, inductive] = [Math.abs(coupling.capacitivePart), Math.abs(coupling.inductivePart)];
  if (!(0 < capacitive + inductive)) return channel;
  return `${channel}, ${capacitive < inductive ? 'mostly inductive' : 'mostly capacitive'}`;
}

function whereInWords({ channel, where, group }: Contribution): string {
  return [...(where === null ? [] : [`${placeWords[channel]} ${escaped(where)}`]), ...(group === null ? [] : [`switches with ${escaped(group)}`])].join(', ');
}

function valueInWords({ value, unfiltered }: Contribution, budget: Budget): string {
  return `${voltageInText(value, budget)}${unfiltered === null || unfiltered === value ? '' : ` in its band, ${inText(unfiltered, 'voltage')} before it`}`;
}

function wayOut(project: Project, budget: Budget): string | null {
  if (budget.verdict !== 'over' && budget.verdict !== 'low') return null;
  const fault = budgetFault(project, budget);
  return `${escaped(causeInText(fault))}: ${excessInText(fault)}. ${remedyInText(fault.largest)}.`;
}

/** Of a source: whom it disturbs most. */
function disturbedBy(budgets: readonly Budget[], net: Net): string | null {
  const most = budgets
    .flatMap((budget) => {
      const own = budget.contributions.filter(({ from }) => from === net.name);
      const value = own.reduce((sum, contribution) => sum + contribution.value, 0);
      return own.length === 0 ? [] : [{ budget, value, share: value / budget.tolerates }];
    })
    .sort((a, b) => b.share - a.share);
  if (most.length === 0) return null;
  const shown = most.slice(0, 3).map(({ budget, value, share }) => `${voltageInText(value, budget)} on ${escaped(receiverInText(budget))} (${percent(share)} of what it tolerates)`);
  return `It puts ${shown.join(', ')}${shown.length < most.length ? ` and less on ${most.length - shown.length} more` : ''}.`;
}
