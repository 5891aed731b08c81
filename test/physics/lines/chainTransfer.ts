/**
 * An independent way to the transfer of coupled lines: the chain matrix as the exponential of -j omega [0 L; C 0] by its power
 * series, ends and leads as equations of one dense system solved by plain elimination. Finite resistances, or 0 and open ends.
 */
import type { Across, CoupledLines, Termination } from '../../../server/src/physics/lines/lines';
import type { Drive, Place } from '../../../server/src/physics/lines/transfer';

type Complex = readonly [number, number];
const plus = ([a, b]: Complex, [c, d]: Complex): Complex => [a + c, b + d];
const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c];
const over = ([a, b]: Complex, [c, d]: Complex): Complex => [(a * c + b * d) / (c * c + d * d), (b * c - a * d) / (c * c + d * d)];
const zero: Complex = [0, 0];

export function chainTransfer(lines: CoupledLines, drives: readonly Drive[], frequency: number): Readonly<Record<Place, { real: Float64Array; imaginary: Float64Array }>> {
  const { order: n } = lines;
  const omega = 2 * Math.PI * frequency;
  // Unknowns: v left, i left (into the lines), v right, i right (out of the lines), u left, j left, u right, j right (terminations' voltage, current towards the line).
  const rows: Complex[][] = [];
  const sides: Complex[] = [];
  const equation = (entries: readonly (readonly [number, Complex])[], value: Complex = zero) => {
    const row: Complex[] = Array.from({ length: 8 * n }, () => zero);
    for (const [at, factor] of entries) row[at] = plus(row[at], factor);
    rows.push(row);
    sides.push(value);
  };
  const chain = exponential(lines, omega);
  for (let i = 0; i < 2 * n; i += 1) equation([[2 * n + i, [1, 0]], ...chain[i].map((entry, k) => [k, times(entry, [-1, 0])] as const)]);
  for (const [side, ends, across] of [[0, lines.left, lines.leftAcross ?? []], [1, lines.right, lines.rightAcross ?? []]] as const) {
    ends.forEach((termination, i) => endEquations({ n, side, i, omega, termination, across, drives }, equation));
  }
  const x = solved(rows, sides);
  const part = (from: number) => ({ real: Float64Array.from({ length: n }, (_, i) => x[from + i][0]), imaginary: Float64Array.from({ length: n }, (_, i) => x[from + i][1]) });
  return { left: part(0), right: part(2 * n), leftTermination: part(4 * n), rightTermination: part(6 * n) };
}

interface End {
  readonly n: number;
  readonly side: 0 | 1;
  readonly i: number;
  readonly omega: number;
  readonly termination: Termination;
  readonly across: readonly Across[];
  readonly drives: readonly Drive[];
}

function endEquations({ n, side, i, omega, termination, across, drives }: End, equation: (entries: readonly (readonly [number, Complex])[], value?: Complex) => void): void {
  const [v, current, u, j] = [2 * n * side + i, 2 * n * side + n + i, 4 * n + 2 * n * side + i, 5 * n + 2 * n * side + i];
  // Towards the line: into it at the left, and against what comes out of it at the right.
  const inward: Complex = side === 0 ? [1, 0] : [-1, 0];
  const angle = omega * (termination.lead?.delay ?? 0);
  const impedance = termination.lead?.impedance ?? 1;
  equation([[u, [-1, 0]], [v, [Math.cos(angle), 0]], [current, times(inward, [0, impedance * Math.sin(angle)])]]);
  equation([[j, [-1, 0]], [v, [0, Math.sin(angle) / impedance]], [current, times(inward, [Math.cos(angle), 0])]]);
  const own = drives.filter((drive) => drive.line === i && (drive.end === 'left' ? 0 : 1) === side);
  const volts = own.filter(({ kind }) => kind === 'voltage').reduce((sum, { amplitude }) => sum + amplitude, 0);
  const amperes = own.filter(({ kind }) => kind === 'current').reduce((sum, { amplitude }) => sum + amplitude, 0);
  if (termination.resistance === 0) return equation([[u, [1, 0]]], [volts, 0]);
  const entries: [number, Complex][] = [[j, [1, 0]], [u, [1 / termination.resistance, omega * termination.capacitance]]];
  for (const { first, second, resistance, capacitance } of across) {
    if (first !== i && second !== i) continue;
    const admittance: Complex = [1 / resistance, omega * capacitance];
    entries.push([u, admittance], [4 * n + 2 * n * side + (first === i ? second : first), times(admittance, [-1, 0])]);
  }
  return equation(entries, [volts / termination.resistance - amperes, 0]);
}

function exponential({ order: n, inductance, capacitance, length }: CoupledLines, omega: number): Complex[][] {
  // Halved until small, then squared as often. Voltages in units of 50 ohm times the current, so that both halves are alike.
  const unit = 50;
  const doublings = 16;
  const small = Array.from({ length: 2 * n }, (_, i) => Array.from({ length: 2 * n }, (__, k): Complex => {
    if (i < n === k < n) return zero;
    const matrix = i < n ? inductance[i * n + k - n] / unit : capacitance[(i - n) * n + k] * unit;
    return [0, (-omega * matrix * length) / 2 ** doublings];
  }));
  let term: Complex[][] = small.map((row, i) => row.map((_, k) => (i === k ? [1, 0] : zero)));
  let sum = term;
  for (let order = 1; order < 14; order += 1) {
    term = product(term, small).map((row) => row.map(([a, b]): Complex => [a / order, b / order]));
    sum = sum.map((row, i) => row.map((entry, k) => plus(entry, term[i][k])));
  }
  for (let n2 = 0; n2 < doublings; n2 += 1) sum = product(sum, sum);
  return sum.map((row, i) => row.map((entry, k) => times(entry, [i < n === k < n ? 1 : i < n ? unit : 1 / unit, 0])));
}

function product(a: readonly Complex[][], b: readonly Complex[][]): Complex[][] {
  return a.map((row) => b[0].map((_, k) => row.reduce((sum, entry, m) => plus(sum, times(entry, b[m][k])), zero)));
}

function solved(rows: Complex[][], sides: Complex[]): Complex[] {
  const size = rows.length;
  const table = rows.map((row, i) => {
    const scale = 1 / Math.max(...row.map(([a, b]) => Math.hypot(a, b)));
    return [...row, sides[i]].map(([a, b]): Complex => [a * scale, b * scale]);
  });
  for (let column = 0; column < size; column += 1) {
    let best = column;
    for (let i = column; i < size; i += 1) if (Math.hypot(...table[best][column]) < Math.hypot(...table[i][column])) best = i;
    [table[best], table[column]] = [table[column], table[best]];
    for (let i = 0; i < size; i += 1) {
      if (i === column) continue;
      const factor = over(table[i][column], table[column][column]);
      table[i] = table[i].map((entry, k) => plus(entry, times(times(factor, table[column][k]), [-1, 0])));
    }
  }
  return table.map((row, i) => over(row[size], row[i]));
}
