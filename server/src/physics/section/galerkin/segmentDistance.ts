/** Smallest distance of two straight segments that do not cross; from an end of one to the other. */
import type { Segment } from '../basis/side';

export function segmentDistance(a: Segment, b: Segment): number {
  return Math.sqrt(Math.min(
    squareToSegment(a.x0, a.y0, b), squareToSegment(a.x1, a.y1, b),
    squareToSegment(b.x0, b.y0, a), squareToSegment(b.x1, b.y1, a),
  ));
}

function squareToSegment(x: number, y: number, { x0, y0, x1, y1 }: Segment): number {
  const ux = x1 - x0;
  const uy = y1 - y0;
  const along = ((x - x0) * ux + (y - y0) * uy) / (ux * ux + uy * uy);
  const t = along < 0 ? 0 : 1 < along ? 1 : along;
  const dx = x - x0 - t * ux;
  const dy = y - y0 - t * uy;
  return dx * dx + dy * dy;
}
