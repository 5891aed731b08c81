/**
 * Puts a guard between a receiver and what disturbs it, tied to the reference so often that it holds at
 * the fastest edge of the run: in the gap as it is where there is room, else with the lanes widened to
 * what would just do.
 */
import type { Place, Project, Run } from '../board/model';
import type { Budget } from '../budget/results';
import type { BudgetFault } from '../rules/budgetFault';
import { gapsBetween } from '../rules/gapsBetween';
import type { Finding } from '../rules/rule';
import { writtenName } from '../syntax/writtenName';
import { metres } from '../units/quantity';
import { bringsNearer } from './bringsNearer';
import { withGuard, type GapPlace, type NewGuard } from './changedRun';
import type { Edit, FixContext, Proposal } from './fix';
import { clearanceOf, gapAdjustable, gapOf, isSpaced } from './gapAdjustable';
import { rowsAfter } from './rowsAfter';
import { solve, withinBudget, type Adjustable } from './solve';
import { trial } from './trial';
import type { WrittenLength } from './writtenLength';

export function stitchedGuard({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  const coupling = largest?.coupling ?? null;
  const between = coupling === null ? null : gapsBetween(coupling.run, coupling.aggressor, coupling.victim);
  if (coupling === null || between === null) return [];
  const place = { row: between.row, gap: between.gaps[0]! };
  const lane = isSpaced(coupling.run, place) || isGuarded(coupling.run, between) ? null : laneFor(context, coupling.run, place);
  if (lane === null) return [];
  if (bringsNearer(context.project, coupling.run, withGuard(coupling.run, place, lane.guardWith(lane.adjustable.given.value)))) return [];
  const solved = solve(context, [lane.adjustable], withinBudget(context, [budget]));
  const side = solved === null || !solved.enough ? lane.adjustable.given.value : solved.values[0]!;
  const guard = lane.guardWith(side);
  const holds = tiesThatHold(context, coupling.run, withGuard(coupling.run, place, guard), budget);
  const tied = { ...guard, stitched: holds === null ? null : lane.written.rounded(roundDown(holds), 'down') };
  if (bringsNearer(context.project, coupling.run, withGuard(coupling.run, place, tied))) return [];
  return [{ words: wordsFor(tied, lane, gapOf(coupling.run, place).value), edits: editsFor(context, coupling.run, place, tied, lane.written), moves: widthOf(tied) - gapOf(coupling.run, place).value + tied.width + viasOf(tied, coupling.run) * holeWidth }];
}

/** Tied where it has to be, from narrow vias to a guard wide enough to take one. */
const usualWidth = 0.25e-3;

/** What a via takes from a board: a small hole with its ring. */
const holeWidth = 0.3e-3;

interface Lane {
  readonly adjustable: Adjustable;
  readonly written: WrittenLength;
  /** With this much room to its neighbours; in a gap that is wide enough, in its middle. */
  guardWith(side: number): NewGuard;
}

function laneFor(context: FixContext, run: Run, place: GapPlace): Lane | null {
  const gap = gapAdjustable(context, run, place);
  if (gap === null) return null;
  const { written } = gap;
  const clearance = written.rounded(clearanceOf(context.project), 'up');
  const name = referenceName(context.project, run);
  const width = written.rounded(Math.max(guardWidth(context.project, run), clearance), 'up');
  const room = gapOf(run, place).value - width;
  const narrowest = Math.max(clearance, written.rounded(room / 2, 'down'));
  const guardWith = (side: number): NewGuard => {
    const left = metres(side);
    // What rounding leaves over stays in the gap, so that nothing moves where there is room.
    const right = Math.abs(side - narrowest) < written.grid / 2 && 2 * clearance <= room + 1e-9 ? written.rounded(room - left, 'up') : left;
    return { name, width, stitched: null, left, right };
  };
  const adjustable: Adjustable = {
    ...gap,
    given: { ...gap.given, value: metres(narrowest) },
    smallest: narrowest,
    largest: Math.max(gap.largest, 2 * narrowest),
    slope: 0.5,
    apply: (changed, side) => withGuard(changed, place, guardWith(side)),
  };
  return { adjustable, written, guardWith };
}

/** One guard does; a second beside it would be for looks. */
function isGuarded(run: Run, { row, gaps }: { row: number; gaps: readonly number[] }): boolean {
  return gaps.some((gap) => run.rows[row]!.conductors.slice(gap, gap + 2).some(({ kind }) => kind !== 'trace'));
}

/** What the board's other guards are tied to, those of this run first. */
function referenceName({ runs }: Project, run: Run): string {
  const guards = [run, ...runs].flatMap(({ rows }) => rows.flatMap(({ conductors }) => conductors.filter(({ kind }) => kind !== 'trace')));
  const [first] = guards;
  return first === undefined || first.kind === 'trace' ? 'GND' : first.name;
}

function guardWidth({ runs }: Project, run: Run): number {
  const guards = [run, ...runs].flatMap(({ rows }) => rows.flatMap(({ conductors }) => conductors.filter(({ kind }) => kind === 'guard')));
  return guards[0]?.width.value ?? usualWidth;
}

/** The furthest that the ties of the new guard may be apart; null where those at its two ends do. */
function tiesThatHold(context: FixContext, before: Run, after: Run, budget: Budget): number | null {
  const old = new Set(before.rows.flatMap(({ conductors }) => conductors));
  const { evaluation } = trial(context, [{ before, after }], [budget]);
  const loose = evaluation.runs.find(({ run }) => run === after)?.looseGuards.find(({ guard }) => !old.has(guard));
  return loose?.largest ?? null;
}

/** To a number that is drawn without a calculator: 1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8 and their tenfold. */
export function roundDown(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const digit = [8, 6, 5, 4, 3, 2.5, 2, 1.5, 1.2, 1].find((candidate) => candidate * power <= value * (1 + 1e-9)) ?? 1;
  return digit * power;
}

/** One at each end, and those between. */
function viasOf({ stitched }: NewGuard, { length }: Run): number {
  return stitched === null ? 2 : Math.ceil(length.value / stitched) + 1;
}

function widthOf({ left, width, right }: NewGuard): number {
  return left + width + right;
}

function wordsFor(guard: NewGuard, { written }: Lane, gap: number): string {
  const ties = guard.stitched === null ? 'tied at both ends' : `stitched every ${written.inUnit(guard.stitched)}`;
  const wider = widthOf(guard) - gap;
  const room = wider < written.grid / 2 ? '' : `, the lane ${written.inUnit(metres(wider))} wider`;
  return `Add a guard ${guard.name} ${ties}${room}`;
}

function editsFor(context: FixContext, run: Run, place: GapPlace, guard: NewGuard, written: WrittenLength): readonly Edit[] {
  const gap: Place = gapOf(run, place).place;
  const stitched = guard.stitched === null ? '' : ` stitched ${written.inUnit(guard.stitched)}`;
  const rows = [['guard', `${writtenName(guard.name)} ${written.inFile(guard.width)}${stitched}`], ['gap', written.inFile(guard.right)]] as const;
  return [
    { path: gap.path, span: gap.span, newText: written.inFile(guard.left) },
    rowsAfter(context.text(gap.path), gap, rows),
  ];
}
