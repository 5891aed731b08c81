/** Masks that follow the traces, end to end: the reference case, limits, identities, and the error bar on seeded random sections. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { filmedCharge } from '../../../../server/src/physics/section/film/filmedCharge';
import { upsideDown } from '../../../../server/src/physics/section/film/upsideDown';
import { solveSection } from '../../../../server/src/physics/section/solveSection';
import type { Section, SectionConductor, SectionFilm, SectionMatrices } from '../../../../server/src/physics/section/section';
import { epsilon0 } from '../../../../server/src/units/constants';
import { metres } from '../../../../server/src/units/quantity';
import { near, relativeDifference } from '../../../support/near';
import { seeded } from '../../../support/seeded';

const um = 1e-6;
const trace = (x: number, width: number, height: number, more: Partial<SectionConductor> = {}): SectionConductor =>
  ({ role: 'signal', x: metres(x * um), y: metres(200 * um), width: metres(width * um), height: metres(height * um), undercut: metres(0), ...more });
const film = (thickness: number, permittivity = 3.4, side: SectionFilm['side'] = 'above'): SectionFilm => ({ permittivity, thickness: metres(thickness * um), side });
const board = (conductors: readonly SectionConductor[], mask: SectionFilm | null): Section => ({
  layers: [{ permittivity: 4.2, thickness: metres(200 * um) }, { permittivity: 1, thickness: metres(Infinity) }], planeBelow: true, planeAbove: false, conductors, film: mask,
});
const flatMask = (conductors: readonly SectionConductor[], thickness: number, permittivity = 3.4): Section => ({
  ...board(conductors, null), layers: [{ permittivity: 4.2, thickness: metres(200 * um) }, { permittivity, thickness: metres(thickness * um) }, { permittivity: 1, thickness: metres(Infinity) }],
});
const pair = [trace(0, 200, 35), trace(400, 200, 35)];

function solved(section: Section): SectionMatrices {
  const solution = solveSection(section);
  assert.ok('solved' in solution, JSON.stringify(solution));
  return solution.solved;
}

describe('a mask that follows the traces', () => {
  it('has the capacitance of the reference case within 5e-5 of its self and mutual, and the bare inductance', () => {
    const { outputs } = JSON.parse(readFileSync('test/reference/sections.json', 'utf8')).cases.find(({ id }: { id: string }) => id === 'A-MSM-g0.4');
    const result = solved(board([trace(-400, 200, 35), trace(200, 200, 35)], film(25)));
    outputs.C_F_per_m.flat().forEach((value: number, at: number) => {
      near(result.capacitance[at], value, 5e-5, `C entry ${at}`);
      assert.ok(relativeDifference(result.capacitance[at], value) < result.capacitanceError[at]);
      assert.ok(result.capacitanceError[at] < 1e-3, `bar ${result.capacitanceError[at]}`);
    });
    outputs.L_H_per_m.flat().forEach((value: number, at: number) => near(result.inductance[at], value, 1e-5, `L entry ${at}`));
    outputs.C0_F_per_m.flat().forEach((value: number, at: number) => near(result.capacitanceInAir[at], value, 1e-5, `C0 entry ${at}`));
  });

  it('is none when made of air, and nearly none when nearly of air', () => {
    const bare = solved(board(pair, null)).capacitance;
    solved(board(pair, film(25, 1))).capacitance.forEach((value, at) => assert.equal(value, bare[at]));
    solved(board(pair, film(25, 1.001))).capacitance.forEach((value, at) => near(value, bare[at], 4e-4));
  });

  it('goes over into the bare section as it gets thinner, in proportion', () => {
    const bare = solved(board(pair, null)).capacitance;
    const added = [4, 2, 1].map((thickness) => solved(board(pair, film(thickness))).capacitance.map((value, at) => value / bare[at] - 1));
    for (let at = 0; at < 2; at += 1) {
      assert.ok(added[2][at] < 0.025);
      for (const [thick, thin] of [[added[0], added[1]], [added[1], added[2]]]) assert.ok(1.7 < thick[at] / thin[at] && thick[at] / thin[at] < 2.05, `${thick[at]} to ${thin[at]}`);
    }
  });

  it('goes over into a half-space of film as it gets thicker', () => {
    const filled = solved({ ...board(pair, null), layers: [{ permittivity: 4.2, thickness: metres(200 * um) }, { permittivity: 3.4, thickness: metres(Infinity) }] }).capacitance;
    const differences = [1000, 5000, 25_000].map((thickness) => relativeDifference(solved(board(pair, film(thickness))).capacitance[0], filled[0]));
    assert.ok(differences[2] < 5e-4 && differences[1] < differences[0] && differences[2] < differences[1], differences.join(' '));
  });

  it('lies between no mask and one that is flat to its roof', () => {
    for (const gap of [60, 200, 800, 3000]) {
      const apart = [pair[0], trace(200 + gap, 200, 35)];
      const [bare, conformal, flat] = [board(apart, null), board(apart, film(25)), flatMask(apart, 60)].map((section) => solved(section).capacitance);
      assert.ok(bare[0] < conformal[0] && conformal[0] < flat[0], `self at gap ${gap}`);
      // Far apart, a flat mask's added self capacitance takes more from the mutual than its permittivity adds: no order there.
      assert.ok(-bare[1] < -conformal[1] && (1000 < gap || -conformal[1] < -flat[1]), `mutual at gap ${gap}`);
    }
  });

  it('is flat over copper of no height, whose flat mask is solved without panels', () => {
    const thin = [trace(0, 200, 0), trace(400, 200, 0)];
    const flat = solved(flatMask(thin, 25)).capacitance;
    solved(board(thin, film(25))).capacitance.forEach((value, at) => assert.equal(value, flat[at]));
    // And nearly so over copper of little height.
    const low = [trace(0, 200, 0.5), trace(400, 200, 0.5)];
    solved(board(low, film(25))).capacitance.forEach((value, at) => near(value, solved(flatMask(low, 25)).capacitance[at], 0.01));
  });

  it('changes little where boxes come to touch, and fills the gap from there', () => {
    const at = (gap: number) => solved(board([pair[0], trace(200 + gap, 200, 35)], film(25))).capacitance;
    const [open, shut, closer] = [at(51), at(50), at(49)];
    near(open[1], shut[1], 0.05);
    near(shut[1], closer[1], 0.03);
    const filled = solved(flatMask([pair[0], trace(250, 200, 35)], 60)).capacitance;
    near(shut[1], filled[1], 0.01);
    assert.ok(shut[0] < filled[0]);
  });
});

describe('identities under a mask', () => {
  const conductors = [trace(0, 150, 35), trace(230, 300, 18, { undercut: metres(5 * um) }), trace(700, 120, 50), trace(905, 200, 35, { role: 'reference' })];
  const section = board(conductors, film(20));
  const result = solved(section);
  const bars = result.capacitanceError;

  it('has a symmetric matrix with negative mutuals and rows that sum to more than nothing', () => {
    for (let i = 0; i < 3; i += 1) {
      let sum = 0;
      for (let j = 0; j < 3; j += 1) {
        sum += result.capacitance[i * 3 + j];
        assert.equal(result.capacitance[i * 3 + j], result.capacitance[j * 3 + i]);
        if (i !== j) assert.ok(result.capacitance[i * 3 + j] < 0);
      }
      assert.ok(0 < sum);
    }
  });

  it('is reciprocal before it is made symmetric', () => {
    const { fine } = filmedCharge(section, [0, 1, 2], 1)!;
    for (const [i, j] of [[0, 1], [0, 2], [1, 2]]) near(fine[i * 3 + j], fine[j * 3 + i], 2e-4, `${i} ${j}`);
  });

  it('does not depend on the order, on left and right, on above and below, nor on scale', () => {
    const reversed = solved(board([...conductors].reverse(), film(20))).capacitance;
    const mirrored = solved(board(conductors.map((conductor) => ({ ...conductor, x: metres(-conductor.x - conductor.width) })), film(20))).capacitance;
    const below = solved(upsideDown(section)).capacitance;
    const large = solved(enlarged(section, 1e3)).capacitance;
    for (let i = 0; i < 3; i += 1) {
      for (let j = 0; j < 3; j += 1) {
        const at = i * 3 + j;
        near(reversed[(2 - i) * 3 + 2 - j], result.capacitance[at], 1e-9);
        near(mirrored[at], result.capacitance[at], bars[at]);
        near(below[at], result.capacitance[at], 1e-9);
        near(large[at], result.capacitance[at], 1e-9);
      }
    }
  });

  it('is the same to the last digit whatever was solved before', () => {
    solved(board(conductors.map((conductor, i) => ({ ...conductor, x: metres(conductor.x + 1.3e-6 * i) })), film(20)));
    assert.deepEqual(solved(section), result);
  });

  it('reduces a reference out: the same with it as a signal at zero potential', () => {
    const all = solved(board(conductors.map((conductor) => ({ ...conductor, role: 'signal' as const })), film(20))).capacitance;
    for (let i = 0; i < 3; i += 1) for (let j = 0; j < 3; j += 1) near(result.capacitance[i * 3 + j], all[i * 4 + j], bars[i * 3 + j] + 1e-9);
  });

  it('has no zero of its own without planes: only differences count, so joined signals see what one does', () => {
    const free: Section = {
      layers: [{ permittivity: 1, thickness: metres(Infinity) }, { permittivity: 4.2, thickness: metres(200 * um) }, { permittivity: 1, thickness: metres(Infinity) }],
      planeBelow: false, planeAbove: false, film: film(25), conductors: [trace(0, 200, 35, { role: 'reference' }), trace(400, 200, 35)],
    };
    const one = solved(free).capacitance[0];
    const other = solved({ ...free, conductors: [trace(0, 200, 35), trace(400, 200, 35, { role: 'reference' })] }).capacitance[0];
    near(one, other, 1e-9);
    const [low, high] = [solved({ ...free, film: null }).capacitance[0], solved({ ...free, film: null, layers: [free.layers[0], free.layers[1], { permittivity: 3.4, thickness: metres(Infinity) }] }).capacitance[0]];
    assert.ok(low < one && one < high);
  });

  it('leaves copper inside the laminate as it is, but for what the film adds above it', () => {
    const buried = { ...trace(100, 200, 35), y: metres(80 * um) };
    const [without, covered, beneath] = [board([trace(0, 200, 35), buried], null), board([trace(0, 200, 35), buried], film(25)), flatMask([trace(0, 200, 35), buried], 60)].map((each) => solved(each).capacitance);
    for (const at of [0, 3]) assert.ok(without[at] < covered[at] && covered[at] < beneath[at], `entry ${at}`);
  });
});

describe('sixteen conductors under a mask', () => {
  it('are solved, each like its neighbours in the middle', () => {
    const result = solved(board(Array.from({ length: 16 }, (_, i) => trace(300 * i, 150, 35)), film(25)));
    assert.equal(result.order, 16);
    near(result.capacitance[7 * 16 + 7], result.capacitance[8 * 16 + 8], 1e-6);
    near(result.capacitance[7 * 16 + 8], result.capacitance[6 * 16 + 7], 1e-4);
    assert.ok(result.capacitance[0] < result.capacitance[17]);
  });
});

describe('refusals', () => {
  it('say what is not covered', () => {
    const refused = (section: Section) => {
      const solution = solveSection(section);
      assert.ok('refused' in solution);
      assert.equal(solution.refused.reason, 'not-covered');
    };
    for (const thickness of [0, -1, NaN, Infinity, 1e-4]) refused(board(pair, film(thickness)));
    for (const permittivity of [0.5, NaN, Infinity]) refused(board(pair, film(25, permittivity)));
    refused({ ...board(pair, film(25)), layers: [{ permittivity: 4.2, thickness: metres(200 * um) }, { permittivity: 1, thickness: metres(500 * um) }], planeAbove: true });
    refused(board([trace(0, 200, 35), trace(0, 200, 35, { y: metres(300 * um) })], film(25)));
    // Buried copper whose top is a hair below the laminate's face.
    refused(board([trace(0, 200, 35), trace(500, 200, 35, { y: metres(164.99 * um) })], film(25)));
  });
});

describe('the error bar under a mask', () => {
  it('shrinks with the effort, and the answers with it', () => {
    const truth = filmedCharge(board(pair, film(25)), [0, 1], 4)!.fine;
    const errors = [0, 1, 2].map((effort) => Math.max(...filmedCharge(board(pair, film(25)), [0, 1], effort)!.fine.map((value, at) => relativeDifference(value, truth[at]))));
    assert.ok(errors[0] < 1e-4 && errors[1] < errors[0] / 3 && errors[2] < 1e-5, errors.join(' '));
  });

  it('holds the finest setting in seeded random sections, self within 5e-4 and mutual within 5e-3', () => {
    const next = seeded(2024);
    for (let k = 0; k < 16; k += 1) {
      const section = randomSection(next);
      const result = solved(section);
      const signals = section.conductors.flatMap(({ role }, index) => (role === 'signal' ? [index] : []));
      const { fine, order } = filmedCharge(section, signals, 4)!;
      for (let i = 0; i < order; i += 1) {
        for (let j = 0; j <= i; j += 1) {
          const truth = ((fine[i * order + j] + fine[j * order + i]) / 2) * 2 * Math.PI * epsilon0;
          const error = relativeDifference(result.capacitance[i * order + j], truth);
          const at = `section ${k}, entry ${i} ${j}: ${JSON.stringify(section)}`;
          assert.ok(error <= result.capacitanceError[i * order + j], `${error} over its bar ${result.capacitanceError[i * order + j]}, ${at}`);
          assert.ok(error < (i === j ? 5e-4 : 5e-3), `${error}, ${at}`);
        }
      }
    }
  });
});

function randomSection(next: () => number): Section {
  const between = (low: number, high: number) => low * (high / low) ** next();
  const [height, thickness, planeBelow] = [between(60, 1600), between(5, 80), next() < 0.75];
  const count = 2 + Math.floor(next() * 2.5);
  const conductors: SectionConductor[] = [];
  let x = 0;
  for (let i = 0; i < count; i += 1) {
    const [copper, width] = [between(9, 70), between(80, 1200)];
    const role = (!planeBelow && i === 0) || (1 < i && next() < 0.3) ? 'reference' : 'signal';
    conductors.push(trace(x, width, copper, { role, y: metres(height * um), undercut: metres(next() < 0.4 ? 0.3 * next() * Math.min(copper, width / 3) * um : 0) }));
    // One gap in five is about twice the film, where boxes touch or leave a slot.
    x += width + (next() < 0.2 ? 2 * thickness * (0.9 + 0.3 * next()) : between(60, 3000));
  }
  const laminate = { permittivity: 2.2 + 7 * next(), thickness: metres(height * um) };
  const air = { permittivity: 1, thickness: metres(Infinity) };
  return { layers: planeBelow ? [laminate, air] : [air, laminate, air], planeBelow, planeAbove: false, conductors, film: film(thickness, 2.5 + 2.5 * next()) };
}

function enlarged(section: Section, factor: number): Section {
  const by = (value: number) => metres(value * factor);
  return {
    ...section,
    layers: section.layers.map(({ permittivity, thickness }) => ({ permittivity, thickness: by(thickness) })),
    conductors: section.conductors.map(({ role, x, y, width, height, undercut }) => ({ role, x: by(x), y: by(y), width: by(width), height: by(height), undercut: by(undercut) })),
    film: section.film === null ? null : { ...section.film, thickness: by(section.film.thickness) },
  };
}
