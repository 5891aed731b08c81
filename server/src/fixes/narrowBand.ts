/**
 * Narrows the band of a receiver whose own noise is most of what it has: its upper end comes down, to two figures, and what the
 * receiver is there to pass must still fit, which only its designer knows; no further than to a tenth.
 */
import type { Frequency } from '../units/quantity';
import { hertz } from '../units/quantity';
import { unitSpelt } from '../units/spelling';
import type { BudgetFault } from '../rules/budgetFault';
import type { Finding } from '../rules/rule';
import { withSignal } from './changedNet';
import type { FixContext, Proposal } from './fix';
import { textAt } from './gapAdjustable';
import { goalFor } from './solve';
import { solveValue } from './solveValue';
import { replacement } from './writtenLength';

export function narrowedBand({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  const { subject } = budget;
  if (largest === null || largest.from !== null || largest.where !== null || subject.band === null) return [];
  const { band } = subject;
  const text = textAt(context, band.to.place);
  const written = frequencyWritten(text);
  if (written === null) return [];
  const given = band.to.value;
  const value = solveValue(context, {
    given,
    better: 'less',
    smallest: Math.max(2 * band.from.value, given / 10),
    largest: given,
    tolerance: 0.005,
    slope: 0.5,
    written: (found) => [0, 1, 2].map((steps) => roundedDown(found * (1 + 2e-3), steps)),
    boardWith: (to) => withSignal(context.project, subject, { ...subject, band: { ...band, to: { ...band.to, value: hertz(to) } } }),
  }, goalFor(context, budget, largest, ({ from, where }) => from === null && where === null));
  if (value === null) return [];
  return [{ words: `Narrow the band of ${subject.name} to ${textAt(context, band.from.place)} to ${written(hertz(value))}`, edits: [replacement(band.to.place, written(hertz(value)))], moves: moreThanCopper }];
}

/** A change of what the circuit is there for comes after every change of copper, m. */
const moreThanCopper = 1;

function roundedDown(value: number, steps: number): number {
  const step = 10 ** (Math.floor(Math.log10(value)) - 1);
  return (Math.floor(value / step) - steps) * step;
}

/** In the unit that stands there, with its space. */
function frequencyWritten(text: string): ((value: Frequency) => string) | null {
  const [, rest] = /^[+]?[\d.]+(?:[eE][+-]?\d+)?(\s*[A-Za-z]+)$/u.exec(text) ?? [];
  const unit = rest === undefined ? undefined : unitSpelt(rest.trim());
  if (unit?.dimension !== 'frequency') return null;
  const size = unit.inSi({ digits: '1', exponent: 0 });
  return (value) => `${Number((value / size).toPrecision(2))}${rest}`;
}
