/**
 * The section solver against the reference cases: boundary elements and finite elements that agree with each other,
 * made without this project's code (test/reference/README.md). Films have their own test.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import type { Section } from '../../../server/src/physics/section/section';
import { metres } from '../../../server/src/units/quantity';
import { relativeDifference } from '../../support/near';

interface ReferenceCase {
  readonly id: string;
  readonly geometry: {
    readonly ground_planes_y: readonly number[];
    readonly dielectric_layers: readonly { readonly er: number; readonly y0: number; readonly y1: number }[];
    readonly dielectric_patches_painted_over_layers: readonly unknown[];
    readonly elsewhere_er: number;
    readonly conductors?: readonly { readonly name: string; readonly polygon: readonly (readonly [number, number])[] }[];
  };
  readonly conductor_order: readonly string[];
  readonly outputs: { readonly C_F_per_m: number[][]; readonly C0_F_per_m: number[][]; readonly L_H_per_m: number[][] };
  readonly rel_uncertainty: { readonly C_diag: number; readonly C_mutual: number; readonly L_diag: number; readonly L_mutual: number };
}

const cases: readonly ReferenceCase[] = JSON.parse(readFileSync('test/reference/sections.json', 'utf8')).cases;

describe('reference sections', () => {
  for (const reference of cases) {
    const { geometry, outputs, rel_uncertainty: uncertainty } = reference;
    if (geometry.conductors === undefined || 0 < geometry.dielectric_patches_painted_over_layers.length) continue;
    it(`${reference.id}: within half as much again of the table's uncertainty and 1e-5 of our own`, () => {
      const solution = solveSection(sectionOf(reference));
      assert.ok('solved' in solution, JSON.stringify(solution));
      const { capacitance, capacitanceInAir, inductance } = solution.solved;
      check(capacitance, outputs.C_F_per_m, 1.5 * uncertainty.C_diag + 1e-5, 1.5 * uncertainty.C_mutual + 1e-5, 'C');
      check(capacitanceInAir, outputs.C0_F_per_m, 1.5 * uncertainty.L_diag + 1e-5, 1.5 * uncertainty.L_mutual + 1e-5, 'C0');
      check(inductance, outputs.L_H_per_m, 1.5 * uncertainty.L_diag + 1e-5, 1.5 * uncertainty.L_mutual + 1e-5, 'L');
    });
  }

  it('has every kind of section but films and closed forms', () => {
    assert.equal(cases.filter(({ geometry }) => geometry.conductors !== undefined && geometry.dielectric_patches_painted_over_layers.length === 0).length, 6);
  });
});

function sectionOf({ geometry, conductor_order: order }: ReferenceCase): Section {
  const open = { permittivity: geometry.elsewhere_er, thickness: metres(Infinity) };
  const planeBelow = geometry.ground_planes_y.includes(0);
  const planeAbove = 1 < geometry.ground_planes_y.length;
  const inner = geometry.dielectric_layers.map(({ er, y0, y1 }) => ({ permittivity: er, thickness: metres(y1 - y0) }));
  return {
    layers: [...(planeBelow ? [] : [open]), ...inner, ...(planeAbove ? [] : [open])],
    planeBelow, planeAbove, film: null,
    conductors: (geometry.conductors ?? []).map(({ name, polygon: [a, b, c, d] }) => ({
      role: order.includes(name) ? 'signal' : 'reference',
      x: metres(a[0]), y: metres(a[1]), width: metres(b[0] - a[0]), height: metres(c[1] - b[1]), undercut: metres(d[0] - a[0]),
    })),
  };
}

function check(actual: Float64Array, expected: number[][], diagonal: number, mutual: number, what: string): void {
  expected.forEach((row, i) => row.forEach((value, j) => {
    const difference = relativeDifference(actual[i * row.length + j], value);
    assert.ok(difference <= (i === j ? diagonal : mutual), `${what}${i}${j} is off by ${difference.toExponential(2)}`);
  }));
}
