/**
 * Brings the sides of a loop together: a rectangle's in the direction that takes the smaller step, a circle's diameter. The
 * corner or the centre stays where it is, so that nothing of the loop leaves the room that it had.
 */
import type { Given, Loop, LoopShape } from '../board/model';
import type { Evaluation } from '../budget/results';
import type { BudgetFault } from '../rules/budgetFault';
import { loopTooLarge, type LoopTooLarge } from '../rules/loopTooLarge';
import { emissionOverLimit, levelInText, type EmissionOverLimit } from '../rules/emissionOverLimit';
import type { Finding } from '../rules/rule';
import { inText } from '../units/inText';
import { metres, type Length } from '../units/quantity';
import type { Fix, FixContext, Proposal } from './fix';
import { clearanceOf, textAt } from './gapAdjustable';
import { judgedByFinding } from './judged';
import { isUnderVoltage, loopsBehind } from './loopsBehind';
import { goalFor, type Goal } from './solve';
import { solveValue, type Sought } from './solveValue';
import { replacement, writtenLength, type WrittenLength } from './writtenLength';

export function shrunkLoops({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  if (largest === null) return [];
  const goal = goalFor(context, budget, largest, ({ channel }) => channel === 'loop' || channel === 'radiated');
  return loopsBehind(context, budget, largest).flatMap((loop) => shrunk(context, loop, goal));
}

/** Down to a limit of the loop's own, or to that of what boards may emit. */
export function shrunkToLimit(finding: Finding, context: FixContext): readonly Fix[] {
  const bound = boundOf(finding, context.evaluation);
  if (bound === null) return [];
  const { loop, limit, valueIn, inWords } = bound;
  const goal: Goal = { budgets: [], excess: ({ evaluation }) => Math.log(valueIn(evaluation) / limit) };
  return shrunk(context, loop, goal).flatMap(({ words, edits }) => {
    const fix = judgedByFinding(finding, context, `${words}: ${inWords(valueIn(context.evaluateWith(edits)))} of ${inWords(limit)}`, edits);
    return fix === null ? [] : [{ ...fix, preferred: true }];
  });
}

interface Bound {
  readonly loop: Loop;
  readonly limit: number;
  valueIn(evaluation: Evaluation): number;
  inWords(value: number): string;
}

function boundOf({ rule, fault }: Finding, { loops: before }: Evaluation): Bound | null {
  const resultIn = ({ loops }: Evaluation, { name }: Loop) => loops.find(({ loop }) => loop.name === name);
  if (rule === loopTooLarge.name) {
    const { loop, what, limit } = fault as LoopTooLarge;
    return { loop, limit, valueIn: (evaluation) => resultIn(evaluation, loop)?.[what] ?? NaN, inWords: (value) => inText(value, what) };
  }
  if (rule !== emissionOverLimit.name) return null;
  const { loop, worst } = fault as EmissionOverLimit;
  // In the order of the board's lines, which no edit of a loop changes.
  const line = before.find((each) => each.loop === loop)?.emission.indexOf(worst) ?? -1;
  return { loop, limit: worst.limit.field.value, valueIn: (evaluation) => resultIn(evaluation, loop)?.emission[line]?.field ?? NaN, inWords: levelInText };
}

interface Side {
  readonly size: Given<Length>;
  readonly written: WrittenLength;
  with(value: Length): LoopShape;
}

/** The side that moves least of those that do; none where that would bring copper nearer to what insulation depends on. */
function shrunk(context: FixContext, loop: Loop, goal: Goal): readonly Proposal[] {
  if (bringsTogether(context, loop)) return [];
  const found = sidesOf(context, loop).flatMap((side): Proposal[] => {
    const value = solveValue(context, soughtFor(context, loop, side), goal);
    if (value === null) return [];
    const size = metres(value);
    return [{ words: `Shrink loop ${loop.name} to ${sizeInWords(context, side, loop, size)}`, edits: [replacement(side.size.place, side.written.inFile(size))], moves: side.size.value - value }];
  });
  return found.length < 2 ? found : [found.reduce((best, other) => (other.moves < best.moves ? other : best))];
}

function sidesOf(context: FixContext, { shape }: Loop): readonly Side[] {
  const side = (size: Given<Length>, withValue: Side['with']): readonly Side[] => {
    const written = writtenLength(textAt(context, size.place), size.value < small ? 'section' : 'run');
    return written === null ? [] : [{ size, written, with: withValue }];
  };
  switch (shape?.form) {
    case 'rectangle': return [
      ...side(shape.width, (value) => ({ ...shape, width: { ...shape.width, value } })),
      ...side(shape.height, (value) => ({ ...shape, height: { ...shape.height, value } })),
    ];
    case 'circle': return side(shape.diameter, (value) => ({ ...shape, diameter: { ...shape.diameter, value } }));
    default: return [];
  }
}

/** Below it a tenth of a millimetre is a step too coarse, m. */
const small = 5e-3;

function soughtFor(context: FixContext, loop: Loop, { size, written, with: shapeWith }: Side): Sought {
  const { project } = context;
  return {
    given: size.value,
    better: 'less',
    // Its two sides are copper, with the fabricator's gap between.
    smallest: Math.max(written.grid, (loop.conductor?.width.value ?? 0) + clearanceOf(project)),
    largest: size.value,
    tolerance: Math.min(0.01, written.grid / size.value / 4),
    slope: 1,
    written: (value) => [0, 1, 2].map((steps) => written.rounded(written.rounded(value, 'down') - steps * written.grid, 'down')),
    boardWith: (value) => {
      const after: Loop = { ...loop, shape: shapeWith(metres(value)) };
      return { ...project, loops: project.loops.map((each) => (each === loop ? after : each)) };
    },
  };
}

function sizeInWords(context: FixContext, { size, written }: Side, { shape }: Loop, value: Length): string {
  if (shape?.form !== 'rectangle') return `${written.inFile(value)} across`;
  const [width, height] = [shape.width, shape.height].map((each) => (each === size ? written.inFile(value) : textAt(context, each.place)));
  return `${width} by ${height}`;
}

/**
 * A loop that shrinks within the room that it had comes nearer to nothing outside of that room: only to itself, to what
 * lies within, and, turned in space, to what nobody can say.
 */
function bringsTogether(context: FixContext, loop: Loop): boolean {
  if (isUnderVoltage(context, loop)) return true;
  return context.project.loops.some((other) => other !== loop && isUnderVoltage(context, other) && (0 < loop.turns.length + other.turns.length || overlap(boundsOf(loop), boundsOf(other))));
}

type Bounds = readonly [left: number, right: number, bottom: number, top: number];

function boundsOf({ shape }: Loop): Bounds {
  if (shape === null) return [-Infinity, Infinity, -Infinity, Infinity];
  if (shape.form === 'path') {
    const [x, y] = [shape.points.map((point) => point.x.value), shape.points.map((point) => point.y.value)];
    return [Math.min(...x), Math.max(...x), Math.min(...y), Math.max(...y)];
  }
  const [x, y] = [shape.at?.x.value ?? 0, shape.at?.y.value ?? 0];
  switch (shape.form) {
    case 'rectangle': return [x, x + shape.width.value, y, y + shape.height.value];
    case 'circle': return [x - shape.diameter.value / 2, x + shape.diameter.value / 2, y - shape.diameter.value / 2, y + shape.diameter.value / 2];
    case 'trace': return [x, x + shape.length.value, y, y];
  }
}

function overlap([left, right, bottom, top]: Bounds, [from, to, low, high]: Bounds): boolean {
  return left <= to && from <= right && bottom <= high && low <= top;
}
