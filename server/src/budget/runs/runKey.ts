/**
 * The name of a run under which its solution is kept: every number and name that enters it, exactly. Whatever
 * `solvedRun` comes to read of a run, a stackup or a net has to stand here.
 */
import type { End, Net, Run, RunConductor, Stackup } from '../../board/model';
import { isReceiver, type Role, type Roles } from '../roles';
import type { SolveCache } from '../solveCache';

/** Keys of one project's runs: its nets and stackups are written out once. */
export function runKeys(roles: Roles, cache: SolveCache): (run: Run) => string {
  const nets = new Map<Net, number>();
  const stackups = new Map<Stackup, number>();
  const net = (trace: Net) => found(nets, trace, () => cache.number(netContent(trace, roles.get(trace))));
  const conductor = (each: RunConductor): string => {
    if (each.kind === 'trace') return `t ${net(each.net)} ${each.width.value} ${each.reversed ? 'r' : 'f'} ${each.after?.value ?? '-'}`;
    return each.kind === 'guard' ? `g ${JSON.stringify(each.name)} ${each.width.value} ${each.stitched?.value ?? '-'}` : `b ${JSON.stringify(each.name)} ${each.width.value}`;
  };
  return ({ name, length, stackup, without, rows }) => {
    let key = `${JSON.stringify(name)} ${length.value} ${found(stackups, stackup, () => cache.number(stackupContent(stackup)))}`;
    for (const plane of without) key += ` w ${JSON.stringify(plane)}`;
    for (const { layer, shift, conductors, gaps } of rows) {
      key += ` on ${stackup.rows.indexOf(layer)} ${shift?.value ?? '-'}`;
      for (const each of conductors) key += ` ${conductor(each)}`;
      for (const { value } of gaps) key += ` ${value}`;
    }
    return key;
  };
}

function found<K>(known: Map<K, number>, key: K, make: () => number): number {
  let value = known.get(key);
  if (value === undefined) known.set(key, (value = make()));
  return value;
}

function stackupContent({ rows }: Stackup): string {
  return written(['stackup', ...rows.flatMap((row) => [row.kind, row.thickness.value, 'er' in row ? row.er.value : row.name, row.kind === 'mask' && row.flat, row.kind === 'copper' ? row.undercut?.value : null])]);
}

function netContent(net: Net, role: Role | undefined): string {
  const { name, swing, rise, fall, bothWays, length, repeats, band, toleratesPeak } = net;
  return written([
    'net', name, role?.drives, role?.receives, ...endContent(role?.source), ...endContent(role?.load), isReceiver(net), toleratesPeak !== null,
    swing !== null, rise?.value, fall?.value, bothWays, length?.value, repeats?.frequency.value, band?.from.value, band?.to.value,
  ]);
}

function endContent(end: End | null | undefined) {
  return [end != null, end?.resistance?.value, end?.capacitance?.value];
}

/** Names in quotes, so that none can pass for the next value; numbers to the last digit. */
function written(values: readonly (string | number | boolean | null | undefined)[]): string {
  return values.map((value) => (typeof value === 'string' ? JSON.stringify(value) : String(value ?? null))).join(' ');
}
