/** The tests' own field solver against values from outside: what it says of its error has to hold before it may judge. */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { fieldCapacitance, fieldCapacitanceInAir, type FieldSection } from '../support/fieldEnergy';

interface Case { readonly id: string; readonly outputs: Record<'C_F_per_m' | 'C0_F_per_m', readonly (readonly number[])[]> }
const cases: readonly Case[] = JSON.parse(readFileSync('test/reference/sections.json', 'utf8')).cases;
const mm = 1e-3;
const trace = (x0: number, x1: number, y0 = 0.2, t = 0.035) => ({ x0: x0 * mm, x1: x1 * mm, y0: y0 * mm, y1: (y0 + t) * mm });
const layer = (y0: number, y1: number, er: number) => ({ y0: y0 * mm, y1: y1 * mm, er });

const sections: readonly (readonly [string, FieldSection])[] = [
  ['A-MS-g0.2', { bottom: 0, top: null, layers: [layer(0, 0.2, 4.2)], conductors: [trace(-0.3, -0.1), trace(0.1, 0.3)] }],
  ['A-MS-g0.8', { bottom: 0, top: null, layers: [layer(0, 0.2, 4.2)], conductors: [trace(-0.6, -0.4), trace(0.4, 0.6)] }],
  ['A-SLA-g0.30', { bottom: 0, top: 0.735 * mm, layers: [layer(0, 0.735, 4.2)], conductors: [trace(-0.35, -0.15), trace(0.15, 0.35)] }],
  ['A-MSM-g0.4', {
    bottom: 0, top: null, layers: [layer(0, 0.2, 4.2), layer(0.2, 0.225, 3.4)], conductors: [trace(-0.4, -0.2), trace(0.2, 0.4)],
    patches: [[-0.425, -0.175], [0.175, 0.425]].map(([x0, x1]) => ({ x0: x0! * mm, x1: x1! * mm, y0: 0.2 * mm, y1: 0.26 * mm, er: 3.4 })),
  }],
  ['A-PCB3-t1.38mil', { bottom: null, top: null, layers: [layer(0, 1.1938, 4.7)], conductors: [{ ...trace(-1.7145, -1.3335, 1.1938, 0.035052), grounded: true }, trace(-0.1905, 0.1905, 1.1938, 0.035052), trace(1.3335, 1.7145, 1.1938, 0.035052)] }],
];

describe('the field solver of the tests', () => {
  for (const [id, section] of sections) {
    it(`holds ${id} within its own error`, () => {
      const { outputs } = cases.find((each) => each.id === id)!;
      for (const [answer, wanted] of [[fieldCapacitance(section), outputs.C_F_per_m], [fieldCapacitanceInAir(section), outputs.C0_F_per_m]] as const) {
        const largest = Math.max(...wanted.flat());
        const worst = Math.max(...wanted.flatMap((row, i) => row.map((value, j) => Math.abs(value - answer.matrix[i]![j]!) / largest)));
        assert.ok(worst <= answer.error, `off by ${worst.toExponential(2)} of the largest entry, said ${answer.error.toExponential(2)}`);
        assert.ok(answer.error <= 5e-3, `an error of ${answer.error} would judge nothing`);
      }
    });
  }
});
