/** A gap of a run as something that a search may widen, and the words and edits for what it found. */
import type { Given, Place, Project, Run, RunConductor } from '../board/model';
import { metres, type Length } from '../units/quantity';
import { isSame, withGap, type GapPlace } from './changedRun';
import type { Edit, FixContext } from './fix';
import type { Adjustable } from './solve';
import { replacement, writtenLength } from './writtenLength';

/** What the language assumes where a board states no clearance. */
const assumedClearance = metres(0.1e-3);

/** Wider than any lane that a board has to spare. */
const widestGap = 10e-3;

export function clearanceOf({ board }: Project): Length {
  return board.clearance?.value ?? assumedClearance;
}

export function gapOf(run: Run, { row, gap }: GapPlace): Given<Length> {
  return run.rows[row]!.gaps[gap]!;
}

/** Null where the gap is not written as a number and its unit. */
export function gapAdjustable(context: FixContext, run: Run, place: GapPlace): Adjustable | null {
  const given = gapOf(run, place);
  const written = writtenLength(textAt(context, given.place), 'section');
  if (written === null) return null;
  return { run, given, written, outward: 'up', smallest: clearanceOf(context.project), largest: Math.max(widestGap, 2 * given.value), slope: 1.5, apply: (changed, value) => withGap(changed, place, value) };
}

export function lengthEdit({ given, written }: Adjustable, value: Length): Edit {
  return replacement(given.place, written.inFile(value));
}

/** `the gap`, where a run has one; `the gap between A and B`; `the spacing of D0 … D7`. */
export function gapInText(run: Run, place: GapPlace): string {
  const { conductors, gaps } = run.rows[place.row]!;
  const shared = gaps.flatMap((given, index) => (isSame(given.place, gaps[place.gap]!.place) ? [index] : []));
  const name = (index: number) => nameOf(conductors[index]!);
  if (1 < shared.length || isSpaced(run, place)) return `the spacing of ${name(shared[0]!)} … ${name(shared.at(-1)! + 1)}`;
  if (run.rows.length === 1 && gaps.length === 1) return 'the gap';
  return `the gap between ${name(place.gap)} and ${name(place.gap + 1)}`;
}

/** Its number stands after `spaced`, in the row of a trace, not in a row of its own. */
export function isSpaced(run: Run, place: GapPlace): boolean {
  const { path, span } = gapOf(run, place).place;
  return run.rows[place.row]!.conductors.some(({ whole }) => whole.path === path && whole.span.start <= span.start && span.end <= whole.span.end);
}

export function nameOf(conductor: RunConductor): string {
  return conductor.kind === 'trace' ? conductor.net.name : conductor.name;
}

export function textAt(context: FixContext, { path, span }: Place): string {
  return context.text(path).slice(span.start, span.end);
}
