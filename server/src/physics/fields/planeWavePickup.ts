/**
 * Open-circuit voltage of a contour in a plane wave: one of given incidence, and the worst of all incidences and polarisations.
 *
 * Model     thin contour that does not disturb the wave; with a plane, incident and reflected wave of a perfect infinite plane
 * Formula   V = |e·F|, F = ∮ exp(-j k·r) dl = Σ l_i (sinc(k·l_i/2) exp(-j k·c_i) - 1), c_i the middle of side i: the 1 adds up to zero
 *           around a closed contour, and without it a small loop would lose its digits. The reflected wave enters as the same
 *           integral along the image. Worst linear polarisation: largest eigenvalue of Re(F F*) across the direction
 * Method    directions from a grid as fine as the contour is large in wave lengths, the best refined
 * Source    Faraday, Stokes; method of images
 * Range     no resonances of the contour's own; small against the wave length it equals w A B
 * Accuracy  given incidence: rounding (a circle 1e-12). Worst: 1e-6 of the maximum that the grid leads to
 */
import { speedOfLight } from '../../units/constants';
import { volts, type FieldStrength, type Frequency, type Length, type Voltage } from '../../units/quantity';
import type { Contour } from '../loops/contour';
import { imageIn, pathsOf, together, type CurrentPaths } from '../loops/currentPaths';
import { filamentStride } from '../loops/filamentMutual';
import { difference, dot, frameAround, norm, sum, type Vector } from '../loops/vector';

export interface PlaneWave {
  readonly field: FieldStrength;
  readonly frequency: Frequency;
  /** Where it travels to; unit length. */
  readonly direction: Vector;
  /** Of E; unit length, across the direction. */
  readonly polarisation: Vector;
}

export interface PickupSettings {
  /** Height of the plane that reflects; null without. */
  readonly plane?: Length | null;
}

export function planeWavePickup(contour: Contour, { field, frequency, direction, polarisation }: PlaneWave, { plane = null }: PickupSettings = {}): Voltage {
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const { re, im } = around(elements(contour, plane, k), direction, k);
  return volts(field * Math.hypot(dot(re, polarisation), dot(im, polarisation)));
}

export function worstPickup(contour: Contour, { field, frequency }: Pick<PlaneWave, 'field' | 'frequency'>, { plane = null }: PickupSettings = {}): { readonly voltage: Voltage; readonly direction: Vector } {
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const parts = elements(contour, plane, k);
  const reach = parts.reduce((most, { middle, along }) => Math.max(most, norm(middle) + norm(along) / 2), 0);
  const count = Math.min(mostRings, 8 + Math.ceil(4 * k * reach));
  const at = (theta: number, phi: number): Vector => [Math.sin(theta) * Math.cos(phi), Math.sin(theta) * Math.sin(phi), Math.cos(theta)];
  let best = { value: -1, theta: 0, phi: 0 };
  const look = (theta: number, phi: number): boolean => {
    const value = strongest(parts, at(theta, phi), k);
    if (value <= best.value) return false;
    best = { value, theta, phi };
    return true;
  };
  for (let i = 0; i <= count; i += 1) for (let j = 0; j < 2 * count; j += 1) look((Math.PI * i) / count, (Math.PI * j) / count);
  for (let step = Math.PI / count; 1e-5 < step;) {
    const { theta, phi } = best;
    if (!look(theta + step, phi) && !look(theta - step, phi) && !look(theta, phi + step) && !look(theta, phi - step)) step /= 2;
  }
  return { voltage: volts(field * best.value), direction: at(best.theta, best.phi) };
}

const mostRings = 48;

interface Element {
  readonly middle: Vector;
  readonly along: Vector;
  /** A place of a rule around a circle instead of a side. */
  readonly isPoint: boolean;
}

function elements(contour: Contour, plane: number | null, k: number): readonly Element[] {
  const own = pathsOf(contour);
  const paths: CurrentPaths = plane === null ? own : together(own, imageIn(own, plane));
  const found: Element[] = [];
  for (let at = 0; at < paths.filaments.length; at += filamentStride) {
    const f = paths.filaments;
    const along: Vector = [f[at + 3] * f[at + 6], f[at + 4] * f[at + 6], f[at + 5] * f[at + 6]];
    found.push({ middle: sum([f[at], f[at + 1], f[at + 2]], along, 0.5), along, isPoint: false });
  }
  for (const { centre, normal, radius } of paths.circles) {
    const [u, v] = frameAround(normal);
    const count = Math.min(2000, 40 + Math.ceil(3 * k * radius));
    for (let i = 0; i < count; i += 1) {
      const angle = (2 * Math.PI * i) / count;
      const size = (2 * Math.PI * radius) / count;
      const along = sum([-size * Math.sin(angle) * u[0], -size * Math.sin(angle) * u[1], -size * Math.sin(angle) * u[2]], v, size * Math.cos(angle));
      found.push({ middle: sum(sum(centre, u, radius * Math.cos(angle)), v, radius * Math.sin(angle)), along, isPoint: true });
    }
  }
  // The phase of the whole is free: from one of its own places.
  const origin = found[0].middle;
  return found.map((each) => ({ ...each, middle: difference(each.middle, origin) }));
}

function around(parts: readonly Element[], direction: Vector, k: number): { re: Vector; im: Vector } {
  let re: Vector = [0, 0, 0];
  let im: Vector = [0, 0, 0];
  for (const { middle, along, isPoint } of parts) {
    const phase = k * dot(direction, middle);
    const half = isPoint ? 0 : (k * dot(direction, along)) / 2;
    const sinc = Math.abs(half) < 1e-4 ? 1 - (half * half) / 6 : Math.sin(half) / half;
    const less = Math.abs(half) < 1e-2 ? (-half * half / 6) * (1 - (half * half) / 20) : sinc - 1;
    const sine = Math.sin(phase / 2);
    re = sum(re, along, less - 2 * sinc * sine * sine);
    im = sum(im, along, -sinc * Math.sin(phase));
  }
  return { re, im };
}

/** For 1 V/m, of the worst linear polarisation across the direction. */
function strongest(parts: readonly Element[], direction: Vector, k: number): number {
  const { re, im } = around(parts, direction, k);
  const [u, v] = frameAround(direction);
  const a = dot(re, u) ** 2 + dot(im, u) ** 2;
  const b = dot(re, v) ** 2 + dot(im, v) ** 2;
  const c = dot(re, u) * dot(re, v) + dot(im, u) * dot(im, v);
  return Math.sqrt(Math.max(0, (a + b) / 2 + Math.hypot((a - b) / 2, c)));
}
