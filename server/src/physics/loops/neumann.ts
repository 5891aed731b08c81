/**
 * Neumann's integral over two sets of closed current paths, each filament and circle exactly.
 *
 * Method    far apart: `distantNeumann.ts`. Else the sum over pairs: filaments in closed form (`filamentMutual.ts`); coaxial
 *           circles by Maxwell (`circlePotential.ts`); a circle and anything else by adaptive quadrature of the circle's own vector
 *           potential along the other, which is exact where the circle is concerned
 * Formula   M = mu0/(4 pi) N,  N = ∮∮ ds1·ds2 / sqrt(R² + g²)
 * Source    Neumann 1845; Grover, Inductance Calculations, 1946
 * Accuracy  the error handed back: rounding of every pair and the quadratures' differences, added as magnitudes
 */
import { adaptiveGauss } from '../../numeric/adaptiveGauss';
import { circlePotential, coaxialNeumann } from './circlePotential';
import { ballAround, type CirclePath, type CurrentPaths } from './currentPaths';
import { distantNeumann, distantShare, type NeumannIntegral } from './distantNeumann';
import { filamentMutual, filamentStride } from './filamentMutual';
import { cross, difference, dot, frameAround, norm, sum, type Vector } from './vector';

export function neumann(first: CurrentPaths, second: CurrentPaths): NeumannIntegral {
  return farNeumann(first, second) ?? nearNeumann(first, second);
}

/** Null where they are not small against their distance. */
export function farNeumann(first: CurrentPaths, second: CurrentPaths): NeumannIntegral | null {
  const ball1 = ballAround(first);
  const ball2 = ballAround(second);
  const apart = norm(difference(ball1.centre, ball2.centre));
  return ball1.radius + ball2.radius < distantShare * apart ? distantNeumann(first, ball1, second, ball2) : null;
}

/** Also for paths that are not closed; `g` as in `filamentMutual`, for filaments. */
export function nearNeumann(first: CurrentPaths, second: CurrentPaths, g = 0): NeumannIntegral {
  const total = { value: 0, error: 0, work: 0 };
  const add = ({ value, error }: { value: number; error: number }): void => {
    total.value += value;
    total.error += error + 4e-16 * Math.abs(value);
    total.work += 1;
  };
  for (let i = 0; i < first.filaments.length; i += filamentStride) {
    for (let j = 0; j < second.filaments.length; j += filamentStride) add(filamentMutual(first.filaments, i, second.filaments, j, g));
  }
  for (const circle of first.circles) {
    for (let j = 0; j < second.filaments.length; j += filamentStride) add(circleAndFilament(circle, second.filaments, j));
    for (const other of second.circles) add(twoCircles(circle, other));
  }
  for (const circle of second.circles) for (let i = 0; i < first.filaments.length; i += filamentStride) add(circleAndFilament(circle, first.filaments, i));
  return total;
}

/** Relative to what the potential is of: a circle's length of 1/R. */
const tolerance = 1e-12;

function circleAndFilament(circle: CirclePath, filaments: Float64Array, at: number): { value: number; error: number } {
  const start: Vector = [filaments[at] - circle.centre[0], filaments[at + 1] - circle.centre[1], filaments[at + 2] - circle.centre[2]];
  const direction: Vector = [filaments[at + 3], filaments[at + 4], filaments[at + 5]];
  const length = filaments[at + 6];
  const size = length * Math.min(1, (circle.radius / Math.max(circle.radius, norm(start) - length)) ** 2);
  return adaptiveGauss((t) => along(circle, sum(start, direction, t), direction), 0, length, tolerance * size);
}

function twoCircles(first: CirclePath, second: CirclePath): { value: number; error: number } {
  const apart = difference(second.centre, first.centre);
  const height = dot(apart, first.normal);
  const aside = norm(cross(apart, first.normal));
  const tilt = norm(cross(first.normal, second.normal));
  const gap = Math.hypot(first.radius - second.radius, height);
  if (aside + tilt * second.radius <= 1e-13 * Math.max(gap, 1e-3 * (first.radius + second.radius))) {
    return { value: Math.sign(dot(first.normal, second.normal)) * coaxialNeumann(first.radius, second.radius, height), error: 0 };
  }
  const [u, v] = frameAround(second.normal);
  const { radius } = second;
  const size = 2 * Math.PI * radius * Math.min(1, (first.radius / Math.max(first.radius, norm(apart) - radius)) ** 2);
  return adaptiveGauss((angle) => {
    const cosine = Math.cos(angle);
    const sine = Math.sin(angle);
    const place = sum(sum(apart, u, radius * cosine), v, radius * sine);
    return along(first, place, [radius * (cosine * v[0] - sine * u[0]), radius * (cosine * v[1] - sine * u[1]), radius * (cosine * v[2] - sine * u[2])]);
  }, 0, 2 * Math.PI, tolerance * size);
}

/** The circle's potential at a place, seen from its centre, times a direction. */
function along(circle: CirclePath, place: Vector, direction: Vector): number {
  const around = cross(circle.normal, place);
  const rho = norm(around);
  if (rho === 0) return 0;
  return (circlePotential(circle.radius, rho, dot(place, circle.normal)) * dot(around, direction)) / rho;
}
