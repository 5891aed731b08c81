/**
 * Slows the edge of what disturbs a receiver by a resistor in series with its driver: the smallest of the E24 series that does.
 * It is written as part of `source`, with the capacitance that stands there.
 *
 * Not offered where the signal would no longer get through: a tenth of the load's resistance, and where it repeats, a
 * time constant with its own load of a tenth of the period, are the most.
 */
import type { End, Given, Net, Pair, Place, Project } from '../board/model';
import { assumedDriver } from '../budget/ends';
import type { BudgetFault } from '../rules/budgetFault';
import type { Finding } from '../rules/rule';
import { e24From } from '../units/e24';
import { inText } from '../units/inText';
import { ohms, type Resistance } from '../units/quantity';
import { withSignal } from './changedNet';
import type { Edit, FixContext, Proposal } from './fix';
import { textAt } from './gapAdjustable';
import { goalFor } from './solve';
import { solveValue, type Sought } from './solveValue';
import { statementAt } from './statementAt';
import { rowsAfter } from './rowsAfter';

export function slowedEdges({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  const name = largest?.from ?? null;
  const signal = name === null ? undefined : (context.project.nets.get(name) ?? context.project.pairs.get(name));
  if (largest === null || signal === undefined || signal.swing === null || !hasOneSource(context.project, signal)) return [];
  const driver = signal.source?.resistance?.value ?? assumedDriver;
  const sought = soughtFor(context.project, signal, driver);
  const value = solveValue(context, sought, goalFor(context, budget, largest, ({ from }) => from === name));
  const edit = value === null ? null : sourceEdit(context, signal, ohms(value));
  if (value === null || edit === null) return [];
  const words = `Slow ${signal.name} with ${asSold(value - driver)} in series at its source`;
  return [{ words, edits: [edit], moves: moreThanCopper }];
}

/** `62 Ω`, `4.7 Ω`: its two figures. */
function asSold(resistor: number): string {
  return inText(resistor, 'resistance').replace(/\.?0+ /u, (zeros) => (zeros.startsWith('.') ? ' ' : zeros)).replace(/(\.\d*[1-9])0+ /u, '$1 ');
}

/** It takes little room, but a change of the signal comes after every change of copper, m. */
const moreThanCopper = 1;

/** What a net of a pair has of its own, or of the pair, is a question that no fix settles. */
function hasOneSource({ pairs }: Project, signal: Net | Pair): boolean {
  if (signal.kind === 'pair') return [signal.plus, signal.minus].every((net) => net === null || net.source === null);
  return signal.source !== null || ![...pairs.values()].some((pair) => (pair.plus === signal || pair.minus === signal) && pair.source !== null);
}

function soughtFor(project: Project, signal: Net | Pair, driver: Resistance): Sought {
  const given = Math.max(driver, 1);
  return {
    given,
    better: 'more',
    smallest: driver + smallestResistor,
    largest: largestSource(signal, driver),
    tolerance: 0.02,
    slope: 1,
    // The series is coarser than the search.
    written: (value) => e24From(0.96 * (value - driver), 3).map((resistor) => driver + resistor),
    boardWith: (value) => {
      const place = signal.source?.place ?? signal.place;
      const resistance: Given<Resistance> = { tolerance: 0, place, ...signal.source?.resistance, value: ohms(value) };
      const source: End = { capacitance: null, place, ...signal.source, resistance };
      return withSignal(project, signal, { ...signal, source });
    },
  };
}

const smallestResistor = 1;

function largestSource({ load, source, repeats }: Net | Pair, driver: Resistance): number {
  const byDivider = (load?.resistance?.value ?? 1e6) / 10;
  const capacitance = (load === null ? 5e-12 : (load.capacitance?.value ?? 0)) + (source?.capacitance?.value ?? 0);
  const byTime = repeats === null || capacitance === 0 ? Infinity : 0.1 / (repeats.frequency.value * capacitance);
  return Math.min(driver + 10e3, byDivider, byTime);
}

/** Into the net's own `source`, or as one where a family states it, or nobody does. */
function sourceEdit(context: FixContext, { source, whole, name }: Net | Pair, value: Resistance): Edit | null {
  const isOwn = (place: Place) => place.path === whole.path && whole.span.start <= place.span.start && place.span.end <= whole.span.end;
  if (source !== null && isOwn(source.place)) {
    const { resistance, capacitance } = source;
    if (resistance !== null) return { ...resistance.place, newText: written(value, textAt(context, resistance.place)) };
    const before = capacitance?.place;
    return before === undefined ? null : { path: before.path, span: { start: before.span.start, end: before.span.start }, newText: `${written(value, '')}, ` };
  }
  const capacitance = source?.capacitance ?? null;
  // A built-in family stands in no file.
  const beside = capacitance === null ? '' : context.project.files.includes(capacitance.place.path) ? `, ${textAt(context, capacitance.place)}` : `, ${capacitance.value * 1e12} pF`;
  return newSource(context, { place: whole, name }, `${written(value, '')}${beside}`);
}

function newSource(context: FixContext, { place: { path, span } }: { readonly place: Place; readonly name: string }, value: string): Edit | null {
  const text = context.text(path);
  const statement = statementAt(text, { start: span.start, end: span.start });
  if (statement === null) return null;
  const { block } = statement;
  if (block === null) return { path, span: { start: statement.span.end, end: statement.span.end }, newText: ` { source ${value} }` };
  const last = block.statements.at(-1);
  if (last === undefined) return { path, span: { start: block.span.start + 1, end: block.span.start + 1 }, newText: ` source ${value} ` };
  return rowsAfter(text, { path, span: last.values[0]?.span ?? last.keywordSpan }, [['source', value]]);
}

/** In the unit that stands there, where that is an ohm; a letter code becomes a number that can hold it. */
function written(value: number, before: string): string {
  const [, space, unit] = /(\s*)(ohm|\u03a9|\u2126|R)$/u.exec(before) ?? [before, ' ', 'ohm'];
  const prefixed = 1e4 <= value ? [value / 1e3, `k${unit}`] as const : [value, unit] as const;
  return `${Number(prefixed[0].toPrecision(4))}${space}${prefixed[1]}`;
}
