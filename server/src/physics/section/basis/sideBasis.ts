/**
 * Charge on one straight side: an edge weight times polynomials, with everything about it that depends on the two
 * edge exponents alone.
 *
 *   start o======================o end      u from -1 to 1, t = (1 + u)/2 from 0 to 1
 *           sigma(u) = w(u) [Q0 p0(u) + Q1 p1(u) + …],   w = (1 + u)^start (1 - u)^end, scaled to the integral 1
 *
 * Model     with the exponents of the edges in the weight, what is left of the charge is smooth and few polynomials
 *           hold it (plain polynomials need some 20 times the accuracy's worth of unknowns)
 * Symbols   p_m orthonormal under w, so Q0 is the side's charge and the other Q carry none; a polynomial of one
 *           degree less is the same series cut short, which is what the error bar rests on
 * Source    p-version boundary elements with singular functions: Stephan & Suri 1989, from memory
 */
import { gaussJacobi } from '../../../numeric/gaussJacobi';
import { orthonormalJacobi, polynomialLimit, type Recurrence } from './orthonormalJacobi';
import { partRule, wholeRule, type PartRule } from './partRule';
import { selfTable } from './selfTable';

export interface SideBasis {
  readonly start: number;
  readonly end: number;
  readonly recurrence: Recurrence;
  /** Integral of the unscaled weight over [-1, 1]. */
  readonly total: number;
  /** The same side run through backwards: its p_m are (-1)^m of these. */
  readonly reversed: () => SideBasis;
  /** Over the whole side, `count` nodes. */
  readonly whole: (count: number) => PartRule;
  /** Over the dyadic part [index, index + 1] / 2^level of the side, level at least 1. */
  readonly part: (level: number, index: number) => PartRule;
  /** Double integrals of w p_m w p_n (-ln |u - v|) for m and n below `order`, or further: entry m × stride + n. */
  readonly self: (order: number) => SelfTable;
  /** Kept here by whoever makes tables of this basis with another one. */
  readonly tables: Map<string, unknown>;
}

export interface SelfTable {
  readonly stride: number;
  readonly entries: Float64Array;
}

/** By the two exponents. A stack has few kinds of edge; the bound only guards against a file that sweeps permittivities. */
const kept = new Map<number, Map<number, SideBasis>>();
const keptLimit = 64;

export function sideBasis(start: number, end: number): SideBasis {
  let row = kept.get(start);
  if (row === undefined || keptLimit < row.size) {
    if (keptLimit <= kept.size) kept.clear();
    row = new Map();
    kept.set(start, row);
  }
  let basis = row.get(end);
  if (basis === undefined) row.set(end, (basis = makeBasis(start, end)));
  return basis;
}

function makeBasis(start: number, end: number): SideBasis {
  const recurrence = orthonormalJacobi(polynomialLimit, start, end);
  const total = gaussJacobi(1, end, start).weights[0];
  const wholes: (PartRule | undefined)[] = [];
  const parts: (PartRule | undefined)[][] = [];
  let self: SelfTable = { stride: 0, entries: new Float64Array(0) };
  const basis: SideBasis = {
    start,
    end,
    recurrence,
    total,
    reversed: () => (start === end ? basis : sideBasis(end, start)),
    whole: (count) => (wholes[count] ??= wholeRule(basis, count)),
    part: (level, index) => ((parts[level] ??= [])[index] ??= partRule(basis, level, index)),
    self: (order) => {
      // The work grows with the cube of the size: most sides need a small one.
      const stride = order <= 8 ? 8 : polynomialLimit;
      // The walls of a conductor have the same exponents the other way round.
      if (self.stride < stride) self = { stride, entries: start < end ? runBackwards(basis.reversed().self(stride)) : selfTable(basis, stride) };
      return self;
    },
    tables: new Map(),
  };
  return basis;
}

/** Of the reversed side: p_m and p_n change their signs with their parities. */
function runBackwards({ stride, entries }: SelfTable): Float64Array {
  return entries.map((value, at) => ((Math.floor(at / stride) + (at % stride)) % 2 === 0 ? value : -value));
}
