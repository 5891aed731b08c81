/**
 * A loop of the text as the physics sees it: its contour in space, its conductor, and the planes whose images count. A conductor on a
 * layer has its middle at that of the copper; both faces of a plane are planes.
 */
import type { Loop, LoopPoint, LoopShape, PlaneRow, Project, StackupRow } from '../../board/model';
import type { LoopConductor } from '../../physics/loops/conductorGmd';
import { loopContour, type Contour, type ContourPoint, type ContourRefusal, type ContourShape } from '../../physics/loops/contour';
import { metres, type Length } from '../../units/quantity';
import { stackupHeights, type RowHeights } from './stackupHeights';

export interface BoardLoop {
  readonly contour: { readonly contour: Contour } | { readonly refused: ContourRefusal };
  /** Null where neither strip nor wire is stated. */
  readonly conductor: LoopConductor | null;
  /** Heights of the faces of the planes that it lies over. */
  readonly planes: readonly Length[];
  readonly assumptions: readonly string[];
}

/** Of copper whose thickness nobody stated. */
const assumedThickness = metres(35e-6);

export function boardLoops(project: Project): ReadonlyMap<Loop, BoardLoop> {
  const heights = new Map(project.stackups.flatMap((stackup) => [...stackupHeights(stackup)]));
  return new Map(project.loops.map((loop) => [loop, boardLoop(loop, heights)]));
}

export function contourOf({ contour }: Pick<BoardLoop, 'contour'>): Contour | null {
  return 'contour' in contour ? contour.contour : null;
}

type Heights = ReadonlyMap<StackupRow, RowHeights>;

function boardLoop(loop: Loop, heights: Heights): BoardLoop {
  const { layer, shape, over, turns, conductor } = loop;
  const z = layer === null ? metres(0) : (heights.get(layer)?.middle ?? metres(0));
  const assumptions = conductor?.form === 'strip' && layer === null ? ['its strip counts as 35 µm thick: it states no layer'] : [];
  const planes = new Set<PlaneRow>(over);
  if (shape?.form === 'trace') planes.add(shape.above);
  const faces = [...planes].flatMap((plane) => {
    const known = heights.get(plane);
    return known === undefined ? [] : [known.bottom, known.top];
  });
  return {
    contour: shape === null ? { refused: { reason: 'no-size' } } : loopContour(contourShape(shape, z, heights), turns.map(({ angle, axis }) => ({ angle: angle.value, axis }))),
    conductor: conductor === null ? null : conductor.form === 'wire' ? { form: 'wire', diameter: conductor.width.value } : { form: 'strip', width: conductor.width.value, thickness: layer?.thickness.value ?? assumedThickness },
    planes: faces,
    assumptions,
  };
}

function contourShape(shape: LoopShape, z: Length, heights: Heights): ContourShape {
  const point = (at: LoopPoint | null): ContourPoint => ({ x: at?.x.value ?? metres(0), y: at?.y.value ?? metres(0), z: at?.z?.value ?? z });
  switch (shape.form) {
    case 'rectangle': return { form: 'rectangle', width: shape.width.value, height: shape.height.value, at: point(shape.at) };
    case 'circle': return { form: 'circle', diameter: shape.diameter.value, at: point(shape.at) };
    case 'path': return { form: 'path', points: shape.points.map(point) };
    case 'trace': {
      const at = point(shape.at);
      const plane = heights.get(shape.above);
      // The face that the trace looks at.
      return { form: 'trace', length: shape.length.value, at, planeZ: plane === undefined ? metres(0) : plane.top <= at.z ? plane.top : plane.bottom };
    }
  }
}
