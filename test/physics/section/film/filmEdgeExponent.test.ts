import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { filmEdgeExponent } from '../../../../server/src/physics/section/film/filmEdgeExponent';
import { near } from '../../../support/near';

describe('filmEdgeExponent', () => {
  it('solves e tan(lambda pi/4) + tan(3 lambda pi/4) = 0', () => {
    for (const e of [1.001, 2, 3.4, 12, 1e3]) {
      const lambda = filmEdgeExponent(e);
      near(-Math.tan((3 * lambda * Math.PI) / 4) / Math.tan((lambda * Math.PI) / 4), e, 1e-9, `e = ${e}`);
    }
  });

  it('has a closed form: tan² (lambda pi/4) = (3 + e)/(1 + 3e), from the triple angle', () => {
    // tan 3a = tan a (3 - tan² a)/(1 - 3 tan² a), so e (1 - 3 T) + 3 - T = 0.
    for (const e of [1.5, 3.4, 9.8]) near(filmEdgeExponent(e), (4 / Math.PI) * Math.atan(Math.sqrt((3 + e) / (1 + 3 * e))), 1e-14);
  });

  it('ends at no edge for no contrast and at 2/3, a conductor’s, for a large one; the same for film in air and air in film', () => {
    near(filmEdgeExponent(1 + 1e-9), 1, 1e-9);
    near(filmEdgeExponent(1e9), 2 / 3, 1e-8);
    assert.equal(filmEdgeExponent(1 / 4), filmEdgeExponent(4));
  });
});
