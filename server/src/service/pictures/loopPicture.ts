/** The outline of a loop, for whoever shows pictures. */
import { boardLoops, contourOf } from '../../budget/loops/boardLoop';
import type { Evaluation, LoopResult } from '../../budget/results';
import type { Contour } from '../../physics/loops/contour';
import type { Picture } from '../../pictures/picture';
import { loopOutline } from '../../pictures/loopOutline';

/** Null where its path is none that a current can take. */
export function loopPicture({ project }: Evaluation, { loop, area, inductance }: LoopResult): Picture | null {
  const known = boardLoops(project).get(loop);
  const contour = known === undefined ? null : contourOf(known);
  if (contour === null) return null;
  const planes = [...loop.over, ...(loop.shape?.form === 'trace' ? [loop.shape.above] : [])];
  return loopOutline({
    name: loop.name,
    points: cornersOf(contour),
    area,
    areaLimit: loop.areaLimit?.value ?? null,
    inductance,
    conductor: loop.conductor === null ? null : { form: loop.conductor.form, width: loop.conductor.width.value },
    planes: [...new Set(planes.map(({ name }) => name))],
  });
}

type Point = readonly [number, number, number];

function cornersOf(contour: Contour): readonly Point[] {
  if (contour.form === 'polygon') return Array.from({ length: contour.points.length / 3 }, (_, index): Point => [contour.points[3 * index], contour.points[3 * index + 1], contour.points[3 * index + 2]]);
  const { centre, normal, radius } = contour;
  const [u, v] = acrossTo([normal[0], normal[1], normal[2]]);
  return Array.from({ length: circleCorners }, (_, index): Point => {
    const angle = (2 * Math.PI * index) / circleCorners;
    const [cosine, sine] = [radius * Math.cos(angle), radius * Math.sin(angle)];
    return [centre[0] + cosine * u[0] + sine * v[0], centre[1] + cosine * u[1] + sine * v[1], centre[2] + cosine * u[2] + sine * v[2]];
  });
}

const circleCorners = 72;

/** Two directions square to a normal of length 1 and to each other; `u × v` is the normal. */
function acrossTo([x, y, z]: Point): readonly [Point, Point] {
  // Built from the axis that is furthest from the normal.
  const u: Point = Math.abs(z) < 0.9 ? [-y / Math.hypot(x, y), x / Math.hypot(x, y), 0] : [z / Math.hypot(x, z), 0, -x / Math.hypot(x, z)];
  return [u, [y * u[2] - z * u[1], z * u[0] - x * u[2], x * u[1] - y * u[0]]];
}
