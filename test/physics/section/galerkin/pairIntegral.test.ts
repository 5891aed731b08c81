/** Double integrals of close sides against product rules of graded panels, which converge for a singularity at one point. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { gradedRule, type Grading } from '../../../../server/src/numeric/gradedRule';
import { polynomialLimit, writePolynomials } from '../../../../server/src/physics/section/basis/orthonormalJacobi';
import type { Side } from '../../../../server/src/physics/section/basis/side';
import { sideBasis } from '../../../../server/src/physics/section/basis/sideBasis';
import { addPairIntegral } from '../../../../server/src/physics/section/galerkin/pairIntegral';
import { writeSideBlock } from '../../../../server/src/physics/section/galerkin/sideBlock';

const order = 8;
const identity = { sign: 1, shift: 0 } as const;
const foot = -0.4384;
const crown = -1 / 3;

describe('double integrals of two sides', () => {
  const base = side([0, 0], [2, 0], foot, foot);
  for (const [name, other] of [
    ['a wall at a right angle', side([2, 0], [2, 0.35], foot, crown)],
    ['a wall at its start, run towards the corner', side([0, 0.35], [0, 0], crown, foot)],
    ['a wall at 70 degrees', side([2, 0], [1.88, 0.33], foot, crown)],
    ['a wall at 45 degrees', side([2, 0], [1.7, 0.3], foot, crown)],
    ['a wall at 130 degrees', side([2, 0], [2.5, 0.6], foot, crown)],
    ['its continuation', side([2, 0], [2.4, 0], foot, crown)],
    ['a far longer continuation', side([2, 0], [20, 0], foot, 0)],
    ['its opposite, a fifth of its length away', side([2, 0.4], [0, 0.4], crown, crown)],
    ['its opposite, a fiftieth of its length away', side([2, 0.04], [0, 0.04], crown, crown)],
    ['a short wall a small gap away', side([2.03, 0], [2.03, 0.35], foot, crown)],
  ] as const) {
    it(`agree with graded panels: ${name}`, () => {
      const block = new Float64Array(order * order);
      addPairIntegral(base, other, { factor: -1, image: identity }, block);
      // Panels shorter than the distance of what lies opposite.
      compare(block, byPanels(base, other, name.includes('fiftieth') ? { ratio: 0.7, levels: 20, points: 40 } : { ratio: 0.3, levels: 9, points: 22 }), 3e-8);
      const swapped = new Float64Array(order * order);
      addPairIntegral(other, base, { factor: -1, image: identity }, swapped);
      compare(Float64Array.from(swapped, (_, at) => swapped[(at % order) * order + Math.floor(at / order)]), block, 3e-8);
    });
  }

  it('of a mirror image are those of the mirrored side', () => {
    const wall = side([2, 0], [1.9, 0.35], foot, crown);
    const image = side([2, 0], [1.9, -0.35], foot, crown);
    const [mirrored, real] = [new Float64Array(order * order), new Float64Array(order * order)];
    addPairIntegral(wall, wall, { factor: -1, image: { sign: -1, shift: 0 } }, mirrored);
    addPairIntegral(wall, image, { factor: -1, image: identity }, real);
    compare(mirrored, real, 1e-12);
    compare(mirrored, byPanels(wall, image), 3e-8);
  });
});

describe('blocks of sides that are not close', () => {
  it('from node to node agree with graded panels from 0.6 lengths on', () => {
    const [block] = [new Float64Array(order * order)];
    const base = side([0, 0], [1, 0], foot, crown);
    for (const distance of [0.6, 1, 3, 20]) {
      for (const other of [side([1 + distance, 0], [1 + distance, 0.8], foot, crown), side([0.2, distance], [0.9, distance + 0.3], crown, 0)]) {
        writeSideBlock(base, other, { direct: 1, mirrors: [], rest: null }, block);
        compare(block, byPanels(base, other), 1e-6, 2);
      }
    }
  });
});

function side([x0, y0]: readonly [number, number], [x1, y1]: readonly [number, number], start: number, end: number): Side {
  return { x0, y0, x1, y1, length: Math.hypot(x1 - x0, y1 - y0), basis: sideBasis(start, end), order, conductor: 0, layer: 0 };
}

type Panels = Pick<Grading, 'ratio' | 'levels' | 'points'>;

function byPanels(first: Side, second: Side, panels: Panels = { ratio: 0.3, levels: 9, points: 22 }): Float64Array {
  const [a, b] = [points(first, panels), points(second, panels)];
  const block = new Float64Array(order * order);
  for (let i = 0; i < a.x.length; i += 1) {
    const row = new Float64Array(order);
    for (let j = 0; j < b.x.length; j += 1) {
      const value = -Math.log(Math.hypot(a.x[i] - b.x[j], a.y[i] - b.y[j]));
      for (let n = 0; n < order; n += 1) row[n] += value * b.weighted[j * polynomialLimit + n];
    }
    for (let m = 0; m < order; m += 1) for (let n = 0; n < order; n += 1) block[m * order + n] += a.weighted[i * polynomialLimit + m] * row[n];
  }
  return block;
}

function points({ x0, y0, x1, y1, basis }: Side, panels: Panels) {
  const rule = gradedRule({ alpha: basis.end, beta: basis.start, ...panels });
  const weighted = new Float64Array(rule.weights.length * polynomialLimit);
  const x = new Float64Array(rule.weights.length);
  const y = new Float64Array(rule.weights.length);
  rule.weights.forEach((weight, f) => {
    const [start, end] = [rule.fromStart[f], rule.fromEnd[f]];
    // From the nearer end: coordinates of nodes beside a corner keep their digits.
    x[f] = start < 1 ? x0 + ((x1 - x0) * start) / 2 : x1 - ((x1 - x0) * end) / 2;
    y[f] = start < 1 ? y0 + ((y1 - y0) * start) / 2 : y1 - ((y1 - y0) * end) / 2;
    writePolynomials(basis.recurrence, start < 1 ? start - 1 : 1 - end, weight / basis.total, weighted, f * polynomialLimit, polynomialLimit);
  });
  return { x, y, weighted };
}

/** Against the largest entry; `degrees` limits the comparison to the low polynomials, which carry the charge. */
function compare(actual: Float64Array, expected: Float64Array, tolerance: number, degrees = order): void {
  const largest = expected.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  actual.forEach((value, at) => {
    const [m, n] = [Math.floor(at / order), at % order];
    if (degrees <= m || degrees <= n) return;
    assert.ok(Math.abs(value - expected[at]) <= tolerance * largest, `entry ${m} ${n}: ${value} instead of ${expected[at]}`);
  });
}
