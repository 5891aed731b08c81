/**
 * From the words of a run to the numbers of a cross-section: which planes it refers to, what lies
 * around its traces, where each of them stands. The rules are those of the language reference,
 * "stackup" and "run".
 *
 *      air                          no plane above: half-space
 *      mask (film, layer or none)
 *   ----+----+------+----+------    outer trace: on the laminate, fill = mask, then air
 *       prepreg, core, …            insulating rows as they are written
 *   --fill--+----+---fill-------    inner copper row: a layer of the copper's height, filled
 *       prepreg, core, …
 *   ==========================      nearest plane below
 *
 * Deliberately absent: tolerances, and any judgement of whether the section can be solved.
 */
import type { CopperRow, Run, RunConductor, RunRow, StackupRow } from '../../board/model';
import type { Section, SectionConductor, SectionFilm, SectionLayer } from '../../physics/section/section';
import { metres } from '../../units/quantity';
import { canonicalSection, isTurnedOver } from './canonicalSection';

/** A part of a run that no plane separates, as the solver sees it. */
export interface RunSection {
  readonly section: Section;
  /** What stands behind each conductor of the section, in its order: that of the text. */
  readonly conductors: readonly RunConductor[];
  /** Mask follows the copper on both faces: that on the underside counts as planar, since a section has one film. */
  readonly undersidePlanar: boolean;
  /** The section is upside down against the board. */
  readonly turnedOver: boolean;
}

/** The sections of a run, uppermost first: one, unless a plane lies between its rows. */
export function runSections(run: Run): readonly RunSection[] {
  const board = laminate(run.stackup.rows);
  return rowsBetweenPlanes(run, board).map((rows) => sectionOf(run, board, rows));
}

/** The stackup without what covers its faces, top to bottom. */
interface Laminate {
  readonly rows: readonly StackupRow[];
  readonly maskAbove: Mask | null;
  readonly maskBelow: Mask | null;
}

interface Mask {
  readonly thickness: number;
  readonly permittivity: number;
  readonly flat: boolean;
}

function laminate(rows: readonly StackupRow[]): Laminate {
  const first = rows.findIndex((row) => row.kind !== 'mask');
  const last = rows.findLastIndex((row) => row.kind !== 'mask');
  return { rows: rows.slice(first, last + 1), maskAbove: maskOf(rows.slice(0, first)), maskBelow: maskOf(rows.slice(last + 1)) };
}

/** Several mask rows on one face act as one: thicknesses add, and so do the series elastances. */
function maskOf(rows: readonly StackupRow[]): Mask | null {
  let thickness = 0;
  let elastance = 0;
  let flat = false;
  for (const row of rows) {
    if (row.kind !== 'mask') continue;
    thickness += row.thickness.value;
    elastance += row.thickness.value / row.er.value;
    flat ||= row.flat;
  }
  return 0 < thickness ? { thickness, permittivity: thickness / elastance, flat } : null;
}

/** Rows of the run, grouped by the planes between them, in the order of the text within each group. */
function rowsBetweenPlanes(run: Run, board: Laminate): readonly (readonly RunRow[])[] {
  const groups = new Map<number, RunRow[]>();
  for (const row of run.rows) {
    const above = board.rows.slice(0, board.rows.indexOf(row.layer)).findLastIndex((other) => isPlane(other, run));
    groups.set(above, [...(groups.get(above) ?? []), row]);
  }
  return [...groups].sort(([a], [b]) => a - b).map(([, rows]) => rows);
}

function isPlane(row: StackupRow, run: Run): boolean {
  return row.kind === 'plane' && !run.without.includes(row.name);
}

function sectionOf(run: Run, board: Laminate, rows: readonly RunRow[]): RunSection {
  const used = new Set<StackupRow>(rows.map((row) => row.layer));
  const indices = rows.map((row) => board.rows.indexOf(row.layer));
  const above = board.rows.slice(0, Math.min(...indices)).findLastIndex((row) => isPlane(row, run));
  const lowest = Math.max(...indices);
  const below = board.rows.findIndex((row, index) => lowest < index && isPlane(row, run));
  const between = { from: above + 1, to: below < 0 ? board.rows.length : below };
  const faces = { planeAbove: 0 <= above, planeBelow: 0 <= below };
  const surroundings = layersBetween(board, used, { ...between, ...faces });
  const conductors = rows.flatMap((row) => conductorsOf(row, rows[0], board, surroundings.zero));
  const section: Section = { layers: surroundings.layers, ...faces, conductors, film: surroundings.film };
  return { section: canonicalSection(section), conductors: rows.flatMap((row) => row.conductors), undersidePlanar: surroundings.undersidePlanar, turnedOver: isTurnedOver(section) };
}

interface Surroundings {
  readonly layers: readonly SectionLayer[];
  readonly film: SectionFilm | null;
  /** Height in the board that the section counts from. */
  readonly zero: number;
  readonly undersidePlanar: boolean;
}

interface Bounds {
  readonly from: number;
  readonly to: number;
  readonly planeAbove: boolean;
  readonly planeBelow: boolean;
}

/** The layers from bottom to top; the height of the board is counted from its underside, masks outside it. */
function layersBetween(board: Laminate, used: ReadonlySet<StackupRow>, bounds: Bounds): Surroundings {
  const bodies: Mutable<SectionLayer>[] = [];
  let zero = heightBelow(board, bounds.to - 1);
  const above = bounds.planeAbove ? null : faceOf(board, used, 'above');
  const filmed = bounds.planeBelow ? null : faceOf(board, used, 'below');
  const undersidePlanar = above?.film != null && filmed?.film != null;
  const below = undersidePlanar ? faceOf({ ...board, maskBelow: board.maskBelow === null ? null : { ...board.maskBelow, flat: true } }, used, 'below') : filmed;
  if (below !== null) {
    bodies.push({ permittivity: 1, thickness: metres(Infinity) });
    if (below.outer) zero += board.rows[board.rows.length - 1].thickness.value;
    if (below.layer !== null) bodies.push(below.layer);
    if (below.layer !== null) zero -= below.layer.thickness;
  }
  for (let index = bounds.to - 1; bounds.from <= index; index -= 1) {
    const row = board.rows[index];
    // An outer copper row stands on the laminate: its height is the mask's and the air's.
    if ((above?.outer === true && index === 0) || (below?.outer === true && index === board.rows.length - 1)) continue;
    bodies.push({ permittivity: fillOf(board, index), thickness: row.thickness.value });
  }
  if (above?.layer != null) bodies.push(above.layer);
  if (above !== null) bodies.push({ permittivity: 1, thickness: metres(Infinity) });
  const film = above?.film ?? below?.film ?? null;
  return { ...merged(bodies, { film, zero }), undersidePlanar };
}

interface Face {
  /** The outermost row of the board is copper (or a plane that is cut away), which stands on the laminate. */
  readonly outer: boolean;
  readonly layer: SectionLayer | null;
  readonly film: SectionFilm | null;
}

function faceOf(board: Laminate, used: ReadonlySet<StackupRow>, side: 'above' | 'below'): Face {
  const row = side === 'above' ? board.rows[0] : board.rows[board.rows.length - 1];
  const mask = side === 'above' ? board.maskAbove : board.maskBelow;
  // A board of one copper row and nothing else: the row is the upper face's.
  const outer = 'name' in row && (side === 'above' || 1 < board.rows.length);
  if (mask === null) return { outer, layer: null, film: null };
  const { permittivity } = mask;
  if (mask.flat) {
    // Planar: its thickness counts from the copper's top, and it fills the space beside the copper.
    const height = outer ? row.thickness.value : 0;
    return { outer, layer: { permittivity, thickness: metres(height + mask.thickness) }, film: null };
  }
  if (used.has(row)) return { outer, layer: null, film: { permittivity, thickness: metres(mask.thickness), side } };
  return { outer, layer: { permittivity, thickness: metres(mask.thickness) }, film: null };
}

type Mutable<T> = { -readonly [K in keyof T]: T[K] };

/** Neighbours of one permittivity become one layer, so that a trace touches a boundary only where there is one. */
function merged(bodies: readonly SectionLayer[], at: Omit<Surroundings, 'layers' | 'undersidePlanar'>): Omit<Surroundings, 'undersidePlanar'> {
  const layers: Mutable<SectionLayer>[] = [];
  let { zero } = at;
  bodies.forEach((body, index) => {
    const last = layers[layers.length - 1];
    // The face under a film stays a boundary, whatever it is made of.
    const filmed = (at.film?.side === 'above' && index === bodies.length - 1) || (at.film?.side === 'below' && index === 1);
    if (last === undefined || last.permittivity !== body.permittivity || filmed) layers.push({ ...body });
    else {
      if (last.thickness === Infinity && body.thickness !== Infinity) zero += body.thickness;
      last.thickness = metres(last.thickness + body.thickness);
    }
  });
  return { layers, film: at.film, zero };
}

/** What fills a row: an insulating row itself; beside copper the adjacent prepreg, else the row above. */
function fillOf(board: Laminate, index: number): number {
  const row = board.rows[index];
  if ('er' in row) return row.er.value;
  const above = board.rows[index - 1];
  const below = board.rows[index + 1];
  if (above?.kind === 'prepreg') return above.er.value;
  if (below?.kind === 'prepreg') return below.er.value;
  // Copper directly on copper: what insulates them from the rest is as near as there is.
  const insulating = board.rows.slice(0, index).findLast((other) => 'er' in other) ?? board.rows.slice(index).find((other) => 'er' in other);
  return insulating !== undefined && 'er' in insulating ? insulating.er.value : 1;
}

/** Height of the underside of row `index` over the underside of the board. */
function heightBelow(board: Laminate, index: number): number {
  let height = 0;
  for (let other = index + 1; other < board.rows.length; other += 1) height += board.rows[other].thickness.value;
  return height;
}

function conductorsOf(row: RunRow, first: RunRow, board: Laminate, zero: number): readonly SectionConductor[] {
  const y = metres(heightBelow(board, board.rows.indexOf(row.layer)) - zero);
  const height = row.layer.thickness.value;
  const undercut = row.layer.undercut?.value ?? metres(0);
  const wideBelow = wideFaceIsBelow(row.layer, board);
  let left: number = row === first ? 0 : (row.shift?.value ?? 0);
  return row.conductors.map((conductor, index) => {
    const wide = conductor.width.value;
    const shape = wideBelow
      ? { x: metres(left), width: wide, undercut }
      : { x: metres(left + undercut), width: metres(wide - 2 * undercut), undercut: metres(-undercut) };
    left += wide + (row.gaps[index]?.value ?? 0);
    return { role: conductor.kind === 'trace' ? 'signal' : 'reference', y, height, ...shape };
  });
}

/** The wide face lies on the adjacent core; where there is none, or one on each side, it faces the board's middle. */
function wideFaceIsBelow(layer: CopperRow, board: Laminate): boolean {
  const index = board.rows.indexOf(layer);
  const coreAbove = board.rows[index - 1]?.kind === 'core';
  const coreBelow = board.rows[index + 1]?.kind === 'core';
  if (coreAbove !== coreBelow) return coreBelow;
  const under = heightBelow(board, index);
  const over = heightBelow(board, -1) - under - layer.thickness.value;
  return over <= under;
}
