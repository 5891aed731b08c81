/** Emission and pickup of loops against reference cases and the small-loop limit. */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { planeWavePickup, worstPickup } from '../../../server/src/physics/fields/planeWavePickup';
import { smallLoopEmission } from '../../../server/src/physics/fields/smallLoopEmission';
import { loopContour, type ContourShape } from '../../../server/src/physics/loops/contour';
import { speedOfLight } from '../../../server/src/units/constants';
import { amperes, hertz, metres, squareMetres, voltsPerMetre } from '../../../server/src/units/quantity';
import { near } from '../../support/near';

const reference = (id: string) => (JSON.parse(readFileSync('test/reference/fields-and-noise.json', 'utf8')) as { cases: { id: string; inputs_SI: Record<string, number>; outputs: Record<string, number> }[] }).cases.find((each) => each.id === id)!;
const made = (shape: ContourShape) => {
  const result = loopContour(shape);
  assert.ok('contour' in result);
  return result.contour;
};
const origin = { x: metres(0), y: metres(0), z: metres(0) };

describe('fields of loops', () => {
  it('meets the reference case of emission', () => {
    const { inputs_SI: i, outputs } = reference('D-loop-emission-1');
    const field = smallLoopEmission({ current: amperes(i.I), area: squareMetres(i.area), frequency: hertz(i.f), distance: metres(i.r) });
    near(field.electric, outputs.E_V_per_m, 1e-8);
    near(field.farElectric, outputs.E_far_only_V_per_m, 1e-8);
  });

  it('meets the reference case of pickup in a large rectangle', () => {
    const { inputs_SI: i, outputs } = reference('D-rect-pickup-1');
    const contour = made({ form: 'rectangle', width: metres(i.a), height: metres(i.b), at: origin });
    near(planeWavePickup(contour, { field: voltsPerMetre(i.E), frequency: hertz(i.f), direction: [-1, 0, 0], polarisation: [0, 1, 0] }), outputs.V, 1e-9);
    assert.ok(outputs.V * (1 - 1e-6) <= worstPickup(contour, { field: voltsPerMetre(i.E), frequency: hertz(i.f) }).voltage);
  });

  it('becomes w A B while small, twice that upright over a plane', () => {
    const frequency = hertz(1e5);
    const wave = { field: voltsPerMetre(3), frequency };
    const small = (2 * Math.PI * frequency * 3) / speedOfLight;
    near(worstPickup(made({ form: 'rectangle', width: metres(0.02), height: metres(0.01), at: origin }), wave).voltage, small * 2e-4, 1e-6);
    near(worstPickup(made({ form: 'circle', diameter: metres(0.02), at: origin }), wave).voltage, small * Math.PI * 1e-4, 1e-6);
    const trace = made({ form: 'trace', length: metres(0.05), planeZ: metres(0), at: { ...origin, z: metres(1e-3) } });
    near(worstPickup(trace, wave, { plane: metres(0) }).voltage, 2 * small * 5e-5, 1e-6);
  });
});
