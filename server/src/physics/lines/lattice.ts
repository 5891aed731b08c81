/**
 * The kinks of all waves on coupled lines after a source begins to rise with unit slope: when each wave
 * changes its slope, and by how much. Between kinks, waves between resistive ends are straight: the answer is exact.
 *
 *   left terminations --lead-- left ends ===== modes ===== right ends --lead-- right terminations
 *        place 2                place 0                     place 1                 place 3
 *
 * Model     lossless coupled lines; ends as they are for the fastest changes, a capacitor being a short circuit
 * Method    Bewley's lattice of echoes, all modes at once: an arrival at one end is scattered into every mode; echoes that
 *           have passed each mode equally often arrive together and are one state (two lines: b + 1 states after b passes)
 * Source    Bewley 1933; Branin 1967; Chang 1970; the merging of echoes and its bookkeeping are this project's own
 * Range     any ends. With capacitors it is the part of the answer that is not smooth: `characteristics.ts` adds the rest
 * Accuracy  rounding, while `dropped` is 0. Times are kept as integers, 2^48 to the horizon, so that equal sums of delays
 *           are equal whatever the order in which they were added
 */
import { Arrivals } from './arrivals';
import { endEquation, type LineEnds, type LineNetwork } from './network';
import { scatteringOf } from './scattering';
import type { Ramp } from './lines';

export interface Lattice {
  /** Left and right ends of the coupled length. */
  readonly ends: readonly [Kinks, Kinks];
  /** Left and right terminations; without events where no line has a lead. */
  readonly terminations: readonly [Kinks, Kinks];
  /** Upper bound of the voltage that was left out, for a source of one volt; infinite where events ran out. */
  readonly dropped: number;
  readonly events: number;
}

/** In order of time, rows of `order` numbers for each event: slope changes for a source of slope 1 V/s. */
export interface Kinks {
  readonly count: number;
  readonly times: Float64Array;
  /** Ends: modal waves that leave into the coupled length. Terminations: waves that leave into the leads, V. */
  readonly leaving: Float64Array;
  /** Ends: waves that leave into the leads, V. */
  readonly leavingToLeads: Float64Array;
  readonly voltage: Float64Array;
  /** Ends: of the current into each coupled line. Terminations: of the current into each lead. A/s. */
  readonly current: Float64Array;
}

export interface LatticeRequest {
  readonly source: Pick<Ramp, 'line' | 'end'>;
  readonly horizon: number;
  /** Leave out what is below this share of the first wave launched; 0 keeps everything. */
  readonly threshold: number;
  readonly mostEvents: number;
  /** Per end and line: the capacitor counts as a short circuit (else as absent). */
  readonly shorted: readonly [Uint8Array, Uint8Array];
}

export function kinkLattice(network: LineNetwork, request: LatticeRequest): Lattice {
  const tracking = startTracking(network, request);
  const { arrivals, arriving, tick } = tracking;
  let events = 0;
  launch(tracking, request);
  for (let arrival = arrivals.next(arriving); arrival !== null; arrival = arrivals.next(arriving)) {
    if (request.horizon < arrival.time * tick) break;
    if (events === request.mostEvents) {
      tracking.dropped = Infinity;
      break;
    }
    events += 1;
    if (arrival.place < 2) scatterAtEnd(tracking, arrival.time, arrival.place as 0 | 1);
    else bounceAtTermination(tracking, arrival.time, (arrival.place - 2) as 0 | 1);
  }
  const [left, right, leftTermination, rightTermination] = tracking.logs;
  return { ends: [left, right], terminations: [leftTermination, rightTermination], dropped: tracking.dropped, events };
}

interface Tracking {
  readonly network: LineNetwork;
  readonly arrivals: Arrivals;
  /** What arrives in the event at hand: modes, then leads. */
  readonly arriving: Float64Array;
  readonly sides: readonly [Side, Side];
  readonly logs: readonly [KinkLog, KinkLog, KinkLog, KinkLog];
  readonly tick: number;
  /** In ticks. */
  readonly delays: readonly number[];
  /** Largest line voltage of each mode's unit wave. */
  readonly modeVolts: Float64Array;
  /** Waves below it, as volts on a line for each volt of source, are not followed. */
  floor: number;
  dropped: number;
}

/** One end of the lines for the fastest changes. */
interface Side {
  readonly ends: LineEnds;
  readonly reflect: Float64Array;
  readonly admit: Float64Array;
  /** Reflection of each lead's termination. */
  readonly bounce: Float64Array;
  /** Per line: what a source of unit slope behind its termination puts into the end's equation, or into the lead. */
  readonly drive: Float64Array;
  /** In ticks; 0 where there is no lead. */
  readonly leads: readonly number[];
}

function startTracking(network: LineNetwork, { horizon, shorted }: LatticeRequest): Tracking {
  const { order, modes } = network;
  const tick = horizon / 2 ** 48;
  const modeVolts = new Float64Array(order);
  for (let at = 0; at < order * order; at += 1) modeVolts[at % order] = Math.max(modeVolts[at % order], Math.abs(modes.voltage[at]));
  return {
    network,
    arrivals: new Arrivals(2 * order),
    arriving: new Float64Array(2 * order),
    sides: [sideOf(network, 0, shorted[0], tick), sideOf(network, 1, shorted[1], tick)],
    logs: [new KinkLog(order), new KinkLog(order), new KinkLog(order), new KinkLog(order)],
    tick,
    delays: Array.from(modes.delays, (delay) => Math.round(delay / tick)),
    modeVolts,
    floor: 0,
    dropped: 0,
  };
}

function sideOf({ order, modes, ends: bothEnds }: LineNetwork, side: 0 | 1, shorted: Uint8Array, tick: number): Side {
  const ends = bothEnds[side];
  const alpha = new Float64Array(order);
  const beta = new Float64Array(order);
  const bounce = new Float64Array(order);
  const drive = new Float64Array(order);
  for (let i = 0; i < order; i += 1) {
    const own = endEquation(ends.resistance[i], shorted[i] === 1 ? Infinity : 0, ends.seen[i]);
    const lead = ends.leadImpedance[i];
    const hasLead = ends.leadDelay[i] !== 0;
    // Behind a lead the end sees the lead's impedance and twice the wave that arrives through it.
    alpha[i] = hasLead ? 1 : own.alpha;
    beta[i] = hasLead ? lead : own.beta;
    bounce[i] = hasLead ? (own.beta - own.alpha * lead) / (own.beta + own.alpha * lead) : 0;
    drive[i] = hasLead ? (own.source * lead) / (own.beta + own.alpha * lead) : own.source;
  }
  return { ends, ...scatteringOf(modes, alpha, beta), bounce, drive, leads: Array.from(ends.leadDelay, (delay) => Math.round(delay / tick)) };
}

/** Time zero: the source's own slope leaves its end, or enters its lead. Sets the scale of what is too small to follow. */
function launch(tracking: Tracking, { source, threshold }: LatticeRequest): void {
  const { network: { order }, sides, logs, arriving, modeVolts } = tracking;
  const side = source.end === 'left' ? 0 : 1;
  const { admit, drive, leads } = sides[side];
  const amplitude = drive[source.line];
  if (amplitude === 0) return;
  arriving.fill(0);
  if (leads[source.line] !== 0) {
    tracking.floor = threshold * amplitude;
    const row = logs[2 + side].add(0);
    logs[2 + side].leaving[row + source.line] = amplitude;
    finishTermination(tracking, 0, side, row);
    return;
  }
  const row = logs[side].add(0);
  const { leaving } = logs[side];
  for (let k = 0; k < order; k += 1) {
    leaving[row + k] = admit[k * order + source.line] * amplitude;
    tracking.floor = Math.max(tracking.floor, threshold * Math.abs(leaving[row + k]) * modeVolts[k]);
  }
  finishEnd(tracking, 0, side, row);
}

function scatterAtEnd(tracking: Tracking, time: number, side: 0 | 1): void {
  const { network: { order }, sides, logs, arriving, tick } = tracking;
  const { reflect, admit, leads } = sides[side];
  const row = logs[side].add(time * tick);
  const { leaving } = logs[side];
  for (let k = 0; k < order; k += 1) {
    let sum = 0;
    for (let j = 0; j < order; j += 1) sum += reflect[k * order + j] * arriving[j];
    for (let i = 0; i < order; i += 1) if (leads[i] !== 0) sum += 2 * admit[k * order + i] * arriving[order + i];
    leaving[row + k] = sum;
  }
  finishEnd(tracking, time, side, row);
}

/** Drops what is too small, then sends the rest on its way. */
function finishEnd(tracking: Tracking, time: number, side: 0 | 1, row: number): void {
  const { network: { order, modes }, sides, logs, arrivals, arriving, delays, modeVolts } = tracking;
  const { leaving, leavingToLeads, voltage, current } = logs[side];
  for (let k = 0; k < order; k += 1) {
    leaving[row + k] = followed(tracking, leaving[row + k], modeVolts[k]);
    if (leaving[row + k] !== 0) arrivals.add(time + delays[k], side === 0 ? 1 : 0, k, leaving[row + k]);
  }
  const { leads } = sides[side];
  for (let i = 0; i < order; i += 1) {
    let volts = 0;
    let amperes = 0;
    for (let k = 0; k < order; k += 1) {
      volts += modes.voltage[i * order + k] * (leaving[row + k] + arriving[k]);
      amperes += modes.current[i * order + k] * (leaving[row + k] - arriving[k]);
    }
    voltage[row + i] = volts;
    current[row + i] = amperes;
    if (leads[i] === 0) continue;
    leavingToLeads[row + i] = followed(tracking, volts - arriving[order + i], 1);
    if (leavingToLeads[row + i] !== 0) arrivals.add(time + leads[i], side === 0 ? 2 : 3, i, leavingToLeads[row + i]);
  }
}

function bounceAtTermination(tracking: Tracking, time: number, side: 0 | 1): void {
  const { network: { order }, sides, logs, arriving, tick } = tracking;
  const row = logs[2 + side].add(time * tick);
  for (let i = 0; i < order; i += 1) logs[2 + side].leaving[row + i] = sides[side].bounce[i] * arriving[i];
  finishTermination(tracking, time, side, row);
}

function finishTermination(tracking: Tracking, time: number, side: 0 | 1, row: number): void {
  const { network: { order }, sides, logs, arrivals, arriving } = tracking;
  const { leaving, voltage, current } = logs[2 + side];
  const { ends, leads } = sides[side];
  for (let i = 0; i < order; i += 1) {
    if (leads[i] === 0) continue;
    leaving[row + i] = followed(tracking, leaving[row + i], 1);
    voltage[row + i] = leaving[row + i] + arriving[i];
    current[row + i] = (leaving[row + i] - arriving[i]) / ends.leadImpedance[i];
    if (leaving[row + i] !== 0) arrivals.add(time + leads[i], side, order + i, leaving[row + i]);
  }
}

function followed(tracking: Tracking, amplitude: number, voltsPerUnit: number): number {
  const volts = Math.abs(amplitude) * voltsPerUnit;
  if (tracking.floor <= volts) return amplitude;
  tracking.dropped += volts;
  return 0;
}

/** Rows that grow as events come. */
class KinkLog implements Kinks {
  count = 0;
  times = new Float64Array(firstRows);
  leaving: Float64Array;
  leavingToLeads: Float64Array;
  voltage: Float64Array;
  current: Float64Array;

  constructor(private readonly order: number) {
    this.leaving = new Float64Array(firstRows * order);
    this.leavingToLeads = new Float64Array(firstRows * order);
    this.voltage = new Float64Array(firstRows * order);
    this.current = new Float64Array(firstRows * order);
  }

  /** Where the new row of zeros starts. */
  add(time: number): number {
    if (this.count === this.times.length) {
      this.times = doubled(this.times);
      this.leaving = doubled(this.leaving);
      this.leavingToLeads = doubled(this.leavingToLeads);
      this.voltage = doubled(this.voltage);
      this.current = doubled(this.current);
    }
    this.times[this.count] = time;
    this.count += 1;
    return (this.count - 1) * this.order;
  }
}

const firstRows = 16;

function doubled(values: Float64Array): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(2 * values.length);
  larger.set(values);
  return larger;
}
