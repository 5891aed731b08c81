/**
 * Images in the planes that are taken out of a layered kernel in closed form, and what they are in its spectra.
 *
 * Model     two planes: the images between them as if one dielectric filled the space, times `factor`; one plane: its plain
 *           image, but only where no interface lies in it (there the interface's mirror is the plane's image)
 * Method    between two planes each spectrum of the layers has a pole c/k at k = 0, the homogeneous ones have too, and
 *           `factor` is the quotient of the two, so that the difference is bounded. The planes keep their real
 *           distances: one scaled by permittivities gives the right far field as well, but puts an image near the conductors
 *           that only cancels after exact integration, with 1.5 % error on wide traces over thin dielectrics
 * Formula   factor = b / (e_i e_j sum of h/e): 1/e in one dielectric;  images below, above and both of a source in layer i
 *           seen in layer j: -e^(-2kd)/(1 - e^(-2kb)) with d the plane's distance from the layer's face
 * Symbols   b distance of the planes; e_i, e_j permittivities of source and observer; h/e over all layers
 */
import { complex, exponential, oneMinusExponential, over, scaled, type Complex } from './complex';
import type { Mirror } from './layeredKernel';
import type { PlanePair } from './planePair';
import type { Stack } from './stack';

export interface GroundImages {
  readonly planes: ScaledPlanes | null;
  readonly mirrors: readonly Mirror[];
  /** What the images add to each spectrum, with the opposite sign: added to it, they leave the remainder. */
  readonly through: (k: Complex) => Complex;
  readonly below: (k: Complex) => Complex;
  readonly above: (k: Complex) => Complex;
  readonly both: (k: Complex) => Complex;
}

export interface ScaledPlanes extends PlanePair {
  readonly factor: number;
}

export function groundImages({ layers, planeBelow, planeAbove }: Stack, lower: number, upper: number): GroundImages {
  const low = layers[0].bottom;
  const high = layers[layers.length - 1].top;
  const down = layers[lower].bottom - low;
  const up = high - layers[upper].top;
  if (planeBelow && planeAbove) {
    const permeance = layers.reduce((sum, { permittivity, bottom, top }) => sum + (top - bottom) / permittivity, 0);
    const factor = (high - low) / (layers[lower].permittivity * layers[upper].permittivity * permeance);
    const image = (strength: number, distance: number) => (k: Complex) =>
      over(scaled(exponential(scaled(k, -2 * distance)), strength), oneMinusExponential(scaled(k, -2 * (high - low))));
    return {
      planes: { low, high, factor }, mirrors: [],
      through: image(-factor, high - low), below: image(factor, down), above: image(factor, up),
      both: lower === upper ? image(-factor, high - low) : image(-factor, down + up),
    };
  }
  const plain = lower === upper && ((planeBelow && 0 < down) || (planeAbove && 0 < up));
  if (!plain) return { planes: null, mirrors: [], through: none, below: none, above: none, both: none };
  const strength = 1 / layers[lower].permittivity;
  const image = (k: Complex) => scaled(exponential(scaled(k, planeBelow ? -2 * down : -2 * up)), strength);
  return {
    planes: null, mirrors: [{ factor: -strength, at: planeBelow ? low : high }],
    through: none, below: planeBelow ? image : none, above: planeBelow ? none : image, both: none,
  };
}

const none = () => complex(0);
