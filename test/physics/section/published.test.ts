/**
 * The section solver against published forms, over the range and within the accuracy that they state. The forms are
 * in `test/support/closedForms/`, each with its source.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import type { Section, SectionMatrices } from '../../../server/src/physics/section/section';
import { epsilon0, mu0, speedOfLight } from '../../../server/src/units/constants';
import { metres } from '../../../server/src/units/quantity';
import { coupledMicrostrip } from '../../support/closedForms/coupledMicrostrip';
import { microstrip } from '../../support/closedForms/microstrip';
import { stripOverPlaneCapacitance } from '../../support/closedForms/stripOverPlane';
import { coupledStripCapacitance, stripCapacitance, thickStripCapacitance } from '../../support/closedForms/stripline';
import { mutualOverPlane, squareWireRadius, twoWireCapacitance, twoWireInductance, wireOverPlaneCapacitance } from '../../support/closedForms/wires';
import { near } from '../../support/near';

describe('striplines', () => {
  it('of zero thickness have Cohn’s exact capacitance, single and in pairs', () => {
    for (const b of [0.3e-3, 1e-3]) {
      for (const w of [0.1 * b, 0.4 * b, 1.5 * b]) {
        for (const s of [0.1 * b, 0.5 * b, 2 * b]) {
          const exact = coupledStripCapacitance(w, s, b);
          const [even, odd] = evenOdd(solved(stripline({ w, s, t: 0, b, permittivity: 4.2 })));
          near(even, 4.2 * exact.even, 2e-5, `even, w/b = ${w / b}, s/b = ${s / b}`);
          near(odd, 4.2 * exact.odd, 2e-5, `odd, w/b = ${w / b}, s/b = ${s / b}`);
        }
        near(solved(stripline({ w, s: null, t: 0, b, permittivity: 3 })).capacitance[0], 3 * stripCapacitance(w, b), 2e-5, `single, w/b = ${w / b}`);
      }
    }
  });

  it('of any thickness have their parallel plates and four exact corners', () => {
    for (const t of [0.02, 0.1, 0.3, 0.6]) {
      for (const w of [1.5, 3]) near(solved(stripline({ w: w * 1e-3, s: null, t: t * 1e-3, b: 1e-3, permittivity: 1 })).capacitance[0], thickStripCapacitance(w, t, 1), 2e-5, `t/b = ${t}, w/b = ${w}`);
    }
  });
});

describe('strips and wires over a plane, in one dielectric', () => {
  it('flat strip: exact, by conformal mapping', () => {
    for (const u of [0.1, 0.3, 1, 3, 10]) {
      near(solved(overPlane({ permittivity: 1, h: 0.2e-3, conductors: [{ x: 0, width: u * 0.2e-3, height: 0 }] })).capacitance[0], stripOverPlaneCapacitance(u, 1), 2e-5, `w/h = ${u}`);
    }
  });

  it('thin square wire: a round one of the same logarithmic capacity', () => {
    for (const ratio of [0.02, 0.08]) {
      const side = ratio * 1e-3;
      const line = solved(overPlane({ permittivity: 1, h: 1e-3 - side / 2, conductors: [{ x: 0, width: side, height: side }] }));
      // The square's next multipole beyond its charge is the fourth: (side / 2h)^4.
      near(line.capacitance[0], wireOverPlaneCapacitance(squareWireRadius(side), 1e-3), 1e-4, `side/h = ${ratio}`);
      near(line.inductance[0] * line.capacitanceInAir[0], mu0 * epsilon0, 1e-9);
    }
  });

  it('two thin square wires: the mutual inductance of their images', () => {
    const side = 0.02e-3;
    for (const s of [0.5e-3, 2e-3, 8e-3]) {
      const pair = solved(overPlane({ permittivity: 1, h: 1e-3 - side / 2, conductors: [{ x: 0, width: side, height: side }, { x: s, width: side, height: side }] }));
      near(pair.inductance[1], mutualOverPlane(s, 1e-3, 1e-3), 1e-3, `s = ${s}`);
    }
  });

  it('two thin square wires without a plane', () => {
    const side = 0.05e-3;
    const s = 1e-3;
    const loop = solved({
      layers: [{ permittivity: 1, thickness: metres(Infinity) }], planeBelow: false, planeAbove: false, film: null,
      conductors: [0, s].map((x, i) => ({ role: i === 0 ? 'signal' as const : 'reference' as const, x: metres(x), y: metres(0), width: metres(side), height: metres(side), undercut: metres(0) })),
    });
    near(loop.capacitance[0], twoWireCapacitance(squareWireRadius(side), s), 1e-4);
    near(loop.inductance[0], twoWireInductance(squareWireRadius(side), s), 1e-4);
  });
});

describe('microstrips', () => {
  it('single, zero thickness: Hammerstad & Jensen within 0.03 % in L and 0.25 % in C', () => {
    for (const permittivity of [1.0001, 2.2, 4.2, 9.8]) {
      for (const u of [0.1, 0.3, 1, 3, 10]) {
        const h = 0.2e-3;
        const published = microstrip(u, 0, 1, permittivity);
        const line = solved(overPlane({ permittivity, h, conductors: [{ x: 0, width: u * h, height: 0 }] }));
        near(line.capacitance[0], published.capacitance, 2.5e-3, `C, w/h = ${u}, er = ${permittivity}`);
        near(line.inductance[0], published.inductance, 3e-4, `L, w/h = ${u}`);
      }
    }
  });

  it('single, real thickness: the correction of Hammerstad & Jensen within 1 %', () => {
    for (const t of [0.05, 0.1, 0.2]) {
      for (const u of [0.5, 1, 2, 5]) {
        const h = 0.2e-3;
        const published = microstrip(u, t, 1, 4.2);
        const line = solved(overPlane({ permittivity: 4.2, h, conductors: [{ x: 0, width: u * h, height: t * h }] }));
        near(line.capacitance[0], published.capacitance, 0.01, `C, w/h = ${u}, t/h = ${t}`);
        near(line.inductance[0], published.inductance, 0.01, `L, w/h = ${u}, t/h = ${t}`);
      }
    }
  });

  it('pair, zero thickness: Kirschning & Jansen within their 0.6 % (+ 0.1 %) in impedance, 0.7 % and 0.5 % in effective permittivity', () => {
    // Measured: impedances at most 0.69 % apart (w/h = 0.1, s/h = 3, er = 9.8). In one corner of its range, wide strips close
    // together (w/h = 10, s/h up to 0.3), the form's odd impedance is 0.6 to 1.6 % high and is held to 1.7 % only: the even one,
    // the same strips in the same solve, agrees to 0.2 % there.
    for (const permittivity of [2.2, 4.2, 9.8]) {
      for (const u of [0.1, 0.5, 1, 3, 10]) {
        for (const g of [0.1, 0.3, 1, 3, 10]) {
          const h = 0.2e-3;
          const published = coupledMicrostrip(u, g, permittivity);
          const pair = solved(overPlane({ permittivity, h, conductors: [{ x: 0, width: u * h, height: 0 }, { x: (u + g) * h, width: u * h, height: 0 }] }));
          const [evenC, oddC] = evenOdd(pair);
          const [evenL, oddL] = [pair.inductance[0] + pair.inductance[1], pair.inductance[0] - pair.inductance[1]];
          const inCorner = u === 10 && g < 1;
          const at = `w/h = ${u}, s/h = ${g}, er = ${permittivity}`;
          near(Math.sqrt(evenL / evenC), published.even.impedance, 0.007, `even Z, ${at}`);
          near(Math.sqrt(oddL / oddC), published.odd.impedance, inCorner ? 0.017 : 0.007, `odd Z, ${at}`);
          near(evenL * evenC * speedOfLight ** 2, published.even.effectivePermittivity, 0.007, `even permittivity, ${at}`);
          near(oddL * oddC * speedOfLight ** 2, published.odd.effectivePermittivity, inCorner ? 0.009 : 0.005, `odd permittivity, ${at}`);
        }
      }
    }
  });
});

describe('three lands on a board without a plane (Paul, Analysis of Multiconductor Transmission Lines; figures from memory)', () => {
  const reference = JSON.parse(readFileSync('test/reference/sections.json', 'utf8')).cases.find(({ id }: { id: string }) => id === 'A-PCB3-t1.38mil');
  const published = reference.published_comparison_from_memory;
  const mil = 25.4e-6;
  const { capacitance, inductance } = solved({
    layers: [{ permittivity: 1, thickness: metres(Infinity) }, { permittivity: 4.7, thickness: metres(47 * mil) }, { permittivity: 1, thickness: metres(Infinity) }],
    planeBelow: false, planeAbove: false, film: null,
    conductors: [-60, 0, 60].map((centre, i) => ({
      role: i === 0 ? 'reference' as const : 'signal' as const,
      x: metres((centre - 7.5) * mil), y: metres(47 * mil), width: metres(15 * mil), height: metres(0), undercut: metres(0),
    })),
  });

  it('has the inductance of lands without thickness that the reference set holds, within 3e-4', () => {
    const exact: number[][] = published.L_zero_thickness_computed_for_this_set_uH_per_m;
    exact.flat().forEach((value, at) => near(inductance[at] * 1e6, value, 3e-4, `L entry ${at}`));
  });

  it('comes within 0.25 % of the book’s L and 0.6 % of its C', () => {
    // The book's lands have no thickness and few pulses carry their charge: its L is too large and its C too small by
    // what coarse pulses miss at the edges. Real thickness would be 6 % on L11.
    const bookL: number[][] = published.L_uH_per_m;
    const bookC: number[][] = published.C_pF_per_m;
    bookL.flat().forEach((value, at) => {
      near(inductance[at] * 1e6, value, 2.5e-3, `L entry ${at}`);
      assert.ok(inductance[at] * 1e6 < value, `L entry ${at} is not below the book's`);
    });
    bookC.flat().forEach((value, at) => near(capacitance[at] * 1e12, value, 6e-3, `C entry ${at}`));
  });
});

function solved(section: Section): SectionMatrices {
  const solution = solveSection(section);
  assert.ok('solved' in solution, JSON.stringify(solution));
  return solution.solved;
}

function stripline({ w, s, t, b, permittivity }: { w: number; s: number | null; t: number; b: number; permittivity: number }): Section {
  return {
    layers: [{ permittivity, thickness: metres(b) }], planeBelow: true, planeAbove: true, film: null,
    conductors: (s === null ? [0] : [0, w + s]).map((x) => ({ role: 'signal', x: metres(x), y: metres((b - t) / 2), width: metres(w), height: metres(t), undercut: metres(0) })),
  };
}

interface Strip { readonly x: number; readonly width: number; readonly height: number }

function overPlane({ permittivity, h, conductors }: { permittivity: number; h: number; conductors: readonly Strip[] }): Section {
  return {
    layers: [{ permittivity, thickness: metres(h) }, { permittivity: 1, thickness: metres(Infinity) }], planeBelow: true, planeAbove: false, film: null,
    conductors: conductors.map(({ x, width, height }) => ({ role: 'signal', x: metres(x), y: metres(h), width: metres(width), height: metres(height), undercut: metres(0) })),
  };
}

/** Capacitance of each of two equal lines in even and in odd mode. */
function evenOdd({ capacitance }: SectionMatrices): [number, number] {
  return [capacitance[0] + capacitance[1], capacitance[0] - capacitance[1]];
}
