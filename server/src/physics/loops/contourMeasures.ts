/**
 * Area, length and size of a contour.
 *
 * Formula   vector area S = 1/2 Σ (r_i - r_0) x (r_i+1 - r_0): what a uniform field passes through, and the loop's moment per ampere;
 *           for a flat contour its length is the area that a drawing shows, whatever surface spans it
 * Source    Stokes; elementary geometry      Accuracy  rounding
 */
import { metres, squareMetres, type Area, type Length } from '../../units/quantity';
import type { Contour } from './contour';
import { norm, type Vector } from './vector';

export interface ContourMeasures {
  /** m², by the right-hand rule. */
  readonly vectorArea: Vector;
  readonly area: Area;
  readonly perimeter: Length;
  /** Largest distance between two of its points, of a polygon's bounding ball's diameter at most 1.16 times as long. */
  readonly extent: Length;
}

export function contourMeasures(contour: Contour): ContourMeasures {
  if (contour.form === 'circle') {
    const area = Math.PI * contour.radius * contour.radius;
    const [x, y, z] = contour.normal;
    return { vectorArea: [area * x, area * y, area * z], area: squareMetres(area), perimeter: metres(2 * Math.PI * contour.radius), extent: metres(2 * contour.radius) };
  }
  const { points } = contour;
  const vectorArea: [number, number, number] = [0, 0, 0];
  let perimeter = 0;
  let extent = 0;
  for (let i = 0; i < points.length; i += 3) {
    const next = (i + 3) % points.length;
    const a = [points[i] - points[0], points[i + 1] - points[1], points[i + 2] - points[2]];
    const b = [points[next] - points[0], points[next + 1] - points[1], points[next + 2] - points[2]];
    vectorArea[0] += (a[1] * b[2] - a[2] * b[1]) / 2;
    vectorArea[1] += (a[2] * b[0] - a[0] * b[2]) / 2;
    vectorArea[2] += (a[0] * b[1] - a[1] * b[0]) / 2;
    perimeter += Math.hypot(b[0] - a[0], b[1] - a[1], b[2] - a[2]);
    for (let j = 0; j < i; j += 3) {
      const dx = points[i] - points[j];
      const dy = points[i + 1] - points[j + 1];
      const dz = points[i + 2] - points[j + 2];
      extent = Math.max(extent, dx * dx + dy * dy + dz * dz);
    }
  }
  return { vectorArea, area: squareMetres(norm(vectorArea)), perimeter: metres(perimeter), extent: metres(Math.sqrt(extent)) };
}
