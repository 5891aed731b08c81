import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { wedgeExponent } from '../../../../server/src/physics/section/basis/wedgeExponent';
import { near } from '../../../support/near';

describe('exponent of an edge', () => {
  it('is pi over the angle in one dielectric: 2/3 at a right-angled edge, 1/2 at the end of a thin strip (Meixner 1972)', () => {
    near(wedgeExponent({ angle: 1.5 * Math.PI, permittivity: 3 }), 2 / 3, 1e-15);
    near(wedgeExponent({ angle: 2 * Math.PI, permittivity: 1 }), 0.5, 1e-15);
    near(wedgeExponent({ angle: Math.PI / 2, permittivity: 4 }, { angle: Math.PI, permittivity: 4 }), 2 / 3, 1e-15);
  });

  it('is 1/2 at the end of a thin strip between any two dielectrics, by symmetry', () => {
    for (const ratio of [1e-3, 0.2, 4.2, 1e3]) near(wedgeExponent({ angle: Math.PI, permittivity: 1 }, { angle: Math.PI, permittivity: ratio }), 0.5, 1e-14);
  });

  it('has the closed form (2/pi) atan(sqrt(1 + 2 e1/e2)) where a right-angled edge stands on a dielectric', () => {
    for (const ratio of [1e-4, 0.1, 1 / 4.2, 1, 3, 1e4]) {
      near(wedgeExponent({ angle: Math.PI / 2, permittivity: ratio }, { angle: Math.PI, permittivity: 1 }), (2 / Math.PI) * Math.atan(Math.sqrt(1 + 2 * ratio)), 1e-14, `e1/e2 = ${ratio}`);
    }
  });

  it('does not depend on which face is named first, and makes the field satisfy the interface for any angles', () => {
    for (const [a, b, e] of [[0.3, 2.5, 5], [1.9, 3.1, 0.2], [2.8, 3.14, 12], [0.05, 3.1416, 80]]) {
      const lambda = wedgeExponent({ angle: a, permittivity: 1 }, { angle: b, permittivity: e });
      near(wedgeExponent({ angle: b, permittivity: e }, { angle: a, permittivity: 1 }), lambda, 1e-13);
      // Potentials sin(lambda theta) from either face, scaled to be equal at the interface: fluxes must be too.
      const flux = 1 / Math.tan(lambda * a) + e / Math.tan(lambda * b);
      assert.ok(Math.abs(flux) < 1e-10 * (1 + e) / Math.min(a, b), `flux ${flux}`);
      assert.ok(Math.PI / (2 * Math.max(a, b)) <= lambda && lambda <= Math.PI / Math.max(a, b));
    }
  });
});
