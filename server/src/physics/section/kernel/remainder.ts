/**
 * What mirrors and plane images leave of the spectra, as tables: one function of z for each way from the source to the observer.
 *
 *   way       z - depth                       spectrum            dies away as e^(-2k times …)
 *   through   y - y'                          T - its limit       the thinnest layer from source to observer
 *   below     y + y' - 2 source bottom        R1, T below         that, or the layer under the source
 *   above     2 observer top - y - y'         R2, T above         that, or the layer over the observer
 *   both      y - y' and y' - y               R3 (one layer)      that layer
 *             2 (top - bottom) - y + y'       T both (two layers) not at all, but is never nearer than top - bottom
 *
 * Symbols   spectra as in reflection.ts; y observer, y' source; depth is the last column, given back to the spectrum
 */
import { complex, exponential, minus, plus, scaled, times, type Complex } from './complex';
import type { GroundImages } from './groundImages';
import { crossLayerSpectra, sameLayerSpectra } from './reflection';
import { RemainderTable } from './remainderTable';
import { stackHeight, type Stack } from './stack';

/** Re F(z), z = observer y + source y' + offset + i |dx|. */
export interface Family {
  readonly observer: 1 | -1;
  readonly source: 1 | -1;
  readonly offset: number;
  readonly table: RemainderTable;
}

export interface Limits {
  /** Of the spectra as k goes to infinity: the direct part's and the mirrors' factors. */
  readonly direct: number;
  readonly below: number;
  readonly above: number;
}

export function remainderFamilies(stack: Stack, lower: number, upper: number, limits: Limits, ground: GroundImages): Family[] {
  const { layers } = stack;
  const [low, high] = [layers[lower].bottom, layers[upper].top];
  const thickness = (i: number) => (0 <= i && i < layers.length ? layers[i].top - layers[i].bottom : Infinity);
  let thinnest = Infinity;
  for (let i = lower; i <= upper; i += 1) thinnest = Math.min(thinnest, thickness(i));
  const families: Family[] = [];
  const add = (way: Way, signs: readonly (readonly [1 | -1, 1 | -1])[], offset: number) => {
    const table = new RemainderTable({ f: lifted(way.spectrum, way.depth), nearest: way.nearest, height: stackHeight(stack) });
    if (!(negligible * limits.direct < table.size)) return;
    for (const [observer, source] of signs) families.push({ observer, source, offset: offset + way.depth, table });
  };
  const depthBelow = 2 * Math.min(thinnest, thickness(lower - 1));
  const depthAbove = 2 * Math.min(thinnest, thickness(upper + 1));
  const spectra = lower === upper
    ? (k: Complex) => inOneLayer(stack, lower, limits.direct, k)
    : (k: Complex) => crossLayerSpectra(stack, lower, upper, k);
  const reach = 2 * thinnest;
  if (-Infinity < low && depthBelow < Infinity) {
    const spectrum = (k: Complex) => plus(minus(spectra(k).below, complex(limits.below)), ground.below(k));
    add({ spectrum, depth: depthBelow, nearest: depthBelow }, [[1, 1]], -2 * low);
  }
  if (high < Infinity && depthAbove < Infinity) {
    const spectrum = (k: Complex) => plus(minus(spectra(k).above, complex(limits.above)), ground.above(k));
    add({ spectrum, depth: depthAbove, nearest: depthAbove }, [[-1, -1]], 2 * high);
  }
  if (reach < Infinity && lower < upper) {
    const spectrum = (k: Complex) => plus(minus(spectra(k).through, complex(limits.direct)), ground.through(k));
    add({ spectrum, depth: reach, nearest: reach }, [[1, -1]], 0);
  }
  if (-Infinity < low && high < Infinity) {
    const spectrum = (k: Complex) => plus(spectra(k).both, ground.both(k));
    // In one layer |y - y'| may come up to the layer's thickness, half of the depth.
    if (lower === upper) add({ spectrum, depth: reach, nearest: reach / 2 }, [[1, -1], [-1, 1]], 0);
    else add({ spectrum, depth: 0, nearest: high - low }, [[-1, 1]], 2 * (high - low));
  }
  return families;
}

/** Of the direct part: the layers make no difference. */
const negligible = 1e-15;

interface Way {
  readonly spectrum: (k: Complex) => Complex;
  readonly depth: number;
  readonly nearest: number;
}

function inOneLayer(stack: Stack, layer: number, direct: number, k: Complex) {
  const { below, above, both } = sameLayerSpectra(stack, layer, k);
  return { through: complex(direct), below: scaled(below, direct), above: scaled(above, direct), both: scaled(both, direct) };
}

/** Without its decay e^(-k depth), which z carries. */
function lifted(spectrum: (k: Complex) => Complex, depth: number): (k: Complex) => Complex {
  return depth === 0 ? spectrum : (k) => times(spectrum(k), exponential(scaled(k, depth)));
}
