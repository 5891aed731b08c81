/**
 * What coupled lines answer to one source that rises with unit slope and never stops: each voltage as a piecewise-linear part,
 * known by its kinks, and a smooth part on an even grid of times. Every ramp is a difference of two such answers
 * (`rampedWaveforms.ts`), so that edges of any duration share one.
 *
 * Method    resistive ends: the lattice alone, exact, while its states are few. Else the large kinks from the lattice and the
 *           rest by the method of characteristics at two steps, dt and 2 dt; the difference gives the error and, the method
 *           being of second order with the kinks taken out, Richardson's correction
 * Accuracy  see test/physics/lines/characteristics.test.ts; `error` is that of the finer step, before the correction
 */
import { gridVoltages, type Grid } from './characteristics';
import { kinkLattice, type Kinks, type Lattice } from './lattice';
import type { LineNetwork } from './network';
import type { Ramp } from './lines';
import { sampleKinks } from './sampledKinks';

export interface UnitResponse {
  readonly method: 'lattice' | 'characteristics';
  readonly horizon: number;
  /** Left and right ends of the coupled length. */
  readonly ends: readonly [UnitVoltages, UnitVoltages];
  /** Left and right terminations: meaningful for lines with a lead there. */
  readonly terminations: readonly [UnitVoltages, UnitVoltages];
  /** Of any voltage for a source of one volt, on top of what the grid shows. */
  readonly dropped: number;
  readonly work: number;
}

/** V for a source of slope 1 V/s, of all lines at one place. */
export interface UnitVoltages {
  readonly kinks: Pick<Kinks, 'count' | 'times' | 'voltage'>;
  readonly smooth: SmoothPart | null;
}

export interface SmoothPart extends Grid {
  /** Rows of `steps` + 1 values, one for each line, at the finer step, corrected. */
  readonly values: Float64Array;
  /** Rows of `coarseSteps` + 1 values at twice the step: estimated error before the correction. */
  readonly error: Float64Array;
  readonly coarseSteps: number;
}

export interface Stepping {
  /** Divides every step: to measure with. */
  readonly refinement?: number;
  /** Of the fastest mode: fewer reach further with the same work. */
  readonly stepsInDelay?: number | undefined;
  /** A step no smaller than this is small enough for what lasts longer than a few of them. */
  readonly finest?: number;
}

export function unitResponse(network: LineNetwork, source: Pick<Ramp, 'line' | 'end'>, wanted: number, stepping: Stepping = {}): UnitResponse {
  const exact = exactLattice(network, source, wanted);
  if (exact !== null) {
    const parts = (kinks: Kinks): UnitVoltages => ({ kinks, smooth: null });
    return {
      method: 'lattice', horizon: wanted, dropped: exact.dropped, work: exact.events,
      ends: [parts(exact.ends[0]), parts(exact.ends[1])],
      terminations: [parts(exact.terminations[0]), parts(exact.terminations[1])],
    };
  }
  const fine = gridFor(network, wanted, stepping);
  const horizon = Math.min(wanted, fine.steps * fine.step);
  const shorted = [shortedAt(network, 0, fine.step), shortedAt(network, 1, fine.step)] as const;
  const lattice = kinkLattice(network, { source, horizon, threshold: kinksFollowed, mostEvents: mostKinks(network.order), shorted });
  const coarse = { step: 2 * fine.step, steps: fine.steps / 2 };
  const fineVoltages = gridVoltages(network, lattice, { source, shorted }, fine);
  const coarseVoltages = gridVoltages(network, lattice, { source, shorted }, coarse);
  const parts = (kinks: Kinks, fineRows: Float64Array, coarseRows: Float64Array): UnitVoltages => ({ kinks, smooth: corrected(network.order, kinks, fine, fineRows, coarseRows) });
  const place = (which: 'ends' | 'terminations', side: 0 | 1) => parts(lattice[which][side], fineVoltages[which][side], coarseVoltages[which][side]);
  return {
    method: 'characteristics', horizon, dropped: 0, work: lattice.events + fine.steps + coarse.steps,
    ends: [place('ends', 0), place('ends', 1)],
    terminations: [place('terminations', 0), place('terminations', 1)],
  };
}

/** Null where a capacitor makes the waves curved, or where the echoes are too many to follow them all. */
function exactLattice(network: LineNetwork, source: Pick<Ramp, 'line' | 'end'>, horizon: number): Lattice | null {
  const { order } = network;
  const curved = network.ends.some(({ resistance, capacitance }) => capacitance.some((value, line) => 0 < value && 0 < resistance[line]));
  if (curved) return null;
  const none = new Uint8Array(order);
  const hasLeads = network.ends.some(({ leadDelay }) => leadDelay.some((delay) => delay !== 0));
  const threshold = order <= 3 && !hasLeads ? 0 : exactThreshold;
  const lattice = kinkLattice(network, { source, horizon, threshold, mostEvents: mostExactEvents, shorted: [none, none] });
  return lattice.dropped < exactEnough ? lattice : null;
}

/** Relative to the first wave launched. Up to three lines keep everything: 2300 events in a whole window. */
const exactThreshold = 1e-8;
/** Of the source's volts, as a sum of magnitudes. */
const exactEnough = 1e-5;
const mostExactEvents = 6000;
/** Kinks below this share of the first wave are left to interpolation, which is good to a tenth of a step. */
const kinksFollowed = 2e-4;
const mostKinks = (order: number) => Math.max(400, 3000 / order);

/**
 * The finer grid: a 24th of the fastest mode's delay, finer where an end's time constant or a lead asks for it and
 * the work allows. An even number of steps, for the coarser one.
 */
function gridFor(network: LineNetwork, wanted: number, { refinement = 1, stepsInDelay = usualSteps, finest: useful = 0 }: Stepping): Grid {
  const coarsest = network.modes.delays[0] / stepsInDelay;
  // What is finer still is not resolved anyway: many lines then take a middling step, and the error bar says what that costs.
  const finest = network.modes.delays[0] / usualSteps / (network.order <= 3 ? 16 : 8);
  let step = coarsest;
  for (const wish of stepWishes(network, useful)) step = Math.min(step, Math.max(wish, finest));
  const mostSteps = 2 * Math.ceil(mostLineSteps / (network.order + 2) / 2);
  step = Math.min(coarsest, Math.max(step, wanted / mostSteps)) / refinement;
  return { step, steps: Math.min(refinement * mostSteps, 2 * Math.ceil(wanted / step / 2)) };
}

const usualSteps = 24;
/** The march must not step over half a delay, at twice the step as well. */
export const fewestSteps = 4;

/** Steps times lines plus two: what one answer may cost, about 20 ms. */
const mostLineSteps = 120_000;
/** The trapezoidal rule is then off by a few ten-thousandths before it is corrected. */
const stepsPerConstant = 24;
/** For edges that are slow against it, of which the bends are all that it rounds. */
const fewPerConstant = 12;
const stepsPerLead = 2;

function stepWishes({ order, ends }: LineNetwork, useful: number): number[] {
  const wishes: number[] = [];
  for (const { resistance, capacitance, seen, leadDelay } of ends) {
    for (let i = 0; i < order; i += 1) {
      const constant = timeConstant(resistance[i], capacitance[i], seen[i]);
      if (0 < constant) wishes.push(Math.max(constant / stepsPerConstant, Math.min(useful, constant / fewPerConstant)));
      if (0 < leadDelay[i]) wishes.push(leadDelay[i] / stepsPerLead);
    }
  }
  return wishes;
}

/** Of an R and C end against the impedance that it sees. */
function timeConstant(resistance: number, capacitance: number, seen: number): number {
  return resistance === 0 ? 0 : capacitance / (1 / resistance + 1 / seen);
}

/** Capacitors that a step resolves are short circuits to a kink; smaller ones are absent from it. */
function shortedAt({ order, ends }: LineNetwork, side: 0 | 1, step: number): Uint8Array {
  const { resistance, capacitance, seen } = ends[side];
  return Uint8Array.from({ length: order }, (_, i) => (step < timeConstant(resistance[i], capacitance[i], seen[i]) ? 1 : 0));
}

/** Takes the kinks out of both grids' voltages and improves the finer one by the difference. */
function corrected(order: number, kinks: Kinks, fine: Grid, fineRows: Float64Array, coarseRows: Float64Array): SmoothPart | null {
  if (fineRows.length === 0) return null;
  const coarseSteps = fine.steps / 2;
  const values = fineRows;
  const error = new Float64Array(order * (coarseSteps + 1));
  const line = new Float64Array(fine.steps + 1);
  for (let i = 0; i < order; i += 1) {
    sampleKinks({ ...kinks, rows: kinks.voltage, order, column: i, delay: 0 }, fine.step, line, 0, fine.steps);
    const row = i * (fine.steps + 1);
    const errorRow = i * (coarseSteps + 1);
    for (let n = 0; n <= coarseSteps; n += 1) error[errorRow + n] = (fineRows[row + 2 * n] - coarseRows[errorRow + n]) / 3;
    for (let n = 0; n <= fine.steps; n += 1) {
      const half = n >> 1;
      const correction = n % 2 === 0 ? error[errorRow + half] : (error[errorRow + half] + error[errorRow + half + 1]) / 2;
      values[row + n] = fineRows[row + n] - line[n] + correction;
    }
  }
  return { ...fine, values, error, coarseSteps };
}
