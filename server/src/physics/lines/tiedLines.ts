/**
 * Coupled lines of which some are tied to the reference at places along the run: guards whose vias are too far apart to hold them at
 * zero potential.
 *
 *   R  --===================================--  R      a = trace        o = tie: the inductance of a via to the plane
 *        a          a          a          a
 *      o-==========-o-========-o-==========-o           between two ties: coupled lines, lossless
 *
 * Model     lossless quasi-TEM lines, cut at every tie; there the voltages of all lines go on, and the tied ones lose the
 *           current of their via. A via is an inductance alone, without coupling to others
 * Method    method of characteristics on modal waves, cubic interpolation of what was on its way for no whole number of steps;
 *           inductances and capacitors by the second backward difference, which is stable for any stiffness. A lead shorter than a step
 *           counts as its capacitance
 * Formula   at a tie  w = a + b - Y^-1 J/2,  J = G v + h    w both sides' sums of waves, a and b those that arrive
 *           G = 2 dt/(3 L), h = (4 J' - J'')/3              J', J'' one and two steps before
 * Source    Branin 1967; Paul, Analysis of Multiconductor Transmission Lines; Gear 1971 (backward differences); from memory
 * Range     up to `mostTies` ties; the work is bounded, and the window shortened where it would not be
 * Accuracy  error bar: twice the difference to the same with steps twice as long
 */
import { seconds, volts, type Time } from '../../units/quantity';
import type { CoupledLines, LineResponse, Ramp, Waveform } from './lines';
import { lineNetwork } from './network';
import { marchTied, type TiedVoltages } from './tiedMarch';

/** To the reference, at a share of the length; those at 0 and 1 are the tied line's ends. */
export interface Tie {
  readonly line: number;
  readonly at: number;
  /** H, above zero. */
  readonly inductance: number;
}

export interface TiedLines {
  /** Terminations of tied lines are not looked at: their ties at 0 and 1 end them. */
  readonly lines: CoupledLines;
  readonly ties: readonly Tie[];
}

export const mostTies = 65;

export function tiedResponse(tied: TiedLines, ramp: Ramp, asked: Time): LineResponse {
  const network = lineNetwork(tied.lines);
  const cuts = cutsOf(tied);
  const shortest = Math.min(...cuts.slice(1).map((cut, k) => cut - cuts[k])) * network.modes.delays[0];
  const perStep = (cuts.length - 1) * (network.order + 2) ** 2;
  const short = ramp.duration + waysAtLeast * network.modes.delays[network.order - 1];
  // As fine as the usual work affords for the whole window, coarser where even the edge and a few ways ask for more. Twice
  // the step has to fit into the shortest piece, for the cubic.
  const finest = Math.max(ramp.duration, shortest / 4) / stepsInEdge;
  const step = Math.min(shortest / 8, Math.max(finest, Math.min(coarsened * finest, (asked * perStep) / mostWork), (short * perStep) / hardLimit));
  const steps = 2 * Math.ceil(Math.min(asked / step, Math.max(mostWork, Math.min(hardLimit, (short / step) * perStep)) / perStep) / 2);
  const window = seconds(Math.min(asked, steps * step));
  const fine = marchTied(network, tied.ties, cuts, ramp, { step, steps });
  const coarse = marchTied(network, tied.ties, cuts, ramp, { step: 2 * step, steps: steps / 2 });
  const waveforms = (rows: readonly Float64Array[]): readonly Waveform[] => rows.map((values) => ({ times: Float64Array.from(values, (_, n) => n * step), values }));
  return {
    left: waveforms(fine.left), right: waveforms(fine.right),
    leftTermination: waveforms(fine.leftTermination), rightTermination: waveforms(fine.rightTermination),
    window, method: 'characteristics',
    errorBar: tied.lines.left.map((_, line) => volts(doubt * largestDifference(fine, coarse, line))),
    work: steps + steps / 2,
  };
}

/** In an edge: its kinks are smeared over a step or two. */
const stepsInEdge = 384;
/** At most so much coarser, before the window is shortened. */
const coarsened = 6;
/** Slowest ways that are followed in any case. */
const waysAtLeast = 3;
/** Steps times pieces times squares of lines and two: some 20 ms, and 150 ms. */
const mostWork = 2.5e5;
const hardLimit = 3e6;
/** Kinks are smeared in the first order of the step, and a little more than that where modes separate. */
const doubt = 2;

/** 0, every place of a tie, 1. */
function cutsOf({ ties }: TiedLines): readonly number[] {
  const places = [0, ...ties.map(({ at }) => at), 1].sort((a, b) => a - b);
  return places.filter((place, n) => n === 0 || 1e-9 < place - places[n - 1]);
}

function largestDifference(fine: TiedVoltages, coarse: TiedVoltages, line: number): number {
  let largest = 0;
  for (const place of ['left', 'right', 'leftTermination', 'rightTermination'] as const) {
    const [one, other] = [fine[place][line], coarse[place][line]];
    for (let n = 0; n < other.length; n += 1) largest = Math.max(largest, Math.abs(other[n] - one[2 * n]));
  }
  return largest;
}
