/**
 * Inductances of a project's loops, each found again by its numbers: of every loop its own, and of two their mutual one,
 * when it is asked for.
 */
import type { Loop, Project } from '../../board/model';
import { conductorHalfWidth } from '../../physics/loops/conductorGmd';
import { contourDistance } from '../../physics/loops/contourDistance';
import { contourMeasures, type ContourMeasures } from '../../physics/loops/contourMeasures';
import { mutualInductance, type MutualInductance } from '../../physics/loops/mutualInductance';
import { selfInductance, type SelfInductance } from '../../physics/loops/selfInductance';
import { metres, type Length } from '../../units/quantity';
import type { SolveCache } from '../solveCache';
import { stripInductance } from '../stripInductance';
import { boardLoops, contourOf, type BoardLoop } from './boardLoop';

export interface LoopInductances {
  readonly of: (loop: Loop) => LoopNumbers;
  /** Null where either has no contour. */
  readonly mutual: (first: Loop, second: Loop) => MutualInductance | null;
  /** Between the middles of their conductors; 0 where either has no contour. */
  readonly distance: (first: Loop, second: Loop) => Length;
}

export interface LoopNumbers extends BoardLoop {
  /** Null where there is no contour. */
  readonly measures: ContourMeasures | null;
  /** Null without contour or conductor. */
  readonly own: SelfInductance | null;
}

export function loopInductances(project: Project, cache: SolveCache): LoopInductances {
  const boards = boardLoops(project);
  const numbers = new Map<Loop, LoopNumbers>();
  const keys = new Map<Loop, string>();
  for (const [loop, board] of boards) {
    const contour = contourOf(board);
    keys.set(loop, JSON.stringify([contour === null ? null : contour.form === 'circle' ? contour : [...contour.points], board.conductor, board.planes]));
    // Most of a budget needs no more of a loop than its area.
    let own: SelfInductance | null | undefined;
    numbers.set(loop, {
      ...board,
      measures: contour === null ? null : contourMeasures(contour),
      get own() { return (own ??= ownOf(loop, board, keys.get(loop)!, cache)); },
    });
  }
  return {
    of: (loop) => numbers.get(loop)!,
    distance: (first, second) => {
      const [one, other] = [contourOf(numbers.get(first)!), contourOf(numbers.get(second)!)];
      if (one === null || other === null) return metres(0);
      return metres(cache.inductance(`distance ${keys.get(first)!} ${keys.get(second)!}`, () => ({ between: contourDistance(one, other) })).between);
    },
    mutual: (first, second) => {
      const [one, other] = [numbers.get(first)!, numbers.get(second)!];
      const [contour1, contour2] = [contourOf(one), contourOf(other)];
      if (contour1 === null || contour2 === null) return null;
      return cache.inductance(`mutual ${keys.get(first)!} ${keys.get(second)!}`, () => mutualInductance(contour1, contour2, { planes: [...new Set([...one.planes, ...other.planes])], clearance: metres(halfWidth(one) + halfWidth(other)) }));
    },
  };
}

function halfWidth({ conductor }: BoardLoop): number {
  return conductor === null ? 0 : conductorHalfWidth(conductor);
}

function ownOf(loop: Loop, board: BoardLoop, key: string, cache: SolveCache): SelfInductance | null {
  const contour = contourOf(board);
  const { conductor, planes } = board;
  if (contour === null || conductor === null) return null;
  const found = cache.inductance(`own ${key}`, () => selfInductance({ contour, conductor, planes }));
  if ('refused' in found || !found.sectionDecides || conductor.form !== 'strip' || loop.layer === null || loop.layer.kind !== 'copper' || loop.stackup === null) return found;
  // A strip close over its plane: its current crowds, as the cross-section knows.
  const height = stripInductance({ layer: loop.layer, stackup: loop.stackup, width: conductor.width, over: loop.shape?.form === 'trace' ? [...loop.over, loop.shape.above] : loop.over }, cache);
  if (height === null) return found;
  return cache.inductance(`over section ${height.inductance} ${key}`, () => selfInductance({ contour, conductor, planes, overSection: height }));
}
