/**
 * A run of lines as one lumped circuit, and its voltages while it answers a ramp.
 *
 *    R           L length         R
 *   --\/\--+----coupled coils----+--\/\--      with the ends' own capacitors beside those, and what is across two ends between
 *          = C length/2          = C length/2  them; a lead adds its capacitance at its end and its inductance to the coil
 *
 * Model     one section: right for what is slow against the delay of the run. What oscillates faster than a twelfth of the time
 *           passed since the ramp's start or end is damped away, as losses do
 * Method    nodal equations for the voltages of both ends and the currents between, in units of the line's own delay and
 *           impedance; an L-stable method of order four with steps that grow with time (`numeric/stiffLinear.ts`)
 * Source    circuit theory; halves of C at the ends: Paul, Analysis of Multiconductor Transmission Lines, from memory
 * Accuracy  1e-6 of the largest voltage for what is slow
 */
import { stiffLinear, type StiffLinear, type StiffSolution } from '../../numeric/stiffLinear';
import type { CoupledLines, Ramp, Termination } from './lines';

export interface LumpedVoltages {
  readonly order: number;
  readonly solution: StiffSolution;
  /** Seconds in a unit of the solution's times. */
  readonly scale: number;
  /** Of any node while it was followed. */
  readonly largest: number;
}

export function lumpedVoltages(lines: CoupledLines, ramp: Ramp, atLeast: number, until: number): LumpedVoltages {
  const units = unitsOf(lines);
  const duration = Math.max(ramp.duration / units.time, shortestRamp);
  const solution = stiffLinear(nodalSystem(lines, ramp, units), {
    input: (time) => (time < duration ? (ramp.amplitude * time) / duration : ramp.amplitude),
    kink: duration,
    until: Math.min(until / units.time, longestFollowed * Math.max(1, duration)),
    atLeast: atLeast / units.time,
    firstStep: Math.min(duration, 1) / 64,
    leastShare: 1 / 12,
    tolerance: 1e-9,
    mostSteps: 4000,
  });
  let largest = 0;
  for (let n = 0; n < solution.count; n += 1) {
    for (let i = 0; i < 2 * lines.order; i += 1) largest = Math.max(largest, Math.abs(solution.states[3 * lines.order * n + i]));
  }
  return { order: lines.order, solution, scale: units.time, largest };
}

/** The voltage of node `node` (left ends, then right ends) at place `share` of step `n`: cubic through values and rates. */
export function voltageWithin({ order, solution }: LumpedVoltages, node: number, n: number, share: number): number {
  const { times, states, rates } = solution;
  const from = 3 * order * n + node;
  const to = from + 3 * order;
  const step = times[n + 1] - times[n];
  const rise = states[to] - states[from];
  const startBend = rates[from] * step - rise;
  const endBend = rise - rates[to] * step;
  return states[from] + share * (rise + (1 - share) * ((1 - share) * startBend + share * endBend));
}

/** Delays and ramps in units of the first line's own delay. */
interface Units {
  readonly time: number;
  readonly impedance: number;
  readonly length: number;
}

const shortestRamp = 1e-6;
const longestFollowed = 1e9;
const shortestLength = 1e-9;
/** In units of the line's own impedance and capacitance: what lies beyond is a short circuit. */
const largestConductance = 1e7;
const largestCapacitance = 1e12;

function unitsOf({ inductance, capacitance, length }: CoupledLines): Units {
  const kept = Math.max(length, shortestLength);
  return { time: kept * Math.sqrt(inductance[0] * capacitance[0]), impedance: Math.sqrt(inductance[0] / capacitance[0]), length: kept };
}

/** Unknowns: left ends' voltages, right ends' voltages, currents from left to right times the unit of impedance. */
function nodalSystem({ order, inductance, capacitance, left, right, leftAcross = [], rightAcross = [] }: CoupledLines, ramp: Ramp, { time, impedance, length }: Units): StiffLinear {
  const size = 3 * order;
  const mass = new Float64Array(size * size);
  const stiffness = new Float64Array(size * size);
  const forcing = new Float64Array(size);
  for (let i = 0; i < order; i += 1) {
    for (let j = 0; j < order; j += 1) {
      const half = (capacitance[i * order + j] * length * impedance) / (2 * time);
      mass[i * size + j] = half;
      mass[(order + i) * size + order + j] = half;
      mass[(2 * order + i) * size + 2 * order + j] = (inductance[i * order + j] * length) / (impedance * time);
    }
    const coil = leadInductance(left[i]) + leadInductance(right[i]);
    mass[(2 * order + i) * (size + 1)] += coil / (impedance * time);
    [left[i], right[i]].forEach((end, side) => {
      const node = side * order + i;
      const conductance = Math.min(impedance / end.resistance, largestConductance);
      mass[node * (size + 1)] += Math.min((endCapacitance(end) * impedance) / time, largestCapacitance);
      stiffness[node * (size + 1)] = -conductance;
      stiffness[node * size + 2 * order + i] = side === 0 ? -1 : 1;
      stiffness[(2 * order + i) * size + node] = side === 0 ? 1 : -1;
      if (ramp.line === i && ramp.end === (side === 0 ? 'left' : 'right')) forcing[node] = conductance;
    });
  }
  [leftAcross, rightAcross].forEach((across, side) => {
    for (const { first, second, resistance, capacitance: charge } of across) {
      const [a, b] = [side * order + first, side * order + second];
      addBetween(stiffness, size, a, b, -Math.min(impedance / resistance, largestConductance));
      addBetween(mass, size, a, b, Math.min((charge * impedance) / time, largestCapacitance));
    }
  });
  return { order: size, mass, stiffness, forcing };
}

function addBetween(matrix: Float64Array, size: number, a: number, b: number, value: number): void {
  matrix[a * (size + 1)] += value;
  matrix[b * (size + 1)] += value;
  matrix[a * size + b] -= value;
  matrix[b * size + a] -= value;
}

export function leadInductance({ lead }: Termination): number {
  return lead === null ? 0 : lead.impedance * lead.delay;
}

export function endCapacitance({ capacitance, lead }: Termination): number {
  return capacitance + (lead === null ? 0 : lead.delay / lead.impedance);
}
