/** The potential of a line charge in layers, against image series and against the conditions that define it. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { layeredKernel, restValue, type Kernel } from '../../../../server/src/physics/section/kernel/layeredKernel';
import { imagesBetweenPlanes } from '../../../../server/src/physics/section/kernel/planePair';
import { stackOf, type Stack } from '../../../../server/src/physics/section/kernel/stack';
import { metres } from '../../../../server/src/units/quantity';
import { seeded } from '../../../support/seeded';

describe('kernel of a charge on a laminate over a plane', () => {
  it('is the image series of Silvester 1968', () => {
    const random = seeded(5);
    for (const permittivity of [1.5, 4.2, 12]) {
      const stack = stackFrom([[permittivity, 1], [1, Infinity]], 'below');
      const kernel = layeredKernel(stack, 1, 1);
      const contrast = (1 - permittivity) / (1 + permittivity);
      for (let i = 0; i < 300; i += 1) {
        const [dx, y, source] = [Math.exp(12 * random() - 6), 1 + random(), 1 + random()];
        let series = -Math.log(Math.hypot(dx, y - source)) - contrast * Math.log(Math.hypot(dx, y + source - 2));
        let strength = 1 - contrast * contrast;
        for (let n = 1; 1e-18 < Math.abs(strength); n += 1) {
          series += strength * Math.log(Math.hypot(dx, y + source - 2 + 2 * n));
          strength *= contrast;
        }
        close(potential(kernel, dx, y, source), series, 6e-10, `er ${permittivity}, dx ${dx}`);
      }
    }
  });
});

describe('kernel between two planes', () => {
  it('is the sum of the images that mirror each other', () => {
    for (const [dx, y, source] of [[0.01, 0.3, 0.31], [0.4, 0.2, 0.9], [2, 0.5, 0.7], [1e-9, 0.6, 0.6]]) {
      // Images at +-source + 2 n, in pairs about the plane, so that the sum converges as 1/n.
      let sum = Math.log(Math.hypot(dx, y + source));
      const terms = 20_000;
      for (let n = 1; n <= terms; n += 1) {
        sum += Math.log(Math.hypot(dx, y + source - 2 * n) * Math.hypot(dx, y + source + 2 * n) / (Math.hypot(dx, y - source - 2 * n) * Math.hypot(dx, y - source + 2 * n)));
      }
      close(imagesBetweenPlanes({ low: 0, high: 1 }, dx, y, source), sum, 1e-4);
    }
  });

  it('cancels the charge itself on both planes, and far away', () => {
    for (const dx of [0, 0.3, 5, 30]) {
      for (const y of [2, 5]) close(imagesBetweenPlanes({ low: 2, high: 5 }, dx, y, 2.7), Math.log(Math.hypot(dx, y - 2.7)), 1e-13);
    }
    assert.ok(Math.abs(imagesBetweenPlanes({ low: 0, high: 1 }, 12, 0.4, 0.5) - Math.log(Math.hypot(12, 0.1))) < 1e-14);
  });
});

describe('kernel of any layers', () => {
  const stacks: Record<string, Stack> = {
    'three dielectrics between planes': stackFrom([[4.2, 0.3], [3, 0.5], [6, 0.4]], 'both'),
    'five between planes, one thin': stackFrom([[4.2, 0.3], [10, 0.02], [3, 0.5], [2.2, 0.1], [6, 0.4]], 'both'),
    'laminate, mask and air over a plane': stackFrom([[4.2, 1], [3.4, 0.3], [1, Infinity]], 'below'),
    'the same under a plane': stackFrom([[1, Infinity], [3.4, 0.3], [4.2, 1]], 'above'),
    'a board in air': stackFrom([[1, Infinity], [4.7, 1.2], [1, Infinity]], 'none'),
    'two half-spaces': stackFrom([[2, Infinity], [7, Infinity]], 'none'),
  };
  for (const [name, stack] of Object.entries(stacks)) {
    const { layers, planeBelow, planeAbove } = stack;
    const high = layers[layers.length - 1].top;
    const inside = ({ bottom, top }: Stack['layers'][number], part: number) => (bottom === -Infinity ? top - 2 * part : top === Infinity ? bottom + 2 * part : bottom + part * (top - bottom));
    /** Observer in layer i, source in layer j, whichever is higher. */
    const at = (i: number, j: number, dx: number, y: number, source: number) =>
      (i < j ? potential(layeredKernel(stack, i, j), dx, source, y) : potential(layeredKernel(stack, j, i), dx, y, source));

    it(`is continuous, and so is its flux, across every interface: ${name}`, () => {
      for (let source = 0; source < layers.length; source += 1) {
        const ySource = inside(layers[source], 0.4);
        for (let i = 0; i + 1 < layers.length; i += 1) {
          const y = layers[i].top;
          for (const dx of [0.02, 0.4, 3]) {
            const below = at(i, source, dx, y, ySource);
            close(at(i + 1, source, dx, y, ySource), below, 1e-9, `interface ${i}, source in ${source}, dx ${dx}`);
            // One-sided differences of second order.
            const h = 1e-4;
            const slope = (layer: number, step: number) => (-3 * below + 4 * at(layer, source, dx, y + step, ySource) - at(layer, source, dx, y + 2 * step, ySource)) / (2 * step);
            const fluxes = [layers[i].permittivity * slope(i, -h), layers[i + 1].permittivity * slope(i + 1, h)];
            close(fluxes[0], fluxes[1], 2e-4 * (1 + Math.abs(fluxes[0])), `flux at interface ${i}, source in ${source}, dx ${dx}`);
          }
        }
      }
    });

    it(`vanishes on its planes and is the same with source and observer exchanged: ${name}`, () => {
      for (let i = 0; i < layers.length; i += 1) {
        const y = inside(layers[i], 0.4);
        for (const dx of [0.02, 0.4, 3]) {
          if (planeBelow) close(at(0, i, dx, 0, y), 0, 1e-9);
          if (planeAbove) close(at(layers.length - 1, i, dx, high, y), 0, 1e-9);
          close(at(i, i, dx, y, inside(layers[i], 0.7)), at(i, i, dx, inside(layers[i], 0.7), y), 1e-12);
        }
      }
    });
  }

  it('without a plane is -2/(e below + e above) ln r far away, the same constant in every layer', () => {
    const stack = stackFrom([[1, Infinity], [4.7, 1.2], [2, Infinity]], 'none');
    for (const [lower, upper, ySource, y] of [[1, 1, 0.3, 0.8], [0, 1, -0.5, 0.8], [0, 2, -0.5, 1.5], [2, 2, 1.3, 1.7]]) {
      close(potential(layeredKernel(stack, lower, upper), 3000, y, ySource), (-2 / 3) * Math.log(3000), 3e-3);
    }
  });
});

function stackFrom(layers: readonly (readonly [number, number])[], planes: 'below' | 'above' | 'both' | 'none'): Stack {
  return stackOf({
    layers: layers.map(([permittivity, thickness]) => ({ permittivity, thickness: metres(thickness) })),
    planeBelow: planes === 'below' || planes === 'both', planeAbove: planes === 'above' || planes === 'both',
  }, 1);
}

function potential({ direct, mirrors, rest }: Kernel, dx: number, y: number, source: number): number {
  const images = mirrors.reduce((sum, { factor, at }) => sum - factor * Math.log(Math.hypot(dx, y + source - 2 * at)), 0);
  return -direct * Math.log(Math.hypot(dx, y - source)) + images + (rest === null ? 0 : restValue(rest, dx, y, source));
}

function close(actual: number, expected: number, tolerance: number, what = ''): void {
  assert.ok(Math.abs(actual - expected) <= tolerance, `${what}: ${actual} instead of ${expected}`);
}
