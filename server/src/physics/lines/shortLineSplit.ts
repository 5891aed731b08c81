/**
 * How much of a victim's peak comes by the electric field and how much by the magnetic one, as on a short line.
 *
 *   driver  R----===================----  load        aggressor and victim alone, each at one voltage and one current:
 *                  Cm    or   Lm                      once with Cm only, once with Lm only
 *   near   Rn----===================----  Rf  far
 *
 * Model     the short line of people's reasoning, whatever ends it: Paul, Introduction to Electromagnetic Compatibility, chapter on
 *           crosstalk, from memory. Other lines of the run are at zero potential
 * Method    steady slopes by the formula of `shares.ts`; a load that the driver charges through most of the edge by
 *           `lumpedCircuit.ts`, two lines, two solutions: both parts at the moment at which their sum is largest, the last such
 *           one of a level top
 * Range     delay below a sixth of the edge; beyond, a hint at what dominates, no more
 * Accuracy  the parts add up to the short line's peak where coupling is weak; test/physics/lines/shortLineSplit.test.ts
 */
import { volts, type Time } from '../../units/quantity';
import type { CoupledLines, Ramp } from './lines';
import { lumpedVoltages, voltageWithin, type LumpedVoltages } from './lumpedCircuit';
import { couplingShares, type CouplingShares, type Shares } from './shares';

export function shortLineSplit(lines: CoupledLines, ramp: Ramp, victim: number, until: Time): CouplingShares {
  if (slopesSettle(lines, ramp)) return couplingShares(lines, ramp, victim);
  const two: Ramp = { ...ramp, line: 0 };
  const [byField, byFlux] = (['capacitance', 'inductance'] as const).map((kept) => lumpedVoltages(pairOf(lines, ramp.line, victim, kept), two, until, until)) as [LumpedVoltages, LumpedVoltages];
  const moments = [...new Set([...momentsOf(byField), ...momentsOf(byFlux)])].sort((a, b) => a - b);
  const [left, right] = [1, 3].map((node) => {
    const [capacitive, inductive] = [valuesAt(byField, node, moments), valuesAt(byFlux, node, moments)];
    const sums = moments.map((_, at) => Math.abs(capacitive[at]! + inductive[at]!));
    const largest = Math.max(...sums);
    const peak = sums.findLastIndex((sum) => level * largest <= sum);
    return { capacitive: volts(capacitive[peak] ?? 0), inductive: volts(inductive[peak] ?? 0) };
  }) as [Shares, Shares];
  return ramp.end === 'left' ? { near: left, far: right } : { near: right, far: left };
}

/** The aggressor's voltage and current have steady slopes for nearly all of the edge: `shares.ts` holds, and echoes do not enter. */
function slopesSettle({ left, right }: CoupledLines, { line, end, duration }: Ramp): boolean {
  const [source, load] = end === 'left' ? [left[line], right[line]] : [right[line], left[line]];
  const charged = load.capacitance === 0 ? 0 : source.resistance * load.capacitance;
  return charged < steady * duration;
}

const steady = 0.05;

/** Of the largest: what a level top may lose to what it approaches slowly. */
const level = 0.999;

/** The two alone, with one of their mutuals. */
function pairOf({ order, inductance, capacitance, length, left, right }: CoupledLines, aggressor: number, victim: number, kept: 'capacitance' | 'inductance'): CoupledLines {
  const of = (matrix: Float64Array, mutual: boolean) => {
    const between = mutual ? matrix[aggressor * order + victim] : 0;
    return Float64Array.of(matrix[aggressor * (order + 1)], between, between, matrix[victim * (order + 1)]);
  };
  const ends = (all: CoupledLines['left']) => [all[aggressor], all[victim]];
  return { order: 2, inductance: of(inductance, kept === 'inductance'), capacitance: of(capacitance, kept === 'capacitance'), length, left: ends(left), right: ends(right) };
}

function momentsOf({ solution: { times, count }, scale }: LumpedVoltages): readonly number[] {
  return Array.from(times.subarray(0, count), (time) => time * scale);
}

/** Of a node (left ends, then right ends), at times that ascend. */
function valuesAt(answer: LumpedVoltages, node: number, moments: readonly number[]): readonly number[] {
  const { solution: { times, count }, scale } = answer;
  let step = 0;
  return moments.map((moment) => {
    const time = moment / scale;
    while (step + 2 < count && times[step + 1] < time) step += 1;
    const share = (time - times[step]) / (times[step + 1] - times[step]);
    return voltageWithin(answer, node, step, Math.min(1, Math.max(0, share)));
  });
}
