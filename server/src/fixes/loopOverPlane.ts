/** Lays a loop over a plane of its stackup: the image of its current in that plane takes from its field. */
import type { CopperRow, Loop, Place, PlaneRow, Stackup } from '../board/model';
import type { BudgetFault } from '../rules/budgetFault';
import { loopTooLarge, type LoopTooLarge } from '../rules/loopTooLarge';
import type { Finding } from '../rules/rule';
import { writtenName } from '../syntax/writtenName';
import { inText } from '../units/inText';
import type { Edit, Fix, FixContext, Proposal } from './fix';
import { judgedByFinding } from './judged';
import { isUnderVoltage, loopsBehind } from './loopsBehind';
import { rowsAfter } from './rowsAfter';

export function laidOverPlane({ fault }: Finding, context: FixContext): readonly Proposal[] {
  const { budget, largest } = fault as BudgetFault;
  return largest === null ? [] : loopsBehind(context, budget, largest).flatMap((loop) => {
    const laid = overNearest(context, loop);
    return laid === null ? [] : [{ ...laid, moves: planeRoom }];
  });
}

/** For a loop over its limit of inductance; its area stays. */
export function laidOverPlaneForLimit(finding: Finding, context: FixContext): readonly Fix[] {
  if (finding.rule !== loopTooLarge.name) return [];
  const { loop, what, limit } = finding.fault as LoopTooLarge;
  const laid = what === 'area' ? null : overNearest(context, loop);
  if (laid === null) return [];
  const after = context.evaluateWith(laid.edits).loops.find((each) => each.loop.name === loop.name)?.inductance ?? null;
  const fix = after === null ? null : judgedByFinding(finding, context, `${laid.words}: ${inText(after, what)} of ${inText(limit, what)}`, laid.edits);
  return fix === null ? [] : [fix];
}

/** To lay copper under a loop is more than to draw its sides together by some millimetres. */
const planeRoom = 20e-3;

function overNearest(context: FixContext, loop: Loop): Pick<Proposal, 'words' | 'edits'> | null {
  const { layer, stackup, shape, over } = loop;
  // A plane is a layer, and no layer may come nearer to what insulation depends on.
  if (layer === null || layer.kind !== 'copper' || stackup === null || shape === null || shape.form === 'trace' || 0 < over.length || isUnderVoltage(context, loop)) return null;
  const plane = nearestPlane(stackup, layer);
  const after = plane === null ? null : rowPlace(loop);
  if (plane === null || after === null) return null;
  const edit: Edit = rowsAfter(context.text(after.path), after, [['over', writtenName(plane.name)]]);
  return { words: `Lay loop ${loop.name} over ${plane.name}`, edits: [edit] };
}

function nearestPlane({ rows }: Stackup, layer: CopperRow): PlaneRow | null {
  const from = rows.indexOf(layer);
  const distances = rows.flatMap((row, at) => (row.kind === 'plane' ? [{ row, distance: rows.slice(Math.min(at, from) + 1, Math.max(at, from)).reduce((sum, { thickness }) => sum + thickness.value, 0) }] : []));
  return distances.length === 0 ? null : distances.reduce((best, other) => (other.distance < best.distance ? other : best)).row;
}

/** A number in a row of the loop, behind which another row has its place. */
function rowPlace({ conductor, shape }: Loop): Place | null {
  if (conductor !== null) return conductor.width.place;
  switch (shape?.form) {
    case 'rectangle': return shape.width.place;
    case 'circle': return shape.diameter.place;
    case 'path': return shape.points.at(-1)?.y.place ?? null;
    default: return null;
  }
}
