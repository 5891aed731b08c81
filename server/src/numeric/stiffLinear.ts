/**
 * Solution of a linear system M x' = K x + f e(t), x(0) = 0, whose time constants may lie any number of decades apart.
 *
 * Steps change by factors of two, so that a factorisation serves many steps. `leastStep` may ask for larger steps than accuracy
 * would like: what oscillates faster than that is then damped away, as the method is L-stable, and what is slower is followed.
 *
 * Method    singly diagonally implicit Runge-Kutta, 5 stages, order 4, L-stable, an embedded order 3 for the error
 * Source    Hairer & Wanner, Solving Ordinary Differential Equations II, table 6.5 of chapter IV, from memory; the order is
 *           measured in the test
 * Accuracy  local error below `tolerance` times the largest entry of x so far, wherever the step was free
 */
import { luFactor, luSolve } from './lu';

export interface StiffLinear {
  readonly order: number;
  /** Row-major; singular only where the input begins at 0 and every state follows from it. */
  readonly mass: Float64Array;
  readonly stiffness: Float64Array;
  readonly forcing: Float64Array;
}

export interface StiffRun {
  readonly input: (time: number) => number;
  /** Where the input is not smooth: a step ends there, and small ones begin again. */
  readonly kink: number;
  readonly until: number;
  /** Not looked at for a standstill before. */
  readonly atLeast: number;
  readonly firstStep: number;
  /** Smallest step that is still made smaller for accuracy, as a share of the time since 0 or the kink. */
  readonly leastShare: number;
  readonly tolerance: number;
  readonly mostSteps: number;
}

export interface StiffSolution {
  readonly count: number;
  readonly times: Float64Array;
  /** Rows of `order` values, and of their rates of change. */
  readonly states: Float64Array;
  readonly rates: Float64Array;
  /** Reached `until` or a standstill before the steps ran out. */
  readonly finished: boolean;
}

export function stiffLinear(system: StiffLinear, run: StiffRun): StiffSolution {
  const march = startMarch(system, run);
  let step = run.firstStep;
  let finished = false;
  for (let tried = 0; tried < run.mostSteps; tried += 1) {
    const now = march.times[march.count - 1];
    if (run.until <= now || standsStill(march, run, now)) {
      finished = true;
      break;
    }
    const beforeKink = now < run.kink;
    const since = beforeKink ? now : now - run.kink;
    const left = (beforeKink ? run.kink : run.until) - now;
    // A little longer rather than a sliver to the next kink.
    const taken = left < 1.2 * step ? left : step;
    const error = attempt(march, run, now, taken);
    const allowed = run.tolerance * march.largest;
    if (allowed < error && run.leastShare * since < taken && smallestShare * run.firstStep < taken) {
      step = taken / 2;
      continue;
    }
    const next = taken === left ? (beforeKink ? run.kink : run.until) : now + taken;
    accept(march, next);
    if (beforeKink && next === run.kink) step = run.firstStep;
    else if (error < allowed / 40 || 2 * step <= run.leastShare * since) step *= 2;
  }
  const { count, times, states, rates } = march;
  return { count, times, states, rates, finished };
}

const stages = 5;
const gamma = 1 / 4;
const nodes = [1 / 4, 3 / 4, 11 / 20, 1 / 2, 1];
const weights = [
  [],
  [1 / 2],
  [17 / 50, -1 / 25],
  [371 / 1360, -137 / 2720, 15 / 544],
  [25 / 24, -49 / 48, 125 / 16, -85 / 12],
];
const last = [25 / 24, -49 / 48, 125 / 16, -85 / 12, 1 / 4];
const embedded = [59 / 48, -17 / 96, 225 / 32, -85 / 12, 0];
/** Of the first step: below that an error is rounding, and halving would not end. */
const smallestShare = 2 ** -20;

interface March {
  readonly system: StiffLinear;
  count: number;
  times: Float64Array;
  states: Float64Array;
  rates: Float64Array;
  largest: number;
  readonly factors: Map<number, { readonly matrix: Float64Array; readonly exchanged: Int32Array }>;
  /** Circuits have few entries in a row. */
  readonly stiffness: SparseRows;
  /** Rates at the stages, one after the other. */
  readonly stage: Float64Array;
  readonly candidate: Float64Array;
  readonly work: Float64Array;
}

interface SparseRows {
  /** Where each row starts; one more than rows. */
  readonly starts: Int32Array;
  readonly columns: Int32Array;
  readonly entries: Float64Array;
}

function sparseRows(matrix: Float64Array, order: number): SparseRows {
  const starts = new Int32Array(order + 1);
  const columns: number[] = [];
  for (let i = 0; i < order; i += 1) {
    for (let j = 0; j < order; j += 1) if (matrix[i * order + j] !== 0) columns.push(j);
    starts[i + 1] = columns.length;
  }
  const entries = new Float64Array(columns.length);
  for (let i = 0; i < order; i += 1) for (let at = starts[i]; at < starts[i + 1]; at += 1) entries[at] = matrix[i * order + columns[at]];
  return { starts, columns: Int32Array.from(columns), entries };
}

function startMarch(system: StiffLinear, run: StiffRun): March {
  const { order } = system;
  const march: March = {
    system,
    count: 1,
    times: new Float64Array(64),
    states: new Float64Array(64 * order),
    rates: new Float64Array(64 * order),
    largest: 0,
    factors: new Map(),
    stiffness: sparseRows(system.stiffness, order),
    stage: new Float64Array(stages * order),
    candidate: new Float64Array(order),
    work: new Float64Array(order),
  };
  const start = run.input(0);
  // At rest everything stands still, whether or not the mass has an inverse.
  if (start === 0) return march;
  const { matrix, exchanged } = factorsFor(march, 0);
  for (let i = 0; i < order; i += 1) march.work[i] = system.forcing[i] * start;
  luSolve(matrix, exchanged, march.work);
  march.rates.set(march.work);
  return march;
}

/** Of M - gamma h K. */
function factorsFor({ system: { order, mass, stiffness }, factors }: March, step: number) {
  const known = factors.get(step);
  if (known !== undefined) return known;
  const matrix = Float64Array.from(mass, (value, at) => value - gamma * step * stiffness[at]);
  const exchanged = luFactor(matrix, order);
  if (exchanged === null) throw new Error(`the system of order ${order} is singular at step ${step}`);
  const made = { matrix, exchanged };
  factors.set(step, made);
  return made;
}

/** Leaves the new state in `candidate`, and answers the largest entry of its estimated error. */
function attempt(march: March, run: StiffRun, now: number, step: number): number {
  const { system: { order, mass, forcing }, stiffness: { starts, columns, entries }, stage, candidate, work } = march;
  const { matrix, exchanged } = factorsFor(march, step);
  const state = (march.count - 1) * order;
  for (let s = 0; s < stages; s += 1) {
    for (let i = 0; i < order; i += 1) {
      let sum = march.states[state + i];
      for (let p = 0; p < s; p += 1) sum += step * weights[s][p] * stage[p * order + i];
      candidate[i] = sum;
    }
    const input = run.input(now + nodes[s] * step);
    for (let i = 0; i < order; i += 1) {
      let sum = forcing[i] * input;
      for (let at = starts[i]; at < starts[i + 1]; at += 1) sum += entries[at] * candidate[columns[at]];
      work[i] = sum;
    }
    luSolve(matrix, exchanged, work);
    stage.set(work, s * order);
  }
  // The raw difference overstates stiff parts: passed once through the factors, it is damped as the solution is.
  for (let i = 0; i < order; i += 1) {
    let difference = 0;
    let sum = march.states[state + i];
    for (let s = 0; s < stages; s += 1) {
      sum += step * last[s] * stage[s * order + i];
      difference += step * (last[s] - embedded[s]) * stage[s * order + i];
    }
    candidate[i] = sum;
    march.stage[i] = difference;
  }
  for (let i = 0; i < order; i += 1) {
    let sum = 0;
    for (let j = 0; j < order; j += 1) sum += mass[i * order + j] * stage[j];
    work[i] = sum;
  }
  luSolve(matrix, exchanged, work);
  let largest = 0;
  for (let i = 0; i < order; i += 1) {
    largest = Math.max(largest, Math.abs(work[i]));
    march.largest = Math.max(march.largest, Math.abs(candidate[i]));
  }
  return largest;
}

function accept(march: March, time: number): void {
  const { order } = march.system;
  if (march.count === march.times.length) {
    march.times = doubled(march.times);
    march.states = doubled(march.states);
    march.rates = doubled(march.rates);
  }
  march.times[march.count] = time;
  march.states.set(march.candidate, march.count * order);
  // The last stage stands at the step's end: its rate is the rate there.
  march.rates.set(march.stage.subarray((stages - 1) * order), march.count * order);
  march.count += 1;
}

/** After the kink, nothing changes by a billionth of the largest value in as long again as all took so far. */
function standsStill({ count, rates, largest, system: { order } }: March, { kink, atLeast }: StiffRun, now: number): boolean {
  if (now <= Math.max(kink, atLeast)) return false;
  for (let i = (count - 1) * order; i < count * order; i += 1) if (1e-9 * largest < Math.abs(rates[i]) * now) return false;
  return true;
}

function doubled(values: Float64Array): Float64Array {
  const larger = new Float64Array(2 * values.length);
  larger.set(values);
  return larger;
}
