import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { filmedCharge } from '../../../../server/src/physics/section/film/filmedCharge';
import { mirrorImages } from '../../../../server/src/physics/section/basis/mirrorImages';
import { sideBasis } from '../../../../server/src/physics/section/basis/sideBasis';
import type { Side } from '../../../../server/src/physics/section/basis/side';
import type { Section } from '../../../../server/src/physics/section/section';
import { metres } from '../../../../server/src/units/quantity';
import { near } from '../../../support/near';

const side = (x0: number, x1: number, more: Partial<Side> = {}): Side =>
  ({ x0, y0: 1, x1, y1: 1, length: Math.abs(x1 - x0), basis: sideBasis(0, 0), order: 3, conductor: -1, layer: 1, ...more });

describe('mirrorImages', () => {
  it('pairs sides about the middle, and one across it with itself', () => {
    const steep = { y1: 2, basis: sideBasis(0, -0.2) };
    const mirrored = { y0: 2, basis: sideBasis(-0.2, 0) };
    assert.deepEqual([...mirrorImages([side(0, 1, steep), side(1, 3), side(3, 4, mirrored)])!], [2, 1, 0]);
  });

  it('finds none where a length, an order, an exponent, a height or a layer differs', () => {
    for (const other of [side(3, 4.1), side(3, 4, { order: 4 }), side(3, 4, { basis: sideBasis(0, -0.2) }), side(3, 4, { y1: 1.1 }), side(3, 4, { layer: 0 })]) {
      assert.equal(mirrorImages([side(0, 1), side(1, 3), other]), null);
    }
    assert.notEqual(mirrorImages([side(0, 1), side(1, 3), side(3, 4)]), null);
  });
});

describe('even and odd charges', () => {
  const um = 1e-6;
  const section = (widths: readonly number[], planeBelow: boolean): Section => {
    let x = 0;
    const air = { permittivity: 1, thickness: metres(Infinity) };
    const laminate = { permittivity: 4.2, thickness: metres(200 * um) };
    return {
      layers: planeBelow ? [laminate, air] : [air, laminate, air], planeBelow, planeAbove: false, film: { permittivity: 3.4, thickness: metres(25 * um), side: 'above' },
      conductors: widths.map((width, i) => {
        const left = x;
        x += width + 300;
        return { role: i === 0 && !planeBelow ? 'reference' as const : 'signal' as const, x: metres(left * um), y: metres(200 * um), width: metres(width * um), height: metres(35 * um), undercut: metres(3 * um) };
      }),
    };
  };
  // A nanometre more on one trace hides the symmetry from the solver, and changes the answer by some 1e-6.
  for (const planeBelow of [true, false]) {
    for (const widths of [[200, 200], [150, 320, 150], [120, 240, 240, 120]]) {
      it(`say what all charges together do: ${widths.length} conductors ${planeBelow ? 'over a plane' : 'without one'}`, () => {
        const signals = widths.map((_, i) => i).slice(planeBelow ? 0 : 1);
        const folded = filmedCharge(section(widths, planeBelow), signals, 0)!;
        const whole = filmedCharge(section([...widths.slice(0, -1), widths[widths.length - 1] + 1e-3], planeBelow), signals, 0)!;
        assert.equal(folded.unknowns, whole.unknowns);
        folded.fine.forEach((value, at) => near(value, whole.fine[at], 2e-5, `fine ${at}`));
        folded.coarse.forEach((value, at) => near(value, whole.coarse[at], 2e-5, `coarse ${at}`));
      });
    }
  }
});
