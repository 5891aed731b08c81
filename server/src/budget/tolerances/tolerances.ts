/**
 * Every quantity of a project that has a tolerance, by the place where it is stated: a family's value is one quantity for all nets
 * that have it, a stackup's row one for all runs, and the gaps of a range are one number in the text.
 */
import type { Given, Place, Project, StackupRow } from '../../board/model';

export interface Toleranced {
  readonly key: string;
  /** `thickness of prepreg`, `gap in run alley`: to be followed by what it moves. */
  readonly what: string;
  readonly place: Place;
  /** Relative, of the value: half of its band. */
  readonly share: number;
}

export function placeKey({ path, span }: Place): string {
  return `${path} ${span.start}`;
}

export function tolerancedQuantities(project: Project): readonly Toleranced[] {
  const found = new Map<string, Toleranced>();
  const visit = (value: unknown, what: Named) => {
    if (typeof value !== 'object' || value === null) return;
    if (isGiven(value)) {
      const key = placeKey(value.place);
      if (0 < value.tolerance && !found.has(key)) found.set(key, { key, what: typeof what === 'string' ? what : what(value.place), place: value.place, share: value.value === 0 ? 0 : Math.abs(value.tolerance / value.value) });
      return;
    }
    for (const [property, each] of Object.entries(value)) if (!skipped.has(property)) visit(each, named(property, what));
  };
  for (const stackup of project.stackups) for (const row of stackup.rows) for (const [property, each] of Object.entries(row)) visit(each, `${property} of ${rowName(row)}`);
  for (const signal of [...project.nets.values(), ...project.pairs.values()]) {
    const { path, span } = signal.whole;
    const isOwn = (place: Place) => place.path === path && span.start <= place.span.start && place.span.end <= span.end;
    for (const [property, each] of Object.entries(signal)) {
      if (property === 'plus' || property === 'minus') continue;
      visit(each, (place) => `${property} of ${isOwn(place) || signal.family === null ? signal.name : `family ${signal.family}`}`);
    }
  }
  for (const run of project.runs) {
    visit(run.length, `length of run ${run.name}`);
    for (const { conductors, gaps, shift } of run.rows) {
      for (const gap of gaps) visit(gap, `gap in run ${run.name}`);
      visit(shift, `shift in run ${run.name}`);
      for (const conductor of conductors) {
        const who = conductor.kind === 'trace' ? conductor.net.name : conductor.name;
        visit(conductor.width, `width of ${who} in run ${run.name}`);
        if (conductor.kind === 'trace') visit(conductor.after, `place of ${who} in run ${run.name}`);
        if (conductor.kind === 'guard') visit(conductor.stitched, `stitching of ${who} in run ${run.name}`);
      }
    }
  }
  for (const { name, shape, conductor, turns } of project.loops) visit({ shape, conductor, turns }, `size of loop ${name}`);
  for (const { name, pieces } of project.returns) for (const { layer: _, stackup: __, ...piece } of pieces.map((each) => ({ layer: null, stackup: null, ...each }))) visit(piece, `piece of return ${name}`);
  for (const { name, capacitance, mutual } of project.links) visit({ capacitance, mutual }, `value of link ${name}`);
  for (const { name, field, modulated } of project.ambients) visit({ field, modulated }, `field of ambient ${name}`);
  for (const { name, slot, sheet } of project.shields) visit({ slot, sheet }, `size of shield ${name}`);
  return [...found.values()];
}

/** What is demanded, and what only says when or where, has no corner. */
const skipped = new Set(['place', 'whole', 'toleratesPeak', 'toleratesRms', 'commonTolerates', 'samples', 'documentation', 'working']);

type Named = string | ((place: Place) => string);

function named(property: string, what: Named): Named {
  if (property !== 'resistance' && property !== 'capacitance') return what;
  return typeof what === 'string' ? `${property} of the ${what}` : (place) => `${property} of the ${what(place)}`;
}

function rowName(row: StackupRow): string {
  return 'name' in row ? `${row.kind} ${row.name}` : row.kind;
}

function isGiven(value: object): value is Given<number> {
  return 'tolerance' in value && 'value' in value && 'place' in value;
}
