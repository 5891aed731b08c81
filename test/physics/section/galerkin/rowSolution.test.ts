/** Conductors beside each other, each by what the others see of it: the same as by all polynomials of all sides. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { chargedConductors, openConstant } from '../../../../server/src/physics/section/basis/chargedConductor';
import { distancesBeside } from '../../../../server/src/physics/section/galerkin/distancesBeside';
import { rowSolution } from '../../../../server/src/physics/section/galerkin/rowSolution';
import { sidesSolution } from '../../../../server/src/physics/section/galerkin/sidesSolution';
import { kernelsOf } from '../../../../server/src/physics/section/kernel/kernelCache';
import { placementOf } from '../../../../server/src/physics/section/placement';
import { metres } from '../../../../server/src/units/quantity';
import { randomSections, sectionKinds } from '../../../support/randomSection';

const each = 12;

function problemOf(section: ReturnType<typeof randomSections>[number], effort: number) {
  const placement = placementOf(section);
  assert.ok(!('refused' in placement));
  const { stack, conductors } = placement;
  const signals = section.conductors.flatMap(({ role }, index) => (role === 'signal' ? [index] : []));
  return { conductors: chargedConductors(conductors, stack, effort), signals, kernel: kernelsOf(stack), constant: openConstant(conductors, stack) };
}

/** Of two matrices, over entries above a ten-thousandth of the diagonal. */
function largestDifference(a: Float64Array, b: Float64Array, order: number): number {
  return a.reduce((worst, value, at) => {
    const scale = Math.sqrt(b[Math.floor(at / order) * (order + 1)] * b[(at % order) * (order + 1)]);
    return Math.abs(b[at]) < 1e-4 * scale ? worst : Math.max(worst, Math.abs(value / b[at] - 1));
  }, 0);
}

describe('a row of conductors by what each sees of the others', () => {
  for (const kind of sectionKinds) {
    it(`is what all polynomials say, at both degrees: ${kind}`, () => {
      let compared = 0;
      for (const section of randomSections(kind, 31, each)) {
        for (const [effort, allowed] of [[0, 2e-5], [2, 1.5e-5]] as const) {
          const problem = problemOf(section, effort);
          const distances = distancesBeside(problem.conductors);
          if (distances === null) continue;
          const [row, sides] = [rowSolution(problem, distances), sidesSolution(problem)];
          assert.ok(row !== null && sides !== null);
          for (const which of ['fine', 'coarse'] as const) {
            const difference = largestDifference(row[which], sides[which], row.order);
            assert.ok(difference < allowed, `${which} off by ${difference.toExponential(1)}: ${JSON.stringify(section)}`);
          }
          compared += 1;
        }
      }
      // Where traces of two layers are placed at random, most stand above each other.
      assert.ok(2 < compared, `only ${compared} of ${2 * each} stood beside each other`);
    });
  }

  it('is the same to the last digit whatever was solved before', () => {
    const [section] = randomSections('eight', 3, 1);
    const of = (moved: number) => {
      const problem = problemOf({ ...section, conductors: section.conductors.map((each, i) => ({ ...each, x: metres(each.x + (4 < i ? moved : 0)) })) }, 0);
      return rowSolution(problem, distancesBeside(problem.conductors)!)!;
    };
    const first = of(0);
    for (const moved of [1e-5, 3e-5, 1e-7]) of(moved);
    assert.deepEqual(of(0), first);
  });

  it('takes any gap down to a fiftieth of the width, and leaves narrower ones to the other way', () => {
    const [section] = randomSections('bare', 3, 1);
    for (const gap of [3.9e-6, 4.1e-6, 7e-6, 20e-6]) {
      const conductors = [0, 1].map((i) => ({ ...section.conductors[0], x: metres(i * (200e-6 + gap)), width: metres(200e-6), height: metres(35e-6), undercut: metres(0) }));
      const problem = problemOf({ ...section, conductors }, 1);
      const distances = distancesBeside(problem.conductors);
      assert.equal(distances === null, gap < 4e-6);
      if (distances === null) continue;
      const difference = largestDifference(rowSolution(problem, distances)!.fine, sidesSolution(problem)!.fine, 2);
      assert.ok(difference < 1e-5, `${gap}: off by ${difference.toExponential(1)}`);
    }
  });

  it('leaves to the other way what stands above another', () => {
    const [section] = randomSections('both faces', 3, 1);
    const stacked = section.conductors.map((each) => ({ ...each, x: metres(0) }));
    assert.equal(distancesBeside(problemOf({ ...section, conductors: stacked.slice(0, 2) }, 0).conductors), null);
  });
});
