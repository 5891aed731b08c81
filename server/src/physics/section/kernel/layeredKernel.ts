/**
 * Potential of a line charge in planar layers, split so that each part can be integrated well.
 *
 *   G(dx, y, y') = - direct ln r - sum of mirror ln r(mirrored) + rest,     potential = G Q / (2 pi eps0)
 *
 *   direct    the charge itself: 1/e in its own layer, transmitted into another one
 *   mirrors   its images in the two interfaces next to the points, which conductors may touch, and in a single plane
 *   rest      smooth: the images between two planes in closed form, and the remainder of the spectra as tables
 *
 * Model     source and observer each anywhere in one layer of the stack
 * Method    the mirrors are the limits of the spectra as k goes to infinity. Two planes give every spectrum a pole c/k
 *           at k = 0, which the closed form for one dielectric, times `planes`, takes away exactly, so that the
 *           remainders are bounded. Real plane distances are used: scaled depths would give a near-singular image that
 *           only cancels after exact integration, and 1.5 % error on wide traces over thin dielectrics
 * Formula   limits: Kd = (e - e_below)/(e + e_below), Ku alike, -1 at a plane; transmitted 2 e_m/(e_m + e_m+1) at each
 *           interface; planes = b / (e_i e_j sum of h/e), b the distance of the planes
 * Symbols   see reflection.ts
 * Accuracy  3e-10 absolute in units of the direct part (remainderTable.ts)
 */
import { complex, exponential, minus, oneMinusExponential, over, plus, scaled, type Complex } from './complex';
import { imagesBetweenPlanes, type PlanePair } from './groundPart';
import { crossLayerSpectra, sameLayerSpectra } from './reflection';
import { RemainderTable } from './remainderTable';
import { stackHeight, type Stack } from './stack';

export interface Kernel {
  readonly direct: number;
  readonly mirrors: readonly Mirror[];
  readonly rest: KernelRest | null;
}

/** - factor ln of the distance from the source's image in the height `at`. */
export interface Mirror {
  readonly factor: number;
  readonly at: number;
}

export interface KernelRest {
  readonly planes: (PlanePair & { readonly factor: number }) | null;
  readonly families: readonly Family[];
  /** Where the rest is singular, as images y'' = sign y' + shift of the source. */
  readonly images: readonly Image[];
}

export interface Image {
  readonly sign: 1 | -1;
  readonly shift: number;
}

/** Re F(z), z = observer y + source y' + offset + i |dx|. */
export interface Family {
  readonly observer: 1 | -1;
  readonly source: 1 | -1;
  readonly offset: number;
  readonly table: RemainderTable;
}

/** `y` in the layer `upper`, `ySource` in the layer `lower` for which the kernel was made. */
export function restValue({ planes, families }: KernelRest, dx: number, y: number, ySource: number): number {
  const across = dx < 0 ? -dx : dx;
  let sum = planes === null ? 0 : planes.factor * imagesBetweenPlanes(planes, dx, y, ySource);
  for (let i = 0; i < families.length; i += 1) {
    const family = families[i];
    sum += family.table.value(family.observer * y + family.source * ySource + family.offset, across);
  }
  return sum;
}

/** Source in layer `lower`, observer in layer `upper`, which is the same or one above. */
export function layeredKernel(stack: Stack, lower: number, upper: number): Kernel {
  const { layers, planeBelow, planeAbove } = stack;
  const source = layers[lower];
  const observer = layers[upper];
  const [below, above] = [layers[lower - 1], layers[upper + 1]];
  const interfaceBelow = -Infinity < source.bottom;
  const interfaceAbove = observer.top < Infinity;
  let direct = 1 / source.permittivity;
  for (let i = lower; i < upper; i += 1) direct *= (2 * layers[i].permittivity) / (layers[i].permittivity + layers[i + 1].permittivity);
  const reflectionBelow = interfaceBelow ? (below === undefined ? -1 : contrast(source.permittivity, below.permittivity)) : 0;
  const reflectionAbove = interfaceAbove ? (above === undefined ? -1 : contrast(observer.permittivity, above.permittivity)) : 0;
  const ground = groundOf(stack, lower, upper);
  // At a plane the closed form already holds the image, if not in full strength.
  const mirrorBelow = direct * reflectionBelow + (below === undefined ? ground.planes?.factor ?? 0 : 0);
  const mirrorAbove = direct * reflectionAbove + (above === undefined ? ground.planes?.factor ?? 0 : 0);
  const mirrors: Mirror[] = [
    { factor: mirrorBelow, at: source.bottom },
    { factor: mirrorAbove, at: observer.top },
    ...ground.mirrors,
  ].filter(({ factor }) => 1e-15 * direct < Math.abs(factor));
  if (layers.length === 1) return { direct, mirrors, rest: ground.planes === null ? null : { planes: ground.planes, families: [], images: planeImages(ground.planes) } };

  const thickness = (i: number) => (0 <= i && i < layers.length ? layers[i].top - layers[i].bottom : Infinity);
  const between = Math.min(...layers.slice(lower, upper + 1).map((_, i) => thickness(lower + i)));
  const depthBelow = 2 * Math.min(between, thickness(lower - 1));
  const depthAbove = 2 * Math.min(between, thickness(upper + 1));
  const spectra = lower === upper
    ? (k: Complex) => {
        const { below: r1, above: r2, both: r3 } = sameLayerSpectra(stack, lower, k);
        return { through: scaled(r3, direct), below: scaled(r1, direct), above: scaled(r2, direct), both: scaled(r3, direct) };
      }
    : (k: Complex) => crossLayerSpectra(stack, lower, upper, k);
  // Each spectrum without its limit and its ground part; `shift` e^(k depth) puts the depth into z.
  const candidates: FamilyPlan[] = [];
  const reach = 2 * between;
  if (lower === upper) {
    if (reach < Infinity) {
      // r3 holds e^(-2kd): z is at least 2d less the layer's own thickness.
      const f = (k: Complex) => plus(spectra(k).both, ground.same(k));
      candidates.push({ observer: 1, source: -1, offset: reach, depth: reach, nearest: reach / 2, f }, { observer: -1, source: 1, offset: reach, depth: reach, nearest: reach / 2, f });
    }
  } else {
    if (reach < Infinity) candidates.push({ observer: 1, source: -1, offset: reach, depth: reach, nearest: reach, f: (k) => plus(minus(spectra(k).through, complex(direct)), ground.same(k)) });
    if (interfaceBelow && interfaceAbove) {
      const span = observer.top - source.bottom;
      candidates.push({ observer: -1, source: 1, offset: 2 * span, depth: 0, nearest: span, f: (k) => plus(spectra(k).both, ground.both(k)) });
    }
  }
  if (interfaceBelow && depthBelow < Infinity) {
    const limit = complex(mirrorBelow);
    candidates.push({ observer: 1, source: 1, offset: depthBelow - 2 * source.bottom, depth: depthBelow, nearest: depthBelow, f: (k) => plus(minus(spectra(k).below, limit), ground.below(k)) });
  }
  if (interfaceAbove && depthAbove < Infinity) {
    const limit = complex(mirrorAbove);
    candidates.push({ observer: -1, source: -1, offset: depthAbove + 2 * observer.top, depth: depthAbove, nearest: depthAbove, f: (k) => plus(minus(spectra(k).above, limit), ground.above(k)) });
  }
  const families = familiesOf(candidates, stackHeight(stack), direct);
  const images = [...families.map(imageOf), ...(ground.planes === null ? [] : planeImages(ground.planes))];
  return { direct, mirrors, rest: families.length === 0 && ground.planes === null ? null : { planes: ground.planes, families, images } };

  function groundOf(of: Stack, from: number, to: number) {
    const low = of.layers[0].bottom;
    const high = of.layers[of.layers.length - 1].top;
    const zeroPart = () => complex(0);
    if (planeBelow && planeAbove) {
      const resistance = of.layers.reduce((sum, { permittivity, bottom, top }) => sum + (top - bottom) / permittivity, 0);
      const factor = (high - low) / (of.layers[from].permittivity * of.layers[to].permittivity * resistance);
      const [down, up] = [of.layers[from].bottom - low, high - of.layers[to].top];
      const image = (strength: number, distance: number) => (k: Complex) =>
        over(scaled(exponential(scaled(k, -2 * distance)), strength), oneMinusExponential(scaled(k, -2 * (high - low))));
      return {
        planes: { low, high, factor }, mirrors: [] as Mirror[],
        same: image(-factor, high - low), below: image(factor, down), above: image(factor, up), both: image(-factor, down + up),
      };
    }
    // One plane: its plain image, where no interface lies in it (there the mirror of the interface is the plane's).
    const plain = from === to && (planeBelow ? 0 < from : planeAbove && to < of.layers.length - 1);
    if (!plain) return { planes: null, mirrors: [] as Mirror[], same: zeroPart, below: zeroPart, above: zeroPart, both: zeroPart };
    const strength = 1 / of.layers[from].permittivity;
    const distance = planeBelow ? of.layers[from].bottom - low : high - of.layers[to].top;
    const image = (k: Complex) => scaled(exponential(scaled(k, -2 * distance)), strength);
    return {
      planes: null, mirrors: [{ factor: -strength, at: planeBelow ? low : high }] as Mirror[],
      same: zeroPart, below: planeBelow ? image : zeroPart, above: planeBelow ? zeroPart : image, both: zeroPart,
    };
  }
}

const contrast = (own: number, other: number) => (own - other) / (own + other);

interface FamilyPlan {
  readonly observer: 1 | -1;
  readonly source: 1 | -1;
  readonly offset: number;
  readonly depth: number;
  readonly nearest: number;
  readonly f: (k: Complex) => Complex;
}

/** One table for every spectrum: the two families of a layer's inner reflections share theirs. */
function familiesOf(plans: readonly FamilyPlan[], height: number, direct: number): Family[] {
  const tables = new Map<FamilyPlan['f'], RemainderTable>();
  const families: Family[] = [];
  for (const { observer, source, offset, depth, nearest, f } of plans) {
    let table = tables.get(f);
    if (table === undefined) {
      // e^(-k depth) belongs to z: it is given back to f here, where it stays bounded for Re k > 0.
      table = new RemainderTable({ f: depth === 0 ? f : (k) => lifted(f(k), k, depth), nearest, height });
      tables.set(f, table);
    }
    if (1e-15 * direct < table.size) families.push({ observer, source, offset, table });
  }
  return families;
}

function lifted(value: Complex, k: Complex, depth: number): Complex {
  const growth = exponential(scaled(k, depth));
  return { re: value.re * growth.re - value.im * growth.im, im: value.re * growth.im + value.im * growth.re };
}

function imageOf({ observer, source, offset }: Family): Image {
  // observer y + source y' + offset = 0 at y = -observer (source y' + offset).
  return { sign: observer === source ? -1 : 1, shift: -observer * offset };
}

const planeImages = ({ low, high }: PlanePair): Image[] => [
  { sign: -1, shift: 2 * low }, { sign: -1, shift: 2 * high }, { sign: 1, shift: 2 * (high - low) }, { sign: 1, shift: -2 * (high - low) },
];
