/**
 * The name of a run under which its solution is kept: every number and name that enters it, exactly. Whatever
 * `solvedRun` comes to read of a run, a stackup or a net has to stand here.
 */
import type { End, Net, Run, RunConductor, Stackup } from '../../board/model';
import type { Receiver } from '../receivers';
import type { Role, Roles } from '../roles';
import type { SolveCache } from '../solveCache';
import type { Source } from '../sources';

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
  const { pair } = role ?? {};
  return written([
    'net', net.name, role?.bothWays, role?.length, ...endContent(role?.source), ...endContent(role?.load),
    'pair', pair?.name, pair?.plus?.name, pair?.minus?.name, ...endContent(pair?.across),
    ...(role?.sources ?? []).flatMap(sourceContent), ...(role?.receivers ?? []).flatMap(receiverContent),
  ]);
}

function sourceContent({ signal, moves }: Source) {
  const { kind, name, swing, rise, fall, sine, current, repeats, once, switchesWith } = signal;
  const drawn = current === null ? [] : [current.form, current.amplitude.value, ...(current.form === 'ramp' ? [current.rise?.value] : [current.measure, current.from.value, current.to?.value])];
  const tone = sine === null ? [] : [sine.amplitude.value, sine.measure, sine.from.value, sine.to?.value];
  return [
    'source', kind, name, ...moves.flatMap(({ net, sign }) => [net.name, sign]), switchesWith,
    swing?.value, rise?.value, fall?.value, 'sine', ...tone, 'current', ...drawn,
    'repeats', repeats?.frequency.value, repeats?.duty?.value, once,
  ];
}

function receiverContent({ subject, kind, terms, leak, toleratesPeak, toleratesRms }: Receiver) {
  const { band, samples } = subject;
  return ['receiver', subject.kind, subject.name, kind, ...terms.flatMap(({ net, weight }) => [net.name, weight]), leak, toleratesPeak !== null, toleratesRms !== null, band?.from.value, band?.to.value, samples?.delay.value, samples?.group];
}

function endContent(end: End | null | undefined) {
  return [end != null, end?.resistance?.value, end?.capacitance?.value];
}

/** Names in quotes, so that none can pass for the next value; numbers to the last digit. */
function written(values: readonly (string | number | boolean | null | undefined)[]): string {
  return values.map((value) => (typeof value === 'string' ? JSON.stringify(value) : String(value ?? null))).join(' ');
}
