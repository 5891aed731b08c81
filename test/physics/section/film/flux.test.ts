import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { addFluxBlock } from '../../../../server/src/physics/section/film/fluxBlock';
import { writeFluxMoments } from '../../../../server/src/physics/section/film/fluxMoments';
import { sideBasis } from '../../../../server/src/physics/section/basis/sideBasis';
import type { Side } from '../../../../server/src/physics/section/basis/side';
import { layeredKernel, type Kernel } from '../../../../server/src/physics/section/kernel/layeredKernel';
import { stackOf } from '../../../../server/src/physics/section/kernel/stack';
import { metres } from '../../../../server/src/units/quantity';
import { gaussJacobi } from '../../../../server/src/numeric/gaussJacobi';

const legendre = (n: number, u: number): number => (n === 0 ? 1 : n === 1 ? u : ((2 * n - 1) * u * legendre(n - 1, u) - (n - 1) * legendre(n - 2, u)) / n);

describe('writeFluxMoments', () => {
  it('agrees with quadrature where that converges', () => {
    const { nodes, weights } = gaussJacobi(120, 0, 0);
    const values = new Float64Array(8);
    for (const [xi, eta] of [[0.3, 0.5], [-1.2, 0.4], [0.9, -0.7], [2.5, 1], [0, -2.9]]) {
      writeFluxMoments(xi, eta, 8, values);
      for (let n = 0; n < 8; n += 1) {
        const sum = nodes.reduce((total, u, i) => total - (weights[i] * legendre(n, u) * eta) / ((u - xi) ** 2 + eta ** 2), 0);
        assert.ok(Math.abs(values[n] - sum) < 1e-9, `n = ${n} at ${xi}, ${eta}: ${values[n]} instead of ${sum}`);
      }
    }
  });

  it('is half of all flux at a point just off the panel, and none in the panel’s line beyond it', () => {
    const values = new Float64Array(4);
    writeFluxMoments(0.2, 1e-12, 4, values);
    for (let n = 0; n < 4; n += 1) assert.ok(Math.abs(values[n] + Math.PI * legendre(n, 0.2)) < 1e-10);
    writeFluxMoments(1.7, 0, 4, values);
    for (const value of values) assert.equal(Math.abs(value), 0);
  });
});

const side = (x0: number, y0: number, x1: number, y1: number, start = 0, end = 0, order = 4): Side =>
  ({ x0, y0, x1, y1, length: Math.hypot(x1 - x0, y1 - y0), basis: sideBasis(start, end), order, conductor: -1, layer: 1 });
const line: Kernel = { direct: 1, mirrors: [], rest: null };
const flux = (kernel: Kernel, target: Side, source: Side) => {
  const block = new Float64Array(target.order * source.order);
  addFluxBlock(kernel, target, source, 1, block);
  return block;
};

/** The same source as pieces: its polynomials are carried over by quadrature on each piece. */
function bySubdivision(kernel: Kernel, target: Side, source: Side): Float64Array {
  const sum = new Float64Array(target.order * source.order);
  const rule = gaussJacobi(40, source.basis.end, source.basis.start);
  const point = { ...sideBasis(0, 0) };
  rule.nodes.forEach((u, i) => {
    const t = (1 + u) / 2;
    const x = source.x0 + (source.x1 - source.x0) * t;
    const y = source.y0 + (source.y1 - source.y0) * t;
    const tiny = side(x - 1e-7, y, x + 1e-7, y, 0, 0, 2);
    const one = flux(kernel, target, { ...tiny, basis: point });
    const powers = polynomials(source, u);
    for (let n = 0; n < target.order; n += 1) for (let m = 0; m < source.order; m += 1) sum[n * source.order + m] += (rule.weights[i] / source.basis.total) * powers[m] * one[n * 2];
  });
  return sum;
}

function polynomials({ basis, order }: Side, u: number): number[] {
  const { centre, spread } = basis.recurrence;
  const values = [1];
  for (let n = 1; n < order; n += 1) values.push(((u - centre[n - 1]) * values[n - 1] - (1 < n ? spread[n - 1] * values[n - 2] : 0)) / spread[n]);
  return values;
}

describe('addFluxBlock', () => {
  const target = side(0, 0, 1, 0);
  const close = (actual: Float64Array, expected: Float64Array, tolerance: number) => {
    const size = expected.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    actual.forEach((value, at) => assert.ok(Math.abs(value - expected[at]) <= tolerance * size, `entry ${at}: ${value} instead of ${expected[at]}`));
  };

  it('conserves charge: what leaves a closed outline is 2 pi times what is inside, whatever its shape', () => {
    const box = [side(-1, -1, 1, -1), side(1, -1, 1, 1), side(1, 1, -1, 1), side(-1, 1, -1, -1)];
    // The normal lies to the left of the direction of travel: inwards here.
    for (const [source, inside] of [[side(-0.99, 0.2, 0.7, -0.4, -0.3, -0.5), 1], [side(-1, -1, 0.2, -0.8, -0.2, 0), 1], [side(2, 0, 1.001, 3), 0]] as const) {
      const total = new Float64Array(source.order);
      for (const panel of box) {
        const block = flux(line, panel, source);
        for (let m = 0; m < source.order; m += 1) total[m] += block[m];
      }
      assert.ok(Math.abs(total[0] + 2 * Math.PI * inside) < 1e-5, `${total[0]}`);
      for (let m = 1; m < source.order; m += 1) assert.ok(Math.abs(total[m]) < 1e-5, `m = ${m}: ${total[m]}`);
    }
  });

  it('agrees with point charges at near and at far sides', () => {
    for (const source of [side(0.2, 0.3, 0.9, 0.5, -0.3, -0.2), side(3, 1, 4, 2, -0.4, 0), side(-2, -0.4, 3, -0.4, -0.3, -0.3)]) close(flux(line, target, source), bySubdivision(line, target, source), 2e-5);
  });

  it('takes mirrors and the rest of a layered kernel: the flux of its potential by differences', () => {
    const stack = stackOf({ layers: [{ permittivity: 4.2, thickness: metres(1) }, { permittivity: 3.4, thickness: metres(Infinity) }], planeBelow: true, planeAbove: false }, 1);
    const kernel = layeredKernel(stack, 1, 1);
    const source = side(0.1, 1, 0.9, 1, -0.4, -0.4);
    const panel = side(-0.3, 1.2, 1.4, 1.2);
    close(flux(kernel, panel, source), bySubdivision(kernel, panel, source), 2e-5);
    const far = side(-4, 1.2, 9, 1.2);
    close(flux(kernel, far, source), bySubdivision(kernel, far, source), 2e-4);
  });

  it('gives none through the panel itself and those in its line', () => {
    assert.deepEqual([...flux(line, target, target)].map(Math.abs), new Array(16).fill(0));
    assert.deepEqual([...flux(line, target, side(1, 0, 5, 0, -0.2, 0))].map(Math.abs), new Array(16).fill(0));
  });
});
