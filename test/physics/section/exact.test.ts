/** Exact answers that striplines and microstrips (published.test.ts) do not reach: a square's logarithmic capacity, shields. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import type { Section, SectionConductor } from '../../../server/src/physics/section/section';
import { epsilon0 } from '../../../server/src/units/constants';
import { metres } from '../../../server/src/units/quantity';
import { near } from '../../support/near';

const air = [{ permittivity: 1, thickness: metres(Infinity) }];

describe('logarithmic capacity', () => {
  it('of a square is Gamma(1/4)² / (4 pi^1.5) of its side: two squares far apart, pi eps0 / ln(distance / capacity)', () => {
    // Gamma(1/4) from tables (Abramowitz & Stegun 1964, 6.1). Each polarises the other, by (capacity / distance)².
    const capacity = 3.6256099082219083 ** 2 / (4 * Math.PI ** 1.5);
    for (const distance of [1000, 30_000]) {
      const c = capacitance({ layers: air, planeBelow: false, planeAbove: false, film: null, conductors: [box(0, 0, 1, 1), { ...box(distance, 0, 1, 1), role: 'reference' }] });
      near(c[0], (Math.PI * epsilon0) / Math.log(distance / capacity), 2e-6);
    }
  });

  it('of a strip is a quarter of its width: two strips far apart, end to end', () => {
    // In line, the distance counts as sqrt(d² - w²/8 - …): exact by conformal map only far away, where it is d.
    const c = capacitance({ layers: air, planeBelow: false, planeAbove: false, film: null, conductors: [box(0, 0, 1, 0), { ...box(1e4, 0, 1, 0), role: 'reference' }] });
    near(c[0], (Math.PI * epsilon0) / Math.log(4e4), 1e-7);
  });
});

describe('two coplanar strips without a plane', () => {
  it('have the capacitance of the exact map, eps0 K(k’)/K(k), k = gap / whole width', () => {
    // Smythe, Static and Dynamic Electricity, from memory: coplanar equal strips, k = s / (s + 2 w).
    for (const s of [0.1, 1, 5]) {
      const c = capacitance({ layers: air, planeBelow: false, planeAbove: false, film: null, conductors: [box(0, 0, 1, 0), { ...box(1 + s, 0, 1, 0), role: 'reference' }] });
      const k = s / (s + 2);
      near(c[0], epsilon0 * (agm(1, k) / agm(1, Math.sqrt(1 - k * k))) ** -1, 1e-6, `gap ${s}`);
    }
  });
});

describe('reference conductors', () => {
  it('are the zero of potential: with a plane, C is that of all as signals, without their rows', () => {
    const section = (role: SectionConductor['role']): Section => ({
      layers: [{ permittivity: 4.2, thickness: metres(1) }, ...air], planeBelow: true, planeAbove: false, film: null,
      conductors: [box(0, 1, 1, 0.2), { ...box(2, 1, 1, 0.2), role }, box(4, 1, 1, 0.2)],
    });
    const all = capacitance(section('signal'));
    const guarded = capacitance(section('reference'));
    [all[0], all[2], all[6], all[8]].forEach((value, at) => near(guarded[at], value, 1e-9));
  });

  it('without a plane, joined, are one: two halves of a return act as its whole', () => {
    const section = (returns: readonly SectionConductor[]): Section => ({ layers: air, planeBelow: false, planeAbove: false, film: null, conductors: [box(0, 0.5, 1, 0.1), ...returns] });
    const whole = capacitance(section([{ ...box(-2, 0, 5, 0.1), role: 'reference' }]));
    const halves = capacitance(section([{ ...box(-2, 0, 2.49995, 0.1), role: 'reference' }, { ...box(0.50055, 0, 2.49945, 0.1), role: 'reference' }]));
    near(halves[0], whole[0], 2e-4);
  });

  it('around a line shield it: what lies outside a box of four does not matter much', () => {
    const walls = [box(-2, -2, 5, 0.2), box(-2, 2, 5, 0.2), box(-2, -1.75, 0.2, 3.7), box(2.8, -1.75, 0.2, 3.7)].map((each) => ({ ...each, role: 'reference' as const }));
    const inside = box(0, 0, 1, 0.2);
    const alone = capacitance({ layers: air, planeBelow: false, planeAbove: false, film: null, conductors: [inside, ...walls] });
    const watched = capacitance({ layers: air, planeBelow: false, planeAbove: false, film: null, conductors: [inside, box(6, 0, 1, 0.2), ...walls] });
    assert.ok(Math.abs(watched[1]) < 2e-4 * watched[0], `leak ${watched[1] / watched[0]}`);
    near(watched[0], alone[0], 1e-5);
  });
});

function agm(a: number, b: number): number {
  for (let i = 0; i < 60 && 1e-15 * a < Math.abs(a - b); i += 1) [a, b] = [(a + b) / 2, Math.sqrt(a * b)];
  return a;
}

function box(x: number, y: number, width: number, height: number): SectionConductor {
  return { role: 'signal', x: metres(x), y: metres(y), width: metres(width), height: metres(height), undercut: metres(0) };
}

function capacitance(section: Section): Float64Array {
  const solution = solveSection(section);
  assert.ok('solved' in solution, JSON.stringify(solution));
  return solution.solved.capacitance;
}
