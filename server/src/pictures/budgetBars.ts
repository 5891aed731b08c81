/**
 * The budget of a receiver as bars, one for each contribution and one for their sum, over what is tolerated.
 *
 *   VALVE in run past  |=========|////////|   12.0 mV      hatched: beyond what is tolerated
 *   sum                |=========|////////|   12.1 mV
 *                      0    tolerated
 */
import { inText } from '../units/inText';
import { linearAxis } from './axis';
import { ink } from './ink';
import { pictureWidth, type Picture } from './picture';
import { element, line, shortened, svgDocument, words } from './svg';

export interface BudgetBars {
  readonly receiver: string;
  readonly measure: 'peak' | 'rms';
  /** Volts. */
  readonly tolerates: number;
  /** What is tolerated less the headroom, where one is wanted. */
  readonly wanted: number | null;
  readonly total: number | null;
  /** Largest first. */
  readonly parts: readonly { readonly name: string; readonly value: number; /** Of the total, as the sum makes it up. */ readonly share: number }[];
  readonly sum: 'adds' | 'squares';
}

const rowHeight = 19;
const left = 124;
const right = 170;
const barsShown = 8;

export function budgetBars(budget: BudgetBars): Picture {
  const { parts, total, tolerates, wanted } = budget;
  const shown = parts.slice(0, barsShown);
  const rest = parts.length - shown.length;
  const from = shown.map(({ name, value, share }) => ({ name, value, note: percent(share), bold: false }));
  const bars = total === null ? from : [...from, { name: 'sum', value: total, note: excess(total / tolerates), bold: true }];
  const top = 22;
  const foot = top + rowHeight * (bars.length + (rest === 0 ? 0 : 1));
  const largest = Math.max(tolerates, ...bars.map(({ value }) => value).filter(Number.isFinite));
  const axis = linearAxis({ from: 0, to: 1.02 * largest, pixels: [left, pictureWidth - right], dimension: 'voltage' }, 52);
  const marks = [
    ...limitMark(axis.at(tolerates), { top, foot }, `tolerated ${voltage(tolerates, budget)}`, '6 3'),
    ...(wanted === null ? [] : headroomMark(axis.at(wanted), { top, foot }, voltage(wanted, budget))),
  ];
  const ticks = axis.ticks.flatMap(({ value, label }) => [line([axis.at(value), foot], [axis.at(value), foot + 4]), words(label, { x: axis.at(value), y: foot + 15 }, { 'text-anchor': 'middle' })]);
  const parted = [
    ...bars.flatMap(({ name, value, note, bold }, row) => {
      // The sum stands under what it is the sum of, the rest that is not drawn included.
      const y = top + rowHeight * (bold && 0 < rest ? row + 1 : row);
      return [...bar(axis, { value, tolerates, y, bold }), words(shortened(name, 18), { x: left - 7, y: y + 13 }, { 'text-anchor': 'end', ...(bold ? { 'font-weight': 'bold' } : {}) }), words(`${voltage(value, budget)} · ${note}`, { x: pictureWidth - right + 8, y: y + 13 })];
    }),
    ...(rest === 0 ? [] : [words(`and ${rest} more`, { x: left - 7, y: top + rowHeight * shown.length + 13 }, { 'text-anchor': 'end', 'font-style': 'italic' })]),
    line([left, foot], [pictureWidth - right, foot]),
    line([left, top], [left, foot]),
    ...ticks,
    ...marks,
  ];
  return svgDocument({ width: pictureWidth, height: foot + 22, words: budgetInWords(budget, rest), parts: parted });
}

function bar(axis: { at(value: number): number }, { value, tolerates, y, bold }: { readonly value: number; readonly tolerates: number; readonly y: number; readonly bold: boolean }): readonly string[] {
  const [start, limit, end] = [axis.at(0), axis.at(tolerates), axis.at(Number.isFinite(value) ? value : 0)];
  const shape = { y: y + 3, height: rowHeight - 7 };
  const within = element('rect', { x: start, width: Math.max(0.75, Math.min(end, limit) - start), ...shape, fill: bold ? ink.text : ink.good });
  return limit < end ? [within, element('rect', { x: limit, width: end - limit, ...shape, fill: 'url(#over)', stroke: ink.over })] : [within];
}

/** The word stands over its line, drawn back from the edges of the picture. */
function limitMark(x: number, { top, foot }: { readonly top: number; readonly foot: number }, label: string, dashes: string): readonly string[] {
  return [line([x, top - 4], [x, foot], { stroke: ink.limit, 'stroke-width': 1.75, 'stroke-dasharray': dashes }), words(label, { x: Math.max(90, Math.min(pictureWidth - 90, x)), y: top - 9 }, { 'text-anchor': 'middle', fill: ink.limit, 'font-weight': 'bold' })];
}

/** Told beside the axis: over the bars there is room for one word only. */
function headroomMark(x: number, { top, foot }: { readonly top: number; readonly foot: number }, label: string): readonly string[] {
  const stroke = { stroke: ink.limit, 'stroke-width': 1.5, 'stroke-dasharray': '1.5 3' };
  const from = pictureWidth - right + 22;
  return [line([x, top], [x, foot], stroke), line([from, foot + 11], [from + 16, foot + 11], stroke), words(`headroom: ${label}`, { x: from + 20, y: foot + 15 }, { fill: ink.limit })];
}

function budgetInWords(budget: BudgetBars, rest: number): string {
  const { receiver, total, tolerates, wanted, parts, sum } = budget;
  const whole = total === null ? `Noise on ${receiver}: no total` : `Noise on ${receiver}: ${voltage(total, budget)}, ${excess(total / tolerates)}`;
  const limits = `${voltage(tolerates, budget)} tolerated${wanted === null ? '' : `, ${voltage(wanted, budget)} with the headroom`}`;
  const listed = parts.slice(0, barsShown).map(({ name, value, share }) => `${name} ${voltage(value, budget)} (${percent(share)})`);
  const made = listed.length === 0 ? '' : ` Made up of ${listed.join(', ')}${rest === 0 ? '' : ` and ${rest} more`}; ${sum === 'adds' ? 'peaks add' : 'squares add'}.`;
  return `${whole}; ${limits}.${made}`;
}

function voltage(value: number, { measure }: BudgetBars): string {
  return `${inText(value, 'voltage')}${measure === 'rms' ? ' rms' : ''}`;
}

function percent(share: number): string {
  return share === 0 ? '0 %' : share < 0.01 ? '< 1 %' : `${Math.round(100 * share)} %`;
}

/** Of what is tolerated. */
function excess(ratio: number): string {
  if (!(0 < ratio)) return 'none';
  return `${inText(Math.abs(20 * Math.log10(ratio)), 'level')} ${ratio <= 1 ? 'to spare' : 'over'}`;
}
