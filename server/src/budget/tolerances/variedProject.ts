/**
 * A project with some of its quantities at an end of their tolerance. A trace that is wider keeps its centre and takes from the
 * gaps; everything that does not change stays the same object.
 */
import type { Given, Loop, Net, Pair, Project, Run, RunConductor, RunRow, Stackup, StackupRow } from '../../board/model';
import type { Length } from '../../units/quantity';
import { placeKey } from './tolerances';

/** By the place of a quantity: 1 at its upper end, -1 at its lower one. */
export type Shifts = ReadonlyMap<string, 1 | -1>;

export function variedProject(project: Project, shifts: Shifts): Project {
  const of = <Value>(value: Value): Value => varied(value, shifts);
  const nets = new Map<Net, Net>([...project.nets.values()].map((net) => [net, of(net)]));
  const net = (each: Net) => nets.get(each) ?? each;
  const pairs = new Map<Pair, Pair>([...project.pairs.values()].map((pair) => {
    const { plus, minus, ...own } = pair;
    return [pair, same(pair, { ...of(own), plus: plus && net(plus), minus: minus && net(minus) })];
  }));
  const signal = (each: Net | Pair) => (each.kind === 'net' ? net(each) : (pairs.get(each) ?? each));
  const rows = new Map<StackupRow, StackupRow>();
  const stackups = new Map<Stackup, Stackup>(project.stackups.map((stackup) => {
    const after = stackup.rows.map((row) => {
      const changed = of(row);
      rows.set(row, changed);
      return changed;
    });
    return [stackup, after.every((row, at) => row === stackup.rows[at]) ? stackup : { ...stackup, rows: after }];
  }));
  const row = <Row extends StackupRow>(each: Row): Row => (rows.get(each) ?? each) as Row;
  const loop = (each: Loop): Loop => {
    const { layer, stackup, carries, senses, over, shape, ...own } = each;
    const moved = shape === null || shape.form !== 'trace' ? of(shape) : { ...of({ ...shape, above: null }), above: row(shape.above) };
    return { ...of(own), shape: moved, layer: layer && row(layer), stackup: stackup && (stackups.get(stackup) ?? stackup), over: over.map(row), carries: carries.map((carried) => ({ ...of({ current: carried.current, place: carried.place }), net: net(carried.net) })), senses: senses.map((sensed) => ({ ...sensed, signal: signal(sensed.signal) })) };
  };
  const loops = new Map(project.loops.map((each) => [each, loop(each)]));
  return {
    ...project,
    board: of(project.board),
    stackups: [...stackups.values()],
    nets: new Map([...project.nets].map(([name, each]) => [name, net(each)])),
    pairs: new Map([...project.pairs].map(([name, each]) => [name, pairs.get(each)!])),
    runs: project.runs.map((run) => variedRun(run, shifts, { net, row, stackup: stackups.get(run.stackup) ?? run.stackup })),
    loops: [...loops.values()],
    returns: project.returns.map((each) => ({
      ...each,
      over: each.over && row(each.over),
      pieces: each.pieces.map((piece) => (piece.form === 'strip' ? { ...of({ ...piece, layer: null, stackup: null }), layer: row(piece.layer), stackup: stackups.get(piece.stackup) ?? piece.stackup } : of(piece))),
      carries: each.carries.map((carried) => ({ ...carried, net: net(carried.net) })),
      refers: each.refers.map((refers) => ({ ...refers, signal: signal(refers.signal) })),
    })),
    links: project.links.map(({ from, to, ...own }) => ({ ...of(own), from: net(from), to: net(to) })),
    shields: project.shields.map(({ covers, ...own }) => ({ ...of(own), covers: covers.map((covered) => ({ ...covered, subject: 'kind' in covered.subject ? signal(covered.subject) : (loops.get(covered.subject) ?? covered.subject) })) })),
    ambients: project.ambients.map(of),
  };
}

interface Changed {
  readonly net: (net: Net) => Net;
  readonly row: <Row extends StackupRow>(row: Row) => Row;
  readonly stackup: Stackup;
}

function variedRun(run: Run, shifts: Shifts, { net, row, stackup }: Changed): Run {
  const length = varied(run.length, shifts);
  const rows = run.rows.map((each): RunRow => {
    const conductors = each.conductors.map((conductor): RunConductor => {
      const width = varied(conductor.width, shifts);
      if (conductor.kind === 'trace') return same(conductor, { ...conductor, width, after: conductor.after && varied(conductor.after, shifts), net: net(conductor.net) });
      return same(conductor, conductor.kind === 'guard' ? { ...conductor, width, stitched: conductor.stitched && varied(conductor.stitched, shifts) } : { ...conductor, width });
    });
    const wider = conductors.map(({ width }, at) => width.value - each.conductors[at]!.width.value);
    const narrowed = (gap: Given<Length>, at: number) => {
      const by = (wider[at]! + wider[at + 1]!) / 2;
      return by === 0 ? gap : { ...gap, value: (gap.value - by) as Length };
    };
    const shift = each.shift === null ? null : varied(each.shift, shifts);
    const moved = shift === null || wider[0] === 0 ? shift : { ...shift, value: (shift.value - wider[0]! / 2) as Length };
    const layer = row(each.layer);
    const gaps = each.gaps.map((gap, at) => narrowed(varied(gap, shifts), at));
    const kept = layer === each.layer && moved === each.shift && conductors.every((conductor, at) => conductor === each.conductors[at]) && gaps.every((gap, at) => gap === each.gaps[at]);
    return kept ? each : { layer, shift: moved, conductors, gaps };
  });
  const kept = length === run.length && stackup === run.stackup && rows.every((each, at) => each === run.rows[at]);
  return kept ? run : { ...run, length, stackup, rows };
}

function same<Whole extends object>(before: Whole, after: Whole): Whole {
  return (Object.keys(after) as (keyof Whole)[]).every((key) => before[key] === after[key]) ? before : after;
}

/** Every quantity inside moved to its end; the same object where none is. Nothing inside refers to another declaration. */
function varied<Value>(value: Value, shifts: Shifts): Value {
  if (typeof value !== 'object' || value === null) return value;
  if (Array.isArray(value)) {
    const changed = value.map((each) => varied(each, shifts));
    return changed.every((each, at) => each === value[at]) ? value : (changed as Value);
  }
  if ('tolerance' in value && 'value' in value && 'place' in value) {
    const given = value as unknown as Given<number> & { readonly high?: number };
    const shift = shifts.get(placeKey(given.place));
    if (shift === undefined) return value;
    const by = shift * given.tolerance;
    return { ...given, value: given.value + by, ...(given.high === undefined ? {} : { high: given.high + by }) } as unknown as Value;
  }
  let changed: Record<string, unknown> | null = null;
  for (const [key, each] of Object.entries(value)) {
    if (key === 'place' || key === 'whole') continue;
    const after = varied(each, shifts);
    if (after !== each) (changed ??= { ...value } as Record<string, unknown>)[key] = after;
  }
  return (changed ?? value) as Value;
}
