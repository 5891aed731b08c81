/**
 * Budgets over the stated tolerances: the largest and the smallest total in the box of all of them, and which quantity moves it most.
 *
 * Method    every quantity at both its ends by itself; the signs of what that does choose each budget's two worst corners, which
 *           are then evaluated. There, others may have turned the sign of what does little, or of anything where few move a budget:
 *           each is tried at its other end once, and left there where that is worse. Where both ends of a quantity do the same, its
 *           effect turns inside the box: both stand in the bounds, and a corner has the worse one of the two and of what is drawn
 * Range     exact where totals are monotone in every quantity; test/budget/tolerances.test.ts holds it against every corner of the box.
 *           Where ways of opposite sign cancel, the smallest total may be missed: by 7e-4 on one of 1 000 seeded boards
 */
import type { Place, Project } from '../../board/model';
import { volts, type Voltage } from '../../units/quantity';
import { evaluate } from '../evaluate';
import type { Budget, Contribution, Coupling, Evaluation } from '../results';
import type { SolveCache } from '../solveCache';
import { tolerancedQuantities, type Toleranced } from './tolerances';
import { variedProject, type Shifts } from './variedProject';

/** One step at a time, so that what an editor asks for meanwhile is answered; the last one is the evaluation with its bounds. */
export function* overTolerances(project: Project, nominal: Evaluation, cache: SolveCache): Generator<null, Evaluation> {
  const quantities = tolerancedQuantities(project);
  const looked = new Looked(nominal);
  const ends: { readonly quantity: Toleranced; readonly up: Evaluation; readonly down: Evaluation }[] = [];
  for (const quantity of quantities) {
    const up = evaluate(variedProject(project, new Map([[quantity.key, 1]])), cache);
    yield null;
    const down = evaluate(variedProject(project, new Map([[quantity.key, -1]])), cache);
    yield null;
    looked.at(up);
    looked.at(down);
    ends.push({ quantity, up, down });
  }
  const tried = new Map<string, readonly (number | null)[]>();
  const totalsAt = (shifts: Shifts) => {
    const key = quantities.map(({ key: each }) => shifts.get(each) ?? 0).join();
    const known = tried.get(key);
    if (known !== undefined) return known;
    const evaluation = evaluate(variedProject(project, shifts), cache);
    looked.at(evaluation);
    const totals = evaluation.budgets.map(({ total }) => total);
    tried.set(key, totals);
    return totals;
  };
  for (const { budget, direction, shifts, doubtful } of cornersOf(nominal, ends)) {
    const worth = (at: Shifts) => {
      const total = totalsAt(at)[budget] ?? null;
      return total === null ? -Infinity : direction * total;
    };
    let best = worth(shifts);
    yield null;
    for (const key of doubtful) {
      const flipped = new Map(shifts).set(key, shifts.get(key) === 1 ? -1 : 1);
      const found = worth(flipped);
      yield null;
      if (best < found) {
        best = found;
        shifts.set(key, flipped.get(key)!);
      }
    }
  }
  return looked.bounded(nominal, ends);
}

export function boundedAtOnce(project: Project, nominal: Evaluation, cache: SolveCache): Evaluation {
  const steps = overTolerances(project, nominal, cache);
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
  }
}

interface Corner {
  readonly budget: number;
  /** 1 towards the largest total. */
  readonly direction: 1 | -1;
  readonly shifts: Map<string, 1 | -1>;
  /** What may have another sign there, the largest first. */
  readonly doubtful: readonly string[];
}

/** Each budget's worst and best corner, of those that more than one quantity moves. */
function cornersOf({ budgets }: Evaluation, ends: readonly { readonly quantity: Toleranced; readonly up: Evaluation; readonly down: Evaluation }[]): readonly Corner[] {
  return budgets.flatMap((_, budget): readonly Corner[] => {
    const nominal = budgets[budget]!.total;
    const moves = ends.flatMap(({ quantity: { key }, up, down }) => {
      const [above, below] = [up.budgets[budget]?.total ?? null, down.budgets[budget]?.total ?? null];
      return nominal === null || above === null || below === null || (above === nominal && below === nominal) ? [] : [{ key, above: above - nominal, below: below - nominal }];
    });
    if (moves.length < 2) return [];
    const sizeOf = ({ above, below }: { readonly above: number; readonly below: number }) => Math.max(Math.abs(above), Math.abs(below));
    const largest = Math.max(...moves.map(sizeOf));
    const doubtful = moves.filter((each) => moves.length <= few || sizeOf(each) < little * largest).sort((a, b) => sizeOf(b) - sizeOf(a)).map(({ key }) => key);
    return ([1, -1] as const).map((direction) => {
      const shifts = moves.flatMap(({ key, above, below }): readonly (readonly [string, 1 | -1])[] => {
        if (above * direction < 0 && below * direction < 0) return [];
        return [[key, below * direction < above * direction ? 1 : -1]];
      });
      return { budget, direction, shifts: new Map(shifts), doubtful };
    });
  });
}

const little = 0.5;
/** So many cost little to try, all of them. */
const few = 12;

type Range = [number, number];

/** The extremes of everything that was seen, in the order of the nominal evaluation. */
class Looked {
  private readonly totals: (Range | null)[];
  private readonly contributions: Map<string, Range>[];
  private readonly couplings = new Map<string, Range>();

  constructor(nominal: Evaluation) {
    this.totals = nominal.budgets.map(({ total }) => (total === null ? null : [total, total]));
    this.contributions = nominal.budgets.map(({ contributions }) => new Map(contributions.map((each) => [keyOf(each), [each.value, each.value] as Range])));
    this.at(nominal);
  }

  at({ budgets, runs }: Evaluation): void {
    budgets.forEach(({ total, contributions }, at) => {
      const range = this.totals[at];
      if (range != null && total !== null) widen(range, total);
      for (const each of contributions) {
        const own = this.contributions[at]?.get(keyOf(each));
        if (own !== undefined) widen(own, each.value);
      }
    });
    for (const { couplings } of runs) {
      for (const coupling of couplings) {
        const value = Math.abs(coupling.atReceiver);
        const known = this.couplings.get(couplingKey(coupling));
        if (known === undefined) this.couplings.set(couplingKey(coupling), [value, value]);
        else widen(known, value);
      }
    }
  }

  bounded(nominal: Evaluation, ends: readonly { readonly quantity: Toleranced; readonly up: Evaluation; readonly down: Evaluation }[]): Evaluation {
    const budgets = nominal.budgets.map((budget, at): Budget => {
      const range = this.totals[at];
      if (range == null) return budget;
      const contributions = budget.contributions.map((each) => withBounds(each, this.contributions[at]!.get(keyOf(each))!));
      const bounds: readonly [Voltage, Voltage] = [volts(range[0]), volts(range[1])];
      return { ...budget, contributions, bounds, movedBy: movedBy(at, ends), verdict: verdictOver(budget, bounds[1]) };
    });
    const runs = nominal.runs.map((run) => ({ ...run, couplings: run.couplings.map((coupling) => signed(coupling, this.couplings.get(couplingKey(coupling)))) }));
    return { ...nominal, budgets, runs };
  }
}

function widen(range: Range, value: number): void {
  range[0] = Math.min(range[0], value);
  range[1] = Math.max(range[1], value);
}

function keyOf({ channel, from, where, cause }: Contribution): string {
  return JSON.stringify([channel, from, where, cause]);
}

function couplingKey({ run, aggressor, victim, kind, edge }: Coupling): string {
  return JSON.stringify([run.name, aggressor.name, victim.name, kind, edge === 'sine']);
}

function withBounds(contribution: Contribution, [low, high]: Range): Contribution {
  return bounded(contribution, [volts(low), volts(high)]);
}

/** Of a peak as it is signed. */
function signed(coupling: Coupling, range: Range | undefined): Coupling {
  if (range === undefined) return coupling;
  return bounded(coupling, coupling.atReceiver < 0 ? [volts(-range[1]), volts(-range[0])] : [volts(range[0]), volts(range[1])]);
}

/** A copy that still makes its words and pictures when they are asked for. */
function bounded<Whole extends { readonly bounds: unknown }>(whole: Whole, bounds: readonly [Voltage, Voltage]): Whole {
  return Object.defineProperties({}, { ...Object.getOwnPropertyDescriptors(whole), bounds: { value: bounds, enumerable: true } }) as Whole;
}

function movedBy(at: number, ends: readonly { readonly quantity: Toleranced; readonly up: Evaluation; readonly down: Evaluation }[]): Budget['movedBy'] {
  return ends
    .map(({ quantity: { what, place, share }, up, down }) => ({ what, place: place as Place, share, moves: volts(Math.abs((up.budgets[at]?.total ?? 0) - (down.budgets[at]?.total ?? 0)) / 2) }))
    .filter(({ moves }) => 0 < moves)
    .sort((a, b) => b.moves - a.moves);
}

/** Within budget as drawn, over it at a corner: little margin, whatever the headroom. */
function verdictOver({ verdict, tolerates }: Budget, worst: Voltage): Budget['verdict'] {
  return verdict === 'pass' && tolerates < worst ? 'low' : verdict;
}
