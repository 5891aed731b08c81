/** A row under a mask, group by group: the same as all sides and panels at once. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { ungroupedCharge, type FilmProblem } from '../../../../server/src/physics/section/film/filmCharge';
import { filmGroups } from '../../../../server/src/physics/section/film/filmGroups';
import { filmProblem } from '../../../../server/src/physics/section/film/filmedCharge';
import { groupedCharge } from '../../../../server/src/physics/section/film/groupedCharge';
import type { Section } from '../../../../server/src/physics/section/section';
import { solveSection } from '../../../../server/src/physics/section/solveSection';
import { epsilon0 } from '../../../../server/src/units/constants';
import { metres } from '../../../../server/src/units/quantity';
import { seeded } from '../../../support/seeded';

const um = 1e-6;

function rowOf(next: () => number, count: number, even: boolean): Section {
  const between = (low: number, high: number) => low * (high / low) ** next();
  const [height, film, copper, width, gap] = [between(60, 800), between(8, 60), between(12, 70), between(80, 700), between(200, 900)];
  let x = 0;
  return {
    layers: [{ permittivity: 2.2 + 7 * next(), thickness: metres(height * um) }, { permittivity: 1, thickness: metres(Infinity) }],
    planeBelow: true, planeAbove: false, film: { permittivity: 2.5 + 2.5 * next(), thickness: metres(film * um), side: 'above' },
    conductors: Array.from({ length: count }, () => {
      const left = x;
      const own = even ? width : between(80, 700);
      x += own + (even ? gap : between(Math.max(90, 2.2 * film), 900));
      return { role: 'signal', x: metres(left * um), y: metres(height * um), width: metres(own * um), height: metres(copper * um), undercut: metres(0) };
    }),
  };
}

function problemOf(section: Section, effort: number): FilmProblem {
  const { problem } = filmProblem(section, section.conductors.map((_, i) => i), effort)!;
  return problem;
}

describe('a row under a mask by groups', () => {
  it('agrees with all at once: self within 5e-6, mutuals of a ten-thousandth within 5e-4, at both degrees', () => {
    const next = seeded(5);
    for (let k = 0; k < 10; k += 1) {
      const section = rowOf(next, k % 3 === 2 ? 16 : 8, k % 2 === 0);
      const problem = problemOf(section, 0);
      const groups = filmGroups(problem);
      assert.ok(groups !== null);
      const [grouped, all] = [groupedCharge(problem, groups), ungroupedCharge(problem)];
      assert.ok(grouped !== null && all !== null);
      const { order } = all;
      for (const which of ['fine', 'coarse'] as const) {
        for (let at = 0; at < order * order; at += 1) {
          const [i, j] = [Math.floor(at / order), at % order];
          const scale = Math.sqrt(all[which][i * order + i] * all[which][j * order + j]);
          if (Math.abs(all[which][at]) < 1e-4 * scale) continue;
          const difference = Math.abs(grouped[which][at] / all[which][at] - 1);
          assert.ok(difference < (i === j ? 5e-6 : 5e-4), `${which} ${i} ${j} off by ${difference.toExponential(1)}: ${JSON.stringify(section)}`);
        }
      }
    }
  });

  it('has bars that hold the finest setting of all at once, self within 5e-4 and mutuals within 5e-3', () => {
    const next = seeded(91);
    for (let k = 0; k < 4; k += 1) {
      const section = rowOf(next, 8, k === 1);
      const solution = solveSection(section);
      assert.ok('solved' in solution);
      const { capacitance, capacitanceError } = solution.solved;
      const { fine, order } = ungroupedCharge(problemOf(section, 3))!;
      for (let at = 0; at < order * order; at += 1) {
        const [i, j] = [Math.floor(at / order), at % order];
        const truth = Math.PI * epsilon0 * (fine[at] + fine[j * order + i]);
        const error = Math.abs(capacitance[at] / truth - 1);
        assert.ok(error <= capacitanceError[at], `${i} ${j} off by ${error.toExponential(1)}, bar ${capacitanceError[at].toExponential(1)}: ${JSON.stringify(section)}`);
        if (1e-4 * Math.sqrt(fine[i * order + i] * fine[j * order + j]) < Math.abs(fine[at])) assert.ok(error < (i === j ? 5e-4 : 5e-3), `${i} ${j} off by ${error.toExponential(1)}`);
      }
    }
  });

  it('comes nearer with the effort', () => {
    const section = rowOf(seeded(8), 8, false);
    const differences = [0, 2].map((effort) => {
      const problem = problemOf(section, effort);
      const [grouped, all] = [groupedCharge(problem, filmGroups(problem)!)!, ungroupedCharge(problem)!];
      return all.fine.reduce((worst, value, at) => Math.max(worst, Math.abs(grouped.fine[at] - value) / all.fine[0]), 0);
    });
    assert.ok(differences[1] < differences[0] / 3, differences.map((each) => each.toExponential(1)).join(' '));
  });

  it('shares what is alike: a bus of equal traces is the same read from either end', () => {
    const section = rowOf(seeded(2), 16, true);
    const problem = problemOf(section, 0);
    const { fine } = groupedCharge(problem, filmGroups(problem)!)!;
    for (let at = 0; at < 256; at += 1) assert.ok(Math.abs(fine[at] - fine[255 - at]) < 2e-6 * fine[0]);
  });

  it('is the same to the last digit whatever was solved before', () => {
    const section = rowOf(seeded(12), 9, false);
    const of = (moved: number, from: number) => {
      const problem = problemOf({ ...section, conductors: section.conductors.map((each, i) => ({ ...each, x: metres(each.x + (from < i ? moved : 0)) })) }, 0);
      return groupedCharge(problem, filmGroups(problem)!)!;
    };
    const first = of(0, 4);
    for (const moved of [1e-5, 3e-5, 1e-7]) for (const from of [2, 4, 7]) of(moved, from);
    assert.deepEqual(of(0, 4), first);
    // Not because all of it was kept: after an edit most of it is.
    const fresh = of(2e-5, 5);
    assert.notDeepEqual(fresh, first);
  });

  it('is for rows only: conductors above each other, or few, are left to the other way', () => {
    assert.equal(filmGroups(problemOf(rowOf(seeded(2), 7, true), 0)), null);
    const section = rowOf(seeded(2), 8, true);
    const buried = { ...section.conductors[0], y: metres(10 * um), height: metres(12 * um) };
    assert.equal(filmGroups(problemOf({ ...section, conductors: [...section.conductors, buried] }, 0)), null);
  });
});
