/** Inductance of loops against reference cases, tables, closed forms and identities. */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { adaptiveGauss } from '../../../server/src/numeric/adaptiveGauss';
import { loopContour, type Contour, type ContourShape, type ContourTurn } from '../../../server/src/physics/loops/contour';
import { contourDistance } from '../../../server/src/physics/loops/contourDistance';
import { contourMeasures } from '../../../server/src/physics/loops/contourMeasures';
import { filamentMutual } from '../../../server/src/physics/loops/filamentMutual';
import { inducedTransfer, inducedWaveform } from '../../../server/src/physics/loops/inducedVoltage';
import { mutualInductance, type MutualSettings } from '../../../server/src/physics/loops/mutualInductance';
import { selfInductance, type InductiveLoop } from '../../../server/src/physics/loops/selfInductance';
import { mu0 } from '../../../server/src/units/constants';
import { amperes, farads, henries, hertz, metres, ohms, radians, seconds } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { seeded } from '../../support/seeded';

interface Case { readonly id: string; readonly inputs_SI: Record<string, number>; readonly outputs: Record<string, number>; readonly rel_uncertainty: number }
const reference = (file: string, id: string): Case => (JSON.parse(readFileSync(`test/reference/${file}`, 'utf8')) as { cases: Case[] }).cases.find((each) => each.id === id)!;

const point = (x: number, y: number, z = 0) => ({ x: metres(x), y: metres(y), z: metres(z) });
const made = (shape: ContourShape, turns: readonly ContourTurn[] = []): Contour => {
  const result = loopContour(shape, turns);
  assert.ok('contour' in result, JSON.stringify(result));
  return result.contour;
};
const rectangle = (width: number, height: number, x = 0, y = 0, z = 0, turns: readonly ContourTurn[] = []) => made({ form: 'rectangle', width: metres(width), height: metres(height), at: point(x, y, z) }, turns);
const circle = (diameter: number, x = 0, y = 0, z = 0, turns: readonly ContourTurn[] = []) => made({ form: 'circle', diameter: metres(diameter), at: point(x, y, z) }, turns);
const trace = (length: number, x: number, y: number, z: number) => made({ form: 'trace', length: metres(length), planeZ: metres(0), at: point(x, y, z) });
const path = (...points: readonly (readonly [number, number, number])[]) => made({ form: 'path', points: points.map(([x, y, z]) => point(x, y, z)) });
const mutual = (a: Contour, b: Contour, settings: MutualSettings = {}): number => {
  const result = mutualInductance(a, b, settings);
  assert.ok('inductance' in result, JSON.stringify(result));
  return result.inductance;
};
const self = (loop: InductiveLoop): number => {
  const result = selfInductance(loop);
  assert.ok('inductance' in result, JSON.stringify(result));
  return result.inductance;
};
const wire = (diameter: number) => ({ form: 'wire', diameter: metres(diameter) }) as const;
const quarter = radians(Math.PI / 2);

describe('mutual inductance', () => {
  it('meets the reference cases', () => {
    const flat = reference('inductance.json', 'C-mutual-coplanar-1');
    near(mutual(rectangle(0.1, 0.03), rectangle(0.1, 0.03, 0, 0.035)), flat.outputs.M_H, flat.rel_uncertainty);
    const round = reference('inductance.json', 'C-mutual-circles-1');
    near(mutual(circle(0.1), circle(0.1, 0, 0, 0.02)), round.outputs.M_H, 4e-12);
  });

  // Rosa & Grover 1912, mutual inductance of two equal parallel coaxial squares of side a at distance d (closed form).
  it('meets the closed form of two squares', () => {
    const [a, d] = [0.05, 0.013];
    const [r, q] = [Math.hypot(a, d), Math.sqrt(2 * a * a + d * d)];
    const expected = ((2 * mu0) / Math.PI) * (a * Math.log(((a + r) / (a + q)) * (r / d)) + q - 2 * r + d);
    near(mutual(rectangle(a, a), rectangle(a, a, 0, 0, d)), expected, 1e-12);
  });

  it('is the same both ways, in every place, and grows with the size', () => {
    const random = seeded(11);
    for (let n = 0; n < 60; n += 1) {
      const shape = (scale: number, shift: number): Contour => {
        const from = seeded(100 + n + shift);
        const turns = [{ angle: radians(6 * from()), axis: 'x' }, { angle: radians(6 * from()), axis: 'y' }] as const;
        const place = [scale * from(), scale * from(), scale * (shift * 1.2 + from())] as const;
        return from() < 0.5 ? rectangle(scale * (0.1 + from()), scale * (0.1 + from()), ...place, turns) : circle(scale * (0.1 + from()), ...place, turns);
      };
      const [a, b] = [shape(1, 0), shape(1, 3)];
      const there = mutual(a, b);
      assert.ok(Math.abs(there - mutual(b, a)) <= 1e-9 * Math.abs(there) + 1e-18, `${n}: ${there} ${mutual(b, a)}`);
      const scale = 10 ** (12 * random() - 6);
      assert.ok(Math.abs(mutual(shape(scale, 0), shape(scale, 3)) - scale * there) <= scale * (1e-9 * Math.abs(there) + 1e-18));
    }
  });

  it('becomes that of two dipoles far away', () => {
    const far = mutual(rectangle(1e-3, 1e-3), rectangle(1e-3, 1e-3, 1e4, 0, 0));
    near(far, (-mu0 / (4 * Math.PI)) * 1e-24, 2e-9);
    // On either side of the change of method.
    for (const x of [0.0069, 0.00717, 0.00725]) {
      const whole = mutual(rectangle(1e-3, 1e-3), rectangle(1e-3, 1e-3, x, 0, 2e-4));
      const halves = mutual(rectangle(5e-4, 1e-3), rectangle(1e-3, 1e-3, x, 0, 2e-4)) + mutual(rectangle(5e-4, 1e-3, 5e-4), rectangle(1e-3, 1e-3, x, 0, 2e-4));
      near(halves, whole, 1e-9);
    }
  });

  it('of a circle is the limit of polygons, coaxial or not', () => {
    const ring = (count: number) => path(...Array.from({ length: count }, (_, i) => [0.05 * Math.cos((2 * Math.PI * i) / count), 0.05 * Math.sin((2 * Math.PI * i) / count), 0] as const));
    for (const other of [circle(0.06, 0.01, 0.02, 0.03), rectangle(0.05, 0.02, 0.01, 0, 0.015), circle(0.1, 0, 0, 0.02, [{ angle: radians(0.2), axis: 'x' }])]) {
      const exact = mutual(circle(0.1), other);
      const [coarse, fine] = [mutual(ring(100), other), mutual(ring(200), other)];
      near((4 * fine - coarse) / 3, exact, 2e-6);
    }
  });

  it('has images in planes', () => {
    const plane = { planes: [metres(0)] };
    const [a, b] = [rectangle(0.02, 0.01, 0, 0, 1e-3), rectangle(0.02, 0.01, 0.005, 0.015, 2e-3)];
    near(mutual(a, b, plane), mutual(a, b) - mutual(rectangle(0.02, 0.01, 0, 0, -1e-3), b), 1e-11);
    // A trace over its plane is half of the loop that it makes with its image: upright rectangles of double height.
    const upright = (y: number): Contour => path([0, y, 1e-3], [0.05, y, 1e-3], [0.05, y, -1e-3], [0, y, -1e-3]);
    near(mutual(trace(0.05, 0, 0, 1e-3), trace(0.05, 0, 5e-3, 1e-3), plane), mutual(upright(0), upright(5e-3)) / 2, 1e-11);
    assert.equal(mutual(a, rectangle(0.02, 0.01, 0, 0, -1e-3), plane), 0);
    // A second plane far away changes nothing; a near one takes away.
    near(mutual(a, b, { planes: [metres(0), metres(50)] }), mutual(a, b, plane), 1e-6);
    assert.ok(Math.abs(mutual(a, b, { planes: [metres(0), metres(3e-3)] })) < Math.abs(mutual(a, b, plane)));
    assert.ok('refused' in mutualInductance(upright(0), a, plane));
  });

  it('is refused where conductors touch', () => {
    const result = mutualInductance(rectangle(0.02, 0.02), rectangle(0.02, 0.02, 0.02, 0), { clearance: metres(1e-4) });
    assert.equal('refused' in result && result.refused.reason, 'touching');
    near(contourDistance(circle(0.1), circle(0.04, 0.08, 0, 0)), 0.01, 1e-7);
    near(contourDistance(rectangle(0.02, 0.02), rectangle(0.02, 0.02, 0.03, 0.1, 0.5)), Math.hypot(0.01, 0.08, 0.5), 1e-14);
  });
});

describe('two filaments', () => {
  const filament = (from: readonly number[], to: readonly number[]): Float64Array => {
    const along = [0, 1, 2].map((i) => to[i] - from[i]);
    const length = Math.hypot(...along);
    return Float64Array.from([...from, ...along.map((value) => value / length), length]);
  };

  it('agree with adaptive quadrature in every position', () => {
    const random = seeded(7);
    const anywhere = (): number[] => [random(), random(), random()];
    for (let n = 0; n < 60; n += 1) {
      const [a, b, c, other] = [anywhere(), anywhere(), anywhere().map((value) => value + 0.4), anywhere()];
      const tilt = 10 ** (-9 * random());
      const d = n % 3 === 0 ? other : c.map((value, i) => value + (b[i] - a[i]) * (0.3 + random()) + (n % 3 === 1 ? tilt * (random() - 0.5) : 0));
      const [first, second] = [filament(a, b), filament(c, d)];
      const cosine = first[3] * second[3] + first[4] * second[4] + first[5] * second[5];
      const inner = (s: number): number => adaptiveGauss((t) => 1 / Math.hypot(...[0, 1, 2].map((i) => first[i] + s * first[3 + i] - second[i] - t * second[3 + i])), 0, second[6], 1e-10).value;
      near(filamentMutual(first, 0, second, 0).value, cosine * adaptiveGauss(inner, 0, first[6], 1e-10).value, 2e-9, `${n}`);
    }
  });
});

describe('self inductance', () => {
  it('meets the reference cases', () => {
    const loop = reference('inductance.json', 'C-loop-wire-1');
    // The reference leaves out terms of the order of the radius, and states 2 % for the model.
    near(self({ contour: rectangle(0.1, 0.05), conductor: wire(1e-3) }), loop.outputs.L_ext_H, 0.002);
    const flat = reference('inductance.json', 'C-loop-trace-1');
    near(self({ contour: rectangle(0.05, 0.02), conductor: { form: 'strip', width: metres(2e-4), thickness: metres(3.5e-5) } }), flat.outputs.L_H, 2.2e-4);
  });

  // Grover 1946, ch. 8, rectangle of round wire, its terms in the radius kept; internal part left out.
  it('meets Grover for rectangles and the closed form for circles', () => {
    const [a, b, r] = [0.1, 0.05, 1e-4];
    const d = Math.hypot(a, b);
    const grover = (mu0 / Math.PI) * ((a + b) * Math.log((2 * a * b) / r) - a * Math.log(a + d) - b * Math.log(b + d) - 2 * (a + b) + 2 * (d + r));
    near(self({ contour: rectangle(a, b), conductor: wire(2 * r) }), grover, 1e-6);
    near(self({ contour: circle(0.1), conductor: wire(1e-4) }), mu0 * 0.05 * (Math.log((8 * 0.05) / 5e-5) - 2), 1e-5);
  });

  it('does not depend on where sides are cut, and falls over a plane', () => {
    const whole = self({ contour: rectangle(0.04, 0.02, 0, 0, 1e-3), conductor: wire(1e-4) });
    near(self({ contour: path([0, 0, 1e-3], [0.013, 0, 1e-3], [0.04, 0, 1e-3], [0.04, 0.02, 1e-3], [0, 0.02, 1e-3]), conductor: wire(1e-4) }), whole, 1e-12);
    assert.ok(self({ contour: rectangle(0.04, 0.02, 0, 0, 1e-3), conductor: wire(1e-4), planes: [metres(0)] }) < whole);
  });

  it('follows the section’s value per length where that is given', () => {
    const loop = { contour: trace(0.05, 0, 0, 1e-3), conductor: wire(2e-5), planes: [metres(0)] };
    const perLength = (mu0 / (2 * Math.PI)) * Math.log(2e-3 / 1e-5);
    near(self({ ...loop, overSection: { height: metres(1e-3), inductance: (perLength * 1.1) as never } }) - self(loop), 0.1 * perLength * 0.05, 1e-9);
  });
});

describe('contours', () => {
  it('turn about their centre and keep their area', () => {
    const turned = contourMeasures(rectangle(0.02, 0.01, 1, 2, 3, [{ angle: quarter, axis: 'x' }]));
    near(turned.area, 2e-4, 1e-12);
    assert.deepEqual(turned.vectorArea.map((value) => Math.round(value * 1e9) + 0), [0, -200000, 0]);
  });

  it('are refused where they are none', () => {
    const bad: readonly ContourShape[] = [
      { form: 'rectangle', width: metres(0), height: metres(1), at: point(0, 0) },
      { form: 'circle', diameter: metres(NaN), at: point(0, 0) },
      { form: 'path', points: [] },
      { form: 'path', points: [point(0, 0), point(1, 0)] },
      { form: 'path', points: [point(0, 0), point(1, 0), point(2, 0)] },
      { form: 'path', points: [point(0, 0), point(1, 1), point(1, 0), point(0, 1)] },
      { form: 'path', points: Array.from({ length: 5000 }, (_, i) => point(i, i * i)) },
    ];
    assert.deepEqual(bad.map((shape) => { const result = loopContour(shape); return 'refused' in result && result.refused.reason; }), ['no-size', 'not-a-number', 'no-size', 'no-size', 'folds-back', 'meets-itself', 'too-many-points']);
  });
});

describe('hostile numbers', () => {
  it('never yield NaN, throw or hang', () => {
    const random = seeded(5);
    const size = (): number => 10 ** (18 * random() - 12);
    for (let n = 0; n < 300; n += 1) {
      const made = [0, 1].map(() => {
        const at = point(size() - size(), size() - size(), size());
        const turns = [{ angle: radians(7 * random()), axis: 'y' }] as const;
        return loopContour(random() < 0.4 ? { form: 'circle', diameter: metres(size()), at } : random() < 0.5 ? { form: 'trace', length: metres(size()), planeZ: metres(0), at } : { form: 'rectangle', width: metres(size()), height: metres(size()), at }, random() < 0.5 ? turns : []);
      });
      if ('refused' in made[0] || 'refused' in made[1]) continue;
      for (const planes of [[], [metres(0)], [metres(-1e-3), metres(1)]]) {
        const result = mutualInductance(made[0].contour, made[1].contour, { planes });
        if ('inductance' in result) assert.ok(Number.isFinite(result.inductance) && 0 <= result.errorBar, `${n}: ${JSON.stringify(result)}`);
        const own = selfInductance({ contour: made[0].contour, conductor: wire(size()), planes });
        if ('inductance' in own) assert.ok(Number.isFinite(own.inductance) && 0 < own.inductance, `${n}: ${JSON.stringify(own)}`);
      }
    }
  });

  it('keep the work of a thousand points bounded', () => {
    const ring = (z: number) => path(...Array.from({ length: 1000 }, (_, i) => [0.05 * Math.cos((2 * Math.PI * i) / 1000), 0.05 * Math.sin((2 * Math.PI * i) / 1000), z] as const));
    const result = mutualInductance(ring(0.01), ring(0.03), { planes: [metres(0), metres(0.1)] });
    assert.ok('work' in result && result.work < 2e7, JSON.stringify(result));
  });
});

describe('induced voltage', () => {
  it('meets the reference cases', () => {
    for (const id of ['E-ind-1', 'E-ind-3']) {
      const { inputs_SI: i, outputs } = reference('lumped.json', id);
      const loop = { mutual: henries(i.M), inductance: henries(i.Lv), source: { resistance: ohms(i.R_near), capacitance: farads(0) }, load: { resistance: ohms(i.R_far), capacitance: farads(0) } };
      const induced = inducedWaveform(loop, { amplitude: amperes(i.I), duration: seconds(i.tr) });
      near(induced.peak, outputs.V_far_peak, 2e-6, id);
      near(Math.max(...induced.source.values), outputs.V_near_peak, 2e-6, id);
      const { re, im } = inducedTransfer(loop, hertz(1e6))!;
      near(Math.hypot(re, im), (2 * Math.PI * 1e6 * i.M * i.R_far) / Math.hypot(i.R_near + i.R_far, 2 * Math.PI * 1e6 * i.Lv), 1e-12);
    }
  });
});
