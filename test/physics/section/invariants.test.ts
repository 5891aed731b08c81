/** What holds of every section, whatever its numbers: laws of electrostatics, and indifference to what does not matter. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { cholesky } from '../../../server/src/numeric/cholesky';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import type { Section, SectionConductor, SectionMatrices } from '../../../server/src/physics/section/section';
import { epsilon0, mu0 } from '../../../server/src/units/constants';
import { metres } from '../../../server/src/units/quantity';
import { near, relativeDifference } from '../../support/near';
import { randomSections, sectionKinds } from '../../support/randomSection';

const sections = sectionKinds.flatMap((kind) => randomSections(kind, 3, 3).map((section) => ({ kind, section })));

describe('every section', () => {
  it('has symmetric, positive definite C, C0 and L, of the right signs', () => {
    for (const { kind, section } of sections) {
      const { order, capacitance, capacitanceInAir, inductance } = solved(section);
      for (const [name, matrix] of [['C', capacitance], ['C0', capacitanceInAir], ['L', inductance]] as const) {
        assert.ok(cholesky(Float64Array.from(matrix, (value) => value / matrix[0]), order), `${kind}: ${name} is not positive definite`);
        for (let i = 0; i < order; i += 1) for (let j = 0; j < order; j += 1) assert.equal(matrix[i * order + j], matrix[j * order + i], `${kind}: ${name} is not symmetric`);
      }
      for (let i = 0; i < order; i += 1) {
        let row = 0;
        for (let j = 0; j < order; j += 1) {
          row += capacitance[i * order + j];
          // What two planes have shielded to a billionth is rounding and has no sign.
          if (i !== j) assert.ok(capacitance[i * order + j] < 1e-9 * capacitance[0] && -1e-9 * inductance[0] < inductance[i * order + j], `${kind}: sign of the mutual ${i} ${j}`);
        }
        assert.ok(0 < row, `${kind}: row ${i} of C`);
      }
    }
  });

  it('has C between C0 and C0 times the largest permittivity', () => {
    for (const { kind, section } of sections) {
      const { order, capacitance, capacitanceInAir } = solved(section);
      const largest = Math.max(...section.layers.map(({ permittivity }) => permittivity));
      for (const bound of [capacitance.map((value, at) => value - capacitanceInAir[at] * (1 - 1e-4)), capacitance.map((value, at) => largest * capacitanceInAir[at] * (1 + 1e-4) - value)]) {
        assert.ok(cholesky(bound.map((value) => value / capacitance[0]), order), kind);
      }
    }
  });

  it('has L C = mu eps in one dielectric', () => {
    for (const { kind, section } of sections) {
      const permittivity = 3.7;
      const { order, capacitance, inductance } = solved({ ...section, layers: section.layers.map(({ thickness }) => ({ permittivity, thickness })) });
      for (let i = 0; i < order; i += 1) {
        for (let j = 0; j < order; j += 1) {
          let sum = 0;
          for (let k = 0; k < order; k += 1) sum += inductance[i * order + k] * capacitance[k * order + j];
          near(sum / (mu0 * epsilon0 * permittivity) + 1, i === j ? 2 : 1, 1e-12, `${kind}: entry ${i} ${j} of L C`);
        }
      }
    }
  });

  it('does not feel where it lies', () => {
    for (const { kind, section } of sections) {
      compare(solved(section), solved(withConductors(section, (each) => ({ ...each, x: metres(each.x + 0.25) }))), 1e-8, `${kind} moved`);
    }
  });

  it('does not feel in which order it is told', () => {
    for (const { kind, section } of sections) {
      const original = solved(section);
      const turned = solved({ ...section, conductors: [...section.conductors].reverse() });
      compare(original, { ...turned, ...Object.fromEntries((['capacitance', 'inductance'] as const).map((name) => [name, Float64Array.from(turned[name]).reverse()])) }, 1e-11, `${kind} reversed`);
    }
  });

  it('is the same in its mirror, and upside down', () => {
    for (const { kind, section } of sections) {
      const mirrored = withConductors(section, (each) => ({ ...each, x: metres(-each.x - each.width) }));
      compare(solved(section), solved(mirrored), 1e-7, `${kind} mirrored`);
      compare(solved(section), solved(upsideDown(section)), 1e-6, `${kind} upside down`);
    }
  });

  it('is the same a thousand times larger or smaller', () => {
    for (const { kind, section } of sections) {
      for (const factor of [1e-3, 1e3, 0.7]) compare(solved(section), solved(enlarged(section, factor)), 1e-6, `${kind} times ${factor}`);
    }
  });

  it('does not feel a dielectric cut in two', () => {
    for (const { kind, section } of sections) {
      const cut = { ...section, layers: section.layers.flatMap(({ permittivity, thickness }) => (thickness === Infinity ? [{ permittivity, thickness }] : [0.25, 0.75].map((part) => ({ permittivity, thickness: metres(part * thickness) })))) };
      compare(solved(section), solved(cut), 1e-6, `${kind} cut`);
    }
  });

  it('hardly feels a dielectric that is almost the same', () => {
    // Through mirrors, transmissions and tables instead of one dielectric: two ways to the same numbers.
    for (const { kind, section } of sections) {
      const equal = { ...section, layers: section.layers.map(({ thickness }) => ({ permittivity: 4, thickness })) };
      const almost = { ...section, layers: section.layers.map(({ thickness }, i) => ({ permittivity: 4 + 1e-8 * i, thickness })) };
      const strong = solved(equal).capacitance.every((value) => 1e-5 * solved(equal).capacitance[0] < Math.abs(value));
      if (strong) compare(solved(equal), solved(almost), 1e-5, kind);
    }
  });
});

function solved(section: Section): SectionMatrices {
  const solution = solveSection(section);
  assert.ok('solved' in solution, JSON.stringify({ solution, section }));
  return solution.solved;
}

function withConductors(section: Section, change: (conductor: SectionConductor) => SectionConductor): Section {
  return { ...section, conductors: section.conductors.map(change) };
}

function enlarged(section: Section, factor: number): Section {
  return {
    ...withConductors(section, ({ role, ...lengths }) => ({ role, ...Object.fromEntries(Object.entries(lengths).map(([name, value]) => [name, value * factor])) }) as SectionConductor),
    layers: section.layers.map(({ permittivity, thickness }) => ({ permittivity, thickness: metres(thickness * factor) })),
  };
}

function upsideDown(section: Section): Section {
  const { layers, planeBelow, planeAbove } = section;
  // Height zero is the lowest finite face, or the plane's.
  const height = layers.reduce((sum, { thickness }) => (thickness === Infinity ? sum : sum + thickness), 0);
  return {
    ...withConductors(section, (each) => ({ ...each, x: metres(each.x + each.undercut), y: metres(height - each.y - each.height), width: metres(each.width - 2 * each.undercut), undercut: metres(-each.undercut) })),
    layers: [...layers].reverse(), planeBelow: planeAbove, planeAbove: planeBelow,
  };
}

/** Entries of either matrix, weak ones against a ten-thousandth of the diagonal: the kernel's tables are good to 1e-10. */
function compare(a: SectionMatrices, b: SectionMatrices, tolerance: number, what: string): void {
  for (const name of ['capacitance', 'inductance'] as const) {
    a[name].forEach((value, at) => {
      const weak = 1e-4 * a[name][0];
      const difference = Math.abs(value) < weak ? Math.abs(value - b[name][at]) / weak : relativeDifference(b[name][at], value);
      assert.ok(difference <= tolerance, `${what}: ${name} ${at} differs by ${difference.toExponential(1)}`);
    });
  }
}
