/** Networks and plain sums that the noise of networks is held against. */
import type { Shunt } from '../../../server/src/physics/circuit/circuit';
import { farads, hertz, ohms } from '../../../server/src/units/quantity';

export const band = (from: number, to: number) => ({ from: hertz(from), to: hertz(to) });

export const shunt = (node: number, to: number, resistance: number, capacitance = 0): Shunt => ({ node, to, resistance: ohms(resistance), capacitance: farads(capacitance) });

/** Midpoint rule over the logarithm of frequency: slow, and nothing that could be wrong with it. */
export function plainSum(from: number, to: number, density: (f: number) => number, steps = 20_000): number {
  const width = Math.log(to / from) / steps;
  let sum = 0;
  for (let at = 0; at < steps; at += 1) {
    const f = from * Math.exp((at + 0.5) * width);
    sum += f * density(f) * width;
  }
  return sum;
}

/** Of two nodes to ground with something between: what 1 A into each puts on both, by Cramer's rule. */
export function twoNodeImpedance(shunts: readonly Shunt[], f: number): { readonly re: readonly number[]; readonly im: readonly number[] } {
  const y = (a: number, b: number) => shunts.filter(({ node, to }) => (node === a && to === b) || (node === b && to === a)).reduce((sum, { resistance, capacitance }) => ({ re: sum.re + 1 / resistance, im: sum.im + 2 * Math.PI * f * capacitance }), { re: 0, im: 0 });
  const [one, two, between] = [y(1, 0), y(2, 0), y(1, 2)];
  const times = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re });
  const plus = (a: Complex, b: Complex): Complex => ({ re: a.re + b.re, im: a.im + b.im });
  const determinant = plus(times(one, two), times(between, plus(one, two)));
  const over = (a: Complex): Complex => {
    const size = determinant.re ** 2 + determinant.im ** 2;
    return { re: (a.re * determinant.re + a.im * determinant.im) / size, im: (a.im * determinant.re - a.re * determinant.im) / size };
  };
  const [z11, z12, z22] = [over(plus(two, between)), over(between), over(plus(one, between))];
  return { re: [z11.re, z12.re, z22.re], im: [z11.im, z12.im, z22.im] };
}

interface Complex {
  readonly re: number;
  readonly im: number;
}
