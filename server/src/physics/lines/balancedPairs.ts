/**
 * Pairs of lines with something across their ends, as lines of their difference and their mean, of which nothing is across.
 *
 *   v1 --+--R--    vd = v1 - v2,  vc = (v1 + v2)/2;  id = (i1 - i2)/2,  ic = i1 + i2
 *        |         difference   own ends 2R, C/2 beside Ra, Ca; leads of twice the impedance
 *       Ra, Ca     mean         own ends R/2, 2C; leads of half the impedance
 *        |         L' = S^-1 L S^-T,  C' = S^T C S,  v = S v'
 *   v2 --+--R--
 *
 * Model     the same lossless lines in other unknowns; power is the same in both
 * Source    even and odd modes of symmetric ends, textbook; here the lines themselves may be as unequal as they like
 * Range     pairs that share no line, equal R, C and lead of both lines at both ends
 * Accuracy  rounding: whatever solves the new lines is as exact for the old
 */
import { farads, ohms, volts, type Resistance } from '../../units/quantity';
import type { Across, CoupledLines, Ramp, Termination } from './lines';

export interface BalancedPairs {
  /** Line `first` of every pair is the difference, line `second` the mean; the others are as they were. */
  readonly lines: CoupledLines;
  readonly pairs: readonly BalancedPair[];
  /** The ramps of the new lines that a ramp of the old ones is. */
  readonly ramps: (ramp: Ramp) => readonly Ramp[];
  /** The voltage of an old line in terms of new ones. */
  readonly parts: (line: number) => readonly { readonly line: number; readonly factor: number }[];
}

export interface BalancedPair {
  readonly first: number;
  readonly second: number;
}

/** Null where a pair is not balanced, or two share a line. */
export function balancedPairs(lines: CoupledLines): BalancedPairs | null {
  const pairs = pairsOf([...(lines.leftAcross ?? []), ...(lines.rightAcross ?? [])]);
  if (pairs === null) return null;
  for (const { first, second } of pairs) {
    if (!equalEnds(lines.left[first], lines.left[second]) || !equalEnds(lines.right[first], lines.right[second])) return null;
  }
  const pairWith = (line: number) => pairs.find(({ first, second }) => first === line || second === line);
  return {
    lines: transformed(lines, pairs),
    pairs,
    ramps: (ramp) => {
      const pair = pairWith(ramp.line);
      if (pair === undefined) return [ramp];
      const sign = ramp.line === pair.first ? 1 : -1;
      const across = ramp.end === 'left' ? lines.leftAcross : lines.rightAcross;
      const share = sourceShare(lines[ramp.end][pair.first].resistance, conductanceOf(across ?? [], pair));
      return [{ ...ramp, line: pair.first, amplitude: volts(sign * share * ramp.amplitude) }, { ...ramp, line: pair.second, amplitude: volts(ramp.amplitude / 2) }];
    },
    parts: (line) => {
      const pair = pairWith(line);
      if (pair === undefined) return [{ line, factor: 1 }];
      return [{ line: pair.second, factor: 1 }, { line: pair.first, factor: line === pair.first ? 0.5 : -0.5 }];
    },
  };
}

function pairsOf(across: readonly Across[]): readonly BalancedPair[] | null {
  const pairs: BalancedPair[] = [];
  for (const { first, second } of across) {
    const [low, high] = first < second ? [first, second] : [second, first];
    const known = pairs.find((pair) => pair.first === low || pair.second === low || pair.first === high || pair.second === high);
    if (known === undefined) pairs.push({ first: low, second: high });
    else if (known.first !== low || known.second !== high) return null;
  }
  return pairs;
}

function equalEnds(one: Termination, other: Termination): boolean {
  return one.resistance === other.resistance && one.capacitance === other.capacitance && one.lead?.delay === other.lead?.delay && one.lead?.impedance === other.lead?.impedance;
}

function between(across: readonly Across[], { first, second }: BalancedPair): readonly Across[] {
  return across.filter((one) => Math.min(one.first, one.second) === first && Math.max(one.first, one.second) === second);
}

function conductanceOf(across: readonly Across[], pair: BalancedPair): number {
  return between(across, pair).reduce((sum, { resistance }) => sum + 1 / resistance, 0);
}

/** What of e1 - e2 stands behind the difference's resistance: 2R and Ra divide it. */
function sourceShare(resistance: Resistance, across: number): number {
  if (resistance === 0 || resistance === Infinity) return resistance === 0 ? 1 : 0;
  return 1 / (1 + 2 * resistance * across);
}

function transformed(lines: CoupledLines, pairs: readonly BalancedPair[]): CoupledLines {
  const { order, length } = lines;
  const inductance = lines.inductance.slice();
  const capacitance = lines.capacitance.slice();
  for (const { first, second } of pairs) {
    changeRowsAndColumns(inductance, order, first, second, [1, -1, 0.5, 0.5]);
    changeRowsAndColumns(capacitance, order, first, second, [0.5, -0.5, 1, 1]);
  }
  const ends = (terminations: readonly Termination[], across: readonly Across[]) => terminations.map((termination, line) => {
    const pair = pairs.find(({ first, second }) => first === line || second === line);
    if (pair === undefined) return termination;
    return line === pair.first ? differenceEnd(termination, between(across, pair)) : meanEnd(termination);
  });
  return { order, length, inductance, capacitance, left: ends(lines.left, lines.leftAcross ?? []), right: ends(lines.right, lines.rightAcross ?? []) };
}

/** Rows and columns p, q of a symmetric matrix become [a b; c d] times them. */
function changeRowsAndColumns(matrix: Float64Array, order: number, p: number, q: number, [a, b, c, d]: readonly [number, number, number, number]): void {
  for (let k = 0; k < order; k += 1) {
    const [x, y] = [matrix[p * order + k], matrix[q * order + k]];
    matrix[p * order + k] = a * x + b * y;
    matrix[q * order + k] = c * x + d * y;
  }
  for (let k = 0; k < order; k += 1) {
    const [x, y] = [matrix[k * order + p], matrix[k * order + q]];
    matrix[k * order + p] = a * x + b * y;
    matrix[k * order + q] = c * x + d * y;
  }
}

function differenceEnd({ resistance, capacitance, lead }: Termination, across: readonly Across[]): Termination {
  const conductance = across.reduce((sum, one) => sum + 1 / one.resistance, 1 / (2 * resistance));
  const charge = across.reduce((sum, one) => sum + one.capacitance, capacitance / 2);
  return { resistance: ohms(1 / conductance), capacitance: farads(charge), lead: lead === null ? null : { ...lead, impedance: ohms(2 * lead.impedance) } };
}

function meanEnd({ resistance, capacitance, lead }: Termination): Termination {
  return { resistance: ohms(resistance / 2), capacitance: farads(2 * capacitance), lead: lead === null ? null : { ...lead, impedance: ohms(lead.impedance / 2) } };
}
