/** Hostile sections: a refusal that names what is wrong, or an answer with its bar; never an exception, never for long. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import type { Section, SectionConductor, SectionLayer } from '../../../server/src/physics/section/section';
import { conductorLimit } from '../../../server/src/physics/section/validate';
import { metres } from '../../../server/src/units/quantity';
import { seeded } from '../../support/seeded';

const h = 0.2e-3;
const w = 0.2e-3;
const t = 35e-6;
const board = [layer(4.2, h), layer(1, Infinity)];

describe('refused sections', () => {
  it('without anything to solve for, or to solve against', () => {
    assert.deepEqual(refusal(over([])), { reason: 'no-signal' });
    assert.deepEqual(refusal(over([trace({ role: 'reference' })])), { reason: 'no-signal' });
    assert.deepEqual(refusal({ ...over([trace({})]), layers: [layer(1, Infinity)], planeBelow: false }), { reason: 'no-reference' });
    assert.deepEqual(refusal(over(Array.from({ length: conductorLimit + 1 }, (_, i) => trace({ x: i * 1e-3 })))), { reason: 'too-many', limit: conductorLimit });
  });

  it('of conductors that meet, naming the two', () => {
    assert.deepEqual(refusal(over([trace({ x: 3e-3 }), trace({}), trace({ x: w / 2 })])), { reason: 'overlap', first: 1, second: 2 });
    assert.deepEqual(refusal(over([trace({}), trace({ x: 2e-3 }), trace({ x: w })])), { reason: 'touching', first: 0, second: 2 });
    assert.deepEqual(refusal(over([trace({}), trace({})])), { reason: 'overlap', first: 0, second: 1 });
    // Undercut parts the feet of one, and joins the shoulders of the other.
    assert.ok('solved' in solveSection(over([trace({ undercut: 8e-6 }), trace({ x: w + 20e-6, undercut: 8e-6 })])));
    assert.equal(refusal(over([trace({ undercut: -15e-6 }), trace({ x: w + 20e-6, undercut: -15e-6 })])).reason, 'overlap');
  });

  it('of conductors that are none', () => {
    for (const change of [{ width: 0 }, { width: -w }, { width: NaN }, { height: -t }, { height: Infinity }, { x: 1e300 }, { y: NaN }, { width: 1e300 }, { width: 1e-300 }, { undercut: w / 2 }, { undercut: w }, { height: 0, undercut: 1e-6 }]) {
      assert.deepEqual(refusal(over([trace({ x: -1e-3 }), trace(change)])), { reason: 'degenerate', conductor: 1 }, JSON.stringify(change));
    }
  });

  it('of conductors that lie in a plane, in two dielectrics or outside', () => {
    for (const y of [0, -t / 2, -1, h - t / 2, h - 1e-6]) assert.deepEqual(refusal(over([trace({ y })])), { reason: 'not-in-dielectric', conductor: 0 }, `${y}`);
    assert.deepEqual(refusal({ ...over([trace({})]), layers: [layer(4.2, h), layer(3.4, t / 2), layer(1, Infinity)] }), { reason: 'not-in-dielectric', conductor: 0 });
  });

  it('of layers that are none, or too thin for the method', () => {
    for (const layers of [[], [layer(0, h), layer(1, Infinity)], [layer(NaN, h), layer(1, Infinity)], [layer(4, 0), layer(1, Infinity)], [layer(4, -1), layer(1, Infinity)], [layer(4.2, h), layer(1, 1)], [layer(4.2, Infinity), layer(1, Infinity)], [layer(4.2, h), layer(3, 1e-9), layer(1, Infinity)]]) {
      assert.equal(refusal({ ...over([trace({ y: 2 * h })]), layers }).reason, 'not-covered', JSON.stringify(layers));
    }
    assert.equal(refusal(over([trace({}), trace({ x: w + 1e-8 })])).reason, 'not-covered');
    assert.equal(refusal(over([trace({ width: 1 })])).reason, 'not-covered');
  });
});

describe('sections at the end of the range', () => {
  it('are solved: square and flat, thick and thin, near and far, with their bars below 1e-3', () => {
    const extremes: Section[] = [
      over([trace({ width: 10e-3 }), trace({ x: 10.1e-3 })]),
      over([trace({ height: 1e-3 }), trace({ x: 0.5e-3, height: 1e-3 })]),
      over([trace({ height: 1e-6 }), trace({ x: 0.5e-3, height: 1e-6 })]),
      over([trace({}), trace({ x: w + 2e-6 })]),
      over([trace({}), trace({ x: 0.3 })]),
      over([trace({ undercut: 0.49 * w }), trace({ x: 0.5e-3, undercut: -t })]),
      { ...over([trace({ y: 5e-6 }), trace({ y: 5e-6, x: 0.5e-3 })]), layers: [layer(4.2, 5e-6), layer(1, Infinity)] },
      { ...over([trace({}), trace({ x: 0.3e-3 })]), layers: [layer(4.2, h), layer(3.4, t), layer(1, Infinity)] },
      { ...over([trace({}), trace({ x: 0.3e-3 })]), layers: [layer(4.2, h), layer(3.4, t + 1e-6), layer(1, Infinity)] },
      { ...over([trace({}), trace({ x: 0.3e-3 })]), layers: [layer(1e5, h), layer(1, Infinity)] },
      { ...over([trace({ width: 40e-3 }), trace({ x: 90e-3 }), trace({ x: 3 })]), layers: [layer(4.2, h), layer(3.7, h)], planeAbove: true },
      { ...over([trace({}), trace({ y: h + t + 5e-6 })]), layers: [layer(4.2, 3 * h)], planeAbove: true },
    ];
    extremes.forEach((section, i) => {
      const solution = solveSection(section);
      assert.ok('solved' in solution, `${i}: ${JSON.stringify(solution)}`);
      const { capacitance, capacitanceError, inductanceError } = solution.solved;
      assert.ok([...capacitance, ...solution.solved.inductance].every(Number.isFinite), `${i}`);
      for (const bar of [...capacitanceError, ...inductanceError]) assert.ok(bar < 1e-3 || Math.abs(capacitance[1]) < 1e-5 * capacitance[0], `${i}: bar ${bar}`);
    });
  });

  it('of random nonsense never throw', () => {
    const random = seeded(9);
    const nonsense = [0, -1, NaN, Infinity, -Infinity, 1e300, 1e-300, -1e-3];
    const mostly = (sensible: number) => (random() < 0.94 ? sensible * (0.5 + random()) : nonsense[Math.floor(nonsense.length * random())]);
    let refused = 0;
    for (let i = 0; i < 600; i += 1) {
      const conductors = Array.from({ length: 1 + Math.floor(3 * random()) }, (_, c): SectionConductor => ({
        role: random() < 0.8 ? 'signal' : 'reference', x: metres(mostly(5e-4 * c)), y: metres(random() < 0.8 ? h : mostly(h)), width: metres(mostly(w)), height: metres(mostly(t)), undercut: metres(random() < 0.7 ? 0 : mostly(t / 3)),
      }));
      const layers = [layer(mostly(4), random() < 0.8 ? h : mostly(h)), layer(mostly(1), random() < 0.8 ? Infinity : mostly(3 * h))];
      const solution = solveSection({ layers, planeBelow: random() < 0.9, planeAbove: random() < 0.2, film: null, conductors });
      if ('refused' in solution) refused += 1;
      else assert.ok(solution.solved.capacitance.every(Number.isFinite) && solution.solved.inductance.every(Number.isFinite));
    }
    assert.ok(150 < refused && refused < 550, `${refused} refused`);
  });
});

function refusal(section: Section) {
  const solution = solveSection(section);
  assert.ok('refused' in solution, 'solved');
  return solution.refused;
}

function layer(permittivity: number, thickness: number): SectionLayer {
  return { permittivity, thickness: metres(thickness) };
}

function trace(change: Partial<Record<'x' | 'y' | 'width' | 'height' | 'undercut', number>> & { role?: SectionConductor['role'] }): SectionConductor {
  const { x = 0, y = h, width = w, height = t, undercut = 0, role = 'signal' } = change;
  return { role, x: metres(x), y: metres(y), width: metres(width), height: metres(height), undercut: metres(undercut) };
}

function over(conductors: readonly SectionConductor[]): Section {
  return { layers: board, planeBelow: true, planeAbove: false, film: null, conductors };
}
