/**
 * Solves for one number of a board that is no length of a run: a side of a loop, a resistance. The search runs on the model; the
 * number is then taken from those that a person would write, and seen to be enough.
 */
import type { Project } from '../board/model';
import type { FixContext } from './fix';
import { search } from './search';
import type { Goal } from './solve';
import { trialOfProject } from './trial';

export interface Sought {
  /** What a factor of 1 stands for. */
  readonly given: number;
  readonly better: 'more' | 'less';
  readonly smallest: number;
  readonly largest: number;
  /** Of the value, relative. */
  readonly tolerance: number;
  /** The power by which the noise falls with it, about. */
  readonly slope: number;
  /** Values that can be written, from the one that changes least: the first that is enough is taken. */
  written(value: number): readonly number[];
  boardWith(value: number): Project;
}

/** Null where no value in reach is enough, or none can be computed. */
export function solveValue(context: FixContext, sought: Sought, goal: Goal): number | null {
  const { given, better, smallest, largest, tolerance, slope } = sought;
  const excess = (value: number) => goal.excess(trialOfProject(context, sought.boardWith(value), goal.budgets));
  if (!(smallest < largest)) return null;
  const found = search({ excess: (factor) => excess(given * factor), better, smallest: smallest / given, largest: largest / given, tolerance, slope });
  if (found === null || !found.enough) return null;
  const candidates = sought.written(given * found.factor).filter((value) => smallest <= value * (1 + 1e-9) && value <= largest * (1 + 1e-9));
  return candidates.find((value) => excess(value) <= 0) ?? null;
}
