import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { writePotentialBlock } from '../../../../server/src/physics/section/film/potentialBlock';
import { sideBasis } from '../../../../server/src/physics/section/basis/sideBasis';
import type { Side } from '../../../../server/src/physics/section/basis/side';
import { writeSideBlock } from '../../../../server/src/physics/section/galerkin/sideBlock';
import { layeredKernel } from '../../../../server/src/physics/section/kernel/layeredKernel';
import { stackOf } from '../../../../server/src/physics/section/kernel/stack';
import { metres } from '../../../../server/src/units/quantity';

const side = (x0: number, y0: number, x1: number, y1: number, start = 0, end = 0, order = 4): Side =>
  ({ x0, y0, x1, y1, length: Math.hypot(x1 - x0, y1 - y0), basis: sideBasis(start, end), order, conductor: -1, layer: 1 });

describe('writePotentialBlock', () => {
  const stack = stackOf({ layers: [{ permittivity: 4.2, thickness: metres(1) }, { permittivity: 3.4, thickness: metres(Infinity) }], planeBelow: true, planeAbove: false }, 1);
  const kernel = layeredKernel(stack, 1, 1);
  const copper = side(0, 1.2, 3, 1.2, -1 / 3, -1 / 3, 7);

  for (const [name, panel] of [
    ['over the copper, as near as a film is', side(0.5, 1.25, 1.7, 1.25)],
    ['over its edge, with a corner of its own', side(-0.05, 1.25, 0.1, 1.25, -0.18, 0)],
    ['upright beside it', side(3.05, 1.05, 3.05, 1.25, -0.18, -0.18)],
    ['at a moderate distance', side(5, 1.05, 9, 1.05, 0, 0, 3)],
    ['far away', side(40, 1.05, 60, 1.05, 0, 0, 3)],
  ] as const) {
    it(`agrees with the solver's own integrals for a panel ${name}`, () => {
      const block = new Float64Array(copper.order * panel.order);
      const expected = new Float64Array(copper.order * panel.order);
      writePotentialBlock(copper, panel, kernel, block);
      writeSideBlock(copper, panel, kernel, expected);
      const size = expected.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
      block.forEach((value, at) => assert.ok(Math.abs(value - expected[at]) < 2e-6 * size + 1e-8 * kernel.direct, `entry ${at}: ${value} instead of ${expected[at]} (largest ${size})`));
    });
  }
});
